import { SEPARATOR, type SeparationWorkspace, separationCost } from './separation.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * A separation from one breadth-first search (level structures: George & Liu 1978): vertices enter side 0 in the order
 * the search reaches them, the separator is what the search has seen but not passed, and the cheapest moment is kept.
 * On grids it finds the oblique separators which coarse graphs, round in every direction, cannot show.
 * Fills `part`, `w.sizes`, `w.list`; returns the cost. Linear in edges.
 */
export function growByDistance(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  seed: number,
  balance: number,
): number {
  const { order: n, pointer, neighbour, weight, totalWeight } = g;
  const queue = w.scratch;
  part.fill(1, 0, n);
  let tail = 0;
  let size0 = 0;
  let separator = 0;
  let next = seed;
  let looked = 0;
  let best = Infinity;
  let bestHead = 0;
  let head = 0;
  while (size0 < balance * (totalWeight - separator)) {
    if (head === tail) {
      while (looked < n && part[next] !== 1) {
        next = next + 1 < n ? next + 1 : 0;
        looked++;
      }
      if (looked === n) break;
      part[next] = SEPARATOR;
      separator += weight[next];
      queue[tail++] = next;
    }
    const v = queue[head++];
    size0 += weight[v];
    separator -= weight[v];
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const u = neighbour[p];
      if (part[u] !== 1) continue;
      part[u] = SEPARATOR;
      separator += weight[u];
      queue[tail++] = u;
    }
    const cost = separationCost(size0, totalWeight - size0 - separator, separator, balance, w.evenness);
    if (cost < best) {
      best = cost;
      bestHead = head;
    }
  }
  // back to the best moment: what was seen later than its vertices is side 1 again
  for (let k = 0; k < tail; k++) part[queue[k]] = k < bestHead ? 0 : 1;
  for (let k = 0; k < bestHead; k++) {
    const v = queue[k];
    for (let p = pointer[v]; p < pointer[v + 1]; p++) if (part[neighbour[p]] === 1) part[neighbour[p]] = SEPARATOR;
  }
  w.measure(g, part);
  return best;
}
