import type { Proof } from '../../engine/trial/proof.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import { WorkerPool } from '../workers/pool.ts';
import type { MatrixKey } from '../workers/protocol.ts';
import type { Stock } from '../workers/stock.ts';
import type { TrialId } from './trial.ts';

/**
 * The big arrays of the page, beside the stores and out of React's sight: held by reference, handed to workers, never looked into.
 */
const stocks = new Map<MatrixKey, Stock>();
/** Results of trials, with their orders and counts. */
const results = new Map<TrialId, TrialResult>();

/** The one pool of workers. */
export const pool = new WorkerPool((key) => stocks.get(key) ?? null);

let made = 0;

/** A fresh key for a matrix about to come in. */
export function newMatrixKey(): MatrixKey {
  return `m${++made}`;
}

export function keepStock(key: MatrixKey, stock: Stock): void {
  stocks.set(key, stock);
}

/** What lies under a key, or null once it is put away. */
export function stockOf(key: MatrixKey): Stock | null {
  return stocks.get(key) ?? null;
}

/** Changes what came beside a matrix; workers are supplied anew. */
export function changeStock(key: MatrixKey, change: Partial<Stock>): void {
  const stock = stocks.get(key);
  if (stock === undefined) return;
  stocks.set(key, { ...stock, ...change });
  pool.forget(key);
}

/** Lets go of a matrix here and in all workers. */
export function dropStock(key: MatrixKey): void {
  stocks.delete(key);
  pool.forget(key);
}

export function keepResult(id: TrialId, result: TrialResult): void {
  results.set(id, result);
}

/** The result of a finished trial, or null. */
export function resultOf(id: TrialId): TrialResult | null {
  return results.get(id) ?? null;
}

type Solutions = Proof['solutions'];
/** Solutions of the user's right-hand sides, by trial. */
const solved = new Map<TrialId, Solutions>();

export function keepSolutions(id: TrialId, solutions: Solutions): void {
  solved.set(id, solutions);
}

/** Solutions from the proof of a trial, or null. */
export function solutionsOf(id: TrialId): Solutions {
  return solved.get(id) ?? null;
}

/** Lets go of the results of trials that can no longer be called back. */
export function dropResults(ids: readonly TrialId[]): void {
  for (const id of ids) {
    results.delete(id);
    solved.delete(id);
  }
}

/** Share of the machine's memory that a proof run may take in this page. */
const memoryShare = 0.75;
/** Assumed where the browser does not say, GiB. */
const usualMemory = 8;

/** Bytes that a numeric run may take here: by what the browser says of the machine, which is at most 8 GiB. */
export function pageMemory(): number {
  const { deviceMemory } = navigator as Navigator & { readonly deviceMemory?: number };
  return memoryShare * (deviceMemory ?? usualMemory) * 2 ** 30;
}
