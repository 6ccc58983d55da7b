import { modulus } from '../../matrix/modulus.ts';
import type { Sweep } from './eliminate.ts';

/**
 * x ← L⁻¹·x over the reach of a column, in topological order; the eliminated part goes to U as it is passed, and x is zero there
 * again. @returns multiply–subtract pairs done
 */
export function updateColumn(s: Sweep, width: 1 | 2): number {
  return width === 2 ? updateComplex(s) : updateReal(s);
}

function updateReal(s: Sweep): number {
  const { x, lowerPointer, upper, lower, rowOf } = s;
  const { order, top } = s.reach;
  const { index, values } = lower;
  const upperIndex = upper.index;
  const upperValues = upper.values;
  let q = upper.count;
  let largest = s.largestUpper;
  let pairs = 0;
  for (let t = top; t < order.length; t++) {
    const c = order[t];
    const row = rowOf[c];
    const u = x[row];
    x[row] = 0;
    upperIndex[q] = c;
    upperValues[q++] = u;
    const m = u < 0 ? -u : u;
    if (m > largest) largest = m;
    const end = lowerPointer[c + 1];
    for (let p = lowerPointer[c]; p < end; p++) x[index[p]] -= values[p] * u;
    pairs += end - lowerPointer[c];
  }
  upper.count = q;
  s.largestUpper = largest;
  return pairs;
}

function updateComplex(s: Sweep): number {
  const { x, lowerPointer, upper, lower, rowOf } = s;
  const { order, top } = s.reach;
  const { index, values } = lower;
  const upperIndex = upper.index;
  const upperValues = upper.values;
  let q = upper.count;
  let largest = s.largestUpper;
  let pairs = 0;
  for (let t = top; t < order.length; t++) {
    const c = order[t];
    const row = 2 * rowOf[c];
    const re = x[row];
    const im = x[row + 1];
    x[row] = 0;
    x[row + 1] = 0;
    upperIndex[q] = c;
    upperValues[2 * q] = re;
    upperValues[2 * q + 1] = im;
    q++;
    const m = modulus(re, im);
    if (m > largest) largest = m;
    const end = lowerPointer[c + 1];
    for (let p = lowerPointer[c]; p < end; p++) {
      const i = 2 * index[p];
      const lr = values[2 * p];
      const li = values[2 * p + 1];
      x[i] -= lr * re - li * im;
      x[i + 1] -= lr * im + li * re;
    }
    pairs += end - lowerPointer[c];
  }
  upper.count = q;
  s.largestUpper = largest;
  return pairs;
}

/** Moves the found rows but the pivot's from x to column k of L, divided by the pivot; x is zero again afterwards. */
export function divideColumn(s: Sweep, k: number, pivotRow: number, pivots: Float64Array, width: 1 | 2): void {
  const { x, lower } = s;
  const { found, foundCount } = s.reach;
  const { index, values } = lower;
  let q = lower.count;
  if (width === 1) {
    const pivot = pivots[k];
    for (let f = 0; f < foundCount; f++) {
      const i = found[f];
      if (i === pivotRow) continue;
      index[q] = i;
      values[q++] = x[i] / pivot;
      x[i] = 0;
    }
  } else {
    const re = pivots[2 * k];
    const im = pivots[2 * k + 1];
    for (let f = 0; f < foundCount; f++) {
      const i = found[f];
      if (i === pivotRow) continue;
      index[q] = i;
      divideInto(x[2 * i], x[2 * i + 1], re, im, values, 2 * q);
      q++;
      x[2 * i] = 0;
      x[2 * i + 1] = 0;
    }
  }
  lower.count = q;
}

/** out[at], out[at + 1] ← (a + ib)/(c + id) by Smith's formula (1962), safe against overflow of c² + d². */
export function divideInto(a: number, b: number, c: number, d: number, out: Float64Array, at: number): void {
  if (Math.abs(c) >= Math.abs(d)) {
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
