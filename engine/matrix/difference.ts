import { modulus } from './modulus.ts';
import { type Pattern, type SparseMatrix, valueWidth } from './pattern.ts';

/** Positions that stand in one pattern only. */
export interface Positions {
  readonly count: number;
  /** the first of them, column by column: row, column, row, column, … (0-based) */
  readonly first: Int32Array;
}

/** How matrix b differs from matrix a: a second time step, a second mesh. */
export interface MatrixDifference {
  /** same numbers of rows and of columns */
  readonly sameShape: boolean;
  /** same shape and the same positions: an analysis of a holds for b */
  readonly samePattern: boolean;
  /** positions of b that a does not have */
  readonly added: Positions;
  /** positions of a that b does not have */
  readonly missing: Positions;
  /** positions that both have */
  readonly common: number;
  /** null where a or b is a pattern */
  readonly values: ValueDifference | null;
}

/** Differences of values over all positions of a or b, an absent entry taken as zero. */
export interface ValueDifference {
  /** max |b − a| over positions where it is finite */
  readonly largest: number;
  /** where: row, column (0-based); null where nothing differs by a finite amount */
  readonly at: readonly [number, number] | null;
  /** `largest` ÷ max |a|; null where a has no finite value other than zero */
  readonly relative: number | null;
  /** positions whose values differ; NaN differs from everything */
  readonly changed: number;
}

/** How many positions `first` lists. */
const listed = 10;

/** Compares two matrices of any shapes. Linear in the entries of both; merges sorted columns, forms nothing. */
export function difference(a: SparseMatrix, b: SparseMatrix): MatrixDifference {
  const added = new PositionList();
  const missing = new PositionList();
  const values = a.values === null || b.values === null ? null : new ValueComparison(a, b);
  let common = 0;
  const columns = Math.max(a.columns, b.columns);
  for (let j = 0; j < columns; j++) {
    let p = j < a.columns ? a.columnPointer[j] : 0;
    let q = j < b.columns ? b.columnPointer[j] : 0;
    const pEnd = j < a.columns ? a.columnPointer[j + 1] : 0;
    const qEnd = j < b.columns ? b.columnPointer[j + 1] : 0;
    while (p < pEnd || q < qEnd) {
      const ia = p < pEnd ? a.rowIndex[p] : Number.POSITIVE_INFINITY;
      const ib = q < qEnd ? b.rowIndex[q] : Number.POSITIVE_INFINITY;
      if (ia === ib) common++;
      else if (ia < ib) missing.add(ia, j);
      else added.add(ib, j);
      if (values !== null) values.compare(ia <= ib ? p : -1, ib <= ia ? q : -1, ia < ib ? ia : ib, j);
      if (ia <= ib) p++;
      if (ib <= ia) q++;
    }
  }
  const sameShape = a.rows === b.rows && a.columns === b.columns;
  return {
    sameShape,
    samePattern: sameShape && added.count === 0 && missing.count === 0,
    added: added.result(),
    missing: missing.result(),
    common,
    values: values === null ? null : values.result(),
  };
}

/** Whether two patterns have the same shape and the same positions; stops at the first difference. */
export function samePattern(a: Pattern, b: Pattern): boolean {
  if (a.rows !== b.rows || a.columns !== b.columns) return false;
  for (let j = 0; j <= a.columns; j++) if (a.columnPointer[j] !== b.columnPointer[j]) return false;
  const count = a.columnPointer[a.columns];
  for (let p = 0; p < count; p++) if (a.rowIndex[p] !== b.rowIndex[p]) return false;
  return true;
}

class PositionList {
  count = 0;
  private readonly first: number[] = [];

  add(row: number, column: number): void {
    if (this.count++ < listed) this.first.push(row, column);
  }

  result(): Positions {
    return { count: this.count, first: Int32Array.from(this.first) };
  }
}

class ValueComparison {
  private largest = 0;
  private row = -1;
  private column = -1;
  private changed = 0;
  private size = 0;
  private readonly a: Operand;
  private readonly b: Operand;

  constructor(a: SparseMatrix, b: SparseMatrix) {
    this.a = new Operand(a);
    this.b = new Operand(b);
  }

  /** Entry p of a against entry q of b; −1: absent. */
  compare(p: number, q: number, row: number, column: number): void {
    const ar = this.a.real(p);
    const ai = this.a.imaginary(p);
    const br = this.b.real(q);
    const bi = this.b.imaginary(q);
    const size = modulus(ar, ai);
    if (size > this.size && size < Number.POSITIVE_INFINITY) this.size = size;
    if (ar === br && ai === bi) return;
    this.changed++;
    const d = modulus(br - ar, bi - ai);
    if (d > this.largest && d < Number.POSITIVE_INFINITY) {
      this.largest = d;
      this.row = row;
      this.column = column;
    }
  }

  result(): ValueDifference {
    return {
      largest: this.largest,
      at: this.row < 0 ? null : [this.row, this.column],
      relative: this.size > 0 ? this.largest / this.size : null,
      changed: this.changed,
    };
  }
}

/** Values of one side, real or complex, absent entries as zero. */
class Operand {
  private readonly values: Float64Array | null;
  private readonly width: number;

  constructor(m: SparseMatrix) {
    this.values = m.values;
    this.width = valueWidth(m);
  }

  real(p: number): number {
    return this.values === null || p < 0 ? 0 : this.values[this.width * p];
  }

  imaginary(p: number): number {
    return this.values === null || p < 0 || this.width === 1 ? 0 : this.values[2 * p + 1];
  }
}
