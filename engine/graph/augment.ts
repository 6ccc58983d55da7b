import type { Pattern } from '../matrix/pattern.ts';
import type { Progress } from '../matrix/progress.ts';

/**
 * Augments a matching to a maximum one by pushes and relabels (Goldberg & Tarjan 1988; for matchings Goldberg & Kennedy 1997), with the
 * distances of the breadth-first phases of Hopcroft & Karp 1973 as labels. distance[i] is a lower bound on the number of columns
 * displaced on the way from row i to a free row, 0 for a free row. A free column takes its nearest row, i, away from the
 * column that has it; that column becomes free, and i is now one further than the second nearest row. A column whose rows reach
 * no free row stays free for good. First in, first out; exact distances anew whenever the scans since the last time have cost as
 * much as they do. With both, O(entries · √n).
 * `t` is the pattern of Aᵀ. Fills `columnOf` and `rowOf`, returns the number of pairs gained.
 */
export function augmentInto(
  columnOf: Int32Array,
  rowOf: Int32Array,
  a: Pattern,
  t: Pattern,
  progress: Progress,
): number {
  const { columnPointer, rowIndex } = a;
  const active = freeColumns(a, rowOf);
  const slots = active.length;
  if (slots === 0) return 0;
  const distance = new Int32Array(a.rows);
  const queue = new Int32Array(a.rows);
  // more columns than can be displaced on any path
  const unreachable = Math.min(a.rows, a.columns) + 1;
  const budget = rowIndex.length + a.rows + a.columns;
  let scanned = budget;
  let sinceCall = 0;
  let waiting = slots;
  let head = 0;
  let gained = 0;
  while (waiting > 0) {
    if (scanned >= budget) {
      progress(gained / slots, 'matching');
      exactDistances(distance, queue, columnOf, rowOf, t, unreachable, () => progress(gained / slots, 'matching'));
      scanned = sinceCall = 0;
    } else if (sinceCall > 200_000) {
      progress(gained / slots, 'matching');
      sinceCall = 0;
    }
    const j = active[head];
    head = head + 1 === slots ? 0 : head + 1;
    waiting--;
    const start = columnPointer[j];
    const end = columnPointer[j + 1];
    let nearest = -1;
    let least = unreachable;
    let second = unreachable;
    for (let p = start; p < end; p++) {
      const d = distance[rowIndex[p]];
      if (d < least) {
        second = least;
        least = d;
        nearest = rowIndex[p];
      } else if (d < second) second = d;
    }
    scanned += end - start + 1;
    sinceCall += end - start + 1;
    if (nearest < 0) continue;
    const displaced = columnOf[nearest];
    columnOf[nearest] = j;
    rowOf[j] = nearest;
    distance[nearest] = second < unreachable ? second + 1 : unreachable;
    if (displaced < 0) {
      gained++;
      continue;
    }
    rowOf[displaced] = -1;
    let tail = head + waiting;
    if (tail >= slots) tail -= slots;
    active[tail] = displaced;
    waiting++;
  }
  return gained;
}

/** Columns without a partner that have entries. */
function freeColumns(a: Pattern, rowOf: Int32Array): Int32Array {
  const free = new Int32Array(a.columns);
  let count = 0;
  for (let j = 0; j < a.columns; j++) {
    if (rowOf[j] < 0 && a.columnPointer[j + 1] > a.columnPointer[j]) free[count++] = j;
  }
  return free.slice(0, count);
}

/** Breadth first from the free rows; linear. Rows that reach none get `unreachable`. */
function exactDistances(
  distance: Int32Array,
  queue: Int32Array,
  columnOf: Int32Array,
  rowOf: Int32Array,
  t: Pattern,
  unreachable: number,
  tick: () => void,
): void {
  let tail = 0;
  for (let i = 0; i < distance.length; i++) {
    if (columnOf[i] < 0) {
      distance[i] = 0;
      queue[tail++] = i;
    } else distance[i] = unreachable;
  }
  for (let head = 0; head < tail; head++) {
    if ((head & 0xffff) === 0xffff) tick();
    const i = queue[head];
    const further = distance[i] + 1;
    const end = t.columnPointer[i + 1];
    for (let p = t.columnPointer[i]; p < end; p++) {
      const r = rowOf[t.rowIndex[p]];
      if (r < 0 || distance[r] !== unreachable) continue;
      distance[r] = further;
      queue[tail++] = r;
    }
  }
}
