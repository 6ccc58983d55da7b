/** How pivots are judged and what happened; shared by the LDLᵀ and the LU of dense fronts. */
export interface PivotRule {
  /** `none`: the planned pivot unless it is exactly zero; `threshold`: only those that pass; `static`: replace small ones */
  readonly pivoting: 'none' | 'threshold' | 'static';
  /** u: multipliers of an accepted pivot stay ≤ 1/u */
  readonly threshold: number;
  /** static pivoting: smallest modulus of a pivot */
  readonly smallest: number;
  readonly hermitian: boolean;
}

/** Counted over all fronts of a run. */
export interface PivotTally {
  twoByTwo: number;
  offDiagonal: number;
  perturbed: number;
  /** largest modulus seen in a pivot column when it was eliminated (LDLᵀ) */
  largest: number;
}
