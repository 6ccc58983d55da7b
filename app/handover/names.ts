import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';

/** "bcsstk01-minimum-degree": the matrix and the ordering, fit for a file name. */
export function stemOf(sheet: Sheet, trial: Trial): string {
  const matrix = sheet.name.replace(/\.[a-z]+$/i, '').replace(/[^\w.-]+/g, '-');
  return `${matrix}-${trial.choice.ordering}`;
}

/** Set before the names of files that are saved one by one. */
export function prefixOf(sheet: Sheet, trial: Trial): string {
  return `${stemOf(sheet, trial)}-`;
}

/** "bcsstk01-minimum-degree-WHAT.ENDING": a name that says what the file is wherever it ends up. */
export function fileNameOf(sheet: Sheet, trial: Trial, what: string, ending: string): string {
  return `${stemOf(sheet, trial)}-${what}.${ending}`;
}
