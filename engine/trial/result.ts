import type { NewToOld } from '../matrix/permutation.ts';
import type { Choice } from './choice.ts';
import type { PortfolioReport } from './portfolio.ts';
import type { TrialPlan } from './prepared.ts';

/** Low and high end, both proven. */
export type Range = readonly [number, number];

/** Figures that pivoting can move; bytes as in `factorBytes`. */
export interface PivotedFigures<T> {
  readonly factorEntries: T;
  readonly operations: T;
  readonly bytes: T;
}

/** The block of the unknowns held last: their Schur complement. Exact from the pattern while no pivot is delayed. */
export interface HeldBlock {
  readonly unknowns: number;
  /** entries of its factors as the structure fills them: the lower triangle with its diagonal, or both triangles for LU */
  readonly entries: number;
  /** the same when it is treated as dense */
  readonly denseEntries: number;
  /** bytes of the dense block: a packed lower triangle, or square for LU; 8-byte values (16 complex) */
  readonly denseBytes: number;
  /** operations to eliminate all other unknowns, which forms the block */
  readonly operationsBefore: number;
  /** operations to factorize the block itself, as the structure fills it, and as a dense one */
  readonly operationsOfBlock: number;
  readonly denseOperations: number;
}

/** Counts of one trial. What is undefined is null, with a reason in `reasons` under the same name. */
export interface TrialCounts {
  /** nnz(L) for Cholesky and LDLᵀ, nnz(L) + nnz(U) − n for LU; diagonal blocks only in block triangular form */
  readonly factorEntries: number | null;
  /** LU: entries of L and of U, diagonals included */
  readonly lowerEntries: number | null;
  readonly upperEntries: number | null;
  /** entries outside the diagonal blocks, which are never factorized; 0 without blocks */
  readonly offDiagonalBlockEntries: number;
  /** LU, and LDLᵀ with pivoting: the expected figures, and a range proven for every pivot sequence of that kind */
  readonly expected: PivotedFigures<number> | null;
  readonly range: PivotedFigures<Range> | null;
  /** LU: the static structure on the symmetrised pattern, which bounds all pivots on the diagonal; L and U have as many entries each */
  readonly staticStructure: { readonly factorEntries: number; readonly operations: number } | null;
  readonly operations: number | null;
  readonly treeHeight: number | null;
  readonly largestFront: number | null;
  /** compressed columns, 8-byte values (16 complex), 4-byte indices, 8-byte pointers */
  readonly factorBytes: number | null;
  /** of the requested order */
  readonly bandwidth: number | null;
  readonly envelope: number | null;
  readonly reasons: Readonly<Record<string, string>>;
}

/** A finished trial. Plain data and typed arrays. */
export interface TrialResult {
  readonly choice: Choice;
  /** what makes the requested order again: `choice`, or what a portfolio kept */
  readonly ran: Choice;
  /** null unless the choice was a portfolio */
  readonly portfolio: PortfolioReport | null;
  /** null without unknowns held last */
  readonly heldBlock: HeldBlock | null;
  /** the order as the method gave it, new-to-old; columns for column LU */
  readonly requested: NewToOld;
  /** the order the counts belong to: `requested`, followed by a postorder where the method takes one */
  readonly effective: NewToOld;
  /** column -> parent in the elimination tree (column elimination tree for column LU), −1 at roots; null if not formed */
  readonly parent: Int32Array | null;
  /** column -> entries of this column of L, diagonal included; null if not formed */
  readonly columnCount: Int32Array | null;
  /** separators of a dissection: positions start … end − 1 of the requested order */
  readonly separators: readonly { readonly start: number; readonly end: number; readonly level: number }[];
  readonly notes: readonly string[];
  /** whether the figures rest on the values (matching or scaling before ordering) and not on the pattern alone */
  readonly valueDependent: boolean;
  readonly counts: TrialCounts;
  /** what was decided before ordering, for the numeric run */
  readonly plan: TrialPlan;
  readonly seconds: { readonly ordering: number; readonly symbolic: number };
}
