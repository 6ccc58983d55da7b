import { checkMatrix } from '../../matrix/check.ts';
import { Fault } from '../../matrix/fault.ts';
import { type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';

/**
 * Normalizations of the same LU factors. All three have the same pattern and the same product:
 *
 *     unit-lower (Doolittle)   L with ones on its diagonal, the pivots in U
 *     unit-upper (Crout)       U with ones on its diagonal, the pivots in L
 *     diagonal   (L·D·U)       ones on both, the pivots in D
 */
export type FormName = 'unit-lower' | 'unit-upper' | 'diagonal';

/** Triangular factors over positions, ones of unit diagonals stored, so that they can be multiplied as they are. */
export interface TriangularForm {
  readonly form: FormName;
  /** lower triangular, diagonal first in every column */
  readonly lower: SparseMatrix;
  /** the pivots of the "diagonal" form, interleaved when complex; null otherwise */
  readonly diagonal: Float64Array | null;
  /** upper triangular, diagonal last in every column */
  readonly upper: SparseMatrix;
}

/** Triangular factors whose L has the unit diagonal, as every factorization of the house gives them. Checks what it is given. */
export function unitLowerForm(lower: SparseMatrix, upper: SparseMatrix): TriangularForm {
  checkMatrix(lower, 'lower');
  checkMatrix(upper, 'upper');
  const n = lower.columns;
  const width = valueWidth(lower);
  if (upper.columns !== n || lower.rows !== n || upper.rows !== n || valueWidth(upper) !== width || width === 0) {
    throw new Error('invariant broken: lower and upper must be square of one size and one field, with values');
  }
  for (let k = 0; k < n; k++) {
    const first = lower.columnPointer[k];
    const last = upper.columnPointer[k + 1] - 1;
    if (lower.columnPointer[k + 1] === first || lower.rowIndex[first] !== k) {
      throw new Error(`invariant broken: column ${k} of lower does not start with its diagonal`);
    }
    if (last < upper.columnPointer[k] || upper.rowIndex[last] !== k) {
      throw new Error(`invariant broken: column ${k} of upper does not end with its diagonal`);
    }
  }
  return { form: 'unit-lower', lower, diagonal: null, upper };
}

/** The pivots, whatever the form: one number a position, interleaved when complex. */
export function pivotsOf(f: TriangularForm): Float64Array {
  if (f.diagonal !== null) return f.diagonal;
  const n = f.lower.columns;
  const width = valueWidth(f.lower);
  const out = new Float64Array(n * width);
  for (let k = 0; k < n; k++) {
    const source = f.form === 'unit-lower' ? f.upper : f.lower;
    const p = f.form === 'unit-lower' ? source.columnPointer[k + 1] - 1 : source.columnPointer[k];
    for (let w = 0; w < width; w++) out[k * width + w] = valuesOf(source)[p * width + w];
  }
  return out;
}

/**
 * The same factors in another form: one multiplication or division an entry that changes, so exact to a rounding of each entry.
 * @throws Fault "zero-pivot" where a pivot is zero: then U cannot have a unit diagonal
 */
export function convertForm(f: TriangularForm, to: FormName): TriangularForm {
  if (f.form === to) return f;
  const pivots = pivotsOf(f);
  const { form } = f;
  // the pivots leave the factor that holds them, and enter the one that is to hold them
  const lower = form === 'unit-upper' ? scaled(f.lower, pivots, 'columns', 'divide') : f.lower;
  const upper = form === 'unit-lower' ? scaled(f.upper, pivots, 'rows', 'divide') : f.upper;
  return {
    form: to,
    lower: to === 'unit-upper' ? scaled(lower, pivots, 'columns', 'multiply') : lower,
    diagonal: to === 'diagonal' ? pivots : null,
    upper: to === 'unit-lower' ? scaled(upper, pivots, 'rows', 'multiply') : upper,
  };
}

/**
 * L·D·Lᴴ of a Cholesky factor and back: L₁ = L·S⁻¹, D = S², S the diagonal of L. Unlike LU forms this squares and takes roots.
 * @param lower Cholesky factor, its diagonal real and positive
 */
export function choleskyToDiagonal(lower: SparseMatrix): { lower: SparseMatrix; diagonal: Float64Array } {
  const n = lower.columns;
  const width = valueWidth(lower);
  const roots = new Float64Array(n * width);
  const diagonal = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    const s = valuesOf(lower)[lower.columnPointer[k] * width];
    roots[k * width] = s;
    diagonal[k] = s * s;
  }
  return { lower: scaled(lower, roots, 'columns', 'divide'), diagonal };
}

function valuesOf(a: SparseMatrix): Float64Array {
  if (a.values === null) throw new Error('invariant broken: a factor without values');
  return a.values;
}

/** A times or over a diagonal: its columns or its rows each with their number. The pattern is shared. */
function scaled(a: SparseMatrix, d: Float64Array, side: 'columns' | 'rows', how: 'multiply' | 'divide'): SparseMatrix {
  const v = valuesOf(a);
  const wide = valueWidth(a) === 2;
  const values = new Float64Array(v.length);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const k = side === 'columns' ? j : a.rowIndex[p];
      if (how === 'divide' && (wide ? d[2 * k] === 0 && d[2 * k + 1] === 0 : d[k] === 0)) {
        throw new Fault(
          'not-completed',
          'zero-pivot',
          `Pivot ${k + 1} (1-based position) is zero: this form does not exist.`,
        );
      }
      if (!wide) values[p] = how === 'multiply' ? v[p] * d[k] : v[p] / d[k];
      else if (how === 'multiply') {
        values[2 * p] = v[2 * p] * d[2 * k] - v[2 * p + 1] * d[2 * k + 1];
        values[2 * p + 1] = v[2 * p] * d[2 * k + 1] + v[2 * p + 1] * d[2 * k];
      } else divideComplex(v[2 * p], v[2 * p + 1], d[2 * k], d[2 * k + 1], values, 2 * p);
    }
  }
  return { ...a, values };
}

/** Smith's formula (1962), with x/x exactly one. */
function divideComplex(a: number, b: number, c: number, d: number, out: Float64Array, at: number): void {
  if (a === c && b === d) {
    out[at] = 1;
    out[at + 1] = 0;
  } else if (Math.abs(c) >= Math.abs(d)) {
    const r = d / c;
    const den = c + d * r;
    out[at] = (a + b * r) / den;
    out[at + 1] = (b - a * r) / den;
  } else {
    const r = c / d;
    const den = c * r + d;
    out[at] = (a * r + b) / den;
    out[at + 1] = (b * r - a) / den;
  }
}
