import type { TrialForecast } from '../../engine/forecast/forecast.ts';
import type { Choice } from '../../engine/trial/choice.ts';
import type { Proof } from '../../engine/trial/proof.ts';
import type { Failure } from '../workers/protocol.ts';
import type { TrialOutcome } from '../workers/trialFigures.ts';

export type TrialId = string;

/** What a numeric run showed; its solutions lie in the vault. */
export type ShownProof = Omit<Proof, 'solutions'>;

/** How far the proof of a trial is. */
export interface ProofState {
  readonly state: 'none' | 'waiting' | 'running' | 'done' | 'stopped' | 'failed';
  readonly fraction: number;
  readonly phase: string;
  readonly failure: Failure | null;
  readonly proof: ShownProof | null;
}

/** No proof asked for. */
export const noProof: ProofState = { state: 'none', fraction: 0, phase: '', failure: null, proof: null };

/** One line of the ledger. */
export interface Trial {
  readonly id: TrialId;
  /** A, B, C …: the stamp on its maps */
  readonly letter: string;
  readonly choice: Choice;
  /** unknowns kept at the end, original numbering, 0-based, increasing; empty for none */
  readonly heldLast: readonly number[];
  /** waiting for a worker, running, finished, stopped by the user, or ended by a failure (which says why) */
  readonly state: 'waiting' | 'running' | 'done' | 'stopped' | 'failed';
  readonly fraction: number;
  readonly phase: string;
  readonly failure: Failure | null;
  /** storage, time and parallelism on the target in force; null until reckoned, or where counts are missing */
  readonly forecast: TrialForecast | null;
  readonly proof: ProofState;
  /** counts and seconds once finished */
  readonly outcome: TrialOutcome | null;
}

/** The k-th stamp: A … Z, AA, AB … */
export function letterOf(k: number): string {
  let out = '';
  for (let q = k; q >= 0; q = Math.floor(q / 26) - 1) out = String.fromCharCode(65 + (q % 26)) + out;
  return out;
}

/** Two trials with the same key are the same trial. */
export function choiceKey(choice: Choice, heldLast: readonly number[]): string {
  const c = choice;
  const threshold = c.pivoting === 'threshold' ? c.threshold : '';
  const details = JSON.stringify([c.tuning, c.relabelling, c.ordering === 'best-of' ? c.portfolio : null]);
  return [
    c.ordering,
    c.factorization,
    c.pivoting,
    threshold,
    c.scaling,
    c.matching,
    c.blocks,
    c.seed,
    details,
    heldLast,
  ].join('|');
}
