import type { Trial, TrialId } from '../state/trial.ts';
import type { FigureName, TrialFigures } from '../workers/trialFigures.ts';
import type { Column } from './columns.ts';

/** The figures of the finished trials. */
export type Figures = ReadonlyMap<TrialId, TrialFigures>;

/** How the ledger is sorted; by null keeps the order in which the trials were added. */
export interface Order {
  readonly by: FigureName | null;
  readonly falling: boolean;
}

/** The trials in the order asked for; those without the figure come last either way. */
export function sortTrials(trials: readonly Trial[], figures: Figures, { by, falling }: Order): readonly Trial[] {
  if (by === null) return trials;
  const key = (t: Trial) => figures.get(t.id)?.[by].value ?? null;
  return [...trials].sort((a, b) => {
    const x = key(a);
    const y = key(b);
    if (x === null || y === null) return (x === null ? 1 : 0) - (y === null ? 1 : 0);
    return falling ? y - x : x - y;
  });
}

/** What the bars of a column are drawn against. */
export interface Range {
  /** the best figure, or null if none is better than another */
  readonly best: number | null;
  /** full length of a bar */
  readonly most: number;
  /** the limit, where it lies within the bars; null else */
  readonly limit: number | null;
}

/** Best and largest figure of a column over the finished trials; the limit counts if it is in reach of the bars. */
export function rangeOf(trials: readonly TrialFigures[], column: Column, memoryBytes: number): Range {
  const values = trials.flatMap((t) => t[column.name].value ?? []);
  if (values.length === 0) return { best: null, most: 0, limit: null };
  const most = Math.max(...values);
  const best = column.best === null ? null : column.best === 'least' ? Math.min(...values) : most;
  const inReach = column.againstMemory && memoryBytes <= 2 * most;
  return {
    best: values.length > 1 ? best : null,
    most: inReach ? Math.max(most, memoryBytes) : most,
    limit: inReach ? memoryBytes : null,
  };
}
