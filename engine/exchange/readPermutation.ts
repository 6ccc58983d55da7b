import { Fault, type Repair } from '../matrix/fault.ts';
import { asNewToOld, asOldToNew, type NewToOld, orderOf } from '../matrix/permutation.ts';
import { lineBlocks } from './lineBlocks.ts';
import { quoted } from './marketHeader.ts';
import type { ByteSource } from './source.ts';
import type { Direction } from './writePermutation.ts';

/** A permutation file. `values` are 0-based, direction as the file means it. */
export interface PermutationFile {
  readonly values: Int32Array;
  readonly base: 0 | 1;
  /** where the file says it; null: every permutation is valid both ways, ask */
  readonly direction: Direction | null;
  /** what was left out or chosen, in sentences */
  readonly notes: readonly string[];
}

export interface PermutationHints {
  /** "detect": by the smallest and largest value */
  readonly base: 'detect' | 0 | 1;
  /** which of two vectors in one file; null: refuse and offer */
  readonly vector?: 1 | 2 | null;
}

/**
 * Reads a permutation of n: integers separated by blanks, commas or line ends, comment lines starting with % or #, or a Matrix Market array.
 * A file of 2n numbers holds two vectors, side by side or one after the other: one of them has to be chosen, unless one only counts the lines.
 * @throws Fault naming the first repeated, missing or out-of-range value with its line; "two-vectors" with the choice as repairs.
 */
export async function readPermutation(
  source: ByteSource,
  n: number,
  hints: PermutationHints = { base: 'detect' },
): Promise<PermutationFile> {
  const words = new PermutationWords(source, n);
  const decoder = new TextDecoder('latin1');
  for await (const block of lineBlocks(source, () => {})) {
    const lines = decoder.decode(block.bytes.subarray(block.start, block.end)).split(/\r\n|\n|\r/);
    if (lines[lines.length - 1] === '') lines.pop();
    for (const text of lines) words.take(text);
  }
  return words.finish(hints);
}

class PermutationWords {
  private readonly source: ByteSource;
  private readonly n: number;
  private numbers: Float64Array;
  private lineOf: Int32Array;
  private count = 0;
  private line = 0;
  private direction: Direction | null = null;
  private declaredBase: 0 | 1 | null = null;
  private array = false;
  private sized = false;
  /** every line so far holds two numbers */
  private pairs = true;

  constructor(source: ByteSource, n: number) {
    this.source = source;
    this.n = n;
    this.numbers = new Float64Array(n);
    this.lineOf = new Int32Array(n);
  }

  private refuse(code: string, text: string, line = this.line, repairs: readonly Repair[] = []): Fault {
    const file = this.source.name;
    const at = Math.max(1, line);
    return new Fault('input', code, `${file}, line ${at}: ${text}`, { file, line: at }, repairs);
  }

