import type { Loaded } from '../../engine/exchange/loaded.ts';
import { WorkerPool } from '../workers/pool.ts';
import type { MatrixKey } from '../workers/protocol.ts';

/**
 * The big arrays of the page, beside the stores and out of React's sight: held by reference, handed to workers, never looked into.
 */
const matrices = new Map<MatrixKey, Loaded>();

/** The one pool of workers. */
export const pool = new WorkerPool((key) => matrices.get(key) ?? null);

let made = 0;

/** A fresh key for a matrix about to come in. */
export function newMatrixKey(): MatrixKey {
  return `m${++made}`;
}

export function keepMatrix(key: MatrixKey, loaded: Loaded): void {
  matrices.set(key, loaded);
}

/** Lets go of a matrix here and in all workers. */
export function dropMatrix(key: MatrixKey): void {
  matrices.delete(key);
  pool.forget(key);
}
