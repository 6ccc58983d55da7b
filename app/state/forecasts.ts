import { settingsStore } from './settings.ts';
import { changeSheet, type SheetId, sheetById, sheetsStore } from './sheets.ts';
import { follow } from './tasks.ts';
import type { TrialId } from './trial.ts';
import { pageMemory, pool, resultOf } from './vault.ts';

/** Forecasts a finished trial on the target in force. An answer for a target that is no longer in force is dropped. */
export function startForecast(id: SheetId, trialId: TrialId): void {
  const sheet = sheetById(id);
  const trial = sheet?.trials.find((t) => t.id === trialId);
  const result = resultOf(trialId);
  if (sheet === null || trial === undefined || result === null) return;
  const { target } = settingsStore.getState();
  const heldLast = Int32Array.from(trial.heldLast);
  const ask = { key: sheet.matrix, result, heldLast, target, pageMemoryBytes: pageMemory() };
  const task = pool.run('forecast', ask, { lane: 'long', priority: 2, matrices: [sheet.matrix] });
  follow(id, `forecast ${trialId}`, task);
  void task.reply.then((reply) => {
    if (!reply.ok || settingsStore.getState().target !== target) return;
    changeSheet(id, ({ trials }) => ({
      trials: trials.map((t) => (t.id === trialId ? { ...t, forecast: reply.value } : t)),
    }));
  });
}

/** How long the target must rest before everything is forecast anew, milliseconds. */
const rest = 400;

/** Forecasts all finished trials anew whenever the target changes. */
export function followTarget(): () => void {
  let timer = 0;
  return settingsStore.subscribe((now, before) => {
    if (now.target === before.target) return;
    clearTimeout(timer);
    timer = window.setTimeout(() => {
      for (const sheet of sheetsStore.getState().sheets) {
        for (const trial of sheet.trials) if (trial.state === 'done') startForecast(sheet.id, trial.id);
      }
    }, rest);
  });
}
