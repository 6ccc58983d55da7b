import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../matrix/permutation.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { requireSquare } from './square.ts';
import { strongComponents } from './strong.ts';
import { type Matching, maximumTransversal } from './transversal.ts';

/** A square matrix in upper block triangular form: B(k,l) = A(rowOrder[k], columnOrder[l]), solved block by block from the last. */
export interface BlockTriangularForm {
  /** number of diagonal blocks */
  readonly blocks: number;
  /** position -> original row; with `columnOrder` it puts the matching on the diagonal of B */
  readonly rowOrder: NewToOld;
  /** position -> original column */
  readonly columnOrder: NewToOld;
  /** block -> its first position; length blocks + 1 */
  readonly blockStart: Int32Array;
  /** largest number of entries no two of which share a row or a column */
  readonly structuralRank: number;
  /**
   * True when the structural rank is full and so the diagonal of B is free of zeros. False: the matching was completed
   * arbitrarily (free columns with free rows, both in increasing order) and the blocks depend on that.
   */
  readonly zeroFreeDiagonal: boolean;
}

/**
 * Block triangular form of a square pattern: maximum transversal, then strong components (Duff 1981; Tarjan 1972; Pothen & Fan
 * 1990). Inside a block the columns keep their original order. Pass a maximum `matching` where one is known.
 */
export function blockTriangularForm(
  a: Pattern,
  progress: Progress = noProgress,
  matching: Matching = maximumTransversal(a, progress),
): BlockTriangularForm {
  const n = requireSquare(a, 'Block triangular form');
  const full = matching.size === n;
  const columnOf = full ? matching.columnOf : completed(matching);
  const { count, of, size } = strongComponents(a, columnOf, progress);
  const blockStart = new Int32Array(count + 1);
  for (let b = 0; b < count; b++) blockStart[b + 1] = blockStart[b] + size[b];
  const next = blockStart.slice(0, count);
  const columnOrder = new Int32Array(n);
  const place = new Int32Array(n);
  for (let j = 0; j < n; j++) {
    const k = next[of[j]]++;
    columnOrder[k] = j;
    place[j] = k;
  }
  const rowOrder = new Int32Array(n);
  for (let i = 0; i < n; i++) rowOrder[place[columnOf[i]]] = i;
  return {
    blocks: count,
    rowOrder: asNewToOld(rowOrder),
    columnOrder: asNewToOld(columnOrder),
    blockStart,
    structuralRank: matching.size,
    zeroFreeDiagonal: full,
  };
}

/** row -> column with the free rows paired with the free columns, both in increasing order. */
function completed(matching: Matching): Int32Array {
  const columnOf = matching.columnOf.slice();
  let j = 0;
  for (let i = 0; i < columnOf.length; i++) {
    if (columnOf[i] >= 0) continue;
    while (matching.rowOf[j] >= 0) j++;
    columnOf[i] = j++;
  }
  return columnOf;
}
