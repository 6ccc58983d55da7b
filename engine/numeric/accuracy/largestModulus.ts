import { modulus } from '../../matrix/modulus.ts';

/** Largest modulus among the numbers of a vector (interleaved when `complex`); NaN if any is NaN, 0 for an empty vector. */
export function largestModulus(x: Float64Array, complex: boolean): number {
  let largest = 0;
  const width = complex ? 2 : 1;
  for (let p = 0; p < x.length; p += width) {
    const m = complex ? modulus(x[p], x[p + 1]) : Math.abs(x[p]);
    // negated, so that NaN passes and stays
    if (!(m <= largest)) largest = m;
    if (Number.isNaN(largest)) return largest;
  }
  return largest;
}
