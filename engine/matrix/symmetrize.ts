import { entryCount, type Pattern } from './pattern.ts';
import { transposePattern } from './transpose.ts';

/**
 * Pattern of A + Aᵀ, square A only, diagonal as `diagonal` says: kept as it is, made full (A + Aᵀ + I), or left out.
 * Merges the sorted columns of A and Aᵀ; linear in entries.
 */
export function symmetrize(a: Pattern, diagonal: 'as-stored' | 'full' | 'none'): Pattern {
  const n = a.columns;
  const t = transposePattern(a);
  if (diagonal === 'none' && samePattern(a, t)) return withoutDiagonal(a);
  const columnPointer = new Int32Array(n + 1);
  const rowIndex = new Int32Array(2 * entryCount(a) + (diagonal === 'full' ? n : 0));
  let q = 0;
  for (let j = 0; j < n; j++) {
    let p = a.columnPointer[j];
    let r = t.columnPointer[j];
    const pEnd = a.columnPointer[j + 1];
    const rEnd = t.columnPointer[j + 1];
    let diagonalDone = diagonal !== 'full';
    while (p < pEnd || r < rEnd) {
      const i1 = p < pEnd ? a.rowIndex[p] : n;
      const i2 = r < rEnd ? t.rowIndex[r] : n;
      const i = i1 < i2 ? i1 : i2;
      if (i1 === i) p++;
      if (i2 === i) r++;
      if (!diagonalDone && i >= j) {
        if (i > j) rowIndex[q++] = j;
        diagonalDone = true;
      }
      if (i === j && diagonal === 'none') continue;
      rowIndex[q++] = i;
    }
    if (!diagonalDone) rowIndex[q++] = j;
    columnPointer[j + 1] = q;
  }
  return { rows: n, columns: n, columnPointer, rowIndex: rowIndex.slice(0, q) };
}

function samePattern(a: Pattern, b: Pattern): boolean {
  for (let j = 0; j <= a.columns; j++) if (a.columnPointer[j] !== b.columnPointer[j]) return false;
  for (let p = 0, end = entryCount(a); p < end; p++) if (a.rowIndex[p] !== b.rowIndex[p]) return false;
  return true;
}

/** A pattern that is symmetric already needs no merging. */
function withoutDiagonal(a: Pattern): Pattern {
  const n = a.columns;
  const columnPointer = new Int32Array(n + 1);
  const rowIndex = new Int32Array(entryCount(a));
  let q = 0;
  for (let j = 0; j < n; j++) {
    for (let p = a.columnPointer[j], end = a.columnPointer[j + 1]; p < end; p++) {
      const i = a.rowIndex[p];
      if (i !== j) rowIndex[q++] = i;
    }
    columnPointer[j + 1] = q;
  }
  return { rows: n, columns: n, columnPointer, rowIndex: rowIndex.slice(0, q) };
}
