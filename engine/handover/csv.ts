import type { Choice } from '../trial/choice.ts';

/** A figure as a table holds it: null where it is not defined. */
export interface TableFigure {
  readonly value: number | null;
  readonly kind: string;
}

/** One trial of a comparison. */
export interface TableRow {
  readonly name: string;
  readonly choice: Choice;
  /** how many unknowns are kept at the end */
  readonly heldLast: number;
  readonly figures: Readonly<Record<string, TableFigure | undefined>>;
}

/** A field as RFC 4180 has it: quoted where it must be. */
function field(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** Lines of comma-separated fields (RFC 4180). */
export function csvText(lines: readonly (readonly string[])[]): string {
  return lines.map((line) => `${line.map(field).join(',')}\r\n`).join('');
}

const options = [
  'ordering',
  'factorization',
  'pivoting',
  'threshold',
  'scaling',
  'matching',
  'blocks',
  'seed',
] as const satisfies readonly (keyof Choice)[];

/** A comparison as CSV: the options of each trial, then the exact figures with their kinds; empty where not defined. */
export function comparisonCsv(rows: readonly TableRow[], figures: readonly string[]): string {
  const head = ['trial', ...options, 'held last', ...figures.flatMap((name) => [name, `${name} kind`])];
  const lines = rows.map((row) => [
    row.name,
    ...options.map((o) => String(row.choice[o])),
    String(row.heldLast),
    ...figures.flatMap((name) => {
      const figure = row.figures[name];
      return figure === undefined || figure.value === null ? ['', ''] : [String(figure.value), figure.kind];
    }),
  ]);
  return csvText([head, ...lines]);
}
