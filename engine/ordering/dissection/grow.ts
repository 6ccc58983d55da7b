import { SEPARATOR, type SeparationWorkspace, separationCost } from './separation.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * A first separation by growing side 0 from a seed vertex (graph growing, Karypis & Kumar 1998, here on separators):
 * the separator vertex that pulls in least becomes part of side 0, until the other side is as small as `balance`
 * allows for this one; the best separation passed on the way is kept. Graphs in pieces are grown on from the next
 * untouched vertex. Fills `part`, `w.sizes`, `w.list`; returns the cost.
 */
export function grow(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  seed: number,
  balance: number,
): number {
  const { order: n, pointer, neighbour, weight, totalWeight } = g;
  const { heap0, reach1, log } = w;
  part.fill(1, 0, n);
  heap0.clear();
  let size0 = 0;
  let separator = 0;
  let next = seed;
  let looked = 0;
  let moves = 0;
  let best = Infinity;
  let bestMoves = 0;
  while (size0 < balance * (totalWeight - separator)) {
    if (heap0.size === 0) {
      while (looked < n && part[next] !== 1) {
        next = next + 1 < n ? next + 1 : 0;
        looked++;
      }
      if (looked === n) break;
      part[next] = SEPARATOR;
      separator += weight[next];
      let r = 0;
      for (let p = pointer[next]; p < pointer[next + 1]; p++) r += weight[neighbour[p]];
      reach1[next] = r;
      heap0.push(next, weight[next] - r);
    }
    const v = heap0.top();
    heap0.remove(v);
    part[v] = 0;
    log[moves++] = v;
    size0 += weight[v];
    separator -= weight[v];
    for (let p = pointer[v]; p < pointer[v + 1]; p++) {
      const u = neighbour[p];
      if (part[u] !== 1) continue;
      const weightOfU = weight[u];
      part[u] = SEPARATOR;
      separator += weightOfU;
      let r = 0;
      for (let q = pointer[u]; q < pointer[u + 1]; q++) {
        const x = neighbour[q];
        if (part[x] === 1) r += weight[x];
        else if (part[x] === SEPARATOR) {
          reach1[x] -= weightOfU;
          heap0.change(x, weightOfU);
        }
      }
      reach1[u] = r;
      heap0.push(u, weightOfU - r);
    }
    const cost = separationCost(size0, totalWeight - size0 - separator, separator, balance, w.evenness);
    if (cost < best) {
      best = cost;
      bestMoves = moves;
    }
  }
  heap0.clear();
  // replay up to the best point
  part.fill(1, 0, n);
  for (let k = 0; k < bestMoves; k++) part[log[k]] = 0;
  for (let k = 0; k < bestMoves; k++) {
    const v = log[k];
    for (let p = pointer[v]; p < pointer[v + 1]; p++) if (part[neighbour[p]] === 1) part[neighbour[p]] = SEPARATOR;
  }
  w.measure(g, part);
  return best;
}
