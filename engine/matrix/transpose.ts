import { entryCount, type Field, type Pattern, type SparseMatrix, valueWidth } from './pattern.ts';
import { noProgress, type Progress } from './progress.ts';

/** Pattern of Aᵀ. Linear in entries; the result is sorted whatever the order inside the columns of `a` was. */
export function transposePattern(a: Pattern, progress: Progress = noProgress): Pattern {
  const { rows, columns, columnPointer, rowIndex } = a;
  const pointer = rowPointers(a);
  const next = pointer.slice(0, rows);
  const index = new Int32Array(entryCount(a));
  for (let j = 0; j < columns; j++) {
    if ((j & 0xffff) === 0) progress(j / columns, 'transposing');
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) index[next[rowIndex[p]]++] = j;
  }
  return { rows: columns, columns: rows, columnPointer: pointer, rowIndex: index };
}

/** Aᵀ with values (not conjugated). Linear in entries. */
export function transpose(a: SparseMatrix): SparseMatrix {
  const { rows, columns, columnPointer, rowIndex, values } = a;
  const pointer = rowPointers(a);
  const next = pointer.slice(0, rows);
  const index = new Int32Array(entryCount(a));
  const width = valueWidth(a);
  const out = values === null ? null : new Float64Array(values.length);
  for (let j = 0; j < columns; j++) {
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const q = next[rowIndex[p]]++;
      index[q] = j;
      if (out === null || values === null) continue;
      if (width === 1) out[q] = values[p];
      else {
        out[2 * q] = values[2 * p];
        out[2 * q + 1] = values[2 * p + 1];
      }
    }
  }
  const field: Field = a.field;
  return { rows: columns, columns: rows, columnPointer: pointer, rowIndex: index, field, values: out };
}

/** row -> first entry of the row in row order; length rows + 1. */
function rowPointers(a: Pattern): Int32Array {
  const pointer = new Int32Array(a.rows + 1);
  const count = entryCount(a);
  for (let p = 0; p < count; p++) pointer[a.rowIndex[p] + 1]++;
  for (let i = 0; i < a.rows; i++) pointer[i + 1] += pointer[i];
  return pointer;
}
