import type { BlockTriangularForm } from '../graph/blockTriangular.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import type { OrderingMethod, OrderingOptions } from './ordering.ts';

/** Rows and columns of P·A·Q in block triangular form, each diagonal block in an order of its own. */
export interface BlockOrdering {
  /** position -> original row */
  readonly rowOrder: NewToOld;
  /** position -> original column */
  readonly columnOrder: NewToOld;
  readonly notes: readonly string[];
}

/**
 * Orders each diagonal block of a block triangular form with `method`, symmetrically inside the block, so that the matching stays on the
 * diagonal. Off-diagonal blocks do not matter: they are never factorized. Blocks of one and two need no method.
 * `columnsOnly`: the method is a column ordering, so rows keep the order of the form.
 * Held-last unknowns cannot be honoured across blocks and are not accepted here.
 */
export function byBlocks(
  a: Pattern,
  form: BlockTriangularForm,
  method: OrderingMethod,
  options: Omit<OrderingOptions, 'heldLast'>,
  progress: Progress,
  columnsOnly = false,
): BlockOrdering {
  const n = a.columns;
  const rowOrder = new Int32Array(n);
  const columnOrder = new Int32Array(n);
  const rowPosition = new Int32Array(n);
  for (let k = 0; k < n; k++) rowPosition[form.rowOrder[k]] = k;
  const notes = new Set<string>();
  for (let b = 0; b < form.blocks; b++) {
    const start = form.blockStart[b];
    const end = form.blockStart[b + 1];
    progress(start / n, 'ordering blocks');
    if (end - start <= 2) {
      for (let k = start; k < end; k++) {
        rowOrder[k] = form.rowOrder[k];
        columnOrder[k] = form.columnOrder[k];
      }
      continue;
    }
    const block = diagonalBlock(a, form, rowPosition, start, end);
    const inner = method(block, options, (fraction, phase) => progress((start + fraction * (end - start)) / n, phase));
    for (const note of inner.notes) notes.add(note);
    for (let k = start; k < end; k++) {
      const l = start + inner.order[k - start];
      columnOrder[k] = form.columnOrder[l];
      rowOrder[k] = form.rowOrder[columnsOnly ? k : l];
    }
  }
  return { rowOrder: asNewToOld(rowOrder), columnOrder: asNewToOld(columnOrder), notes: [...notes] };
}

/** Positions start … end − 1 of P·A·Q as a pattern of their own, rows sorted. */
function diagonalBlock(
  a: Pattern,
  form: BlockTriangularForm,
  rowPosition: Int32Array,
  start: number,
  end: number,
): Pattern {
  const size = end - start;
  const columnPointer = new Int32Array(size + 1);
  let bound = 0;
  for (let k = start; k < end; k++) {
    const j = form.columnOrder[k];
    bound += a.columnPointer[j + 1] - a.columnPointer[j];
  }
  const rowIndex = new Int32Array(bound);
  let at = 0;
  for (let k = start; k < end; k++) {
    const j = form.columnOrder[k];
    const from = at;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const r = rowPosition[a.rowIndex[p]];
      if (r >= start && r < end) rowIndex[at++] = r - start;
    }
    rowIndex.subarray(from, at).sort();
    columnPointer[k - start + 1] = at;
  }
  return { rows: size, columns: size, columnPointer, rowIndex: rowIndex.slice(0, at) };
}
