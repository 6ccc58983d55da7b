import { say } from '../state/notices.ts';
import { changeSheet, type SheetId, sheetById } from '../state/sheets.ts';
import { runSurvey } from '../state/surveys.ts';
import { addTrials, firstTrials } from '../state/trials.ts';
import { keepStock } from '../state/vault.ts';
import type { Arrival } from '../workers/operations.ts';
import type { Reply } from '../workers/protocol.ts';

/** Puts what has come in (or why not) on its sheet, and starts the survey and the first trials. A closed sheet stays closed. */
export function settle(id: SheetId, reply: Reply<Arrival>): void {
  if (sheetById(id) === null) return;
  if (!reply.ok) {
    changeSheet(id, () => ({ phase: 'failed', failure: reply.failure, reading: null }));
    return;
  }
  const { summary, facts, stock } = reply.value;
  keepStock(id, stock);
  changeSheet(id, () => ({ phase: 'ready', summary, facts, name: summary.name, reading: null, failure: null }));
  say(`${summary.name} is ready: ${summary.rows} by ${summary.columns}, ${summary.entries} entries.`);
  runSurvey(id);
  const sheet = sheetById(id);
  if (sheet !== null) addTrials(id, firstTrials(sheet), false);
}
