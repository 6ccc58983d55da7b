/**
 * A fact of the survey: a value, the sentence that says it, and what it points to in the picture.
 */

/** `exact`: counted, or picked from the values; `rounded`: sums and quotients in double precision; `bound`: encloses the true value. */
export type FactKind = 'exact' | 'rounded' | 'bound';

/** Lines or entries to highlight. */
export interface Mark {
  /** what they are, in words: "rows without a diagonal entry" */
  readonly label: string;
  /** what `indices` holds: rows, columns, unknowns (row and column of the same number), or entries as row, column, row, column, … */
  readonly axis: 'rows' | 'columns' | 'unknowns' | 'entries';
  /** 0-based, in increasing order (entries: in the order they are told); at most `markLimit` of them */
  readonly indices: Int32Array;
  /** how many there are in all */
  readonly count: number;
}

/** How many lines or entries a mark lists; `count` goes on counting. */
export const markLimit = 1000;

export interface Fact<Value> {
  /** null where the fact is not defined for this matrix; `reason` then says why */
  readonly value: Value | null;
  readonly reason: string | null;
  /** plain language, complete with units; rows and columns counted from 1 */
  readonly sentence: string;
  /** unit of the main figures: "entries", "rows", "1" for a ratio, "as the values" */
  readonly unit: string;
  readonly kind: FactKind;
  readonly marks: readonly Mark[];
}

/** A defined fact. */
export function fact<Value>(
  value: Value,
  sentence: string,
  unit: string,
  kind: FactKind = 'exact',
  marks: readonly Mark[] = [],
): Fact<Value> {
  return { value, reason: null, sentence, unit, kind, marks: marks.filter((m) => m.count > 0) };
}

/** A fact that this matrix does not have. */
export function undefinedFact<Value>(reason: string, unit: string): Fact<Value> {
  return { value: null, reason, sentence: reason, unit, kind: 'exact', marks: [] };
}

/** The lines i with flag[i] ≠ 0. */
export function markWhere(label: string, axis: 'rows' | 'columns' | 'unknowns', flag: Uint8Array): Mark {
  const listed: number[] = [];
  let count = 0;
  for (let i = 0; i < flag.length; i++) {
    if (flag[i] === 0) continue;
    if (count++ < markLimit) listed.push(i);
  }
  return { label, axis, indices: Int32Array.from(listed), count };
}

/** All lines of `list`, or the first of them. */
export function markList(label: string, axis: 'rows' | 'columns' | 'unknowns', list: Int32Array): Mark {
  return { label, axis, indices: list.slice(0, markLimit), count: list.length };
}

/** One entry; none where the row is −1. */
export function markEntry(label: string, row: number, column: number): Mark {
  const there = row >= 0;
  return { label, axis: 'entries', indices: Int32Array.from(there ? [row, column] : []), count: there ? 1 : 0 };
}
