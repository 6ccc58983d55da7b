import { runProof } from '../../engine/trial/proof.ts';
import type { Job } from './jobs.ts';
import { contextOf } from './trialJobs.ts';

export const prove: Job<'prove'> = ({ key, result, heldLast, refine, memoryLimit }, { shelf, progress }) => {
  const { loaded } = shelf.get(key);
  const rhs = loaded.rightHandSides;
  const complex = rhs !== null && rhs.values.length > rhs.columns * loaded.matrix.rows;
  const options = { refine, memoryLimit, ...(rhs === null ? {} : { rightHandSides: { ...rhs, complex } }) };
  return runProof(contextOf(shelf, key, heldLast), result, options, progress);
};
