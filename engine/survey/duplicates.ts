import type { Base } from './base.ts';
import { type Fact, fact, type Mark, markWhere } from './fact.ts';
import type { Ticker } from './ticker.ts';
import { counted, plural } from './wording.ts';

export interface DuplicateRows {
  /** rows equal to an earlier row: same positions, same values; empty rows are left out */
  readonly rows: number;
  /** different rows that are repeated at least once */
  readonly groups: number;
  /** the first ten: row, and the earlier row it equals (0-based) */
  readonly first: readonly (readonly [number, number])[];
}

/**
 * Rows that repeat an earlier one, exactly (−0 equals 0; a pattern's entries are all equal). Hashes of 64 bits, summed over the
 * entries so that no row has to be gathered, name the candidates; these are then compared entry by entry.
 */
export function duplicateRowsFact(base: Base, ticker: Ticker): Fact<DuplicateRows> {
  ticker.begin('duplicate rows');
  const candidates = candidatesOf(base, hashes(base, ticker));
  const earlier = candidates.some((r) => r >= 0) ? confirmed(base, candidates, ticker) : candidates;
  const flag = new Uint8Array(earlier.length);
  const repeated = new Uint8Array(earlier.length);
  const first: [number, number][] = [];
  for (let i = 0; i < earlier.length; i++) {
    if (earlier[i] < 0) continue;
    flag[i] = 1;
    repeated[earlier[i]] = 1;
    if (first.length < 10) first.push([i, earlier[i]]);
  }
  const marks: Mark[] = [
    markWhere('rows equal to an earlier row', 'rows', flag),
    markWhere('rows that are repeated', 'rows', repeated),
  ];
  const value = { rows: marks[0].count, groups: marks[1].count, first };
  const what = base.sizes === null ? 'positions' : 'positions and values';
  if (value.rows === 0) return fact(value, `No two rows have the same ${what}.`, 'rows', 'exact', marks);
  const example = `row ${counted(first[0][0] + 1)} equals row ${counted(first[0][1] + 1)}`;
  const consequence = base.sizes === null ? '' : ', so the matrix is singular';
  return fact(
    value,
    `${plural(value.rows, 'row repeats', 'rows repeat')} an earlier row in ${what} (first: ${example})${base.square ? consequence : ''}.`,
    'rows',
    'exact',
    marks,
  );
}

function mixed(x: number): number {
  let h = x ^ (x >>> 16);
  h = Math.imul(h, 0x7feb352d);
  h ^= h >>> 15;
  h = Math.imul(h, 0x846ca68b);
  return h ^ (h >>> 16);
}

function hashes(base: Base, ticker: Ticker): { one: Int32Array; two: Int32Array } {
  const { rows, columns, columnPointer, rowIndex, values, field } = base.matrix;
  const one = new Int32Array(rows);
  const two = new Int32Array(rows);
  const width = values === null ? 0 : field === 'complex' ? 4 : 2;
  const bits =
    values === null ? new Int32Array(0) : new Int32Array(values.buffer, values.byteOffset, 2 * values.length);
  for (let j = 0; j < columns; j++) {
    const end = columnPointer[j + 1];
    const u = mixed(j + 0x3c6ef372);
    const v = mixed(j ^ 0x5bd1e995);
    for (let p = columnPointer[j]; p < end; p++) {
      let x = u;
      let y = v;
      for (let w = 0; w < width; w += 2) {
        let a = bits[width * p + w];
        let b = bits[width * p + w + 1];
        // −0 has one bit set, in whichever half is the high one
        if (a === 0 && b === -2147483648) b = 0;
        else if (b === 0 && a === -2147483648) a = 0;
        x = mixed(Math.imul(x, 0x01000193) + Math.imul(a, 0x27d4eb2f) + b);
        y = mixed(Math.imul(y, 0x0019660d) ^ (Math.imul(b, 0x165667b1) + a));
      }
      const i = rowIndex[p];
      one[i] += x;
      two[i] += y;
    }
    ticker.add(end - columnPointer[j]);
  }
  return { one, two };
}

/** row -> an earlier row with the same hashes and number of entries, −1 if there is none. */
function candidatesOf(base: Base, hash: { one: Int32Array; two: Int32Array }): Int32Array {
  const { rowCount } = base.positions;
  const n = rowCount.length;
  const { one, two } = hash;
  let size = 16;
  while (size < 2 * n) size *= 2;
  const table = new Int32Array(size).fill(-1);
  const earlier = new Int32Array(n).fill(-1);
  for (let i = 0; i < n; i++) {
    if (rowCount[i] === 0) continue;
    let slot = mixed(one[i]) & (size - 1);
    for (; table[slot] >= 0; slot = (slot + 1) & (size - 1)) {
      const r = table[slot];
      if (one[r] === one[i] && two[r] === two[i] && rowCount[r] === rowCount[i]) break;
    }
    if (table[slot] >= 0) earlier[i] = table[slot];
    else table[slot] = i;
  }
  return earlier;
}

/** The candidates whose rows are equal entry by entry. Only rows that take part are gathered. */
function confirmed(base: Base, candidates: Int32Array, ticker: Ticker): Int32Array {
  const { rows, columns, columnPointer, rowIndex, values, field } = base.matrix;
  const { rowCount } = base.positions;
  const start = new Int32Array(rows).fill(-1);
  let total = 0;
  const admit = (i: number): void => {
    if (start[i] >= 0) return;
    start[i] = total;
    total += rowCount[i];
  };
  for (let i = 0; i < rows; i++) {
    if (candidates[i] < 0) continue;
    admit(candidates[i]);
    admit(i);
  }
  const column = new Int32Array(total);
  const entry = new Int32Array(total);
  const next = start.slice();
  for (let j = 0; j < columns; j++) {
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = rowIndex[p];
      if (start[i] < 0) continue;
      column[next[i]] = j;
      entry[next[i]++] = p;
    }
    ticker.add(columnPointer[j + 1] - columnPointer[j]);
  }
  const width = values === null ? 0 : field === 'complex' ? 2 : 1;
  const out = candidates.slice();
  for (let i = 0; i < rows; i++) {
    const r = candidates[i];
    if (r < 0) continue;
    for (let k = 0; k < rowCount[i] && out[i] >= 0; k++) {
      const p = start[i] + k;
      const q = start[r] + k;
      if (column[p] !== column[q]) out[i] = -1;
      for (let w = 0; w < width && values !== null; w++) {
        if (values[width * entry[p] + w] !== values[width * entry[q] + w]) out[i] = -1;
      }
    }
  }
  return out;
}
