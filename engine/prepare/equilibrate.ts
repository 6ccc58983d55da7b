import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { nearestPowerOfTwo } from './logarithm.ts';
import { moduliOf } from './moduli.ts';
import type { Scaling } from './scaling.ts';

export interface EquilibrateOptions {
  /** the same factors for rows and columns, R = C, so that symmetry stays; square matrices; default false */
  readonly symmetric?: boolean;
  /** stop when every row and column has a largest modulus within this of 1; default 0.01 */
  readonly tolerance?: number;
  /** most sweeps; default 20 */
  readonly sweeps?: number;
  /** round the factors to powers of two, so that scaling makes no rounding errors; norms then lie within [½, 2]; default true */
  readonly powersOfTwo?: boolean;
}

/** Scalings and how the sweeps went. Value-dependent. */
export interface Equilibration extends Scaling {
  /** sweeps done */
  readonly sweeps: number;
  /** largest distance from 1 of a row's or column's largest modulus, before rounding to powers of two */
  readonly deviation: number;
}

/**
 * Row and column equilibration in the maximum norm (Ruiz 2001): every sweep divides rows and columns by the square roots of their
 * largest moduli, both at once; converges linearly with rate ½, and keeps a symmetric matrix symmetric. Rows and columns of
 * zeros keep the factor 1. Value-dependent.
 */
export function equilibrate(
  a: SparseMatrix,
  options: EquilibrateOptions = {},
  progress: Progress = noProgress,
): Equilibration {
  const moduli = moduliOf(a);
  const tolerance = options.tolerance ?? 0.01;
  const most = options.sweeps ?? 20;
  const rowScaling = new Float64Array(a.rows).fill(1);
  const columnScaling = new Float64Array(a.columns).fill(1);
  const rowNorm = new Float64Array(a.rows);
  const columnNorm = new Float64Array(a.columns);
  let deviation = largestNorms(a, moduli, rowScaling, columnScaling, rowNorm, columnNorm);
  let sweeps = 0;
  while (deviation > tolerance && sweeps < most) {
    progress(sweeps / most, 'equilibration');
    if (options.symmetric) {
      for (let i = 0; i < a.rows; i++) rowNorm[i] = columnNorm[i] = Math.max(rowNorm[i], columnNorm[i]);
    }
    for (let i = 0; i < a.rows; i++) if (rowNorm[i] > 0) rowScaling[i] /= Math.sqrt(rowNorm[i]);
    for (let j = 0; j < a.columns; j++) if (columnNorm[j] > 0) columnScaling[j] /= Math.sqrt(columnNorm[j]);
    deviation = largestNorms(a, moduli, rowScaling, columnScaling, rowNorm, columnNorm);
    sweeps++;
  }
  if (options.powersOfTwo ?? true) {
    for (let i = 0; i < a.rows; i++) rowScaling[i] = nearestPowerOfTwo(rowScaling[i]);
    for (let j = 0; j < a.columns; j++) columnScaling[j] = nearestPowerOfTwo(columnScaling[j]);
  }
  return { rowScaling, columnScaling, sweeps, deviation };
}

/** Largest moduli of the rows and columns of R·A·C; returns the largest distance from 1 among those that are not zero. */
function largestNorms(
  a: SparseMatrix,
  moduli: Float64Array,
  rowScaling: Float64Array,
  columnScaling: Float64Array,
  rowNorm: Float64Array,
  columnNorm: Float64Array,
): number {
  rowNorm.fill(0);
  columnNorm.fill(0);
  for (let j = 0; j < a.columns; j++) {
    let top = 0;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      const m = moduli[p] * rowScaling[i] * columnScaling[j];
      if (m > top) top = m;
      if (m > rowNorm[i]) rowNorm[i] = m;
    }
    columnNorm[j] = top;
  }
  let deviation = 0;
  for (const norms of [rowNorm, columnNorm]) {
    for (let i = 0; i < norms.length; i++) {
      const d = norms[i] > 0 ? Math.abs(1 - norms[i]) : 0;
      if (d > deviation) deviation = d;
    }
  }
  return deviation;
}
