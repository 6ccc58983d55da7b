import type { SparseMatrix } from '../matrix/pattern.ts';

/** unknown -> 1 where its diagonal entry is absent or zero; and how many of these are stored zeros, known from values only. */
export function zeroDiagonals(a: SparseMatrix): { zero: Uint8Array; stored: number } {
  const n = Math.min(a.rows, a.columns);
  const width = a.field === 'complex' ? 2 : 1;
  const zero = new Uint8Array(n).fill(1);
  let stored = 0;
  for (let j = 0; j < n; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (a.rowIndex[p] !== j) continue;
      const isZero = a.values !== null && a.values[width * p] === 0 && a.values[width * p + width - 1] === 0;
      if (isZero) stored++;
      else zero[j] = 0;
    }
  }
  return { zero, stored };
}
