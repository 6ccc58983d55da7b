import type { Graph } from '../graph/graph.ts';
import type { NewToOld, OldToNew } from '../matrix/permutation.ts';

/**
 * Elimination tree of the graph of A + Aᵀ in an order: column -> parent column, −1 at a root; parent[j] > j.
 * Liu 1986, with path compression; near-linear in edges. The permuted matrix is not formed.
 */
export function eliminationTree(graph: Graph, order: NewToOld, position: OldToNew): Int32Array {
  const n = graph.order;
  const { pointer, neighbour } = graph;
  const parent = new Int32Array(n).fill(-1);
  // column -> an ancestor in the forest built so far, −1 where none is known
  const ancestor = new Int32Array(n).fill(-1);
  for (let k = 0; k < n; k++) {
    const v = order[k];
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      let r = position[neighbour[p]];
      if (r >= k) continue;
      for (;;) {
        const a = ancestor[r];
        if (a === k) break;
        ancestor[r] = k;
        if (a < 0) {
          parent[r] = k;
          break;
        }
        r = a;
      }
    }
  }
  return parent;
}
