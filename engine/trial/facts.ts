import { entryCount, type SparseMatrix } from '../matrix/pattern.ts';
import { transpose } from '../matrix/transpose.ts';
import type { MatrixFacts } from './rules.ts';

/** The facts that decide what can be done with a matrix. One transpose and one pass; linear in entries. */
export function factsOf(a: SparseMatrix, hasCoordinates = false, hasImported = false): MatrixFacts {
  const square = a.rows === a.columns;
  const complex = a.field === 'complex';
  const mirror = square ? mirrorFacts(a) : { patternSymmetric: false, valueSymmetric: false, hermitian: false };
  const diagonal = diagonalFacts(a);
  let notFinite = 0;
  if (a.values !== null) {
    const width = complex ? 2 : 1;
    for (let e = 0; e < a.values.length; e += width) {
      if (!Number.isFinite(a.values[e]) || !Number.isFinite(a.values[e + width - 1])) notFinite++;
    }
  }
  return {
    rows: a.rows,
    columns: a.columns,
    entries: entryCount(a),
    offDiagonalEntries: entryCount(a) - diagonal.stored,
    hasValues: a.values !== null,
    complex,
    ...mirror,
    diagonalPositive: a.values === null ? null : diagonal.allPositive,
    zeroDiagonals: diagonal.zero,
    notFinite,
    hasCoordinates,
    hasImported,
  };
}

function mirrorFacts(a: SparseMatrix): { patternSymmetric: boolean; valueSymmetric: boolean; hermitian: boolean } {
  const t = transpose(a);
  const count = entryCount(a);
  let patternSymmetric = true;
  for (let j = 0; j <= a.columns && patternSymmetric; j++) patternSymmetric = a.columnPointer[j] === t.columnPointer[j];
  for (let p = 0; p < count && patternSymmetric; p++) patternSymmetric = a.rowIndex[p] === t.rowIndex[p];
  if (!patternSymmetric || a.values === null || t.values === null) {
    return { patternSymmetric, valueSymmetric: false, hermitian: false };
  }
  let valueSymmetric = true;
  let hermitian = true;
  if (a.field === 'complex') {
    for (let p = 0; p < count && (valueSymmetric || hermitian); p++) {
      if (a.values[2 * p] !== t.values[2 * p]) valueSymmetric = hermitian = false;
      if (a.values[2 * p + 1] !== t.values[2 * p + 1]) valueSymmetric = false;
      if (a.values[2 * p + 1] !== -t.values[2 * p + 1]) hermitian = false;
    }
  } else {
    for (let p = 0; p < count && valueSymmetric; p++) valueSymmetric = a.values[p] === t.values[p];
    hermitian = valueSymmetric;
  }
  return { patternSymmetric, valueSymmetric, hermitian };
}

function diagonalFacts(a: SparseMatrix): { zero: number; stored: number; allPositive: boolean } {
  const n = Math.min(a.rows, a.columns);
  const complex = a.field === 'complex';
  let zero = 0;
  let positive = 0;
  let storedCount = 0;
  for (let j = 0; j < n; j++) {
    let stored = false;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (a.rowIndex[p] !== j) continue;
      storedCount++;
      if (a.values === null) stored = true;
      else {
        const re = complex ? a.values[2 * p] : a.values[p];
        const im = complex ? a.values[2 * p + 1] : 0;
        stored = re !== 0 || im !== 0;
        if (re > 0 && im === 0) positive++;
      }
    }
    if (!stored) zero++;
  }
  return { zero, stored: storedCount, allPositive: positive === n };
}
