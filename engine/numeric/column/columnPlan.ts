import { type BlockTriangularForm, blockTriangularForm } from '../../graph/blockTriangular.ts';
import type { Pattern } from '../../matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../matrix/permutation.ts';
import { permutePattern } from '../../matrix/permute.ts';
import { noProgress, type Progress } from '../../matrix/progress.ts';

/** What column LU wants to know before it starts; the fields go into `factorizeColumns` and its options as they are. */
export interface ColumnPlan {
  readonly columnOrder: NewToOld;
  /** original column -> original row of its planned pivot */
  readonly plannedRow: Int32Array;
  readonly blockStart: Int32Array;
}

/**
 * Orders the columns inside every block of a block triangular form. Each block is shown to `orderBlock` as a square pattern with the
 * planned pivots on its diagonal, so that orderings of A + Aᵀ and of AᵀA both fit; blocks of one or two need none.
 *
 * @param form a block form of `a`; default its own. Its matching becomes the planned pivots.
 */
export function columnPlan(
  a: Pattern,
  orderBlock: (block: Pattern) => NewToOld,
  form: BlockTriangularForm = blockTriangularForm(a),
  progress: Progress = noProgress,
): ColumnPlan {
  const n = a.columns;
  const { blockStart, rowOrder, columnOrder } = form;
  const permuted = permutePattern(a, rowOrder, columnOrder);
  const order = new Int32Array(n);
  const plannedRow = new Int32Array(n);
  for (let k = 0; k < n; k++) plannedRow[columnOrder[k]] = rowOrder[k];
  for (let b = 0; b < form.blocks; b++) {
    if ((b & 0xff) === 0) progress(b / form.blocks, 'ordering inside blocks');
    const start = blockStart[b];
    const end = blockStart[b + 1];
    const inside = end - start > 2 ? orderBlock(diagonalBlock(permuted, start, end)) : null;
    for (let k = start; k < end; k++) order[k] = columnOrder[inside === null ? k : start + inside[k - start]];
  }
  return { columnOrder: asNewToOld(order), plannedRow, blockStart };
}

/** The block of positions start … end − 1 of a block upper triangular pattern. */
function diagonalBlock(b: Pattern, start: number, end: number): Pattern {
  const size = end - start;
  if (size === b.columns) return b;
  const columnPointer = new Int32Array(size + 1);
  const rowIndex = new Int32Array(b.columnPointer[end] - b.columnPointer[start]);
  let q = 0;
  for (let k = start; k < end; k++) {
    for (let p = b.columnPointer[k]; p < b.columnPointer[k + 1]; p++) {
      // rows of earlier blocks are not in it
      if (b.rowIndex[p] >= start) rowIndex[q++] = b.rowIndex[p] - start;
    }
    columnPointer[k - start + 1] = q;
  }
  return { rows: size, columns: size, columnPointer, rowIndex: rowIndex.slice(0, q) };
}
