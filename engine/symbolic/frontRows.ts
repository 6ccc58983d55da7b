import type { Graph } from '../graph/graph.ts';
import { positionOf } from '../matrix/permutation.ts';
import type { AssemblyTree, FrontRows } from './types.ts';

/**
 * Row subscripts of all fronts. Each row climbs the tree from the supernodes of its entries of A until it meets its own track, so every
 * list comes out sorted; linear in Σ frontOrder (Liu 1990: row structures are tree paths).
 */
export function frontRows(tree: AssemblyTree, graph: Graph): FrontRows {
  const { count, firstColumn, parent, frontOrder } = tree;
  const n = tree.size;
  const position = positionOf(tree.order);
  const nodeOf = new Int32Array(n);
  const pointer = new Float64Array(count + 1);
  for (let s = 0; s < count; s++) {
    nodeOf.fill(s, firstColumn[s], firstColumn[s + 1]);
    pointer[s + 1] = pointer[s] + frontOrder[s];
  }
  const row = new Int32Array(pointer[count]);
  const next = pointer.slice(0, count);
  const seen = new Int32Array(count).fill(-1);
  for (let i = 0; i < n; i++) {
    const own = nodeOf[i];
    seen[own] = i;
    row[next[own]++] = i;
    const v = tree.order[i];
    for (let p = graph.pointer[v]; p < graph.pointer[v + 1]; p++) {
      const k = position[graph.neighbour[p]];
      if (k >= i) continue;
      for (let s = nodeOf[k]; s >= 0 && seen[s] !== i; s = parent[s]) {
        seen[s] = i;
        row[next[s]++] = i;
      }
    }
  }
  return { pointer, row };
}
