import type { NewToOld } from '../../matrix/permutation.ts';

/**
 * The factors as they are held: P·R·A·C·Q = L·U + F in compressed columns over positions. Arrays may be longer than the entries
 * they hold; the pointers count.
 */
export interface ColumnFactors {
  readonly size: number;
  readonly complex: boolean;
  /** Q: position -> original column */
  readonly columnOrder: NewToOld;
  /** P: position -> original row */
  readonly rowOrder: NewToOld;
  /** block -> first position; length blocks + 1 */
  readonly blockStart: Int32Array;
  /** R, original row -> factor; null: all 1 */
  readonly rowScaling: Float64Array | null;
  /** C, original column -> factor; null: all 1 */
  readonly columnScaling: Float64Array | null;
  /** L without its unit diagonal, inside the diagonal blocks; rows unsorted */
  readonly lower: FactorPart;
  /** U without its diagonal, inside the diagonal blocks; rows in an order in which they can be eliminated */
  readonly upper: FactorPart;
  /** diagonal of U, by position; interleaved when complex */
  readonly pivots: Float64Array;
  /** F: entries of P·R·A·C·Q above the diagonal blocks */
  readonly offDiagonal: FactorPart;
}

/** Compressed columns over positions. */
export interface FactorPart {
  /** position of a column -> its first entry; length size + 1 */
  readonly pointer: Int32Array;
  /** entry -> position of its row */
  readonly index: Int32Array;
  /** entry -> value; interleaved when complex */
  readonly values: Float64Array;
}

/** What a numeric sweep measured on its way. */
export interface SweepFacts {
  /** max|P·R·A·C·Q| */
  readonly largestEntry: number;
  /** max over U (with its diagonal) and F */
  readonly largestUpper: number;
  /** multiply–subtract pairs done */
  readonly updates: number;
  /** divisions by a pivot done */
  readonly divisions: number;
  /** pivots that were replaced */
  readonly perturbed: number;
  /** positions whose pivot column held nothing but zeros */
  readonly zeroPivots: readonly number[];
}
