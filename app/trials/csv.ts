import type { Trial } from '../state/trial.ts';
import { comparisonCsv } from '../workers/csv.ts';
import type { Column } from './columns.ts';
import type { Figures } from './order.ts';

/** The ledger as CSV (RFC 4180): all options of each trial, then the exact figures with their kinds; empty where not defined. */
export function ledgerAsCsv(trials: readonly Trial[], figures: Figures, columns: readonly Column[]): string {
  const rows = trials.map(({ id, letter, choice, heldLast }) => ({
    name: letter,
    choice,
    heldLast: heldLast.length,
    figures: figures.get(id) ?? {},
  }));
  return comparisonCsv(
    rows,
    columns.map((c) => c.name),
  );
}
