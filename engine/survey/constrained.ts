import { type Base, notSquare } from './base.ts';
import { type Fact, fact, markWhere, undefinedFact } from './fact.ts';
import { type MirrorScan, scanMirrors } from './mirror.ts';
import type { Ticker } from './ticker.ts';
import { counted, figure, lines, plural } from './wording.ts';

export interface Constrained {
  /** rows whose only nonzero stands on the diagonal (stored zeros elsewhere do not count) */
  readonly rows: number;
  /** of these: rows whose diagonal entry is exactly 1; null for a pattern */
  readonly unitRows: number | null;
  /** columns whose only nonzero stands on the diagonal */
  readonly columns: number;
  /** unknowns with such a row or column */
  readonly unknowns: number;
  /** the matrix without these unknowns; null where there are none, or nothing else */
  readonly remaining: Remaining | null;
}

export interface Remaining {
  readonly order: number;
  readonly patternSymmetric: boolean;
  readonly valueSymmetric: boolean;
  readonly hermitian: boolean;
  /** max |A − Aᵀ| of what remains; null for a pattern */
  readonly difference: number | null;
}

/** `whole`: the comparison with mirrors of the whole matrix, null for a rectangular one. */
export function constrainedFact(base: Base, whole: MirrorScan | null, ticker: Ticker): Fact<Constrained> {
  if (whole === null) return undefinedFact(notSquare(base.matrix), 'unknowns');
  const n = base.matrix.columns;
  const rows = new Uint8Array(n);
  const columns = new Uint8Array(n);
  const either = new Uint8Array(n);
  let unitRows = 0;
  for (let i = 0; i < n; i++) {
    rows[i] = alone(base, i, 'row') ? 1 : 0;
    columns[i] = alone(base, i, 'column') ? 1 : 0;
    either[i] = rows[i] | columns[i];
    if (rows[i] && isOne(base, i)) unitRows++;
  }
  const marks = [
    markWhere('rows with nothing but their diagonal entry', 'rows', rows),
    markWhere('columns with nothing but their diagonal entry', 'columns', columns),
  ];
  const unknowns = markWhere('', 'unknowns', either).count;
  const value: Constrained = {
    rows: marks[0].count,
    unitRows: base.sizes === null ? null : unitRows,
    columns: marks[1].count,
    unknowns,
    remaining: unknowns === 0 || unknowns === n ? null : remaining(base, either, unknowns, whole, ticker),
  };
  return fact(value, sentenceOf(value, marks[0].indices, whole), 'unknowns', 'exact', marks);
}

/** The diagonal entry of line i is nonzero and no other value of the line is. */
function alone(base: Base, i: number, axis: 'row' | 'column'): boolean {
  const { sizes, positions } = base;
  if (sizes === null) {
    return positions.diagonalEntry[i] >= 0 && (axis === 'row' ? positions.rowCount : positions.columnCount)[i] === 1;
  }
  return sizes.diagonal[i] !== 0 && (axis === 'row' ? sizes.rowSum : sizes.columnSum)[i] === 0;
}

function isOne(base: Base, i: number): boolean {
  const { values, field } = base.matrix;
  const p = base.positions.diagonalEntry[i];
  if (values === null || p < 0) return false;
  return field === 'complex' ? values[2 * p] === 1 && values[2 * p + 1] === 0 : values[p] === 1;
}

function remaining(base: Base, skip: Uint8Array, unknowns: number, whole: MirrorScan, ticker: Ticker): Remaining {
  // what is symmetric and hermitian as a whole stays so
  const symmetric = whole.symmetric.differing === 0 && whole.hermitian.differing === 0;
  const settled = symmetric && whole.mirrored === whole.offDiagonal;
  if (!settled) ticker.begin('without constrained unknowns');
  const scan = settled ? whole : scanMirrors(base.matrix, skip, ticker);
  return {
    order: base.matrix.columns - unknowns,
    patternSymmetric: scan.mirrored === scan.offDiagonal,
    valueSymmetric: scan.symmetric.differing === 0,
    hermitian: scan.hermitian.differing === 0,
    difference: base.sizes === null ? null : scan.symmetric.largest,
  };
}

function sentenceOf(c: Constrained, rowList: Int32Array, whole: MirrorScan): string {
  if (c.unknowns === 0) return 'No row and no column consists of its diagonal entry alone.';
  const ones =
    c.unitRows === null || c.rows === 0
      ? ''
      : c.unitRows === c.rows
        ? ', equal to 1'
        : `, ${counted(c.unitRows)} of them equal to 1`;
  const alone = 'nothing but the diagonal entry';
  const start =
    c.rows > 0
      ? `${plural(c.rows, 'row has', 'rows have')} ${alone}${ones} (${lines('row', rowList, c.rows)}): constrained unknowns; ` +
        `so ${c.columns === 1 ? 'has' : 'have'} ${plural(c.columns, 'column')}.`
      : `${plural(c.columns, 'column has', 'columns have')} ${alone}.`;
  if (c.remaining === null) return `${start} Nothing else remains.`;
  return `${start} Removing ${c.unknowns === 1 ? 'it' : 'them'} leaves ${plural(c.remaining.order, 'unknown')}${outcome(c.remaining, whole)}.`;
}

function outcome(r: Remaining, whole: MirrorScan): string {
  if (r.valueSymmetric && whole.symmetric.differing > 0) return ', and makes the matrix symmetric';
  if (r.hermitian && whole.hermitian.differing > 0) return ', and makes the matrix hermitian';
  if (r.valueSymmetric) return '; the matrix stays symmetric';
  if (r.hermitian) return '; the matrix stays hermitian';
  const near = r.difference === null ? '' : ` (max |A − Aᵀ| = ${figure(r.difference)})`;
  if (r.patternSymmetric) {
    const word = whole.mirrored === whole.offDiagonal ? 'a pattern that stays symmetric' : 'a symmetric pattern';
    return `, with ${word} but values that are not${near}`;
  }
  return `; the matrix is not symmetric then${near}`;
}
