import { readMatrix } from '../../engine/exchange/read.ts';
import { applyRepair, defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { factsOf } from '../../engine/trial/facts.ts';
import { blobFile, plainSource } from '../unpack/open.ts';
import type { Job } from './jobs.ts';
import { shareLoaded } from './shared.ts';
import { summarize } from './summary.ts';

/** Least time between two reports of bytes, milliseconds. */
const reportEvery = 60;

export const read: Job<'read'> = async ({ key, file, repairs }, { shelf, progress, early }) => {
  const started = performance.now();
  const options = repairs.reduce(applyRepair, defaultReadOptions);
  let last = 0;
  const loaded = shareLoaded(
    await readMatrix(
      await plainSource(blobFile(file.name, file), options.member),
      options,
      (bytesDone, bytesAll, phase) => {
        const fraction = bytesAll === null || bytesAll === 0 ? 0 : Math.min(1, bytesDone / bytesAll);
        progress(fraction, phase);
        const now = performance.now();
        if (now - last < reportEvery) return;
        last = now;
        early({ bytesDone, bytesAll }, fraction, phase);
      },
    ),
  );
  progress(1, 'looking at the diagonal');
  const stock = { loaded, coordinates: null, imported: null };
  shelf.put(key, stock);
  const facts = factsOf(loaded.matrix);
  return { summary: summarize(loaded, (performance.now() - started) / 1e3), facts, stock };
};
