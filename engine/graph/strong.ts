import type { Pattern } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { type Classes, sizes } from './components.ts';
import { requireSquare } from './square.ts';

const closed = 2 ** 31 - 1;

/**
 * Strong components of the directed graph of a square pattern, an edge j → i for each entry (i,j); with `columnOf` (row ->
 * column matched with it, a perfect matching) the edge is j → columnOf[i], so that the graph is that of the matrix with the
 * matching moved to its diagonal.
 *
 * Tarjan 1972, without recursion; linear. A component is numbered once all that it reaches are numbered: an entry
 * leads from a class to one of the same or a lower number, so classes in increasing order give an upper block triangular matrix.
 */
export function strongComponents(
  a: Pattern,
  columnOf: Int32Array | null = null,
  progress: Progress = noProgress,
): Classes {
  const n = requireSquare(a, 'Strong components');
  const { columnPointer, rowIndex } = a;
  const of = new Int32Array(n).fill(-1);
  // low[v] = 0: not seen; `closed`: its component is complete; else the smallest visit number known to be reachable inside the open ones
  const low = new Int32Array(n);
  const next = columnPointer.slice(0, n);
  const path = new Int32Array(n);
  const open = new Int32Array(n);
  const visitOf = new Int32Array(n);
  let count = 0;
  let visit = 0;
  let openCount = 0;
  for (let s = 0; s < n; s++) {
    if ((s & 0xffff) === 0) progress(s / n, 'strong components');
    if (low[s] !== 0) continue;
    let depth = 0;
    path[0] = s;
    low[s] = visitOf[0] = ++visit;
    open[openCount++] = s;
    while (depth >= 0) {
      const v = path[depth];
      const end = columnPointer[v + 1];
      let p = next[v];
      let best = low[v];
      let child = -1;
      while (p < end) {
        const i = rowIndex[p++];
        const w = columnOf === null ? i : columnOf[i];
        const reach = low[w];
        if (reach === 0) {
          child = w;
          break;
        }
        // closed vertices no longer count: their number is larger than any
        if (reach < best) best = reach;
      }
      next[v] = p;
      low[v] = best;
      if (child >= 0) {
        depth++;
        path[depth] = child;
        low[child] = visitOf[depth] = ++visit;
        open[openCount++] = child;
        if ((visit & 0xffff) === 0) progress(visit / n, 'strong components');
        continue;
      }
      // v is done: visitOf[depth] is its own visit number
      if (best === visitOf[depth]) {
        let w: number;
        do {
          w = open[--openCount];
          of[w] = count;
          low[w] = closed;
        } while (w !== v);
        count++;
      }
      depth--;
      if (depth >= 0 && low[v] !== closed && best < low[path[depth]]) low[path[depth]] = best;
    }
  }
  return { count, of, size: sizes(of, count) };
}
