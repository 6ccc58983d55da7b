import type { Choice } from '../../engine/trial/choice.ts';
import type { Failure } from '../workers/protocol.ts';

export type TrialId = string;

/** One line of the ledger. */
export interface Trial {
  readonly id: TrialId;
  /** A, B, C …: the stamp on its maps */
  readonly letter: string;
  readonly choice: Choice;
  /** waiting for a worker, running, finished, stopped by the user, or ended by a failure (which says why) */
  readonly state: 'waiting' | 'running' | 'done' | 'stopped' | 'failed';
  readonly fraction: number;
  readonly phase: string;
  readonly failure: Failure | null;
}

/** The k-th stamp: A … Z, AA, AB … */
export function letterOf(k: number): string {
  let out = '';
  for (let q = k; q >= 0; q = Math.floor(q / 26) - 1) out = String.fromCharCode(65 + (q % 26)) + out;
  return out;
}
