import type { ReplayedTrial } from './replay.ts';

/** Limits of a gate; null: none. */
export interface GateLimits {
  readonly factorBytes: number | null;
  readonly peakBytes: number | null;
  readonly operations: number | null;
}

/** One limit held against its figure. */
export interface GateLine {
  readonly limit: keyof GateLimits;
  readonly most: number;
  /** null where the figure is not defined, which counts as passed limit: nothing is known to hold */
  readonly found: number | null;
  /** found − most where that is above zero, else 0; null where nothing was found */
  readonly over: number | null;
  readonly holds: boolean;
  /** high end of the range proven for every pivot sequence; null where pivots cannot move the figure */
  readonly worst: number | null;
}

/** Holds the limits against a replayed trial, in their order; limits that are not set are left out. */
export function gateLines(trial: ReplayedTrial, limits: GateLimits): readonly GateLine[] {
  const { counts } = trial.result;
  const pivoted = trial.result.choice.pivoting === 'threshold' ? counts.range : null;
  const rows = [
    ['factorBytes', counts.factorBytes, pivoted?.bytes[1] ?? null],
    ['peakBytes', trial.forecast?.peak.bytes ?? null, null],
    ['operations', counts.operations, pivoted?.operations[1] ?? null],
  ] as const;
  return rows.flatMap(([limit, found, worst]) => {
    const most = limits[limit];
    if (most === null) return [];
    const holds = found !== null && found <= most;
    return [{ limit, most, found, over: found === null ? null : Math.max(0, found - most), holds, worst }];
  });
}
