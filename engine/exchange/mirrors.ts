import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';

/** Entry of (i, j), or −1. */
function find(a: SparseMatrix, i: number, j: number): number {
  let low = a.columnPointer[j];
  let high = a.columnPointer[j + 1];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (a.rowIndex[middle] < i) low = middle + 1;
    else high = middle;
  }
  return low < a.columnPointer[j + 1] && a.rowIndex[low] === i ? low : -1;
}

/** Whether entry q is what the symmetry makes of entry p (NaN mirrors NaN). */
function mirrorAgrees(a: SparseMatrix, p: number, q: number, symmetry: Symmetry): boolean {
  const { values } = a;
  if (values === null) return true;
  const width = a.field === 'complex' ? 2 : 1;
  const same = (x: number, y: number) => x === y || (Number.isNaN(x) && Number.isNaN(y));
  const sign = symmetry === 'skew-symmetric' ? -1 : 1;
  const imaginarySign = symmetry === 'symmetric' ? 1 : -1;
  return (
    same(values[q * width], sign * values[p * width]) &&
    (width === 1 || same(values[2 * q + 1], imaginarySign * values[2 * p + 1]))
  );
}

/** Throws a `Fault` unless one triangle tells the whole matrix: half storage would lose something otherwise. */
export function checkMirrors(a: SparseMatrix, symmetry: Symmetry): void {
  if (symmetry === 'general') return;
  const refuse = (i: number, j: number): Fault =>
    new Fault(
      'input',
      'not-that-symmetric',
      `The matrix is not exactly ${symmetry}: entry (${i + 1}, ${j + 1}) and its mirror do not agree, so one triangle cannot stand for both. Write it as general.`,
      { row: i, column: j },
    );
  if (a.rows !== a.columns) throw refuse(0, 0);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      const q = i === j ? p : find(a, j, i);
      if (q < 0 || !mirrorAgrees(a, p, q, symmetry)) throw refuse(i, j);
    }
  }
}
