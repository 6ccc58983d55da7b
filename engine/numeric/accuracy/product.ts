import { Fault } from '../../matrix/fault.ts';
import { modulus } from '../../matrix/modulus.ts';
import { type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';

/**
 * Products of a sparse matrix and a dense vector in working precision, for real and complex matrices.
 * Vectors are interleaved when complex, real part first. A complex matrix needs complex vectors; a real one takes either.
 */

/** The values of a matrix, or a Fault for a pattern without values. */
export function valuesOf(a: SparseMatrix): Float64Array {
  if (a.values === null) {
    throw new Fault('input', 'values-missing', 'This matrix has a pattern but no values; numeric work needs values.');
  }
  return a.values;
}

/** y = A·x. `x` has a.columns numbers, `y` a.rows; both interleaved when `complex`. They must not overlap. */
export function multiplyInto(a: SparseMatrix, x: Float64Array, y: Float64Array, complex: boolean): void {
  const { columns, columnPointer, rowIndex } = a;
  const v = valuesOf(a);
  y.fill(0);
  if (valueWidth(a) === 2) {
    for (let j = 0; j < columns; j++) {
      const re = x[2 * j];
      const im = x[2 * j + 1];
      for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
        const i = 2 * rowIndex[p];
        y[i] += v[2 * p] * re - v[2 * p + 1] * im;
        y[i + 1] += v[2 * p] * im + v[2 * p + 1] * re;
      }
    }
  } else if (complex) {
    for (let j = 0; j < columns; j++) {
      const re = x[2 * j];
      const im = x[2 * j + 1];
      for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
        const i = 2 * rowIndex[p];
        y[i] += v[p] * re;
        y[i + 1] += v[p] * im;
      }
    }
  } else {
    for (let j = 0; j < columns; j++) {
      const xj = x[j];
      for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) y[rowIndex[p]] += v[p] * xj;
    }
  }
}

/** y = Aᵀ·x, not conjugated. `x` has a.rows numbers, `y` a.columns; both interleaved when `complex`. They must not overlap. */
export function multiplyTransposedInto(a: SparseMatrix, x: Float64Array, y: Float64Array, complex: boolean): void {
  const { columns, columnPointer, rowIndex } = a;
  const v = valuesOf(a);
  const wide = valueWidth(a) === 2;
  for (let j = 0; j < columns; j++) {
    let re = 0;
    let im = 0;
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = rowIndex[p];
      if (wide) {
        re += v[2 * p] * x[2 * i] - v[2 * p + 1] * x[2 * i + 1];
        im += v[2 * p] * x[2 * i + 1] + v[2 * p + 1] * x[2 * i];
      } else if (complex) {
        re += v[p] * x[2 * i];
        im += v[p] * x[2 * i + 1];
      } else re += v[p] * x[i];
    }
    if (complex) {
      y[2 * j] = re;
      y[2 * j + 1] = im;
    } else y[j] = re;
  }
}

/** y = |A|·|x|, moduli entry by entry. `x` has a.columns numbers (interleaved when `complex`), `y` a.rows real ones. */
export function multiplyModuliInto(a: SparseMatrix, x: Float64Array, y: Float64Array, complex: boolean): void {
  const { columns, columnPointer, rowIndex } = a;
  const v = valuesOf(a);
  const wide = valueWidth(a) === 2;
  y.fill(0);
  for (let j = 0; j < columns; j++) {
    const xj = complex ? modulus(x[2 * j], x[2 * j + 1]) : Math.abs(x[j]);
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      y[rowIndex[p]] += (wide ? modulus(v[2 * p], v[2 * p + 1]) : Math.abs(v[p])) * xj;
    }
  }
}
