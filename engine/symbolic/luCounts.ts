import type { Pattern } from '../matrix/pattern.ts';
import { type NewToOld, positionOf } from '../matrix/permutation.ts';

/** Structure of an LU without interchanges. Columns and rows are positions of the order. */
export interface LuCounts {
  /** column -> entries of this column of L, diagonal included */
  readonly lower: Int32Array;
  /** row -> entries of this row of U, diagonal included */
  readonly upper: Int32Array;
  readonly lowerEntries: number;
  readonly upperEntries: number;
}

/**
 * Exact counts of an unsymmetric LU with pivots on the diagonal (an absent one taken as nonzero), by depth-first search
 * (Gilbert & Peierls 1988) with symmetric pruning (Eisenstat & Liu 1992). Costs at least the entries of L.
 * @param a square; row i pairs with column i
 * @param workLimit steps of search and entries held after which it gives up
 * @returns the counts, or null when the limit is passed
 */
export function luCounts(a: Pattern, order: NewToOld, workLimit: number): LuCounts | null {
  const n = a.columns;
  const position = positionOf(order);
  // L by columns, without diagonal: column -> start, end, and end of what a search still has to follow
  const start = new Float64Array(n + 1);
  const prunedEnd = new Float64Array(n);
  const pruned = new Uint8Array(n);
  let rows = new Int32Array(Math.max(16, 4 * a.rowIndex.length));
  const lower = new Int32Array(n).fill(1);
  const upper = new Int32Array(n).fill(1);
  const mark = new Int32Array(n).fill(-1);
  const stack = new Int32Array(n);
  const at = new Float64Array(n);
  const reached = new Int32Array(n);
  let work = 0;
  let fill = 0;
  for (let k = 0; k < n; k++) {
    start[k] = fill;
    mark[k] = k;
    if (fill + n > rows.length) {
      const bigger = new Int32Array(2 * rows.length + n);
      bigger.set(rows.subarray(0, fill));
      rows = bigger;
    }
    let reachedCount = 0;
    const j = order[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const r0 = position[a.rowIndex[p]];
      if (mark[r0] === k) continue;
      mark[r0] = k;
      if (r0 > k) {
        rows[fill++] = r0;
        continue;
      }
      let depth = 0;
      stack[0] = r0;
      at[0] = start[r0];
      while (depth >= 0) {
        const r = stack[depth];
        const end = prunedEnd[r];
        let q = at[depth];
        let child = -1;
        const from = q;
        while (q < end) {
          const i = rows[q++];
          if (mark[i] === k) continue;
          mark[i] = k;
          if (i > k) rows[fill++] = i;
          else {
            child = i;
            break;
          }
        }
        work += q - from + 1;
        at[depth] = q;
        if (child < 0) {
          reached[reachedCount++] = r;
          depth--;
        } else {
          stack[++depth] = child;
          at[depth] = start[child];
        }
      }
    }
    lower[k] = fill - start[k] + 1;
    prunedEnd[k] = fill;
    for (let c = 0; c < reachedCount; c++) {
      const r = reached[c];
      upper[r]++;
      if (pruned[r] === 0) pruneColumn(rows, start[r], start[r + 1], r, k, pruned, prunedEnd);
    }
    start[k + 1] = fill;
    if (work + fill > workLimit) return null;
  }
  let lowerEntries = 0;
  let upperEntries = 0;
  for (let k = 0; k < n; k++) {
    lowerEntries += lower[k];
    upperEntries += upper[k];
  }
  return { lower, upper, lowerEntries, upperEntries };
}

/**
 * U(r,k) is an entry; if L(k,r) is one too, column r's rows below k are reached through column k from now on, and a search may stop
 * following them: rows up to k are moved to the front of the list.
 */
function pruneColumn(
  rows: Int32Array,
  from: number,
  to: number,
  r: number,
  k: number,
  pruned: Uint8Array,
  prunedEnd: Float64Array,
): void {
  let found = false;
  for (let q = from; q < to && !found; q++) found = rows[q] === k;
  if (!found) return;
  let low = from;
  let high = to - 1;
  while (low <= high) {
    if (rows[low] <= k) low++;
    else {
      const t = rows[low];
      rows[low] = rows[high];
      rows[high--] = t;
    }
  }
  pruned[r] = 1;
  prunedEnd[r] = low;
}
