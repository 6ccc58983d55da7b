import { type Base, notFiniteReason, notSquare, noValues } from './base.ts';
import { type Fact, fact, markWhere, undefinedFact } from './fact.ts';
import { counted, figure } from './wording.ts';

export interface Dominance {
  /** rows with |aᵢᵢ| ≥ Σ of the other |aᵢⱼ| */
  readonly rows: number;
  /** rows with |aᵢᵢ| > Σ */
  readonly strictRows: number;
  readonly columns: number;
  readonly strictColumns: number;
}

function obstacle(base: Base): string | null {
  if (!base.square) return notSquare(base.matrix);
  if (base.sizes === null) return noValues;
  return base.sizes.notFinite > 0 ? notFiniteReason(base.sizes.notFinite) : null;
}

export function dominanceFact(base: Base): Fact<Dominance> {
  const { sizes } = base;
  const reason = obstacle(base);
  if (sizes === null || reason !== null) return undefinedFact(reason ?? noValues, 'rows');
  const n = sizes.diagonal.length;
  const weak = new Uint8Array(n);
  let strictRows = 0;
  let columns = 0;
  let strictColumns = 0;
  for (let i = 0; i < n; i++) {
    const d = sizes.diagonal[i];
    if (!(d >= sizes.rowSum[i])) weak[i] = 1;
    if (d > sizes.rowSum[i]) strictRows++;
    if (d >= sizes.columnSum[i]) columns++;
    if (d > sizes.columnSum[i]) strictColumns++;
  }
  const mark = markWhere('rows that are not diagonally dominant', 'rows', weak);
  const rows = n - mark.count;
  const sentence =
    rows === n
      ? `Every row is diagonally dominant, ${strictRows === n ? 'all of them' : counted(strictRows)} strictly.`
      : `${counted(rows)} of ${counted(n)} rows are diagonally dominant (${counted(strictRows)} strictly), ${counted(columns)} of the columns.`;
  return fact({ rows, strictRows, columns, strictColumns }, sentence, 'rows', 'rounded', [mark]);
}

export interface Gershgorin {
  /** true: A is symmetric or hermitian, its eigenvalues are real and lie in [real[0], real[1]] */
  readonly real: readonly [number, number];
  /** [0, 0] for a symmetric or hermitian matrix; else the hull of the discs along the imaginary axis */
  readonly imaginary: readonly [number, number];
  readonly realSpectrum: boolean;
}

/** Gershgorin 1931: every eigenvalue lies in a disc about a diagonal entry with the sum of the row's other |a| as radius. */
export function gershgorinFact(base: Base, realSpectrum: boolean): Fact<Gershgorin> {
  const { sizes } = base;
  const reason = obstacle(base);
  if (sizes === null || reason !== null) return undefinedFact(reason ?? noValues, 'as the values');
  const n = sizes.diagonal.length;
  if (n === 0) return undefinedFact('The matrix is empty.', 'as the values');
  const { values, field } = base.matrix;
  const real: [number, number] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  const imaginary: [number, number] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  const ends = new Int32Array(2);
  for (let i = 0; i < n; i++) {
    const p = base.positions.diagonalEntry[i];
    const complex = field === 'complex';
    const re = p < 0 || values === null ? 0 : values[complex ? 2 * p : p];
    const im = p < 0 || values === null || !complex ? 0 : values[2 * p + 1];
    const r = sizes.rowSum[i];
    if (re - r < real[0]) {
      real[0] = re - r;
      ends[0] = i;
    }
    if (re + r > real[1]) {
      real[1] = re + r;
      ends[1] = i;
    }
    if (im - r < imaginary[0]) imaginary[0] = im - r;
    if (im + r > imaginary[1]) imaginary[1] = im + r;
  }
  const range = `${figure(real[0])} and ${figure(real[1])}`;
  const sentence = realSpectrum
    ? `All eigenvalues are real and lie between ${range} (Gershgorin).${real[0] > 0 ? ' So the matrix is positive definite.' : real[1] < 0 ? ' So the matrix is negative definite.' : ''}`
    : `All eigenvalues have real parts between ${range} and imaginary parts between ${figure(imaginary[0])} and ${figure(imaginary[1])} (hull of the Gershgorin discs).`;
  const flag = new Uint8Array(n);
  flag[ends[0]] = flag[ends[1]] = 1;
  const value: Gershgorin = { real, imaginary: realSpectrum ? [0, 0] : imaginary, realSpectrum };
  return fact(value, sentence, 'as the values', 'bound', [
    markWhere('rows that set the ends of the range', 'rows', flag),
  ]);
}
