/**
 * Progress and cancel, one thing for every long kernel of the engine.
 */

/** Thrown out of a kernel when its caller asked it to stop. */
export class Cancelled extends Error {
  override readonly name = 'Cancelled';
  constructor() {
    super('Stopped on request.');
  }
}

/**
 * Called by long kernels at least ten times a second, outside hot inner loops.
 * `fraction` is the share done, 0 to 1, never falling inside one phase; `phase` a short name ("coarsening").
 * It throws `Cancelled` when the work is to stop; kernels let it pass and leave nothing half made behind.
 */
export type Progress = (fraction: number, phase: string) => void;

/** For callers that want neither progress nor cancel. */
export const noProgress: Progress = () => {};
