import { type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';
import { valuesOf } from './product.ts';

/**
 * Residuals in doubled precision: every number is an unevaluated sum high + low of two doubles.
 *
 * Exact sum of two doubles: Knuth 1969 (the branch-free form, Møller 1965). Exact product: Dekker 1971 with Veltkamp's
 * splitting (1968). Products are exact as long as nothing overflows (|factor| < 2⁹⁹⁵) or falls below 2⁻⁹⁶⁹; the
 * system is scaled to stay clear of both (see system.ts). The result carries a relative error of some n·2⁻¹⁰⁶ of
 * |A|·|x| + |b|, so that after rounding to a double it is right to the last place or nearly so.
 */

/** 2²⁷ + 1: cuts a double of 53 bits into two halves of 26 bits (Veltkamp). */
const splitter = 134217729;

/** Subtracts a·x from (high[i], low[i]). */
function subtractProduct(high: Float64Array, low: Float64Array, i: number, a: number, x: number): void {
  const product = a * x;
  let c = splitter * a;
  const aHigh = c - (c - a);
  const aLow = a - aHigh;
  c = splitter * x;
  const xHigh = c - (c - x);
  const xLow = x - xHigh;
  const error = aLow * xLow - (product - aHigh * xHigh - aLow * xHigh - aHigh * xLow);
  const before = high[i];
  const sum = before - product;
  const taken = sum - before;
  low[i] += before - (sum - taken) + (-product - taken) - error;
  high[i] = sum;
}

/** A pair of vectors for doubled sums; `low` is workspace that callers keep between calls. */
export interface DoubledWorkspace {
  readonly high: Float64Array;
  readonly low: Float64Array;
}

/** Workspace for vectors of `length` doubles. */
export function doubledWorkspace(length: number): DoubledWorkspace {
  return { high: new Float64Array(length), low: new Float64Array(length) };
}

/**
 * r = b − A·x, summed in doubled precision and rounded once at the end.
 * @param x a.columns numbers, `b` and `r` a.rows; interleaved when `complex`, which a complex matrix needs.
 */
export function residualDoubledInto(
  a: SparseMatrix,
  x: Float64Array,
  b: Float64Array,
  r: Float64Array,
  complex: boolean,
  work: DoubledWorkspace,
): void {
  const { columns, columnPointer, rowIndex } = a;
  const v = valuesOf(a);
  const { high, low } = work;
  const wide = valueWidth(a) === 2;
  high.set(b);
  low.fill(0);
  for (let j = 0; j < columns; j++) {
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = rowIndex[p];
      if (!complex) {
        subtractProduct(high, low, i, v[p], x[j]);
        continue;
      }
      const re = wide ? v[2 * p] : v[p];
      subtractProduct(high, low, 2 * i, re, x[2 * j]);
      subtractProduct(high, low, 2 * i + 1, re, x[2 * j + 1]);
      if (!wide) continue;
      subtractProduct(high, low, 2 * i, -v[2 * p + 1], x[2 * j + 1]);
      subtractProduct(high, low, 2 * i + 1, v[2 * p + 1], x[2 * j]);
    }
  }
  for (let i = 0; i < r.length; i++) r[i] = high[i] + low[i];
}

/** r = b − A·x in working precision. Layout as in `residualDoubledInto`. */
export function residualInto(
  a: SparseMatrix,
  x: Float64Array,
  b: Float64Array,
  r: Float64Array,
  complex: boolean,
): void {
  const { columns, columnPointer, rowIndex } = a;
  const v = valuesOf(a);
  const wide = valueWidth(a) === 2;
  r.set(b);
  for (let j = 0; j < columns; j++) {
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = rowIndex[p];
      if (!complex) {
        r[i] -= v[p] * x[j];
        continue;
      }
      const re = wide ? v[2 * p] : v[p];
      const im = wide ? v[2 * p + 1] : 0;
      r[2 * i] -= re * x[2 * j] - im * x[2 * j + 1];
      r[2 * i + 1] -= re * x[2 * j + 1] + im * x[2 * j];
    }
  }
}
