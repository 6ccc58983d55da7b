import type { SparseMatrix } from '../matrix/pattern.ts';
import type { ImportNote } from './loaded.ts';

/** What is put behind the name of a matrix whose values are ours, so that no report can pass them off as the user's. */
export const syntheticMark = ' (synthetic values)';

/**
 * Values for a pattern, so that numeric work can be tried on it: −1 off the diagonal; on it, one more than the larger number of
 * off-diagonal entries in its row and its column, so that rows and columns are strictly diagonally dominant. Positions stay as they are:
 * a diagonal position that is not stored gets no value. A matrix that has values is left alone, with a note.
 */
export function withSyntheticValues(a: SparseMatrix, notes: ImportNote[]): SparseMatrix {
  if (a.values !== null) {
    notes.push({ code: 'values-kept', text: 'The file has values of its own; they were kept.' });
    return a;
  }
  const { rows, columns, columnPointer, rowIndex } = a;
  const inRow = new Int32Array(rows);
  for (let p = 0; p < rowIndex.length; p++) inRow[rowIndex[p]]++;
  const values = new Float64Array(rowIndex.length).fill(-1);
  let stored = 0;
  for (let j = 0; j < columns; j++) {
    const inColumn = columnPointer[j + 1] - columnPointer[j];
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      if (rowIndex[p] !== j) continue;
      // the counts hold the diagonal entry itself, which makes up for the one more
      values[p] = Math.max(inRow[j], inColumn);
      stored++;
    }
  }
  const absent = Math.min(rows, columns) - stored;
  notes.push({
    code: 'synthetic-values',
    text: `The values are synthetic, made by this program on request: −1 off the diagonal, a dominant diagonal.${absent === 0 ? '' : ` ${absent} diagonal positions are not stored and stay so.`} Numeric results say nothing about the real system.`,
  });
  return { ...a, field: 'real', values };
}
