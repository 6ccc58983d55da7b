import type { SparseMatrix } from '../matrix/pattern.ts';
import { asNewToOld, asOldToNew, orderOf } from '../matrix/permutation.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { TrialContext } from './context.ts';
import { defaultChoice } from './rules.ts';
import { runTrial } from './run.ts';

/** Factor entries of the Cholesky factor of A + Aᵀ + I in the order that a vector means when read either way. */
export interface BothDirections {
  readonly 'new-to-old': number | null;
  readonly 'old-to-new': number | null;
}

/** Forecasts both readings of a permutation that does not say its direction (`values`, 0-based); null for a rectangular matrix. */
export function bothDirections(
  matrix: SparseMatrix,
  values: Int32Array,
  progress: Progress = noProgress,
): BothDirections {
  if (matrix.rows !== matrix.columns) return { 'new-to-old': null, 'old-to-new': null };
  const entries = (imported: ReturnType<typeof asNewToOld>): number | null => {
    const context = new TrialContext({ matrix, coordinates: null, imported, heldLast: null });
    return runTrial(context, defaultChoice('cholesky', 'imported'), progress).counts.factorEntries;
  };
  return { 'new-to-old': entries(asNewToOld(values)), 'old-to-new': entries(orderOf(asOldToNew(values))) };
}

/** The reading with fewer factor entries, or null where both are equal or unknown. */
export function leanerDirection(of: BothDirections): keyof BothDirections | null {
  const a = of['new-to-old'];
  const b = of['old-to-new'];
  if (a === null || b === null || a === b) return null;
  return a < b ? 'new-to-old' : 'old-to-new';
}
