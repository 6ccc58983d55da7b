import { writeDense } from '../../engine/exchange/writeDense.ts';
import { type ProofOptions, runProof } from '../../engine/trial/proof.ts';
import { proveSecond } from '../../engine/trial/reuse.ts';
import { schurOfTrial } from '../../engine/trial/schurProof.ts';
import { sweepThresholds } from '../../engine/trial/sweep.ts';
import type { Job } from './jobs.ts';
import type { ProofAsk } from './proofOperations.ts';
import type { Shelf } from './shelf.ts';
import { contextOf } from './trialJobs.ts';

function optionsOf(shelf: Shelf, { key, wish, memoryLimit }: ProofAsk): ProofOptions {
  const { refine, precision, transposed, seed, given } = wish;
  const { rightHandSides: rhs, matrix } = shelf.get(key).loaded;
  const complex = rhs !== null && rhs.values.length > rhs.columns * matrix.rows;
  return {
    refine,
    precision,
    transposed,
    seed,
    memoryLimit,
    ...(rhs === null || !given ? {} : { rightHandSides: { ...rhs, complex } }),
  };
}

export const prove: Job<'prove'> = (ask, { shelf, progress }) =>
  runProof(contextOf(shelf, ask.key, ask.heldLast), ask.result, optionsOf(shelf, ask), progress);

export const sweep: Job<'sweep'> = (ask, { shelf, progress }) =>
  sweepThresholds(contextOf(shelf, ask.key, ask.heldLast), ask.result, optionsOf(shelf, ask), progress);

export const reuse: Job<'reuse'> = (ask, { shelf, progress }) => {
  const { matrix } = shelf.get(ask.second).loaded;
  return proveSecond(contextOf(shelf, ask.key, ask.heldLast), ask.result, matrix, optionsOf(shelf, ask), progress);
};

/** Rows and columns of a complement that the page shows. */
const cornerShown = 6;

export const schur: Job<'schur'> = (ask, { shelf, progress }) => {
  const context = contextOf(shelf, ask.key, ask.heldLast);
  const { memoryLimit } = ask;
  const run = schurOfTrial(context, ask.result, ask.failures, { memoryLimit }, progress);
  const { size, appended, rows, complex, values } = run.complement;
  const comments = [
    `Schur complement onto ${size} unknowns; row and column k belong to the original unknowns (1-based):`,
    Array.from(rows, (r) => r + 1).join(' '),
    ...run.notes,
  ];
  const chunks = writeDense({ rows: size, columns: size, field: complex ? 'complex' : 'real', values }, comments);
  const shown = Math.min(size, cornerShown);
  const width = complex ? 2 : 1;
  const corner = new Float64Array(width * shown * shown);
  for (let c = 0; c < shown; c++) {
    corner.set(values.subarray(width * c * size, width * (c * size + shown)), width * c * shown);
  }
  const file = new Blob([...chunks] as BlobPart[], { type: 'text/plain' });
  return {
    size,
    appended,
    rows,
    complex,
    corner: { size: shown, values: corner },
    file,
    seconds: run.seconds,
    notes: run.notes,
  };
};
