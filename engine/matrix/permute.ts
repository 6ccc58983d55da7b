import { entryCount, type Pattern, type SparseMatrix, valueWidth } from './pattern.ts';
import { type NewToOld, positionOf } from './permutation.ts';
import { transpose, transposePattern } from './transpose.ts';

/** Pattern of P·A·Q: entry (k,l) of the result is A(rowOrder[k], columnOrder[l]). Both orders new-to-old. */
export function permutePattern(a: Pattern, rowOrder: NewToOld, columnOrder: NewToOld): Pattern {
  const rowPosition = positionOf(rowOrder);
  const columnPointer = new Int32Array(a.columns + 1);
  const rowIndex = new Int32Array(entryCount(a));
  let q = 0;
  for (let l = 0; l < a.columns; l++) {
    const j = columnOrder[l];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) rowIndex[q++] = rowPosition[a.rowIndex[p]];
    columnPointer[l + 1] = q;
  }
  // transposing twice sorts the rows inside the columns in linear time
  return transposePattern(transposePattern({ rows: a.rows, columns: a.columns, columnPointer, rowIndex }));
}

/** P·A·Q with values; conventions of `permutePattern`. Symmetric use: both orders the same. */
export function permute(a: SparseMatrix, rowOrder: NewToOld, columnOrder: NewToOld): SparseMatrix {
  const rowPosition = positionOf(rowOrder);
  const width = valueWidth(a);
  const columnPointer = new Int32Array(a.columns + 1);
  const rowIndex = new Int32Array(entryCount(a));
  const values = a.values === null ? null : new Float64Array(a.values.length);
  let q = 0;
  for (let l = 0; l < a.columns; l++) {
    const j = columnOrder[l];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++, q++) {
      rowIndex[q] = rowPosition[a.rowIndex[p]];
      if (values === null || a.values === null) continue;
      for (let w = 0; w < width; w++) values[q * width + w] = a.values[p * width + w];
    }
    columnPointer[l + 1] = q;
  }
  return transpose(transpose({ ...a, columnPointer, rowIndex, values }));
}
