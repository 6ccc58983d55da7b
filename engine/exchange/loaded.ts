import type { Repair } from '../matrix/fault.ts';
import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';

/** Told bytes pulled, bytes to pull in all (null if unknown), and what is being done; may throw `Cancelled`. */
export type ReadProgress = (bytes: number, total: number | null, phase: string) => void;

/** One remark of the import summary: what was found or repaired. Nothing is changed without one. */
export interface ImportNote {
  /** stable word, e.g. "duplicates-summed" */
  readonly code: string;
  /** one sentence for the user, with counts and places */
  readonly text: string;
  /** other readings the user may choose, as words of `applyRepair` */
  readonly offers?: readonly Repair[];
}

/** What a reader returns. */
export interface Loaded {
  /** file name, without folder */
  readonly name: string;
  /** "Matrix Market coordinate", "Rutherford–Boeing", … */
  readonly format: string;
  /** both triangles present, duplicates summed, rows sorted */
  readonly matrix: SparseMatrix;
  /** entries as written in the file */
  readonly storedEntries: number;
  /** as declared in the file */
  readonly symmetry: Symmetry;
  /** how many stored entries were summed into another one */
  readonly duplicates: number;
  /** entries of the expanded matrix whose value is exactly zero (kept); null for a pattern */
  readonly explicitZeros: number | null;
  /** entries whose value is NaN or infinite; numeric work is impossible if any */
  readonly notFinite: number;
  readonly notes: readonly ImportNote[];
  /** labels of rows where the file gave them (node/dof tables), else null */
  readonly labels: readonly string[] | null;
  /** right-hand sides in the file (column by column; complex interleaved), else null */
  readonly rightHandSides: { readonly columns: number; readonly values: Float64Array } | null;
}
