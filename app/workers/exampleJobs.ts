import type { Loaded } from '../../engine/exchange/loaded.ts';
import { entryCount, type Pattern, type SparseMatrix } from '../../engine/matrix/pattern.ts';
import { exampleById, workedExamples } from '../../engine/problems/examples.ts';
import { factsOf } from '../../engine/trial/facts.ts';
import type { Job } from './jobs.ts';
import type { Plate } from './operations.ts';
import { shareLoaded } from './shared.ts';
import { summarize } from './summary.ts';

export const plates: Job<'plates'> = ({ cells }, { early }) => {
  const out: Plate[] = [];
  for (const { id, title, sentence, sizes, sizeMeans, make } of workedExamples) {
    const { matrix } = make(sizes[0]);
    const { rows, columns, field } = matrix;
    const facts = { id, title, sentence, sizes, sizeMeans, rows, columns, field, entries: entryCount(matrix), cells };
    const plate = { ...facts, density: densityOf(matrix, cells) };
    out.push(plate);
    early(plate, out.length / workedExamples.length, title);
  }
  return out;
};

export const example: Job<'example'> = ({ key, id, size }, { shelf, progress }) => {
  const started = performance.now();
  const found = exampleById(id);
  if (found === undefined) throw new Error(`no worked example "${id}"`);
  progress(0, 'making the example');
  const { matrix, coordinates } = found.make(size);
  const loaded = shareLoaded(asLoaded(`${found.title.toLowerCase()}, ${size}`, matrix));
  const stock = { loaded, coordinates, imported: null };
  shelf.put(key, stock);
  const facts = factsOf(matrix, coordinates !== null);
  return { summary: summarize(loaded, (performance.now() - started) / 1e3), facts, stock };
};

/** A matrix made on the spot, in the form of one that was read. */
export function asLoaded(name: string, matrix: SparseMatrix): Loaded {
  const entries = entryCount(matrix);
  let zeros = 0;
  if (matrix.values !== null) {
    const width = matrix.field === 'complex' ? 2 : 1;
    for (let e = 0; e < entries; e++) {
      if (matrix.values[e * width] === 0 && (width === 1 || matrix.values[e * width + 1] === 0)) zeros++;
    }
  }
  return {
    name,
    format: 'worked example',
    matrix,
    storedEntries: entries,
    symmetry: 'general',
    duplicates: 0,
    explicitZeros: matrix.values === null ? null : zeros,
    notFinite: 0,
    notes: [],
    labels: null,
    rightHandSides: null,
  };
}

/** Entries in each cell of a cells × cells raster laid over the whole matrix, row by row from the top. */
function densityOf(a: Pattern, cells: number): Uint32Array {
  const density = new Uint32Array(cells * cells);
  for (let j = 0; j < a.columns; j++) {
    const x = Math.floor((j * cells) / a.columns);
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      density[Math.floor((a.rowIndex[p] * cells) / a.rows) * cells + x]++;
    }
  }
  return density;
}
