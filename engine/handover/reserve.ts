import type { TrialForecast } from '../forecast/forecast.ts';
import type { Target } from '../forecast/target.ts';
import type { TrialContext } from '../trial/context.ts';
import type { TrialResult } from '../trial/result.ts';

/** Memory to set aside on the target, and how it came about. Bytes. */
export interface Reserve {
  readonly layout: string;
  /** factors in compressed columns at the widths of the target */
  readonly factorBytes: number | null;
  /** factors and working storage at their highest */
  readonly peakBytes: number;
  /** the matrix itself, which most solvers keep beside the factors */
  readonly matrixBytes: number;
  /** share added for what the forecast cannot know */
  readonly marginShare: number;
  readonly reserveBytes: number;
  readonly basis: string;
  readonly fitsTarget: boolean;
}

/** Shares are round figures of common practice, no source; where the forecast knows a larger growth, that is taken. */
const exactMargin = 0.15;
const delayedMargin = 0.3;
const interchangedMargin = 0.5;

export function reserveFor(
  context: TrialContext,
  trial: TrialResult,
  forecast: TrialForecast,
  target: Target,
): Reserve {
  const { choice } = trial;
  const { facts } = context;
  const { bytes: peakBytes } = forecast.peak;
  const scalar = target.scalarBytes * (facts.complex ? 2 : 1);
  const matrixBytes = facts.entries * (scalar + target.indexBytes) + 8 * (facts.columns + 1);
  const { share, basis } = marginOf(trial, forecast);
  const reserveBytes = Math.ceil((peakBytes + matrixBytes) * (1 + share));
  return {
    layout:
      choice.factorization === 'column-lu'
        ? 'compressed columns of L and U'
        : 'dense trapezoids with one index list a supernode, and the stack of contribution blocks',
    factorBytes: forecast.storage.compressedColumns.value,
    peakBytes,
    matrixBytes,
    marginShare: share,
    reserveBytes,
    basis,
    fitsTarget: reserveBytes <= target.memoryBytes,
  };
}

function marginOf({ choice, counts }: TrialResult, forecast: TrialForecast): { share: number; basis: string } {
  if (choice.pivoting !== 'threshold') {
    return { share: exactMargin, basis: 'the counts are exact; the margin is for work arrays and alignment' };
  }
  if (choice.factorization === 'column-lu') {
    const expected = counts.expected?.bytes ?? null;
    const most = counts.range?.bytes[1] ?? null;
    if (expected === null || most === null || expected === 0) {
      return { share: interchangedMargin, basis: 'row interchanges move the counts' };
    }
    const proven = most / expected - 1;
    return proven < interchangedMargin
      ? { share: proven, basis: 'no pivot sequence can take more: the proven high end of the range' }
      : {
          share: interchangedMargin,
          basis: `row interchanges move the counts; the proven worst case would add ${(100 * proven).toPrecision(3)} %`,
        };
  }
  const { delayed, bytes } = forecast.peak;
  const modelled = delayed === null || bytes === 0 ? 0 : delayed / bytes - 1;
  return modelled > delayedMargin
    ? { share: modelled, basis: 'modelled growth with a fifth of the pivots delayed' }
    : { share: delayedMargin, basis: 'delayed pivots make fronts grow' };
}
