import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';

/** "bcsstk01-minimum-degree-WHAT.ENDING": a name that says what the file is wherever it ends up. */
export function fileNameOf(sheet: Sheet, trial: Trial, what: string, ending: string): string {
  const matrix = sheet.name.replace(/\.[a-z]+$/i, '').replace(/[^\w.-]+/g, '-');
  return `${matrix}-${trial.choice.ordering}-${what}.${ending}`;
}
