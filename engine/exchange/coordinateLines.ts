import { decimalEnd, parseDecimal } from './decimal.ts';
import type { TripletStore } from './triplets.ts';

/**
 * The hot loop of coordinate text: whole lines "row column [value [imaginary]]" in the plainest form. Any other line (comment, blank,
 * parentheses, wrong field count, an index out of range) is left to `strange`, which reads it or throws.
 */
export interface CoordinateTarget {
  readonly store: TripletStore;
  readonly rows: number;
  readonly columns: number;
  readonly base: 0 | 1;
  /** lines read so far in the whole file */
  line: number;
  /** entries after which a line is strange whatever it says (the declared number) */
  readonly limit: number;
  /** diagonal entries are strange: the symmetry has a rule for them */
  readonly strictDiagonal: boolean;
  /** takes the line bytes[from … to), its line end left out; `target.line` is its number */
  strange(bytes: Uint8Array, from: number, to: number): void;
}

/** Reads the lines of bytes[start … end). */
export function readCoordinateLines(bytes: Uint8Array, start: number, end: number, target: CoordinateTarget): void {
  const { store, rows, columns, base, limit, strictDiagonal } = target;
  const width = store.width;
  let p = start;
  let line = target.line;
  // the shortest line, "1 1\n", takes four bytes
  store.reserve(Math.min(limit - store.count, ((end - start) >> 2) + 1));
  let { row, column, values } = store;
  let k = store.count;
  while (p < end) {
    const lineStart = p;
    line++;
    // biome-ignore lint/suspicious/noConfusingLabels: one way out of the plain form for every reason, without a function call a line
    plain: {
      if (k >= limit) break plain;
      let c = bytes[p];
      while (c === 32 || c === 9) c = bytes[++p];
      let d = c ^ 48;
      if (d > 9) break plain;
      let i = 0;
      const iStart = p;
      do {
        i = (i * 10 + d) | 0;
        d = bytes[++p] ^ 48;
      } while (d <= 9);
      if (p - iStart > 9) break plain;
      c = bytes[p];
      if (c !== 32 && c !== 9) break plain;
      while (c === 32 || c === 9) c = bytes[++p];
      d = c ^ 48;
      if (d > 9) break plain;
      let j = 0;
      const jStart = p;
      do {
        j = (j * 10 + d) | 0;
        d = bytes[++p] ^ 48;
      } while (d <= 9);
      if (p - jStart > 9) break plain;
      i -= base;
      j -= base;
      if (i < 0 || i >= rows || j < 0 || j >= columns) break plain;
      if (strictDiagonal && i === j) break plain;
      c = p < end ? bytes[p] : 10;
      if (width > 0) {
        if (c !== 32 && c !== 9) break plain;
        while (c === 32 || c === 9) c = bytes[++p];
        const value = parseDecimal(bytes, p, end);
        if (decimalEnd < 0) break plain;
        p = decimalEnd;
        c = p < end ? bytes[p] : 10;
        if (width === 1) values[k] = value;
        else {
          if (c !== 32 && c !== 9) break plain;
          while (c === 32 || c === 9) c = bytes[++p];
          const imaginary = parseDecimal(bytes, p, end);
          if (decimalEnd < 0) break plain;
          p = decimalEnd;
          c = p < end ? bytes[p] : 10;
          values[2 * k] = value;
          values[2 * k + 1] = imaginary;
        }
      }
      while (c === 32 || c === 9) c = ++p < end ? bytes[p] : 10;
      if (c === 13) {
        c = 10;
        if (p + 1 < end && bytes[p + 1] === 10) p++;
      }
      if (c !== 10) break plain;
      p++;
      row[k] = i;
      column[k] = j;
      k++;
      continue;
    }
    let lineEnd = lineStart;
    while (lineEnd < end && bytes[lineEnd] !== 10 && bytes[lineEnd] !== 13) lineEnd++;
    store.count = k;
    target.line = line;
    target.strange(bytes, lineStart, lineEnd);
    store.reserve(1 + Math.min(limit - store.count, (end - lineEnd) >> 2));
    ({ row, column, values } = store);
    k = store.count;
    p = lineEnd;
    if (p < end && bytes[p] === 13 && p + 1 < end && bytes[p + 1] === 10) p++;
    p++;
  }
  store.count = k;
  target.line = line;
}
