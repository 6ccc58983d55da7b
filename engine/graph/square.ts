import { Fault } from '../matrix/fault.ts';
import type { Pattern } from '../matrix/pattern.ts';

/** The order of a square pattern; refuses any other shape in the words of the caller ("Block triangular form"). */
export function requireSquare(a: Pattern, what: string): number {
  if (a.rows !== a.columns) {
    throw new Fault(
      'input',
      'not-square',
      `${what} needs a square matrix; this one has ${a.rows} rows and ${a.columns} columns.`,
    );
  }
  return a.columns;
}
