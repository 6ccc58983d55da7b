import { sheetById, takeAway } from '../state/sheets.ts';
import { stopAll } from '../state/tasks.ts';
import { dropResults, dropStock } from '../state/vault.ts';
import { forgetOrigin } from './receive.ts';

/** Puts a sheet away: stops what runs for it and frees its memory here and in the workers. */
export function closeSheet(id: string): void {
  const sheet = sheetById(id);
  if (sheet === null) return;
  stopAll(id);
  takeAway(id);
  forgetOrigin(id);
  dropStock(sheet.matrix);
  const everyTrial = [sheet.trials, ...sheet.past.map((p) => p.trials)].flat();
  dropResults(everyTrial.map((t) => t.id));
}
