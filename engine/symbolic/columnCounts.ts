import type { Graph } from '../graph/graph.ts';
import type { NewToOld } from '../matrix/permutation.ts';

/**
 * Entries of each column of L, diagonal included, exactly, in almost linear time (Gilbert, Ng & Peyton 1994). Works in postorder labels, in
 * which neighbours and their ancestors lie close together in memory.
 * @param order position -> vertex
 * @param post a postorder of `parent`: label -> position
 * @returns position -> entries
 */
export function columnCounts(graph: Graph, order: NewToOld, parent: Int32Array, post: Int32Array): Int32Array {
  const n = graph.order;
  const { pointer, neighbour } = graph;
  const { labelOf, up } = postorderLabels(order, parent, post);
  // label -> label of the first descendant of its subtree
  const first = new Int32Array(n).fill(-1);
  const weight = new Int32Array(n).fill(1);
  for (let t = 0; t < n; t++) {
    if (first[t] < 0) first[t] = t;
    const p = up[t];
    if (p < 0) continue;
    if (first[p] < 0) first[p] = first[t];
    weight[p] = 0;
  }
  // label of i -> its last lower neighbour, and the last leaf of its row subtree, both −1 at first
  const lastNeighbour = new Int32Array(n).fill(-1);
  const lastLeaf = new Int32Array(n).fill(-1);
  // disjoint sets of finished subtrees; path halving
  const set = new Int32Array(n);
  for (let t = 0; t < n; t++) set[t] = t;
  for (let t = 0; t < n; t++) {
    const above = up[t];
    if (above >= 0) weight[above]--;
    const start = first[t];
    const v = order[post[t]];
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      // a neighbour that comes later is an ancestor, so it has the larger label too
      const i = labelOf[neighbour[p]];
      if (i <= t) continue;
      if (start > lastNeighbour[i]) {
        // t is a leaf of the row subtree of i
        weight[t]++;
        const leaf = lastLeaf[i];
        if (leaf >= 0) {
          let q = leaf;
          while (set[q] !== q) {
            set[q] = set[set[q]];
            q = set[q];
          }
          weight[q]--;
        }
        lastLeaf[i] = t;
      }
      lastNeighbour[i] = t;
    }
    if (above >= 0) set[t] = above;
  }
  const counts = new Int32Array(n);
  for (let t = 0; t < n; t++) {
    if (up[t] >= 0) weight[up[t]] += weight[t];
    counts[post[t]] = weight[t];
  }
  return counts;
}

/** vertex -> its label, and label -> label of its parent, −1 at a root. */
function postorderLabels(
  order: NewToOld,
  parent: Int32Array,
  post: Int32Array,
): { labelOf: Int32Array; up: Int32Array } {
  const n = post.length;
  const labelOf = new Int32Array(n);
  const labelAt = new Int32Array(n);
  for (let t = 0; t < n; t++) {
    labelAt[post[t]] = t;
    labelOf[order[post[t]]] = t;
  }
  const up = new Int32Array(n);
  for (let t = 0; t < n; t++) {
    const p = parent[post[t]];
    up[t] = p < 0 ? -1 : labelAt[p];
  }
  return { labelOf, up };
}
