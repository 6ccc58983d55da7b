import type { Graph } from '../graph/graph.ts';
import type { NewToOld, OldToNew } from '../matrix/permutation.ts';

/**
 * Entries of each column of L, diagonal included, exactly, in almost linear time (Gilbert, Ng & Peyton 1994).
 * @param post a postorder of `parent`: position -> column
 */
export function columnCounts(
  graph: Graph,
  order: NewToOld,
  position: OldToNew,
  parent: Int32Array,
  post: Int32Array,
): Int32Array {
  const n = graph.order;
  const { pointer, neighbour } = graph;
  const postPosition = new Int32Array(n);
  for (let t = 0; t < n; t++) postPosition[post[t]] = t;
  // column -> postorder position of the first descendant of its subtree
  const first = new Int32Array(n).fill(-1);
  const weight = new Int32Array(n).fill(1);
  for (let t = 0; t < n; t++) {
    const j = post[t];
    if (first[j] < 0) first[j] = t;
    const p = parent[j];
    if (p >= 0) {
      if (first[p] < 0) first[p] = first[j];
      weight[p] = 0;
    }
  }
  // column i -> postorder position of its last lower neighbour, and the last leaf of its row subtree, both −1 at first
  const lastNeighbour = new Int32Array(n).fill(-1);
  const lastLeaf = new Int32Array(n).fill(-1);
  // disjoint sets of finished subtrees, by column; path halving
  const set = new Int32Array(n);
  for (let j = 0; j < n; j++) set[j] = j;
  for (let t = 0; t < n; t++) {
    const j = post[t];
    const up = parent[j];
    if (up >= 0) weight[up]--;
    const start = first[j];
    const v = order[j];
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const i = position[neighbour[p]];
      if (i <= j) continue;
      if (start > lastNeighbour[i]) {
        // j is a leaf of the row subtree of i
        weight[j]++;
        const leaf = lastLeaf[i];
        if (leaf >= 0) {
          let q = leaf;
          while (set[q] !== q) {
            set[q] = set[set[q]];
            q = set[q];
          }
          weight[q]--;
        }
        lastLeaf[i] = j;
      }
      lastNeighbour[i] = t;
    }
    if (up >= 0) set[j] = up;
  }
  for (let t = 0; t < n; t++) {
    const j = post[t];
    if (parent[j] >= 0) weight[parent[j]] += weight[j];
  }
  return weight;
}
