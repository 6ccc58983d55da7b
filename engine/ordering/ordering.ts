import type { Pattern } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';

/**
 * The one signature of all orderings. A method gets the pattern as read (square for symmetric orderings, any shape for
 * column orderings), makes the graph it needs itself (A + Aᵀ, or AᵀA implicitly), and returns the requested order:
 * no postorder is applied here.
 */
export type OrderingMethod<Options = OrderingOptions> = (
  pattern: Pattern,
  options: Options,
  progress: Progress,
) => OrderingResult;

/** What every method understands; each method's file extends it with its own options, all optional with stated defaults. */
export interface OrderingOptions {
  /** seed of every random choice; default 1 */
  readonly seed?: number;
  /** unknowns (0-based, original) kept at the end in one block, in the given order; default none */
  readonly heldLast?: Int32Array;
}

export interface OrderingResult {
  /** new-to-old, length = columns */
  readonly order: NewToOld;
  /** facts worth showing: "3 dense rows set aside (more than 1,581 neighbours)" */
  readonly notes: readonly string[];
  /**
   * Separators of a dissection in this order, outermost first: positions start … end − 1 of the order form one separator.
   * Absent for other methods.
   */
  readonly separators?: readonly { readonly start: number; readonly end: number; readonly level: number }[];
}
