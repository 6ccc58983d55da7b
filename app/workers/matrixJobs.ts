import { writeMatrixMarket } from '../../engine/exchange/writeMatrixMarket.ts';
import { writeRutherfordBoeing } from '../../engine/exchange/writeRutherfordBoeing.ts';
import { combine as combined } from '../../engine/matrix/combine.ts';
import { difference as differenceOf } from '../../engine/matrix/difference.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import { mirrorSymmetry } from '../../engine/survey/symmetry.ts';
import { factsOf } from '../../engine/trial/facts.ts';
import { asLoaded } from './exampleJobs.ts';
import type { Job } from './jobs.ts';
import { shareLoaded } from './shared.ts';
import { summarize } from './summary.ts';

/** Bytes gathered into one part of the file. */
const part = 1 << 22;

export const matrixFile: Job<'matrixFile'> = ({ key, format, half }, { shelf, progress }) => {
  const { matrix, name, symmetry: declared } = shelf.get(key).loaded;
  const symmetry = half ? (mirrorSymmetry(matrix) ?? (matrix.values === null ? declared : 'general')) : 'general';
  if (half && symmetry === 'general') {
    const text = `${name} is not symmetric exactly, so half of it does not tell the rest. Save all entries.`;
    throw new Fault('input', 'not-that-symmetric', text);
  }
  const chunks =
    format === 'rutherford-boeing'
      ? writeRutherfordBoeing(matrix, { symmetry, title: name })
      : writeMatrixMarket(matrix, { symmetry, storage: half ? 'half' : 'full', comments: [`from ${name}`] });
  let whole = new Blob([]);
  let parts: Uint8Array<ArrayBuffer>[] = [];
  let size = 0;
  for (const chunk of chunks) {
    parts.push(chunk as Uint8Array<ArrayBuffer>);
    size += chunk.length;
    if (size < part) continue;
    progress(0, 'writing');
    // parts go into the browser's keeping, out of the heap
    whole = new Blob([whole, ...parts]);
    parts = [];
    size = 0;
  }
  return new Blob([whole, ...parts], { type: 'text/plain' });
};

export const difference: Job<'difference'> = ({ key, other }, { shelf }) =>
  differenceOf(shelf.get(key).loaded.matrix, shelf.get(other).loaded.matrix);

export const combine: Job<'combine'> = ({ key, name, terms }, { shelf, progress }) => {
  const started = performance.now();
  progress(0, 'summing');
  const matrix = combined(
    terms.map((term) => ({ coefficient: term.coefficient, matrix: shelf.get(term.key).loaded.matrix })),
  );
  const loaded = shareLoaded({ ...asLoaded(name, matrix), format: 'sum of matrices' });
  const stock = { loaded, coordinates: null, imported: null };
  shelf.put(key, stock);
  return { summary: summarize(loaded, (performance.now() - started) / 1e3), facts: factsOf(matrix), stock };
};
