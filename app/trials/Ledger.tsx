import type { Sheet } from '../state/sheets.ts';

export function Ledger({ sheet }: { sheet: Sheet }) {
  return <p>{sheet.trials.length} trials</p>;
}
