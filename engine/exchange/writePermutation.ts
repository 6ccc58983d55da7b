import { type NewToOld, positionOf } from '../matrix/permutation.ts';

export type Direction = 'new-to-old' | 'old-to-new';

/** How a permutation is written. */
export interface PermutationFormat {
  readonly direction: Direction;
  readonly base: 0 | 1;
  readonly format: 'matrix-market-array' | 'plain';
  /** what it is the order of, one line, e.g. "bcsstk01.mtx, minimum-degree" */
  readonly title?: string;
}

/** The convention in one line of ASCII, as it stands in the file, on the screen and in the guide. */
export function permutationFormula(direction: Direction, base: 0 | 1): string {
  return direction === 'new-to-old'
    ? `new-to-old, ${base}-based: line k (counted from ${base}) holds p[k], the original unknown at position k; (P A P^T)(k,l) = A(p[k], p[l])`
    : `old-to-new, ${base}-based: line i (counted from ${base}) holds q[i], the position of the original unknown i; (P A P^T)(q[i], q[j]) = A(i,j)`;
}

/** The first entries in words, at most five. */
export function permutationExample(values: Int32Array, direction: Direction, base: 0 | 1): readonly string[] {
  const lines: string[] = [];
  for (let k = 0; k < Math.min(5, values.length); k++) {
    lines.push(
      direction === 'new-to-old'
        ? `p[${k + base}] = ${values[k] + base}: position ${k + base} holds unknown ${values[k] + base}`
        : `q[${k + base}] = ${values[k] + base}: unknown ${k + base} goes to position ${values[k] + base}`,
    );
  }
  return lines;
}

/**
 * A permutation as text, its convention and a worked example in comment lines that start with %.
 * @param order new-to-old, 0-based; written in the direction and base asked for
 * @returns chunks of ASCII bytes
 */
export function* writePermutation(order: NewToOld, f: PermutationFormat): Generator<Uint8Array> {
  const encoder = new TextEncoder();
  const values: Int32Array = f.direction === 'new-to-old' ? order : positionOf(order);
  const head: string[] = [];
  if (f.format === 'matrix-market-array') head.push('%%MatrixMarket matrix array integer general');
  head.push(
    `% permutation of ${values.length} unknowns${f.title === undefined ? '' : `: ${f.title.replace(/[^\x20-\x7e]/g, '?')}`}`,
  );
  head.push(`% ${permutationFormula(f.direction, f.base)}`);
  for (const line of permutationExample(values, f.direction, f.base)) head.push(`% ${line}`);
  if (f.format === 'matrix-market-array') head.push(`${values.length} 1`);
  yield encoder.encode(`${head.join('\n')}\n`);
  for (let from = 0; from < values.length; from += 65_536) {
    let text = '';
    for (let k = from; k < Math.min(values.length, from + 65_536); k++) text += `${values[k] + f.base}\n`;
    yield encoder.encode(text);
  }
}
