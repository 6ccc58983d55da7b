import type { Base } from './base.ts';
import { type Fact, fact, markWhere } from './fact.ts';
import { counted, plural } from './wording.ts';

export interface Diagonal {
  /** positions (i,i): min(rows, columns) */
  readonly length: number;
  /** diagonal positions that are entries */
  readonly stored: number;
  /** diagonal entries with a value other than zero; a pattern's entries count as nonzero */
  readonly nonzero: number;
  /** stored with the value zero; 0 for a pattern */
  readonly zero: number;
  /** not stored */
  readonly absent: number;
  /** real and > 0; null for a pattern, like the next two */
  readonly positive: number | null;
  /** real and < 0 */
  readonly negative: number | null;
  /** complex with an imaginary part */
  readonly notReal: number | null;
}

export function diagonalFact(base: Base): Fact<Diagonal> {
  const { diagonalEntry } = base.positions;
  const { values, field } = base.matrix;
  const width = field === 'complex' ? 2 : 1;
  const length = diagonalEntry.length;
  const absent = new Uint8Array(length);
  const zero = new Uint8Array(length);
  const negative = new Uint8Array(length);
  let stored = 0;
  let nonzero = 0;
  let positive = 0;
  let notReal = 0;
  for (let i = 0; i < length; i++) {
    const p = diagonalEntry[i];
    if (p < 0) {
      absent[i] = 1;
      continue;
    }
    stored++;
    if (values === null) {
      nonzero++;
      continue;
    }
    const re = values[width * p];
    const im = width === 2 ? values[2 * p + 1] : 0;
    if (re === 0 && im === 0) {
      zero[i] = 1;
      continue;
    }
    nonzero++;
    if (im !== 0) notReal++;
    else if (re > 0) positive++;
    else if (re < 0) negative[i] = 1;
  }
  const marks = [
    markWhere('diagonal entry not stored', 'unknowns', absent),
    markWhere('diagonal entry stored as zero', 'unknowns', zero),
    markWhere('negative diagonal entry', 'unknowns', negative),
  ];
  const known = values !== null;
  const value: Diagonal = {
    length,
    stored,
    nonzero,
    zero: marks[1].count,
    absent: marks[0].count,
    positive: known ? positive : null,
    negative: known ? marks[2].count : null,
    notReal: known ? notReal : null,
  };
  return fact(value, sentenceOf(value), 'entries', 'exact', marks);
}

function sentenceOf(d: Diagonal): string {
  if (d.length === 0) return 'There is no diagonal.';
  const presence =
    d.absent === 0 && d.zero === 0
      ? `All ${counted(d.length)} diagonal entries are present${d.positive === null ? '' : ' and nonzero'}`
      : `Of ${plural(d.length, 'diagonal entry', 'diagonal entries')}, ${counted(d.absent)} absent and ${counted(d.zero)} stored as zero`;
  const advice =
    d.absent + d.zero === 0
      ? ''
      : ` Pivots cannot all be taken from it: use a matching of large entries to the diagonal, or LDLᵀ with 2×2 pivots.${d.absent > 0 ? ' Some solvers want every diagonal position stored, as a zero if need be.' : ''}`;
  if (d.positive === null || d.nonzero === 0) return `${presence}.${advice}`;
  const signs = [
    d.positive > 0 && `${counted(d.positive)} positive`,
    (d.negative ?? 0) > 0 && `${counted(d.negative ?? 0)} negative`,
    (d.notReal ?? 0) > 0 && `${counted(d.notReal ?? 0)} not real`,
  ].filter((s) => s !== false);
  return `${presence}: ${signs.join(', ')}.${advice}`;
}
