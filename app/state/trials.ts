import type { Choice } from '../../engine/trial/choice.ts';
import { advisedFactorization, defaultChoice, suitableOrderings } from '../workers/rules.ts';
import { startForecast } from './forecasts.ts';
import { notify, say } from './notices.ts';
import { changeSheet, type Sheet, type SheetId, sheetById } from './sheets.ts';
import { follow, stopTask } from './tasks.ts';
import { choiceKey, letterOf, noProof, type Trial, type TrialId } from './trial.ts';
import { keepResult, pool } from './vault.ts';

/** How many earlier lists of trials can be called back. */
const pastKept = 40;
/** Maps beside the original on the sheet. */
const mostShown = 3;

/** Orderings that every sheet starts with: they are quick, and between them they show what the matrix is like. */
const firstOrderings = [
  'natural',
  'reverse-cuthill-mckee',
  'minimum-degree',
  'nested-dissection',
  'column-minimum-degree',
];

export interface TrialPlan {
  readonly choice: Choice;
  readonly heldLast?: readonly number[];
}

/** The trials a sheet starts with. */
export function firstTrials(sheet: Sheet): readonly TrialPlan[] {
  return sensibleTrials(sheet).filter(({ choice }) => firstOrderings.includes(choice.ordering));
}

/** Every ordering that suits the matrix, with the factorization advised for it. */
export function sensibleTrials({ facts }: Sheet): readonly TrialPlan[] {
  if (facts === null) return [];
  const { factorization } = advisedFactorization(facts);
  return suitableOrderings(facts, factorization).map((ordering) => ({
    choice: defaultChoice(factorization, ordering),
  }));
}

/**
 * Adds trials that are not in the ledger yet and starts them.
 * @returns how many were added; the others are there already.
 */
export function addTrials(id: SheetId, plans: readonly TrialPlan[], undoable = true): number {
  const sheet = sheetById(id);
  if (sheet === null) return 0;
  const keys = new Set(sheet.trials.map((t) => choiceKey(t.choice, t.heldLast)));
  const added: Trial[] = [];
  let stamps = sheet.stamps;
  for (const { choice, heldLast = [] } of plans) {
    const key = choiceKey(choice, heldLast);
    if (keys.has(key)) continue;
    keys.add(key);
    added.push({
      id: `${id}-t${stamps}`,
      letter: letterOf(stamps++),
      choice,
      heldLast,
      state: 'waiting',
      fraction: 0,
      phase: '',
      failure: null,
      outcome: null,
      forecast: null,
      proof: noProof,
    });
  }
  if (added.length === 0) return 0;
  const did =
    added.length === 1 ? `adding ${added[0].letter}` : `adding ${added[0].letter} to ${added[added.length - 1].letter}`;
  changeSheet(id, (s) => ({
    trials: [...s.trials, ...added],
    stamps,
    past: undoable ? remember(s, did) : s.past,
  }));
  for (const trial of added) startTrial(id, trial.id);
  return added.length;
}

/** Runs a trial, or runs it again. */
export function startTrial(id: SheetId, trialId: TrialId): void {
  const sheet = sheetById(id);
  const trial = sheet?.trials.find((t) => t.id === trialId);
  if (sheet === null || trial === undefined) return;
  changeTrial(id, trialId, { state: 'waiting', fraction: 0, phase: '', failure: null });
  const task = pool.run(
    'trial',
    { key: sheet.matrix, choice: trial.choice, heldLast: Int32Array.from(trial.heldLast) },
    {
      lane: 'long',
      matrices: [sheet.matrix],
      hear: ({ fraction, phase }) => changeTrial(id, trialId, { state: 'running', fraction, phase }),
    },
  );
  follow(id, trialId, task);
  void task.reply.then((reply) => {
    if (sheetById(id)?.trials.every((t) => t.id !== trialId)) return;
    if (reply.ok) {
      keepResult(trialId, reply.value.result);
      changeTrial(id, trialId, { state: 'done', fraction: 1, outcome: reply.value.outcome });
      startForecast(id, trialId);
      say(`Trial ${trial.letter} is ready.`);
      showFirst(id, trialId);
      return;
    }
    const { failure } = reply;
    changeTrial(id, trialId, { state: failure.kind === 'stopped' ? 'stopped' : 'failed', failure });
    if (failure.kind !== 'stopped') say(`Trial ${trial.letter}: ${failure.message}`);
  });
}

export function stopTrial(id: SheetId, trialId: TrialId): void {
  stopTask(id, trialId);
}

/** Strikes a trial from the ledger; it can be called back. */
export function removeTrial(id: SheetId, trialId: TrialId): void {
  const trial = sheetById(id)?.trials.find((t) => t.id === trialId);
  if (trial === undefined) return;
  stopTask(id, trialId);
  changeSheet(id, (s) => ({
    trials: s.trials.filter((t) => t.id !== trialId),
    shown: s.shown.filter((t) => t !== trialId),
    chosen: s.chosen === trialId ? null : s.chosen,
    past: remember(s, `removing ${trial.letter}`),
  }));
}

/** Takes back the last change of the list of trials. Finished trials come back with their figures; others start again. */
export function undo(id: SheetId): void {
  const sheet = sheetById(id);
  const last = sheet?.past[sheet.past.length - 1];
  if (sheet === null || last === undefined) return;
  for (const trial of sheet.trials) {
    if (!last.trials.some((t) => t.id === trial.id)) stopTask(id, trial.id);
  }
  const now = new Map(sheet.trials.map((t) => [t.id, t]));
  const trials = last.trials.map((t) => now.get(t.id) ?? t);
  changeSheet(id, (s) => ({
    trials,
    past: s.past.slice(0, -1),
    shown: s.shown.filter((t) => trials.some((u) => u.id === t)),
    chosen: trials.some((t) => t.id === s.chosen) ? s.chosen : null,
  }));
  for (const trial of trials) {
    if (!now.has(trial.id) && trial.state !== 'done' && trial.state !== 'failed') startTrial(id, trial.id);
  }
  notify(`Took back: ${last.did}.`);
}

/** Puts the maps of a trial on the sheet or takes them off. A fourth one pushes the oldest off. */
export function toggleShown(id: SheetId, trialId: TrialId): void {
  changeSheet(id, ({ shown }) => ({
    shown: shown.includes(trialId) ? shown.filter((t) => t !== trialId) : [...shown, trialId].slice(-mostShown),
  }));
}

/** The trial that proof and handover speak of. */
export function chooseTrial(id: SheetId, trialId: TrialId): void {
  changeSheet(id, ({ shown }) => ({
    chosen: trialId,
    shown: shown.includes(trialId) ? shown : [...shown, trialId].slice(-mostShown),
  }));
}

/** Puts the first finished trials on the sheet by themselves, as long as the user has not chosen any. */
function showFirst(id: SheetId, trialId: TrialId): void {
  changeSheet(id, (s) => {
    const trial = s.trials.find((t) => t.id === trialId);
    const worthSeeing = trial !== undefined && trial.choice.ordering !== 'natural';
    return s.shown.length < 2 && worthSeeing && s.chosen === null ? { shown: [...s.shown, trialId] } : {};
  });
}

function changeTrial(id: SheetId, trialId: TrialId, change: Partial<Trial>): void {
  changeSheet(id, ({ trials }) => ({ trials: trials.map((t) => (t.id === trialId ? { ...t, ...change } : t)) }));
}

function remember(sheet: Sheet, did: string): Sheet['past'] {
  return [...sheet.past, { did, trials: sheet.trials }].slice(-pastKept);
}
