import type { FactorKind } from '../symbolic/operations.ts';
import type { AssemblyTree } from '../symbolic/types.ts';

/**
 * Operations of a front of order m with p pivots, padding included: Cholesky Σ k² over k = m − p + 1 … m, LDLᵀ one less for
 * each pivot, LU Σ (k − 1)(2k − 1). Closed forms; real arithmetic.
 */
export function frontOperations(kind: FactorKind, m: number, p: number): number {
  const squares = (k: number): number => (k * (k + 1) * (2 * k + 1)) / 6;
  const sum = squares(m) - squares(m - p);
  if (kind === 'cholesky') return sum;
  if (kind === 'ldlt') return sum - p;
  const linear = (m * (m + 1)) / 2 - ((m - p) * (m - p + 1)) / 2;
  return 2 * sum - 3 * linear + p;
}

/** supernode -> operations of its front. */
export function workOfFronts(kind: FactorKind, tree: AssemblyTree): Float64Array {
  const work = new Float64Array(tree.count);
  for (let s = 0; s < tree.count; s++) {
    work[s] = frontOperations(kind, tree.frontOrder[s], tree.firstColumn[s + 1] - tree.firstColumn[s]);
  }
  return work;
}
