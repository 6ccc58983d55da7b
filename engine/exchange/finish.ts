import { Fault } from '../matrix/fault.ts';
import type { Field, SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import type { ImportNote, Loaded } from './loaded.ts';
import { placeTriplets } from './place.ts';
import type { ReadOptions } from './readOptions.ts';
import { absurdOrder } from './sizeLimits.ts';
import { symmetrised } from './symmetrise.ts';
import { syntheticMark, withSyntheticValues } from './syntheticValues.ts';
import type { TripletStore } from './triplets.ts';
import { valueNotes } from './valueNotes.ts';

export interface FinishRequest {
  readonly file: string;
  readonly format: string;
  readonly rows: number;
  readonly columns: number;
  readonly field: Field;
  readonly symmetry: Symmetry;
  readonly options: ReadOptions;
  readonly notes: readonly ImportNote[];
  readonly labels: readonly string[] | null;
  readonly rightHandSides: Loaded['rightHandSides'];
}

/** What is put behind the name of a matrix of which a part is missing, so that every report says so. */
export const incompleteMark = ' (incomplete)';

/** From the stored entries to what a reader returns: placed, merged, expanded, counted, with the chosen readings applied. */
export function finishMatrix(store: TripletStore, r: FinishRequest): Loaded {
  const stored = store.count;
  const { file, rows, columns, field, symmetry, options } = r;
  const absurd = absurdOrder(rows, columns, stored);
  if (absurd !== null) throw new Fault('input', 'size-absurd', `${file}, byte 0: ${absurd}.`, { file, byteOffset: 0 });
  const placed = placeTriplets(store, { file, rows, columns, field, symmetry, duplicates: options.duplicates });
  return finishPlaced(placed.matrix, stored, placed.duplicates, { ...r, notes: [...r.notes, ...placed.notes] });
}

/** The same from a matrix whose entries are in place already. */
export function finishPlaced(placed: SparseMatrix, stored: number, duplicates: number, r: FinishRequest): Loaded {
  const notes = [...r.notes];
  let matrix = placed;
  if (r.options.imaginary === 'drop-zero' && matrix.field === 'complex') matrix = withoutImaginary(matrix, notes);
  if (r.options.mirrors === 'average') matrix = symmetrised(r.file, matrix, notes);
  if (r.options.zeros === 'drop') matrix = withoutSmall(matrix, r.options.dropBelow, notes);
  const made = r.options.values === 'synthetic' && matrix.values === null;
  if (r.options.values === 'synthetic') matrix = withSyntheticValues(matrix, notes);
  const facts = valueNotes(matrix, r.symmetry, notes);
  const incomplete = notes.some((n) => n.code === 'incomplete');
  return {
    name: `${r.file}${incomplete ? incompleteMark : ''}${made ? syntheticMark : ''}`,
    format: r.format,
    matrix,
    storedEntries: stored,
    symmetry: r.symmetry,
    duplicates,
    explicitZeros: facts?.zeros ?? null,
    notFinite: facts?.notFinite ?? 0,
    notes,
    labels: r.labels,
    rightHandSides: r.rightHandSides,
  };
}

/** Real values where every imaginary part is zero; else unchanged, with a note. */
function withoutImaginary(a: SparseMatrix, notes: ImportNote[]): SparseMatrix {
  const values = a.values as Float64Array;
  for (let e = 1; e < values.length; e += 2) {
    if (values[e] !== 0) {
      notes.push({ code: 'imaginary-kept', text: 'Imaginary parts were kept: not all of them are zero.' });
      return a;
    }
  }
  notes.push({ code: 'imaginary-dropped', text: 'All imaginary parts are zero; the matrix was taken as real.' });
  return { ...a, field: 'real', values: values.filter((_, k) => k % 2 === 0) };
}

/** Without the entries whose modulus is at most `bound` (0: exact zeros only). */
function withoutSmall(a: SparseMatrix, bound: number, notes: ImportNote[]): SparseMatrix {
  const { values } = a;
  if (values === null) return a;
  const width = a.field === 'complex' ? 2 : 1;
  const columnPointer = new Int32Array(a.columns + 1);
  const rowIndex = new Int32Array(a.rowIndex.length);
  const kept = new Float64Array(values.length);
  let fill = 0;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const size = width === 1 ? Math.abs(values[p]) : Math.hypot(values[2 * p], values[2 * p + 1]);
      if (size <= bound) continue;
      rowIndex[fill] = a.rowIndex[p];
      for (let w = 0; w < width; w++) kept[fill * width + w] = values[p * width + w];
      fill++;
    }
    columnPointer[j + 1] = fill;
  }
  const gone = a.rowIndex.length - fill;
  if (gone === 0) return a;
  const which = bound === 0 ? 'exact zeros' : `values of modulus up to ${bound}`;
  notes.push({
    code: 'zeros-dropped',
    text: `${gone} stored entries (${which}) were dropped on request; the pattern changed.`,
  });
  return { ...a, columnPointer, rowIndex: rowIndex.slice(0, fill), values: kept.slice(0, fill * width) };
}
