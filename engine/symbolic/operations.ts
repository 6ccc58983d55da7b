/**
 * Operations of a factorization from its column counts: additions, multiplications, divisions and square roots, each counted
 * one, no padding, no assembly. Exact up to 2⁵³.
 */

/** Cholesky: Σ cⱼ². */
export function choleskyOperations(columnCount: Int32Array): number {
  let sum = 0;
  for (let j = 0; j < columnCount.length; j++) sum += columnCount[j] * columnCount[j];
  return sum;
}
