import type { ImportNote, Loaded } from '../../engine/exchange/loaded.ts';
import { entryCount, type Field, type Symmetry } from '../../engine/matrix/pattern.ts';

/** What the page shows of a matrix that has come in. Plain data; the arrays stay with `Loaded`. */
export interface ImportSummary {
  readonly name: string;
  readonly format: string;
  readonly rows: number;
  readonly columns: number;
  readonly field: Field;
  /** as declared by the file */
  readonly symmetry: Symmetry;
  readonly storedEntries: number;
  /** after symmetric expansion and summing of duplicates */
  readonly entries: number;
  readonly duplicates: number;
  /** null for a pattern */
  readonly explicitZeros: number | null;
  readonly notFinite: number;
  readonly notes: readonly ImportNote[];
  readonly labelled: boolean;
  /** right-hand sides that came in the file */
  readonly rightHandSides: number;
  /** bytes of the arrays that hold the matrix */
  readonly heldBytes: number;
  /** wall-clock seconds that reading took, unpacking included */
  readonly seconds: number;
}

/** The plain facts of a loaded matrix. */
export function summarize(loaded: Loaded, seconds: number): ImportSummary {
  const { matrix } = loaded;
  return {
    name: loaded.name,
    format: loaded.format,
    rows: matrix.rows,
    columns: matrix.columns,
    field: matrix.field,
    symmetry: loaded.symmetry,
    storedEntries: loaded.storedEntries,
    entries: entryCount(matrix),
    duplicates: loaded.duplicates,
    explicitZeros: loaded.explicitZeros,
    notFinite: loaded.notFinite,
    notes: loaded.notes,
    labelled: loaded.labels !== null,
    rightHandSides: loaded.rightHandSides?.columns ?? 0,
    heldBytes: matrix.columnPointer.byteLength + matrix.rowIndex.byteLength + (matrix.values?.byteLength ?? 0),
    seconds,
  };
}
