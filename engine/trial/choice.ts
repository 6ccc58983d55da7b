/**
 * The vocabulary of a trial: one candidate way of factorizing. These words are the ones of the command line and of every file.
 */

export const orderingNames = [
  'natural',
  'reverse-cuthill-mckee',
  'sloan',
  'minimum-degree',
  'minimum-fill',
  'nested-dissection',
  'geometric-dissection',
  'column-minimum-degree',
  'imported',
] as const;
export type OrderingName = (typeof orderingNames)[number];

export const factorizationNames = ['cholesky', 'ldlt', 'lu', 'column-lu'] as const;
/** `lu` works on fronts of the symmetrised pattern, `column-lu` column by column with row interchanges. */
export type FactorizationName = (typeof factorizationNames)[number];

export const pivotingNames = ['none', 'threshold', 'static'] as const;
export type PivotingName = (typeof pivotingNames)[number];

export const scalingNames = ['none', 'equilibrate', 'matching'] as const;
export type ScalingName = (typeof scalingNames)[number];

export const matchingNames = ['none', 'structural', 'large-entry'] as const;
export type MatchingName = (typeof matchingNames)[number];

/** One candidate. Every field is explicit: nothing is silently on. */
export interface Choice {
  readonly ordering: OrderingName;
  readonly factorization: FactorizationName;
  readonly pivoting: PivotingName;
  /** u of threshold pivoting, 0 < u ≤ 1 (≤ 0.5 for ldlt) */
  readonly threshold: number;
  readonly scaling: ScalingName;
  readonly matching: MatchingName;
  /** block triangular form first */
  readonly blocks: boolean;
  readonly seed: number;
}
