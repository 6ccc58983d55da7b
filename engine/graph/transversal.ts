import type { Pattern } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { transposePattern } from '../matrix/transpose.ts';
import { augmentInto } from './augment.ts';
import { assignInto } from './cheapAssignment.ts';

/** A matching of rows and columns over entries. */
export interface Matching {
  /** row -> the column matched with it, −1 if none */
  readonly columnOf: Int32Array;
  /** column -> the row matched with it, −1 if none */
  readonly rowOf: Int32Array;
  /** number of pairs; of a maximum matching: the structural rank */
  readonly size: number;
}

/**
 * A maximum matching (maximum transversal, Duff 1981) of any pattern; stored zeros count as entries. A full stored diagonal is
 * taken as it is. Else a cheap assignment (Karp & Sipser 1981), then pushes guided by distances to the free rows
 * (`augmentInto`). O(entries · √n) at worst, a few passes in practice. No recursion.
 * `transposed`, where the caller has it, is the pattern of Aᵀ (A itself when the pattern is symmetric).
 */
export function maximumTransversal(
  a: Pattern,
  progress: Progress = noProgress,
  transposed: (() => Pattern) | null = null,
): Matching {
  const columnOf = new Int32Array(a.rows).fill(-1);
  const rowOf = new Int32Array(a.columns).fill(-1);
  if (a.rows === a.columns && hasFullDiagonal(a)) {
    for (let j = 0; j < a.columns; j++) columnOf[j] = rowOf[j] = j;
    return { columnOf, rowOf, size: a.columns };
  }
  progress(0, 'cheap assignment');
  const t = transposed === null ? transposePattern(a) : transposed();
  let size = assignInto(columnOf, rowOf, a, t, progress);
  size += augmentInto(columnOf, rowOf, a, t, progress);
  return { columnOf, rowOf, size };
}

function hasFullDiagonal(a: Pattern): boolean {
  const { columnPointer, rowIndex } = a;
  for (let j = 0; j < a.columns; j++) {
    // rows are sorted: halving finds the diagonal
    const end = columnPointer[j + 1];
    let low = columnPointer[j];
    let high = end;
    while (low < high) {
      const middle = (low + high) >>> 1;
      if (rowIndex[middle] < j) low = middle + 1;
      else high = middle;
    }
    if (low === end || rowIndex[low] !== j) return false;
  }
  return true;
}