  take(text: string): void {
    this.line++;
    const { n } = this;
    if (/^\s*[%#]/.test(text)) {
      if (/^%%?matrixmarket/i.test(text)) this.array = true;
      const said = /\b(new-to-old|old-to-new), ([01])-based/.exec(text);
      if (said !== null) {
        this.direction = said[1] as Direction;
        this.declaredBase = said[2] === '0' ? 0 : 1;
      }
      return;
    }
    const words = text.split(/[\s,;]+/).filter((w) => w !== '');
    if (words.length === 0) return;
    if (this.array && !this.sized) {
      this.sized = true;
      const size = words.length === 2 ? Number(words[0]) * Number(words[1]) : -1;
      if (size !== n && size !== 2 * n) {
        throw this.refuse('permutation-length', `the size line says "${quoted(text)}"; expected "${n} 1".`);
      }
      return;
    }
    if (words.length !== 2) this.pairs = false;
    for (const word of words) this.number(word);
  }

  private number(word: string): void {
    const { n } = this;
    if (!/^[+-]?\d+(\.0*)?$/.test(word)) {
      throw this.refuse('permutation-word', `"${quoted(word)}" is not an integer; expected ${n} integers.`);
    }
    if (this.count === 2 * n) throw this.tooMany(this.line);
    if (this.count === this.numbers.length) {
      const numbers = new Float64Array(2 * n);
      const lineOf = new Int32Array(2 * n);
      numbers.set(this.numbers);
      lineOf.set(this.lineOf);
      this.numbers = numbers;
      this.lineOf = lineOf;
    }
    this.numbers[this.count] = Number(word);
    this.lineOf[this.count++] = this.line;
  }

  private tooMany(line: number): Fault {
    const { n } = this;
    return this.refuse(
      'permutation-length',
      `more than ${n} numbers; expected one for each of the ${n} unknowns.`,
      line,
    );
  }

  finish(hints: PermutationHints): PermutationFile {
    const { n, count } = this;
    if (count < n) {
      throw this.refuse(
        'permutation-length',
        `the file ends after ${count} numbers; expected one for each of the ${n} unknowns.`,
      );
    }
    if (count > n && count < 2 * n) throw this.tooMany(this.lineOf[n]);
    const notes: string[] = [];
    let { numbers, lineOf } = this;
    if (count > n) {
      const vector = hints.vector ?? this.onlyVector(notes);
      const at = (k: number) => (this.pairs ? 2 * k + vector - 1 : (vector - 1) * n + k);
      numbers = Float64Array.from({ length: n }, (_, k) => this.numbers[at(k)]);
      lineOf = Int32Array.from({ length: n }, (_, k) => this.lineOf[at(k)]);
      if (hints.vector !== undefined && hints.vector !== null) {
        notes.push(`Of the two vectors in the file, ${vector === 1 ? 'the first' : 'the second'} was used.`);
      }
    }
    const base = hints.base !== 'detect' ? hints.base : (this.declaredBase ?? detectBase(numbers, n));
    return { values: checked(this.source, numbers, lineOf, n, base), base, direction: this.direction, notes };
  }

  /** The one vector that can be meant: the other counts the lines. Else the user has to say. */
  private onlyVector(notes: string[]): 1 | 2 {
    const { n, numbers, pairs } = this;
    const counts = [true, true];
    for (let v = 0; v < 2; v++) {
      const at = (k: number) => numbers[pairs ? 2 * k + v : v * n + k];
      for (let k = 1; k < n && counts[v]; k++) if (at(k) !== at(k - 1) + 1) counts[v] = false;
      if (at(0) !== 0 && at(0) !== 1) counts[v] = false;
    }
    if (counts[0] !== counts[1] && n > 1) {
      const vector = counts[0] ? 2 : 1;
      notes.push(`The ${counts[0] ? 'first' : 'second'} column only counts the lines and was left out.`);
      return vector;
    }
    const place = pairs ? 'side by side' : 'one after the other';
    throw this.refuse(
      'two-vectors',
      `the file holds ${2 * n} numbers, two vectors of ${n} ${place} (an order and its inverse, or one for rows and one for columns?); expected one. Say which of them is meant.`,
      this.lineOf[n],
      [
        { id: 'permutation-vector=1', text: pairs ? 'Use the left column' : 'Use the first half' },
        { id: 'permutation-vector=2', text: pairs ? 'Use the right column' : 'Use the second half' },
      ],
    );
  }
}

/** 0 where a value is 0, else 1. */
function detectBase(numbers: Float64Array, n: number): 0 | 1 {
  for (let k = 0; k < n; k++) if (numbers[k] === 0) return 0;
  return 1;
}

function checked(source: ByteSource, numbers: Float64Array, lineOf: Int32Array, n: number, base: 0 | 1): Int32Array {
  const values = new Int32Array(n);
  const seenAt = new Int32Array(n).fill(-1);
  for (let k = 0; k < n; k++) {
    const i = numbers[k] - base;
    if (!(i >= 0 && i < n)) {
      throw refuse(
        source,
        lineOf[k],
        'permutation-range',
        `the value ${numbers[k]} is outside ${base} … ${n - 1 + base} (${base}-based).`,
      );
    }
    if (seenAt[i] >= 0) {
      const missing = missingValue(numbers, n, base);
      throw refuse(
        source,
        lineOf[k],
        'permutation-repeat',
        `the value ${numbers[k]} appears a second time (first in line ${lineOf[seenAt[i]]}); ${missing + base} is missing.`,
      );
    }
    seenAt[i] = k;
    values[k] = i;
  }
  return values;
}

function missingValue(numbers: Float64Array, n: number, base: number): number {
  const seen = new Uint8Array(n);
  for (let k = 0; k < n; k++) if (numbers[k] >= base && numbers[k] < n + base) seen[numbers[k] - base] = 1;
  return seen.indexOf(0);
}

function refuse(source: ByteSource, line: number, code: string, text: string): Fault {
  return new Fault('input', code, `${source.name}, line ${line}: ${text}`, { file: source.name, line });
}

/** The new-to-old order a file means when read in `direction`. */
export function orderFrom(file: PermutationFile, direction: Direction): NewToOld {
  return direction === 'new-to-old' ? asNewToOld(file.values) : orderOf(asOldToNew(file.values));
}
