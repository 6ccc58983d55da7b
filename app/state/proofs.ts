import { createStore } from 'zustand/vanilla';
import type { Reuse } from '../../engine/trial/reuse.ts';
import type { SweepRow } from '../../engine/trial/sweep.ts';
import type { Task } from '../workers/pool.ts';
import type { ProofAsk, ProofWish, SchurAnswer } from '../workers/proofOperations.ts';
import type { Failure, Reply } from '../workers/protocol.ts';
import { say } from './notices.ts';
import { changeSheet, type SheetId, sheetById } from './sheets.ts';
import { follow, stopTask } from './tasks.ts';
import type { ProofState, TrialId } from './trial.ts';
import { keepSolutions, pageMemory, pool, resultOf } from './vault.ts';

/** How proofs are made until the user says otherwise. */
export const usualWish: ProofWish = { refine: 5, precision: 'double', transposed: false, seed: 1, given: true };

/** What stands beside a proof: each under way, done, or failed with a reason. */
export interface Beside<T> {
  readonly state: 'running' | 'done' | 'failed';
  readonly fraction: number;
  readonly phase: string;
  readonly failure: Failure | null;
  readonly value: T | null;
}

/** Runs beside the proof of a trial. */
export interface BesideProof {
  readonly sweep?: Beside<readonly SweepRow[]>;
  readonly reuse?: Beside<Reuse> & { readonly name: string };
  readonly schur?: Beside<SchurAnswer>;
}

/** By trial; what a trial no longer has is simply not looked at. */
export const besideStore = createStore<Readonly<Record<TrialId, BesideProof>>>()(() => ({}));

function askFor(id: SheetId, trialId: TrialId, wish: ProofWish): ProofAsk | null {
  const sheet = sheetById(id);
  const trial = sheet?.trials.find((t) => t.id === trialId);
  const result = resultOf(trialId);
  if (sheet === null || trial === undefined || result === null) return null;
  return { key: sheet.matrix, result, heldLast: Int32Array.from(trial.heldLast), wish, memoryLimit: pageMemory() };
}

/** Runs the numeric factorization of a finished trial and keeps what it showed. */
export function startProof(id: SheetId, trialId: TrialId, wish: ProofWish): void {
  const ask = askFor(id, trialId, wish);
  const letter = sheetById(id)?.trials.find((t) => t.id === trialId)?.letter ?? '';
  if (ask === null) return;
  changeProof(id, trialId, () => ({ state: 'waiting', fraction: 0, phase: '', failure: null, proof: null }));
  const task = pool.run('prove', ask, {
    lane: 'long',
    priority: 1,
    matrices: [ask.key],
    hear: ({ fraction, phase }) => changeProof(id, trialId, (p) => ({ ...p, state: 'running', fraction, phase })),
  });
  follow(id, `prove ${trialId}`, task);
  void task.reply.then((reply) => {
    if (reply.ok) {
      const { solutions, ...proof } = reply.value;
      keepSolutions(trialId, solutions);
      changeProof(id, trialId, () => ({ state: 'done', fraction: 1, phase: '', failure: null, proof }));
      say(`Proof of trial ${letter}: ${proof.card.verdict}.`);
      return;
    }
    const { failure } = reply;
    const state = failure.kind === 'stopped' ? 'stopped' : 'failed';
    changeProof(id, trialId, (p) => ({ ...p, state, failure }));
    if (state === 'failed') say(`Proof of trial ${letter} failed: ${failure.message}`);
  });
}

export function stopProof(id: SheetId, trialId: TrialId): void {
  stopTask(id, `prove ${trialId}`);
}

/** Runs the trial with every pivot threshold and with static pivoting. */
export function startSweep(id: SheetId, trialId: TrialId, wish: ProofWish): void {
  const ask = askFor(id, trialId, wish);
  if (ask === null) return;
  const change = changeBeside(trialId, 'sweep', {});
  const task = pool.run('sweep', ask, { lane: 'long', priority: 1, matrices: [ask.key], hear: change.hear });
  settle(id, trialId, 'sweep', task, change.done);
}

/** Factorizes another open matrix on the analysis of this trial. */
export function startReuse(id: SheetId, trialId: TrialId, other: SheetId, wish: ProofWish): void {
  const ask = askFor(id, trialId, wish);
  const second = sheetById(other);
  if (ask === null || second === null) return;
  const change = changeBeside(trialId, 'reuse', { name: second.name });
  const matrices = [ask.key, second.matrix];
  const task = pool.run(
    'reuse',
    { ...ask, second: second.matrix },
    { lane: 'long', priority: 1, matrices, hear: change.hear },
  );
  settle(id, trialId, 'reuse', task, change.done);
}

/** Computes the Schur complement onto the trial's held-last unknowns. */
export function startSchur(id: SheetId, trialId: TrialId, failures: 'append' | 'perturb', wish: ProofWish): void {
  const ask = askFor(id, trialId, wish);
  if (ask === null) return;
  const change = changeBeside(trialId, 'schur', {});
  const task = pool.run(
    'schur',
    { ...ask, failures },
    { lane: 'long', priority: 1, matrices: [ask.key], hear: change.hear },
  );
  settle(id, trialId, 'schur', task, change.done);
}

export function stopBeside(id: SheetId, trialId: TrialId, what: keyof BesideProof): void {
  stopTask(id, `${what} ${trialId}`);
}

function changeBeside<K extends keyof BesideProof>(trialId: TrialId, what: K, more: object) {
  const set = (part: Omit<Beside<unknown>, never>): void =>
    besideStore.setState((s) => ({ [trialId]: { ...s[trialId], [what]: { ...more, ...part } } }));
  set({ state: 'running', fraction: 0, phase: '', failure: null, value: null });
  return {
    hear: ({ fraction, phase }: { fraction: number; phase: string }) =>
      set({ state: 'running', fraction, phase, failure: null, value: null }),
    done: (reply: Reply<unknown>) =>
      set(
        reply.ok
          ? { state: 'done', fraction: 1, phase: '', failure: null, value: reply.value }
          : { state: 'failed', fraction: 0, phase: '', failure: reply.failure, value: null },
      ),
  };
}

function settle<T>(id: SheetId, trialId: TrialId, what: string, task: Task<T>, done: (reply: Reply<T>) => void): void {
  follow(id, `${what} ${trialId}`, task);
  void task.reply.then(done);
}

function changeProof(id: SheetId, trialId: TrialId, change: (proof: ProofState) => ProofState): void {
  changeSheet(id, ({ trials }) => ({
    trials: trials.map((t) => (t.id === trialId ? { ...t, proof: change(t.proof) } : t)),
  }));
}
