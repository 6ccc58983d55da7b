import type { BlockTriangularForm } from '../graph/blockTriangular.ts';
import { entryCount, type Pattern } from '../matrix/pattern.ts';
import { transposePattern } from '../matrix/transpose.ts';

/** What column LU really factorizes: the diagonal blocks, rows paired with columns. */
export interface DiagonalBlocks {
  /** rows renumbered by the column they are paired with; entries between different blocks left out; the diagonal full */
  readonly pattern: Pattern;
  /** column -> its block; blocks in the order of the block triangular form */
  readonly blockOf: Int32Array;
  readonly blocks: number;
  /** entries outside the diagonal blocks */
  readonly offDiagonalBlockEntries: number;
  /** entries of A inside the diagonal blocks, absent diagonals added */
  readonly inside: number;
}

/** The diagonal blocks of a block triangular form. With `whole`, one block holds everything (rows still paired). Linear in entries. */
export function diagonalBlocks(a: Pattern, form: BlockTriangularForm, whole: boolean): DiagonalBlocks {
  const n = a.columns;
  const blockOf = new Int32Array(n);
  const pairedColumn = new Int32Array(n);
  for (let b = 0; b < form.blocks; b++) {
    for (let k = form.blockStart[b]; k < form.blockStart[b + 1]; k++) {
      if (!whole) blockOf[form.columnOrder[k]] = b;
      pairedColumn[form.rowOrder[k]] = form.columnOrder[k];
    }
  }
  const columnPointer = new Int32Array(n + 1);
  const rowIndex = new Int32Array(entryCount(a) + n);
  let q = 0;
  let outside = 0;
  let asItIs = true;
  for (let j = 0; j < n; j++) {
    if (pairedColumn[j] !== j) asItIs = false;
    let diagonal = false;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = pairedColumn[a.rowIndex[p]];
      if (blockOf[i] !== blockOf[j]) {
        outside++;
        continue;
      }
      if (i === j) diagonal = true;
      rowIndex[q++] = i;
    }
    if (!diagonal) {
      rowIndex[q++] = j;
      asItIs = false;
    }
    columnPointer[j + 1] = q;
  }
  const unsorted = { rows: n, columns: n, columnPointer, rowIndex: rowIndex.slice(0, q) };
  return {
    // nothing moved, left out or added: the pattern itself
    pattern: asItIs && outside === 0 ? a : transposePattern(transposePattern(unsorted)),
    blockOf,
    blocks: whole ? 1 : form.blocks,
    offDiagonalBlockEntries: outside,
    inside: q,
  };
}

/** An order of the columns sorted by block, keeping the given order inside each block. */
export function byBlock(order: Int32Array, blockOf: Int32Array, blocks: number): Int32Array {
  const next = new Int32Array(blocks + 1);
  for (let k = 0; k < order.length; k++) next[blockOf[order[k]] + 1]++;
  for (let b = 0; b < blocks; b++) next[b + 1] += next[b];
  const out = new Int32Array(order.length);
  for (let k = 0; k < order.length; k++) out[next[blockOf[order[k]]]++] = order[k];
  return out;
}
