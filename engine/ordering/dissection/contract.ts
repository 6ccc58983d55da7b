import type { IntegerArena } from './arena.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * The coarse graph of a matching: pairs become one vertex, parallel edges one edge with the sum of their weights.
 * `match`, `coarseOf` as filled by `matchInto`; `seen`: workspace, at least as long as the coarse order.
 * Arrays come from the arena; linear in entries.
 */
export function contract(
  g: WeightedGraph,
  match: Int32Array,
  coarseOf: Int32Array,
  coarseOrder: number,
  seen: Int32Array,
  arena: IntegerArena,
): WeightedGraph {
  const { order: n, pointer, neighbour, edgeWeight, weight } = g;
  const coarseWeight = arena.take(coarseOrder);
  const coarsePointer = arena.take(coarseOrder + 1);
  // one block for both halves, so that the unused end can go back to the arena
  const bound = pointer[n] - pointer[0];
  const block = arena.take(2 * bound);
  const coarseNeighbour = block.subarray(0, bound);
  const coarseEdge = block.subarray(bound);
  for (let c = 0; c < coarseOrder; c++) seen[c] = -1;
  let q = 0;
  let c = 0;
  for (let v = 0; v < n; v++) {
    const u = match[v];
    if (u < v) continue;
    // an edge position at or after `start` belongs to this coarse vertex, so `seen` needs no clearing between them
    const start = q;
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const k = coarseOf[neighbour[p]];
      if (k === c) continue;
      const at = seen[k];
      if (at >= start) coarseEdge[at] += edgeWeight[p];
      else {
        seen[k] = q;
        coarseNeighbour[q] = k;
        coarseEdge[q++] = edgeWeight[p];
      }
    }
    let w = weight[v];
    if (u !== v) {
      w += weight[u];
      for (let p = pointer[u], end = pointer[u + 1]; p < end; p++) {
        const k = coarseOf[neighbour[p]];
        if (k === c) continue;
        const at = seen[k];
        if (at >= start) coarseEdge[at] += edgeWeight[p];
        else {
          seen[k] = q;
          coarseNeighbour[q] = k;
          coarseEdge[q++] = edgeWeight[p];
        }
      }
    }
    coarseWeight[c] = w;
    coarsePointer[c++] = start;
  }
  coarsePointer[c] = q;
  block.copyWithin(q, bound, bound + q);
  const kept = arena.trim(block, 2 * q);
  return {
    order: coarseOrder,
    pointer: coarsePointer,
    neighbour: kept.subarray(0, q),
    edgeWeight: kept.subarray(q),
    weight: coarseWeight,
    totalWeight: g.totalWeight,
  };
}
