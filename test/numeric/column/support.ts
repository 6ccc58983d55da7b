/** Slow, obvious arithmetic on small dense matrices: what P·R·A·C·Q and L·U + F are. Complex entries as [re, im]. */
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import type { ColumnFactor } from '../../../engine/numeric/column/columnFactor.ts';
import { exportFactors } from '../../../engine/numeric/column/export.ts';

export type Complex = readonly [number, number];

/** Rows of a matrix. */
export function denseComplex(a: SparseMatrix): Complex[][] {
  const rows: Complex[][] = Array.from({ length: a.rows }, () =>
    Array.from({ length: a.columns }, (): Complex => [0, 0]),
  );
  const v = a.values ?? new Float64Array(0);
  const wide = a.field === 'complex';
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      rows[a.rowIndex[p]][j] = wide ? [v[2 * p], v[2 * p + 1]] : [v[p], 0];
    }
  }
  return rows;
}

/** max over entries of |P·R·A·C·Q − (L·U + F)| / (|L|·|U| + |F| + |P·R·A·C·Q|), 0/0 counting as 0. */
export function factorizationError(a: SparseMatrix, factor: ColumnFactor): number {
  const n = a.columns;
  const f = factor.factors;
  const { lower, upper, offDiagonal } = exportFactors(f);
  const dense = denseComplex(a);
  const [l, u, o] = [lower, upper, offDiagonal].map(denseComplex);
  let worst = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const row = f.rowOrder[i];
      const column = f.columnOrder[j];
      const s = (f.rowScaling?.[row] ?? 1) * (f.columnScaling?.[column] ?? 1);
      let re = o[i][j][0] - s * dense[row][column][0];
      let im = o[i][j][1] - s * dense[row][column][1];
      let size = Math.hypot(...o[i][j]) + s * Math.hypot(...dense[row][column]);
      for (let k = 0; k <= Math.min(i, j); k++) {
        const [a1, b1] = l[i][k];
        const [a2, b2] = u[k][j];
        re += a1 * a2 - b1 * b2;
        im += a1 * b2 + b1 * a2;
        size += Math.hypot(a1, b1) * Math.hypot(a2, b2);
      }
      const error = Math.hypot(re, im);
      if (error > 0) worst = Math.max(worst, error / size);
    }
  }
  return worst;
}

/** ‖b − A·x‖∞ / (‖A‖∞‖x‖∞ + ‖b‖∞), or with Aᵀ, on dense rows. */
export function denseBackwardError(a: SparseMatrix, x: Float64Array, b: Float64Array, transposed = false): number {
  const rows = denseComplex(a);
  const n = a.columns;
  const wide = a.field === 'complex';
  const at = (v: Float64Array, i: number): Complex => (wide ? [v[2 * i], v[2 * i + 1]] : [v[i], 0]);
  let residual = 0;
  let norm = 0;
  let xNorm = 0;
  let bNorm = 0;
  for (let i = 0; i < n; i++) {
    let [re, im] = at(b, i);
    let sum = 0;
    for (let j = 0; j < n; j++) {
      const [ar, ai] = transposed ? rows[j][i] : rows[i][j];
      const [xr, xi] = at(x, j);
      re -= ar * xr - ai * xi;
      im -= ar * xi + ai * xr;
      sum += Math.hypot(ar, ai);
    }
    residual = Math.max(residual, Math.hypot(re, im));
    norm = Math.max(norm, sum);
    xNorm = Math.max(xNorm, Math.hypot(...at(x, i)));
    bNorm = Math.max(bNorm, Math.hypot(...at(b, i)));
  }
  return residual / (norm * xNorm + bNorm);
}
