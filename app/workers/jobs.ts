import type { Progress } from '../../engine/matrix/progress.ts';
import { attach, inspect } from './attachJobs.ts';
import { example, plates } from './exampleJobs.ts';
import { forecast } from './forecastJobs.ts';
import {
  convention,
  handoverFile,
  handoverList,
  handoverPreview,
  handoverZip,
  heldAgainst,
  makeRecipe,
  matchRecipe,
  permutation,
} from './handoverJobs.ts';
import { layMap, map, spot, whyFill } from './mapJobs.ts';
import { combine, difference, matrixFile } from './matrixJobs.ts';
import type { Answer, Ask, Early, Operation } from './protocol.ts';
import { read } from './readJobs.ts';
import { reconcile } from './reconcileJobs.ts';
import type { Shelf } from './shelf.ts';
import { survey } from './surveyJobs.ts';
import { front, tree } from './treeJobs.ts';
import { trial } from './trialJobs.ts';

/** What a job may use besides what it was asked. */
export interface Means<E> {
  readonly shelf: Shelf;
  readonly progress: Progress;
  /** hands over a part of the answer ahead of it */
  readonly early: (part: E, fraction: number, phase: string) => void;
  /** buffers of the answer that the worker has no more use for: they are moved to the page and not copied */
  readonly giveAway: (...buffers: ArrayBuffer[]) => void;
}

export type Job<K extends Operation> = (ask: Ask<K>, means: Means<Early<K>>) => Answer<K> | Promise<Answer<K>>;

/** A job whose code comes when it is first asked for: the first load stays small. */
function later<K extends Operation>(load: () => Promise<Job<K>>): Job<K> {
  return async (ask, means) => (await load())(ask, means);
}

const proofs = () => import('./proofJobs.ts');
const measures = () => import('./measureJobs.ts');

/** Who does what. One line an operation. */
export const jobs: { readonly [K in Operation]: Job<K> } = {
  plates,
  read,
  inspect,
  attach,
  matrixFile,
  difference,
  combine,
  example,
  survey,
  layMap,
  map,
  spot,
  whyFill,
  tree,
  front,
  trial,
  forecast,
  reconcile,
  calibrate: later(async () => (await measures()).calibrate),
  spread: later(async () => (await measures()).spread),
  prove: later(async () => (await proofs()).prove),
  sweep: later(async () => (await proofs()).sweep),
  reuse: later(async () => (await proofs()).reuse),
  schur: later(async () => (await proofs()).schur),
  permutation,
  convention,
  handoverList,
  handoverFile,
  handoverPreview,
  handoverZip,
  makeRecipe,
  matchRecipe,
  heldAgainst,
};
