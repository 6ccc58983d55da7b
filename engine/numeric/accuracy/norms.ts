import { modulus } from '../../matrix/modulus.ts';
import { entryCount, type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';
import { valuesOf } from './product.ts';

/** Norms of a matrix, from the moduli of its entries. */
export interface Norms {
  /** largest sum of moduli of a column */
  readonly one: number;
  /** largest sum of moduli of a row */
  readonly infinity: number;
  /** largest modulus */
  readonly largest: number;
  /** smallest modulus above zero; 0 if there is none */
  readonly smallestNonzero: number;
  /** row -> sum of its moduli */
  readonly rowSum: Float64Array;
  /** row -> its largest modulus */
  readonly rowLargest: Float64Array;
  /** entries that are NaN or infinite */
  readonly notFinite: number;
}

/** All norms in one sweep over the entries. */
export function normsOf(a: SparseMatrix): Norms {
  const v = valuesOf(a);
  const wide = valueWidth(a) === 2;
  const rowSum = new Float64Array(a.rows);
  const rowLargest = new Float64Array(a.rows);
  let one = 0;
  let largest = 0;
  let smallest = Infinity;
  let notFinite = 0;
  for (let j = 0; j < a.columns; j++) {
    let sum = 0;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const m = wide ? modulus(v[2 * p], v[2 * p + 1]) : Math.abs(v[p]);
      if (!(m < Infinity)) {
        notFinite++;
        continue;
      }
      const i = a.rowIndex[p];
      sum += m;
      rowSum[i] += m;
      if (m > rowLargest[i]) rowLargest[i] = m;
      if (m > largest) largest = m;
      if (m > 0 && m < smallest) smallest = m;
    }
    if (sum > one) one = sum;
  }
  let infinity = 0;
  for (let i = 0; i < a.rows; i++) if (rowSum[i] > infinity) infinity = rowSum[i];
  return {
    one,
    infinity,
    largest,
    smallestNonzero: smallest === Infinity ? 0 : smallest,
    rowSum,
    rowLargest,
    notFinite,
  };
}

/** Position of the first entry that is NaN or infinite, 0-based, or null. */
export function firstNotFinite(a: SparseMatrix): { row: number; column: number } | null {
  const v = valuesOf(a);
  const width = valueWidth(a);
  const count = entryCount(a) * width;
  let at = 0;
  while (at < count && Math.abs(v[at]) < Infinity) at++;
  if (at === count) return null;
  const entry = Math.floor(at / width);
  let column = 0;
  while (a.columnPointer[column + 1] <= entry) column++;
  return { row: a.rowIndex[entry], column };
}
