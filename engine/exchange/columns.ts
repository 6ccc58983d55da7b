import type { TripletStore } from './triplets.ts';

/** Compressed columns under construction; rows sorted, duplicates merged, `count` of the arrays in use. */
export interface Columns {
  readonly columnPointer: Int32Array;
  readonly rowIndex: Int32Array;
  /** `width` doubles an entry */
  readonly values: Float64Array;
  /** entries merged into another one */
  readonly duplicates: number;
  /** first places (row, column; 0-based) where entries were merged, at most twenty */
  readonly duplicatePlaces: readonly (readonly [number, number])[];
}

/**
 * Sorts triplets by column, then by row, stable; merges duplicates by sum or by taking the last. Linear where the rows of each column
 * come in order, as they mostly do.
 */
export function compressTriplets(t: TripletStore, columns: number, merge: 'sum' | 'last'): Columns {
  const { count, width } = t;
  const pointer = new Int32Array(columns + 1);
  for (let e = 0; e < count; e++) pointer[t.column[e] + 1]++;
  for (let j = 0; j < columns; j++) pointer[j + 1] += pointer[j];
  const next = pointer.slice(0, columns);
  const rowIndex = new Int32Array(count);
  const values = new Float64Array(count * width);
  for (let e = 0; e < count; e++) {
    const q = next[t.column[e]]++;
    rowIndex[q] = t.row[e];
    if (width === 1) values[q] = t.values[e];
    else if (width === 2) {
      values[2 * q] = t.values[2 * e];
      values[2 * q + 1] = t.values[2 * e + 1];
    }
  }
  return sortAndMergeInPlace(pointer, rowIndex, values, width, merge);
}

/** Sorts the rows of each column and merges duplicates; the arrays given are the result where nothing was merged. */
export function sortAndMergeInPlace(
  pointer: Int32Array,
  rowIndex: Int32Array,
  values: Float64Array,
  width: 0 | 1 | 2,
  merge: 'sum' | 'last',
): Columns {
  const columns = pointer.length - 1;
  const places: [number, number][] = [];
  let fill = 0;
  let duplicates = 0;
  let start = 0;
  for (let j = 0; j < columns; j++) {
    const end = pointer[j + 1];
    const strict = sortColumnInPlace(rowIndex, values, width, start, end);
    const from = fill;
    if (strict && fill === start) {
      // nothing merged so far and nothing to merge here: all is in place
      pointer[j] = from;
      fill = end;
      start = end;
      continue;
    }
    for (let p = start; p < end; p++) {
      const i = rowIndex[p];
      if (fill > from && rowIndex[fill - 1] === i) {
        duplicates++;
        if (places.length < 20) places.push([i, j]);
        for (let w = 0; w < width; w++) {
          const v = values[p * width + w];
          if (merge === 'sum') values[(fill - 1) * width + w] += v;
          else values[(fill - 1) * width + w] = v;
        }
        continue;
      }
      rowIndex[fill] = i;
      for (let w = 0; w < width; w++) values[fill * width + w] = values[p * width + w];
      fill++;
    }
    pointer[j] = from;
    start = end;
  }
  pointer[columns] = fill;
  const whole = fill === rowIndex.length;
  return {
    columnPointer: pointer,
    rowIndex: whole ? rowIndex : rowIndex.slice(0, fill),
    values: whole ? values : values.slice(0, fill * width),
    duplicates,
    duplicatePlaces: places,
  };
}

/** Stable sort of one column by row; nothing to do when it is in order already. True if its rows were strictly increasing. */
function sortColumnInPlace(
  rowIndex: Int32Array,
  values: Float64Array,
  width: 0 | 1 | 2,
  start: number,
  end: number,
): boolean {
  let p = start + 1;
  while (p < end && rowIndex[p] > rowIndex[p - 1]) p++;
  if (p >= end) return true;
  while (p < end && rowIndex[p] >= rowIndex[p - 1]) p++;
  if (p >= end) return false;
  const size = end - start;
  const perm = new Float64Array(size);
  // row and place in one number keep the sort stable: both are below 2³¹ and their product below 2⁵³ only for short columns
  if (size < 2 ** 21) {
    for (let k = 0; k < size; k++) perm[k] = rowIndex[start + k] * 2 ** 21 + k;
    perm.sort();
    for (let k = 0; k < size; k++) perm[k] %= 2 ** 21;
  } else {
    for (let k = 0; k < size; k++) perm[k] = k;
    perm.sort((x, y) => rowIndex[start + x] - rowIndex[start + y] || x - y);
  }
  const rows = rowIndex.slice(start, end);
  const old = values.slice(start * width, end * width);
  for (let k = 0; k < size; k++) {
    rowIndex[start + k] = rows[perm[k]];
    for (let w = 0; w < width; w++) values[(start + k) * width + w] = old[perm[k] * width + w];
  }
  return false;
}

/** How a mirror entry follows from the stored one. */
export type MirrorRule = 'same' | 'conjugate' | 'negate';

/** Both triangles from the lower one. Rows stay sorted. */
export function expandLower(
  lower: Columns,
  width: 0 | 1 | 2,
  rule: MirrorRule,
): { columnPointer: Int32Array; rowIndex: Int32Array; values: Float64Array } {
  const n = lower.columnPointer.length - 1;
  const { columnPointer: lp, rowIndex: li, values: lv } = lower;
  const upperCount = new Int32Array(n);
  for (let j = 0; j < n; j++) for (let p = lp[j]; p < lp[j + 1]; p++) if (li[p] !== j) upperCount[li[p]]++;
  const pointer = new Int32Array(n + 1);
  for (let j = 0; j < n; j++) pointer[j + 1] = pointer[j] + upperCount[j] + lp[j + 1] - lp[j];
  const rowIndex = new Int32Array(pointer[n]);
  const values = new Float64Array(pointer[n] * width);
  const next = pointer.slice(0, n);
  const sign = rule === 'negate' ? -1 : 1;
  const imaginarySign = rule === 'same' ? 1 : -1;
  for (let j = 0; j < n; j++) {
    let q = pointer[j] + upperCount[j];
    for (let p = lp[j]; p < lp[j + 1]; p++, q++) {
      const i = li[p];
      rowIndex[q] = i;
      for (let w = 0; w < width; w++) values[q * width + w] = lv[p * width + w];
      if (i === j) continue;
      const m = next[i]++;
      rowIndex[m] = j;
      if (width > 0) values[m * width] = sign * lv[p * width];
      if (width === 2) values[2 * m + 1] = imaginarySign * lv[2 * p + 1];
    }
  }
  return { columnPointer: pointer, rowIndex, values };
}
