import { Fault } from '../matrix/fault.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import type { TrialContext } from './context.ts';
import { type ProofOptions, runProof } from './proof.ts';
import type { TrialResult } from './result.ts';

/** One run of a sweep over pivot thresholds. Plain data. */
export interface SweepRow {
  /** u of threshold pivoting; null: static pivoting */
  readonly threshold: number | null;
  readonly factorEntries: number | null;
  /** numeric phase, seconds */
  readonly seconds: number | null;
  readonly pivotGrowth: number | null;
  readonly unrefinedBackwardError: number | null;
  readonly backwardError: number | null;
  readonly delayed: number;
  readonly offDiagonal: number;
  readonly twoByTwo: number;
  readonly perturbed: number;
  readonly verdict: 'green' | 'amber' | 'red' | null;
  /** why the run could not be completed; null where it was */
  readonly failure: string | null;
}

/** The thresholds of a sweep, largest first; 1 is for LU only. */
export const sweptThresholds: readonly number[] = [1, 0.5, 0.1, 0.01, 0.001];

/**
 * Runs the same trial with every pivot threshold and with static pivoting: what safety costs in fill and time. The order and the
 * analysis are those of the trial.
 * @throws Fault "sweep-without-pivoting" for Cholesky; Fault of kind "memory" when a run does not fit
 */
export function sweepThresholds(
  context: TrialContext,
  trial: TrialResult,
  options: ProofOptions = {},
  progress: Progress = noProgress,
): readonly SweepRow[] {
  const { factorization } = trial.choice;
  if (factorization === 'cholesky') {
    throw new Fault(
      'input',
      'sweep-without-pivoting',
      'Cholesky takes its pivots in order: there is no threshold to vary.',
    );
  }
  const thresholds = factorization === 'ldlt' ? sweptThresholds.filter((u) => u <= 0.5) : sweptThresholds;
  const all: readonly (number | null)[] = [...thresholds, null];
  return all.map((threshold, k) => {
    const choice = {
      ...trial.choice,
      pivoting: threshold === null ? ('static' as const) : ('threshold' as const),
      threshold: threshold ?? trial.choice.threshold,
    };
    const part: Progress = (fraction, phase) =>
      progress((k + fraction) / all.length, `${threshold === null ? 'static' : `threshold ${threshold}`}: ${phase}`);
    try {
      const { card, report, seconds } = runProof(context, { ...trial, choice }, options, part);
      return {
        threshold,
        factorEntries: report.factorEntries,
        seconds: seconds.numeric,
        pivotGrowth: card.pivotGrowth,
        unrefinedBackwardError: card.unrefinedBackwardError,
        backwardError: card.backwardError,
        ...card.pivots,
        verdict: card.verdict,
        failure: null,
      };
    } catch (thrown) {
      if (!(thrown instanceof Fault) || thrown.kind !== 'not-completed') throw thrown;
      return {
        threshold,
        factorEntries: null,
        seconds: null,
        pivotGrowth: null,
        unrefinedBackwardError: null,
        backwardError: null,
        offDiagonal: 0,
        delayed: 0,
        twoByTwo: 0,
        perturbed: 0,
        verdict: null,
        failure: thrown.message,
      };
    }
  });
}
