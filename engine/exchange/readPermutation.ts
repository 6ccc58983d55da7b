import { Fault } from '../matrix/fault.ts';
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
}

export interface PermutationHints {
  /** "detect": by the smallest and largest value */
  readonly base: 'detect' | 0 | 1;
}

/**
 * Reads a permutation of n: integers separated by blanks, commas or line ends, comment lines starting with % or #, or a Matrix Market array.
 * @throws Fault naming the first repeated, missing or out-of-range value with its line.
 */
export async function readPermutation(
  source: ByteSource,
  n: number,
  hints: PermutationHints = { base: 'detect' },
): Promise<PermutationFile> {
  const numbers = new Float64Array(n);
  const lineOf = new Int32Array(n);
  const decoder = new TextDecoder('latin1');
  let count = 0;
  let line = 0;
  let direction: Direction | null = null;
  let declaredBase: 0 | 1 | null = null;
  let array = false;
  let sized = false;
  for await (const block of lineBlocks(source, () => {})) {
    const lines = decoder.decode(block.bytes.subarray(block.start, block.end)).split(/\r\n|\n|\r/);
    if (lines[lines.length - 1] === '') lines.pop();
    for (const text of lines) {
      line++;
      if (/^\s*[%#]/.test(text)) {
        if (/^%%?matrixmarket/i.test(text)) array = true;
        const said = /\b(new-to-old|old-to-new), ([01])-based/.exec(text);
        if (said !== null) {
          direction = said[1] as Direction;
          declaredBase = said[2] === '0' ? 0 : 1;
        }
        continue;
      }
      const words = text.split(/[\s,;]+/).filter((w) => w !== '');
      if (words.length === 0) continue;
      if (array && !sized) {
        sized = true;
        if (words.length !== 2 || Number(words[0]) * Number(words[1]) !== n) {
          throw refuse(source, line, 'permutation-length', `the size line says "${quoted(text)}"; expected "${n} 1".`);
        }
        continue;
      }
      for (const word of words) {
        if (!/^[+-]?\d+(\.0*)?$/.test(word)) {
          throw refuse(
            source,
            line,
            'permutation-word',
            `"${quoted(word)}" is not an integer; expected ${n} integers.`,
          );
        }
        if (count === n) {
          throw refuse(
            source,
            line,
            'permutation-length',
            `more than ${n} numbers; expected one for each of the ${n} unknowns.`,
          );
        }
        numbers[count] = Number(word);
        lineOf[count++] = line;
      }
    }
  }
  if (count < n) {
    throw refuse(
      source,
      line,
      'permutation-length',
      `the file ends after ${count} numbers; expected one for each of the ${n} unknowns.`,
    );
  }
  const base = hints.base !== 'detect' ? hints.base : (declaredBase ?? detectBase(numbers, n));
  return { values: checked(source, numbers, lineOf, n, base), base, direction };
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
