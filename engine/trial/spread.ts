import type { Progress } from '../matrix/progress.ts';
import { noProgress } from '../matrix/progress.ts';
import type { Choice } from './choice.ts';
import type { TrialContext } from './context.ts';
import { isFixed } from './order.ts';
import type { TrialResult } from './result.ts';
import { runTrial } from './run.ts';

/** Least, middle and largest of a figure over the runs of a spread. */
export interface SpreadFigure {
  readonly least: number;
  readonly median: number;
  readonly most: number;
}

/** How far a trial's figures hang on seeds and on the numbering. */
export interface TrialSpread {
  readonly runs: number;
  readonly factorEntries: SpreadFigure | null;
  readonly operations: SpreadFigure | null;
}

/**
 * Runs a choice again on seeded relabellings of the unknowns. The first run is `first`, as chosen; natural and imported orders have but one.
 * @param runs in all, at least 1
 */
export function spreadOf(
  context: TrialContext,
  choice: Choice,
  first: TrialResult,
  runs: number,
  progress: Progress = noProgress,
): TrialSpread {
  const results = [first];
  const again = isFixed(choice.ordering) ? 1 : runs;
  for (let k = 1; k < again; k++) {
    const seed = choice.seed + k;
    const tick: Progress = (fraction, phase) => progress((k + fraction) / again, phase);
    results.push(runTrial(context, { ...choice, seed, relabelling: seed }, tick));
  }
  const figure = (value: (t: TrialResult) => number | null): SpreadFigure | null => {
    const values = results.map(value).filter((v) => v !== null);
    if (values.length < results.length) return null;
    values.sort((a, b) => a - b);
    const middle = values.length >> 1;
    const median = values.length % 2 === 1 ? values[middle] : (values[middle - 1] + values[middle]) / 2;
    return { least: values[0], median, most: values[values.length - 1] };
  };
  return {
    runs: results.length,
    factorEntries: figure((t) => t.counts.factorEntries),
    operations: figure((t) => t.counts.operations),
  };
}

/**
 * Which of several spreads cannot be told from the best, by median: those whose runs overlap with its runs. The best itself is not among
 * them.
 */
export function noDifferences(figures: readonly (SpreadFigure | null)[]): readonly boolean[] {
  let best = -1;
  figures.forEach((f, k) => {
    if (f !== null && (best < 0 || f.median < (figures[best]?.median ?? 0))) best = k;
  });
  const most = best < 0 ? 0 : (figures[best]?.most ?? 0);
  return figures.map((f, k) => f !== null && k !== best && f.least <= most);
}
