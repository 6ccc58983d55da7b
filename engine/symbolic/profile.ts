import type { Graph } from '../graph/graph.ts';
import { type NewToOld, positionOf } from '../matrix/permutation.ts';

/** Bandwidth (max |k − l|) and envelope (Σ over rows of k − smallest column, diagonal present) of the permuted graph. Exact. */
export function profileOf(graph: Graph, order: NewToOld): { readonly bandwidth: number; readonly envelope: number } {
  const position = positionOf(order);
  let bandwidth = 0;
  let envelope = 0;
  for (let k = 0; k < graph.order; k++) {
    const v = order[k];
    let smallest = k;
    for (let p = graph.pointer[v]; p < graph.pointer[v + 1]; p++) {
      const l = position[graph.neighbour[p]];
      if (l < smallest) smallest = l;
    }
    envelope += k - smallest;
    if (k - smallest > bandwidth) bandwidth = k - smallest;
  }
  return { bandwidth, envelope };
}
