/**
 * Operations of a factorization from its column counts: additions, multiplications, divisions and square roots, each counted
 * one, no padding, no assembly. Exact up to 2⁵³. Complex arithmetic counts in real operations: multiplication 6, addition 2, division by
 * a complex number 11, by a real one 2, root of a real pivot 1.
 */
export type FactorKind = 'cholesky' | 'ldlt' | 'lu';

/** real numbers, complex ones, or complex ones with real pivots (hermitian factorizations) */
export type Arithmetic = 'real' | 'hermitian' | 'complex';

/** Costs of one scalar operation in real ones. */
export interface ScalarCosts {
  readonly multiplyAdd: number;
  readonly divideByPivot: number;
}

const real: ScalarCosts = { multiplyAdd: 2, divideByPivot: 1 };
/** pivots of a hermitian factorization are real */
const hermitian: ScalarCosts = { multiplyAdd: 8, divideByPivot: 2 };
const complex: ScalarCosts = { multiplyAdd: 8, divideByPivot: 11 };

/** Real operations of one scalar multiply–add and of one division by a pivot. */
export function scalarCosts(arithmetic: Arithmetic): ScalarCosts {
  return arithmetic === 'real' ? real : arithmetic === 'hermitian' ? hermitian : complex;
}

/**
 * Operations of p pivots in a dense front of order m (p = m: a dense matrix), padding included: the sum of `factorOperations` over columns
 * with m − 1, m − 2, … m − p off-diagonal entries. Closed form.
 */
export function denseOperations(kind: FactorKind, m: number, p: number, arithmetic: Arithmetic = 'real'): number {
  const costs = scalarCosts(arithmetic);
  const upTo = (k: number): number => (k * (k + 1)) / 2;
  const squaresUpTo = (k: number): number => (k * (k + 1) * (2 * k + 1)) / 6;
  const sum = upTo(m - 1) - upTo(m - p - 1);
  const squares = squaresUpTo(m - 1) - squaresUpTo(m - p - 1);
  if (kind === 'lu') return costs.divideByPivot * sum + costs.multiplyAdd * squares;
  const symmetric = costs.divideByPivot * sum + (costs.multiplyAdd * (squares + sum)) / 2;
  return kind === 'cholesky' ? symmetric + p : symmetric;
}

/** Cholesky: Σ cⱼ². */
export function choleskyOperations(columnCount: Int32Array): number {
  let sum = 0;
  for (let j = 0; j < columnCount.length; j++) sum += columnCount[j] * columnCount[j];
  return sum;
}

/**
 * Cholesky Σ cⱼ², LDLᵀ Σ (cⱼ² − 1), LU Σ lⱼ(1 + 2uⱼ), with cⱼ the entries of column j of L, diagonal included, and
 * lⱼ, uⱼ the off-diagonal entries of column j of L and row j of U (equal on a symmetrised pattern).
 */
export function factorOperations(
  kind: FactorKind,
  lower: Int32Array,
  arithmetic: Arithmetic = 'real',
  upper: Int32Array = lower,
): number {
  const costs = scalarCosts(arithmetic);
  let sum = 0;
  for (let j = 0; j < lower.length; j++) {
    const l = lower[j] - 1;
    const u = upper[j] - 1;
    if (kind === 'lu') sum += l * (costs.divideByPivot + costs.multiplyAdd * u);
    else if (kind === 'cholesky') sum += 1 + l * costs.divideByPivot + (costs.multiplyAdd * l * (l + 1)) / 2;
    // LDLᵀ: l divisions by the pivot, and a multiplication and an addition for each entry of the updated triangle
    else sum += l * costs.divideByPivot + (costs.multiplyAdd * l * (l + 1)) / 2;
  }
  return sum;
}

/** Largest count that a double holds exactly; beyond, figures are marked "rounded". */
export const exactLimit = 2 ** 53;
