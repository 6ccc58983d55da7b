import type { NewToOld } from '../matrix/permutation.ts';

/**
 * What the pattern alone says about the Cholesky factor of P(A + Aᵀ + I)Pᵀ. Columns are positions of `order`, 0-based.
 * Entries of L are never listed.
 */
export interface SymbolicFactor {
  /** number of columns */
  readonly size: number;
  /** the effective order: column k of the factor is the original unknown order[k] */
  readonly order: NewToOld;
  /** whether `order` is the requested order followed by a postorder of its elimination tree */
  readonly postordered: boolean;
  /** column -> its parent in the elimination tree, −1 at a root; parent[j] > j */
  readonly parent: Int32Array;
  /** column -> entries of this column of L, diagonal included */
  readonly columnCount: Int32Array;
  /** Σ columnCount: nnz(L), diagonal counted once */
  readonly factorEntries: number;
  /** nodes on the longest path to a root */
  readonly treeHeight: number;
  /** max columnCount, before amalgamation */
  readonly largestFront: number;
}

/**
 * Supernodes and their tree, for fronts. Everything here lives in an internal postorder: internal column c is the original
 * unknown order[c]; the columns of a supernode are consecutive; children come before parents, in the order in which the
 * walk visits them (Liu's best order of children where asked for).
 */
export interface AssemblyTree {
  /** number of columns */
  readonly size: number;
  /** number of supernodes */
  readonly count: number;
  /** internal order: column c is the original unknown order[c] */
  readonly order: NewToOld;
  /** supernode -> its first internal column; length count + 1 */
  readonly firstColumn: Int32Array;
  /** supernode -> parent supernode, −1 at a root; parent > child */
  readonly parent: Int32Array;
  /** supernode -> order of its front (pivot columns + contribution rows), amalgamation padding included */
  readonly frontOrder: Int32Array;
  /** Σ over supernodes of the lower trapezoid: entries stored with padding, diagonal included */
  readonly storedFactorEntries: number;
  /** nnz(L) without padding */
  readonly factorEntries: number;
}

/** Row subscripts of all fronts, formed for a numeric run (length Σ frontOrder): the one place where subscripts are listed. */
export interface FrontRows {
  /** supernode -> first subscript; length count + 1; Float64Array since Σ can pass 2³¹ */
  readonly pointer: Float64Array;
  /** internal columns, increasing inside a front; the first entries are the supernode's own columns */
  readonly row: Int32Array;
}
