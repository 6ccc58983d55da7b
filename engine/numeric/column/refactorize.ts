import { difference, samePattern } from '../../matrix/difference.ts';
import { Fault } from '../../matrix/fault.ts';
import { modulus } from '../../matrix/modulus.ts';
import { entryCount, type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';
import { positionOf } from '../../matrix/permutation.ts';
import { noProgress, type Progress } from '../../matrix/progress.ts';
import { valuesOf } from '../accuracy/product.ts';
import { refuseNotFinite } from '../accuracy/system.ts';
import { type ColumnFactor, columnFactorOf } from './columnFactor.ts';
import { divideInto } from './columnKernels.ts';
import type { ColumnFactors } from './data.ts';
import { scaleInto } from './scatter.ts';

/** When a refactorization with kept pivots gives up. */
export interface RefactorizeOptions {
  /** largest growth max|U|/max|P·R·A·C·Q| that is let pass; default: the larger of 1e6 and 100 times that of the first run */
  readonly growthLimit?: number;
  /** largest multiplier (entry of L) that is let pass; default 1e6 */
  readonly multiplierLimit?: number;
}

/**
 * Numeric factorization of a matrix with the same pattern as an earlier one, keeping its pattern, pivots and scalings: no search, no
 * interchange. Index arrays are shared with the earlier factor.
 *
 * @param first the matrix that `factor` was made from; its pattern is compared
 * @throws Fault "pattern-differs" (kind input); "pivots-unfit" (kind not-completed) when a pivot is zero or growth or a
 * multiplier passes its limit: then analyse anew
 */
export function refactorizeColumns(
  factor: ColumnFactor,
  first: SparseMatrix,
  matrix: SparseMatrix,
  options: RefactorizeOptions = {},
  progress: Progress = noProgress,
): ColumnFactor {
  refuseOtherPattern(factor, first, matrix);
  refuseNotFinite(matrix);
  const old = factor.factors;
  const scaled = old.rowScaling !== null || old.columnScaling !== null;
  const values = scaled ? new Float64Array(valuesOf(matrix).length) : valuesOf(matrix);
  if (scaled) scaleInto(matrix, old.rowScaling, old.columnScaling, values);
  const n = old.size;
  const fresh: ColumnFactors = {
    ...old,
    lower: { ...old.lower, values: new Float64Array(old.lower.pointer[n] * (old.complex ? 2 : 1)) },
    upper: { ...old.upper, values: new Float64Array(old.upper.pointer[n] * (old.complex ? 2 : 1)) },
    offDiagonal: { ...old.offDiagonal, values: new Float64Array(old.offDiagonal.pointer[n] * (old.complex ? 2 : 1)) },
    pivots: new Float64Array(old.pivots.length),
  };
  const limits = {
    growth: options.growthLimit ?? Math.max(1e6, 100 * (factor.report.pivotGrowth ?? 1)),
    multiplier: options.multiplierLimit ?? 1e6,
  };
  const x = new Float64Array(n * (old.complex ? 2 : 1));
  const facts = old.complex
    ? sweepComplex(matrix, values, fresh, x, limits, progress)
    : sweepReal(matrix, values, fresh, x, limits, progress);
  const parts = [fresh.lower, fresh.upper, fresh.offDiagonal];
  const bytes = parts.reduce((sum, part) => sum + part.values.byteLength, 0) + fresh.pivots.byteLength + x.byteLength;
  return columnFactorOf(fresh, facts, factor.plannedRow, bytes + (scaled ? values.byteLength : 0));
}

function refuseOtherPattern(factor: ColumnFactor, first: SparseMatrix, matrix: SparseMatrix): void {
  const sameField = (valueWidth(matrix) === 2) === factor.complex;
  if (samePattern(first, matrix) && sameField) return;
  const { added, missing } = difference(first, matrix);
  const place = added.count > 0 ? added.first : missing.first;
  throw new Fault(
    'input',
    'pattern-differs',
    sameField
      ? `Same pattern: no (${added.count} new positions, ${missing.count} gone). A fresh analysis is needed.`
      : 'One matrix is complex and the other real. A fresh analysis is needed.',
    place.length > 0 ? { row: place[0], column: place[1] } : {},
  );
}

interface Limits {
  readonly growth: number;
  readonly multiplier: number;
}

function unfit(f: ColumnFactors, k: number, what: string): never {
  const row = f.rowOrder[k];
  const column = f.columnOrder[k];
  throw new Fault(
    'not-completed',
    'pivots-unfit',
    `The kept pivots do not suit the new values: ${what} at row ${row + 1}, column ${column + 1} (1-based, original). A fresh analysis is needed.`,
    { row, column },
  );
}

function sweepReal(
  a: SparseMatrix,
  values: Float64Array,
  f: ColumnFactors,
  x: Float64Array,
  limits: Limits,
  progress: Progress,
) {
  const n = f.size;
  const rowPosition = positionOf(f.rowOrder);
  const { lower, upper, offDiagonal, pivots } = f;
  let largestEntry = 0;
  for (let p = 0; p < entryCount(a); p++) largestEntry = Math.max(largestEntry, Math.abs(values[p]));
  let largestUpper = 0;
  let updates = 0;
  let block = 0;
  let work = 0;
  for (let k = 0; k < n; k++) {
    if ((k & 0x3ff) === 0 || work > 1e7) {
      work = 0;
      progress(k / n, 'refactorization');
    }
    while (k >= f.blockStart[block + 1]) block++;
    const start = f.blockStart[block];
    const j = f.columnOrder[k];
    let q = offDiagonal.pointer[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = rowPosition[a.rowIndex[p]];
      if (i < start) {
        offDiagonal.values[q++] = values[p];
        largestUpper = Math.max(largestUpper, Math.abs(values[p]));
      } else x[i] = values[p];
    }
    const before = updates;
    for (q = upper.pointer[k]; q < upper.pointer[k + 1]; q++) {
      const c = upper.index[q];
      const u = x[c];
      x[c] = 0;
      upper.values[q] = u;
      largestUpper = Math.max(largestUpper, Math.abs(u));
      const end = lower.pointer[c + 1];
      for (let p = lower.pointer[c]; p < end; p++) x[lower.index[p]] -= lower.values[p] * u;
      updates += end - lower.pointer[c];
    }
    work += updates - before;
    const pivot = x[k];
    x[k] = 0;
    pivots[k] = pivot;
    if (pivot === 0) unfit(f, k, 'a zero pivot');
    largestUpper = Math.max(largestUpper, Math.abs(pivot));
    if (!(largestUpper <= limits.growth * largestEntry)) unfit(f, k, 'growth beyond the limit');
    for (let p = lower.pointer[k]; p < lower.pointer[k + 1]; p++) {
      const i = lower.index[p];
      const l = x[i] / pivot;
      x[i] = 0;
      lower.values[p] = l;
      if (!(Math.abs(l) <= limits.multiplier)) unfit(f, k, 'a multiplier beyond the limit');
    }
  }
  return { largestEntry, largestUpper, updates, divisions: lower.pointer[n], perturbed: 0, zeroPivots: [] };
}

function sweepComplex(
  a: SparseMatrix,
  values: Float64Array,
  f: ColumnFactors,
  x: Float64Array,
  limits: Limits,
  progress: Progress,
) {
  const n = f.size;
  const rowPosition = positionOf(f.rowOrder);
  const { lower, upper, offDiagonal, pivots } = f;
  let largestEntry = 0;
  for (let p = 0; p < entryCount(a); p++)
    largestEntry = Math.max(largestEntry, modulus(values[2 * p], values[2 * p + 1]));
  let largestUpper = 0;
  let updates = 0;
  let block = 0;
  let work = 0;
  for (let k = 0; k < n; k++) {
    if ((k & 0x3ff) === 0 || work > 1e7) {
      work = 0;
      progress(k / n, 'refactorization');
    }
    while (k >= f.blockStart[block + 1]) block++;
    const start = f.blockStart[block];
    const j = f.columnOrder[k];
    let q = offDiagonal.pointer[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = rowPosition[a.rowIndex[p]];
      const out = i < start ? offDiagonal.values : x;
      const at = 2 * (i < start ? q++ : i);
      out[at] = values[2 * p];
      out[at + 1] = values[2 * p + 1];
      if (i < start) largestUpper = Math.max(largestUpper, modulus(values[2 * p], values[2 * p + 1]));
    }
    const before = updates;
    for (q = upper.pointer[k]; q < upper.pointer[k + 1]; q++) {
      const c = upper.index[q];
      const re = x[2 * c];
      const im = x[2 * c + 1];
      x[2 * c] = x[2 * c + 1] = 0;
      upper.values[2 * q] = re;
      upper.values[2 * q + 1] = im;
      largestUpper = Math.max(largestUpper, modulus(re, im));
      const end = lower.pointer[c + 1];
      for (let p = lower.pointer[c]; p < end; p++) {
        const i = 2 * lower.index[p];
        x[i] -= lower.values[2 * p] * re - lower.values[2 * p + 1] * im;
        x[i + 1] -= lower.values[2 * p] * im + lower.values[2 * p + 1] * re;
      }
      updates += end - lower.pointer[c];
    }
    work += updates - before;
    const re = x[2 * k];
    const im = x[2 * k + 1];
    x[2 * k] = x[2 * k + 1] = 0;
    pivots[2 * k] = re;
    pivots[2 * k + 1] = im;
    const m = modulus(re, im);
    if (m === 0) unfit(f, k, 'a zero pivot');
    largestUpper = Math.max(largestUpper, m);
    if (!(largestUpper <= limits.growth * largestEntry)) unfit(f, k, 'growth beyond the limit');
    for (let p = lower.pointer[k]; p < lower.pointer[k + 1]; p++) {
      const i = 2 * lower.index[p];
      divideInto(x[i], x[i + 1], re, im, lower.values, 2 * p);
      x[i] = x[i + 1] = 0;
      if (!(modulus(lower.values[2 * p], lower.values[2 * p + 1]) <= limits.multiplier)) {
        unfit(f, k, 'a multiplier beyond the limit');
      }
    }
  }
  return { largestEntry, largestUpper, updates, divisions: lower.pointer[n], perturbed: 0, zeroPivots: [] };
}
