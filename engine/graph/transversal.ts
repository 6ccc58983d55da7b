import type { Pattern } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';

/** A matching of rows and columns over entries. */
export interface Matching {
  /** row -> the column matched with it, −1 if none */
  readonly columnOf: Int32Array;
  /** column -> the row matched with it, −1 if none */
  readonly rowOf: Int32Array;
  /** number of pairs; of a maximum matching: the structural rank */
  readonly size: number;
}

/**
 * A maximum matching (maximum transversal) of any pattern; stored zeros count as entries.
 * First the stored diagonal, then each column takes its first free row (Duff 1981, the cheap assignment); the rest by
 * Hopcroft & Karp 1973: breadth-first levels from the free columns to the nearest free rows, then disjoint shortest augmenting
 * paths found depth first, each column scanned once a phase. O(entries · √n) at worst, a few phases in practice. No recursion.
 */
export function maximumTransversal(a: Pattern, progress: Progress = noProgress): Matching {
  const columnOf = new Int32Array(a.rows).fill(-1);
  const rowOf = new Int32Array(a.columns).fill(-1);
  let size = takeDiagonal(a, columnOf, rowOf);
  if (size < Math.min(a.rows, a.columns)) {
    size += takeFreeRows(a, columnOf, rowOf);
    size += augmentByPhases(a, columnOf, rowOf, progress);
  }
  return { columnOf, rowOf, size };
}

function takeDiagonal(a: Pattern, columnOf: Int32Array, rowOf: Int32Array): number {
  const { columnPointer, rowIndex } = a;
  const m = Math.min(a.rows, a.columns);
  let taken = 0;
  for (let j = 0; j < m; j++) {
    // rows are sorted: halving finds the diagonal
    let low = columnPointer[j];
    let high = columnPointer[j + 1];
    while (low < high) {
      const middle = (low + high) >>> 1;
      if (rowIndex[middle] < j) low = middle + 1;
      else high = middle;
    }
    if (low < columnPointer[j + 1] && rowIndex[low] === j) {
      columnOf[j] = rowOf[j] = j;
      taken++;
    }
  }
  return taken;
}

function takeFreeRows(a: Pattern, columnOf: Int32Array, rowOf: Int32Array): number {
  let taken = 0;
  for (let j = 0; j < a.columns; j++) {
    if (rowOf[j] >= 0) continue;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      if (columnOf[i] >= 0) continue;
      columnOf[i] = j;
      rowOf[j] = i;
      taken++;
      break;
    }
  }
  return taken;
}

/** Workspace of the phases: one array a column each. */
interface PhaseWork {
  /** column -> breadth-first level, −1 not reached or used up */
  readonly level: Int32Array;
  /** columns in breadth-first order; reused as the stack of the depth-first search */
  readonly queue: Int32Array;
  /** column -> next entry to look at in this phase */
  readonly next: Int32Array;
}

function augmentByPhases(a: Pattern, columnOf: Int32Array, rowOf: Int32Array, progress: Progress): number {
  const n = a.columns;
  const work: PhaseWork = { level: new Int32Array(n), queue: new Int32Array(n), next: new Int32Array(n) };
  let free = new Int32Array(n);
  let freeCount = 0;
  for (let j = 0; j < n; j++) if (rowOf[j] < 0 && a.columnPointer[j + 1] > a.columnPointer[j]) free[freeCount++] = j;
  free = free.slice(0, freeCount);
  let gained = 0;
  while (freeCount > 0) {
    progress(gained / (gained + freeCount), 'matching');
    if (!markLevels(a, columnOf, free, freeCount, work)) break;
    work.next.set(a.columnPointer.subarray(0, n));
    let left = 0;
    for (let f = 0; f < freeCount; f++) {
      if ((f & 0xfff) === 0xfff) progress((gained + f - left) / (gained + freeCount), 'matching');
      const j = free[f];
      if (!augment(a, columnOf, rowOf, j, work)) free[left++] = j;
    }
    gained += freeCount - left;
    freeCount = left;
  }
  return gained;
}

/** Levels from all free columns, up to the first level that touches a free row; false if none does. */
function markLevels(a: Pattern, columnOf: Int32Array, free: Int32Array, freeCount: number, work: PhaseWork): boolean {
  const { columnPointer, rowIndex } = a;
  const { level, queue } = work;
  level.fill(-1);
  let tail = 0;
  for (let f = 0; f < freeCount; f++) {
    level[free[f]] = 0;
    queue[tail++] = free[f];
  }
  let found = false;
  let head = 0;
  while (head < tail && !found) {
    for (const end = tail; head < end; head++) {
      const j = queue[head];
      const last = columnPointer[j + 1];
      for (let p = columnPointer[j]; p < last; p++) {
        const k = columnOf[rowIndex[p]];
        if (k < 0) found = true;
        else if (level[k] < 0) {
          level[k] = level[j] + 1;
          queue[tail++] = k;
        }
      }
    }
  }
  return found;
}

/** One augmenting path along rising levels from the free column `start`; columns that lead nowhere are used up. */
function augment(a: Pattern, columnOf: Int32Array, rowOf: Int32Array, start: number, work: PhaseWork): boolean {
  const { columnPointer, rowIndex } = a;
  const { level, next } = work;
  const stack = work.queue;
  let depth = 0;
  stack[0] = start;
  while (depth >= 0) {
    const j = stack[depth];
    const end = columnPointer[j + 1];
    const wanted = level[j] + 1;
    let p = next[j];
    let deeper = -1;
    let done = false;
    while (p < end) {
      const k = columnOf[rowIndex[p++]];
      if (k < 0) {
        done = true;
        break;
      }
      if (level[k] === wanted) {
        deeper = k;
        break;
      }
    }
    next[j] = p;
    if (done) {
      // every column of the stack takes the row it looked at last
      for (let d = 0; d <= depth; d++) {
        const k = stack[d];
        const i = rowIndex[next[k] - 1];
        rowOf[k] = i;
        columnOf[i] = k;
        level[k] = -1;
      }
      return true;
    }
    if (deeper >= 0) {
      stack[++depth] = deeper;
    } else {
      level[j] = -1;
      depth--;
    }
  }
  return false;
}
