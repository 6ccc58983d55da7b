import type { Choice } from '../../engine/trial/choice.ts';
import { say } from './notices.ts';
import { changeSheet, type Sheet, type SheetId, sheetById } from './sheets.ts';
import { follow, stopTask } from './tasks.ts';
import type { ProofState, TrialId } from './trial.ts';
import { addTrials, whenDone } from './trials.ts';
import { keepSolutions, pageMemory, pool, resultOf } from './vault.ts';

/** Runs the numeric factorization of a finished trial and keeps what it showed. */
export function startProof(id: SheetId, trialId: TrialId, refine: number): void {
  const sheet = sheetById(id);
  const trial = sheet?.trials.find((t) => t.id === trialId);
  const result = resultOf(trialId);
  if (sheet === null || trial === undefined || result === null) return;
  changeProof(id, trialId, () => ({ state: 'waiting', fraction: 0, phase: '', failure: null, proof: null }));
  const task = pool.run(
    'prove',
    {
      key: sheet.matrix,
      result,
      heldLast: Int32Array.from(trial.heldLast),
      refine,
      memoryLimit: pageMemory(),
    },
    {
      lane: 'long',
      priority: 1,
      matrices: [sheet.matrix],
      hear: ({ fraction, phase }) => changeProof(id, trialId, (p) => ({ ...p, state: 'running', fraction, phase })),
    },
  );
  follow(id, `prove ${trialId}`, task);
  void task.reply.then((reply) => {
    if (reply.ok) {
      const { solutions, ...proof } = reply.value;
      keepSolutions(trialId, solutions);
      changeProof(id, trialId, () => ({ state: 'done', fraction: 1, phase: '', failure: null, proof }));
      say(`Proof of trial ${trial.letter}: ${proof.card.verdict}.`);
      return;
    }
    const { failure } = reply;
    const state = failure.kind === 'stopped' ? 'stopped' : 'failed';
    changeProof(id, trialId, (p) => ({ ...p, state, failure }));
    if (state === 'failed') say(`Proof of trial ${trial.letter} failed: ${failure.message}`);
  });
}

export function stopProof(id: SheetId, trialId: TrialId): void {
  stopTask(id, `prove ${trialId}`);
}

/** Thresholds tried in a sweep; 1 is for LU only, where rows may be interchanged freely. */
const sweep = [1, 0.5, 0.1, 0.01, 0.001];

/** Adds a trial for each pivot threshold (and static pivoting) beside the given one, and proves them all. */
export function sweepThreshold(sheet: Sheet, choice: Choice, refine: number): void {
  const most = choice.factorization === 'ldlt' ? 0.5 : 1;
  const choices: Choice[] = sweep
    .filter((threshold) => threshold <= most)
    .map((threshold) => ({ ...choice, pivoting: 'threshold', threshold }));
  choices.push({ ...choice, pivoting: 'static' });
  addTrials(
    sheet.id,
    choices.map((c) => ({ choice: c })),
  );
  for (const c of choices) whenDone(sheet.id, c, (trialId) => startProof(sheet.id, trialId, refine));
}

function changeProof(id: SheetId, trialId: TrialId, change: (proof: ProofState) => ProofState): void {
  changeSheet(id, ({ trials }) => ({
    trials: trials.map((t) => (t.id === trialId ? { ...t, proof: change(t.proof) } : t)),
  }));
}
