import type { Trial } from '../state/trial.ts';
import type { Column } from './columns.ts';
import type { Figures } from './order.ts';

/** A field as RFC 4180 has it: quoted where it must be. */
function field(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** The ledger as CSV (RFC 4180): all options of each trial, then the exact figures with their kinds; empty where not defined. */
export function ledgerAsCsv(trials: readonly Trial[], figures: Figures, columns: readonly Column[]): string {
  const options = [
    'ordering',
    'factorization',
    'pivoting',
    'threshold',
    'scaling',
    'matching',
    'blocks',
    'seed',
  ] as const;
  const head = ['trial', ...options, 'held last', ...columns.flatMap((c) => [c.name, `${c.name} kind`])];
  const lines = trials.map((t) => [
    t.letter,
    ...options.map((o) => String(t.choice[o])),
    String(t.heldLast.length),
    ...columns.flatMap((c) => {
      const figure = figures.get(t.id)?.[c.name];
      return figure === undefined || figure.value === null ? ['', ''] : [String(figure.value), figure.kind];
    }),
  ]);
  return `${[head, ...lines].map((line) => line.map(field).join(',')).join('\r\n')}\r\n`;
}
