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
  'best-of',
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

/** By what a portfolio keeps its best. */
export const measureNames = ['entries', 'operations', 'peak-memory', 'critical-path'] as const;
export type MeasureName = (typeof measureNames)[number];

/** Options of the methods; null: the method's own default. A method takes no notice of those that are not its own. */
export interface OrderingTuning {
  /** dissections: pieces of at most so many vertices go to minimum degree */
  readonly leafSize: number | null;
  /** nested dissection: most share of both sides that one of them may have, 0.5 to 0.9 */
  readonly balance: number | null;
  /** nested dissection: growing starts for each separator */
  readonly tries: number | null;
  /** minimum degree, minimum fill, nested dissection, column minimum degree: more neighbours than this make a row dense */
  readonly denseThreshold: number | null;
}

/** What "best-of" runs. */
export interface Portfolio {
  /** null: every ordering that suits the matrix */
  readonly members: readonly OrderingName[] | null;
  readonly measure: MeasureName;
  /** rounds with seeds seed, seed + 1, …; the first on the numbering as given, the others on a relabelling */
  readonly rounds: number;
  /** seconds after which nothing more is started; null: none */
  readonly timeLimit: number | null;
}

/** One candidate. Every field is explicit: nothing is silently on. */
export interface Choice {
  readonly ordering: OrderingName;
  readonly factorization: FactorizationName;
  readonly pivoting: PivotingName;
  /** u of threshold pivoting, 0 < u ≤ 1 (≤ 0.5 for ldlt) */
  readonly threshold: number;
  readonly scaling: ScalingName;
  /**
   * LU: rows moved so that the planned pivots stand on the diagonal. LDLᵀ: unknowns paired for 2×2 pivots and kept together by the
   * ordering, zero diagonals by structure ("structural"), or all by magnitude ("large-entry", value-dependent).
   */
  readonly matching: MatchingName;
  /** block triangular form first; symmetric factorizations: connected components one after the other */
  readonly blocks: boolean;
  readonly seed: number;
  readonly tuning: OrderingTuning;
  /** seed of a random relabelling that is ordered in place of the numbering as given, and carried back; null: none */
  readonly relabelling: number | null;
  /** read by "best-of" only */
  readonly portfolio: Portfolio;
}
