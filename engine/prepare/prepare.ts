import { maximumTransversal } from '../graph/transversal.ts';
import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { type Effect, effectOf } from './effect.ts';
import { equilibrate } from './equilibrate.ts';
import { type LargeEntryMatching, largeEntryMatching } from './largeEntryMatching.ts';
import { type SymmetricMatching, symmetricMatching } from './symmetricMatching.ts';

/** Which preparations are on; the words are those of a trial. Nothing is on by itself. */
export interface PrepareChoice {
  readonly scaling: 'none' | 'equilibrate' | 'matching';
  readonly matching: 'none' | 'structural' | 'large-entry';
  /** keep symmetry: R = C, and pairs instead of a row permutation (Cholesky and LDLᵀ) */
  readonly symmetric: boolean;
}

/** What came of them. */
export interface Prepared {
  /** column -> planned pivot row, a permutation; null when nothing was matched, or symmetric */
  readonly plannedRow: Int32Array | null;
  /** unknown -> partner in a likely 2×2 pivot or itself; null unless symmetric with large-entry matching */
  readonly partner: Int32Array | null;
  readonly rowScaling: Float64Array | null;
  readonly columnScaling: Float64Array | null;
  /** whether anything rests on values: forecasts made with it are to be labelled so */
  readonly valueDependent: boolean;
  /** sizes before and after; null for a pattern without values */
  readonly effect: Effect | null;
  readonly notes: readonly string[];
}

/**
 * Runs the preparations of a choice in their fixed order: matching, then scaling; square matrices.
 * @throws Fault "structurally-singular" when a matching is asked for and no full one exists; "values-missing", "not-finite",
 * "not-symmetric", "not-square" as the parts do
 */
export function prepare(a: SparseMatrix, choice: PrepareChoice, progress: Progress = noProgress): Prepared {
  if (a.rows !== a.columns) {
    throw new Fault(
      'input',
      'not-square',
      `Matching and scaling for a factorization need a square matrix, not ${a.rows} × ${a.columns}.`,
    );
  }
  const notes: string[] = [];
  const wantsMatching = choice.matching === 'large-entry' || choice.scaling === 'matching';
  const paired = wantsMatching && choice.symmetric ? symmetricMatching(a, progress) : null;
  const large = wantsMatching && !choice.symmetric ? largeEntryMatching(a, progress) : null;
  if (large !== null) noteLarge(a, large, notes);
  if (paired !== null) notePairs(a, paired, notes);
  const rowOf =
    choice.matching === 'large-entry' && large !== null
      ? large.rowOf
      : choice.matching === 'structural' && !choice.symmetric
        ? structural(a, progress, notes)
        : null;
  const scaling = scalingOf(a, choice, large, paired, progress, notes);
  return {
    plannedRow: rowOf,
    partner: choice.matching === 'large-entry' && paired !== null ? paired.partner : null,
    rowScaling: scaling?.rowScaling ?? null,
    columnScaling: scaling?.columnScaling ?? null,
    valueDependent: wantsMatching || choice.scaling !== 'none',
    effect: a.values === null ? null : effectOf(a, scaling, rowOf),
    notes,
  };
}

function scalingOf(
  a: SparseMatrix,
  choice: PrepareChoice,
  large: LargeEntryMatching | null,
  paired: SymmetricMatching | null,
  progress: Progress,
  notes: string[],
): { rowScaling: Float64Array; columnScaling: Float64Array } | null {
  if (choice.scaling === 'none') return null;
  if (choice.scaling === 'equilibrate') {
    const e = equilibrate(a, { symmetric: choice.symmetric }, progress);
    notes.push(`equilibrated in ${e.sweeps} sweeps, factors rounded to powers of two`);
    return e;
  }
  if (paired !== null) return { rowScaling: paired.scaling, columnScaling: paired.scaling };
  return large;
}

function structural(a: SparseMatrix, progress: Progress, notes: string[]): Int32Array {
  const matching = maximumTransversal(a, progress);
  refuseDeficient(a, matching.size);
  let moved = 0;
  for (let j = 0; j < a.columns; j++) if (matching.rowOf[j] !== j) moved++;
  notes.push(`${moved} columns got a planned pivot off the diagonal`);
  return matching.rowOf;
}

function noteLarge(a: SparseMatrix, m: LargeEntryMatching, notes: string[]): void {
  refuseDeficient(a, m.size);
  notes.push(`${m.offDiagonal} columns have their large entry off the diagonal (value-dependent)`);
}

function notePairs(a: SparseMatrix, m: SymmetricMatching, notes: string[]): void {
  refuseDeficient(a, m.size);
  notes.push(
    `${m.pairs} likely pivots of order two, ${m.zeroSingles} unknowns alone with a zero diagonal (value-dependent)`,
  );
}

function refuseDeficient(a: SparseMatrix, size: number): void {
  if (size === a.columns) return;
  throw new Fault(
    'not-completed',
    'structurally-singular',
    `Structurally singular: only ${size} of ${a.columns} columns can be matched with a row of their own.`,
  );
}
