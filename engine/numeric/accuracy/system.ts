import { Fault } from '../../matrix/fault.ts';
import { type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';
import { type Solver, solveComplexInPlace } from '../solver.ts';
import { firstNotFinite, type Norms, normsOf } from './norms.ts';
import { valuesOf } from './product.ts';

/**
 * A matrix prepared for measuring errors: its norms, and a power of two that keeps products clear of overflow and underflow.
 * Backward errors do not change when A and b are multiplied by the same number, so they are measured on scale·A and scale·b.
 */
export interface MeasuredSystem {
  /** scale·A; the given matrix itself when scale is 1 */
  readonly matrix: SparseMatrix;
  /** a power of two, exact */
  readonly scale: number;
  /** norms of scale·A */
  readonly norms: Norms;
  readonly size: number;
  readonly complex: boolean;
}

/** Prepares a square matrix with finite values; a Fault otherwise. */
export function measuredSystem(a: SparseMatrix): MeasuredSystem {
  if (a.rows !== a.columns) {
    throw new Fault('input', 'not-square', `A solve needs a square matrix; this one is ${a.rows} × ${a.columns}.`);
  }
  refuseNotFinite(a);
  const norms = normsOf(a);
  const complex = valueWidth(a) === 2;
  // inside these limits every exact product of doubled.ts is safe; outside they are brought near 1
  if (norms.largest === 0 || (norms.largest > 1e-60 && norms.largest < 1e60 && norms.infinity < 1e60)) {
    return { matrix: a, scale: 1, norms, size: a.columns, complex };
  }
  let scale = 1;
  while (norms.largest * scale > 1) scale /= 2;
  // 2¹⁰²³ is the largest power of two; a matrix of denormals stops there
  while (norms.largest * scale < 0.5 && scale < 2 ** 1023) scale *= 2;
  const matrix: SparseMatrix = { ...a, values: valuesOf(a).map((x) => x * scale) };
  return { matrix, scale, norms: normsOf(matrix), size: a.columns, complex };
}

/** A Fault with the first address if any value is NaN or infinite. */
export function refuseNotFinite(a: SparseMatrix): void {
  const place = firstNotFinite(a);
  if (place === null) return;
  throw new Fault(
    'input',
    'not-finite',
    `The value at row ${place.row + 1}, column ${place.column + 1} (1-based) is NaN or infinite; numeric work is impossible.`,
    place,
  );
}

/** Solves with one vector, real or complex, whatever the solver is; a real vector needs a real solver. */
export function solveVectorInPlace(solver: Solver, x: Float64Array, complex: boolean, transposed = false): void {
  if (complex) solveComplexInPlace(solver, x, 1, transposed);
  else if (transposed) solver.solveTransposedInPlace(x, 1);
  else solver.solveInPlace(x, 1);
}
