/**
 * The stored forms every room shares. All indices are 0-based.
 */

/** Positions of stored entries in compressed columns; no values. Treated as frozen once built. */
export interface Pattern {
  /** number of rows */
  readonly rows: number;
  /** number of columns */
  readonly columns: number;
  /** column -> its first entry in `rowIndex`; length columns + 1; the last is the number of entries */
  readonly columnPointer: Int32Array;
  /** entry -> row; strictly increasing inside each column (sorted, no duplicates) */
  readonly rowIndex: Int32Array;
}

/** What the values are. `pattern`: there are none. `integer` values are held as doubles. */
export type Field = 'real' | 'integer' | 'complex' | 'pattern';

/** A declared symmetry, as the exchange formats know it. In memory both triangles are always present. */
export type Symmetry = 'general' | 'symmetric' | 'skew-symmetric' | 'hermitian';

/** A pattern with values. */
export interface SparseMatrix extends Pattern {
  readonly field: Field;
  /**
   * entry -> value. Real and integer: one double an entry. Complex: two, real part first
   * (length 2 · entries). Pattern: null.
   */
  readonly values: Float64Array | null;
}

/** Number of stored entries. */
export function entryCount(a: Pattern): number {
  return a.columnPointer[a.columns];
}

/** Doubles an entry takes: 2 for complex, 1 for real and integer, 0 without values. */
export function valueWidth(a: SparseMatrix): 0 | 1 | 2 {
  return a.values === null ? 0 : a.field === 'complex' ? 2 : 1;
}
