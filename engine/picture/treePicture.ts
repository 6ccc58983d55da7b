import type { AssemblyTree } from '../symbolic/types.ts';

/**
 * One front as a block of an area picture. Across: shares of all operations, the subtree of a front as wide as its work, children side by
 * side in the order of the walk, the front's own work at the right of them. Up: shares of the critical path, operations from the
 * end of the factorization, so that a way of blocks as high as the picture is a critical path.
 */
export interface TreeBlock {
  readonly supernode: number;
  /** −1 at a root */
  readonly parent: number;
  /** 0 to 1, left to right */
  readonly left: number;
  readonly right: number;
  /** 0 at the end of the factorization, 1 at the far end of the critical path */
  readonly bottom: number;
  readonly top: number;
  /** order of the front */
  readonly order: number;
  /** pivot columns, internal: firstColumn … firstColumn + columns − 1 */
  readonly firstColumn: number;
  readonly columns: number;
  readonly operations: number;
  readonly subtreeOperations: number;
  /** on the critical path */
  readonly critical: boolean;
}

export interface TreePicture {
  /** the largest subtrees, parents before children */
  readonly blocks: readonly TreeBlock[];
  /** fronts in all; those too small to be drawn are counted here only */
  readonly fronts: number;
  readonly operations: number;
  /** operations on the longest way from a leaf to a root, fronts whole */
  readonly criticalOperations: number;
  /** fronts on that way */
  readonly criticalFronts: number;
}

/**
 * Lays the tree out as areas. Linear in supernodes.
 * @param work supernode -> operations of its front
 * @param most blocks at most; subtrees with less work are left out
 */
export function treePicture(tree: AssemblyTree, work: Float64Array, most = 1200): TreePicture {
  const { count, parent, firstColumn, frontOrder } = tree;
  const below = Float64Array.from(work);
  // longest way from a leaf up to and with a front
  const reach = new Float64Array(count);
  let total = 0;
  let longest = 0;
  let end = -1;
  for (let s = 0; s < count; s++) {
    reach[s] += work[s];
    total += work[s];
    const up = parent[s];
    if (up >= 0) {
      below[up] += below[s];
      if (reach[s] > reach[up]) reach[up] = reach[s];
    } else if (reach[s] > longest) {
      longest = reach[s];
      end = s;
    }
  }
  const critical = criticalWay(tree, work, reach, end);
  const least = leastDrawn(below, most);
  const left = new Float64Array(count);
  // where the next child of a front begins; roots stand side by side
  const next = new Float64Array(count);
  const bottom = new Float64Array(count);
  // the first child of the walk stands leftmost: starts are made from the widths of the children before
  let rootStart = 0;
  for (let s = 0; s < count; s++) {
    const up = parent[s];
    if (up < 0) {
      left[s] = rootStart;
      rootStart += below[s];
    } else {
      left[s] = next[up];
      next[up] += below[s];
    }
  }
  const blocks: TreeBlock[] = [];
  const scaleX = total > 0 ? 1 / total : 0;
  const scaleY = longest > 0 ? 1 / longest : 0;
  for (let s = count - 1; s >= 0; s--) {
    const up = parent[s];
    if (up >= 0) {
      left[s] += left[up];
      bottom[s] = bottom[up] + work[up];
    }
    if (below[s] < least) continue;
    blocks.push({
      supernode: s,
      parent: up,
      left: left[s] * scaleX,
      right: (left[s] + below[s]) * scaleX,
      bottom: bottom[s] * scaleY,
      top: (bottom[s] + work[s]) * scaleY,
      order: frontOrder[s],
      firstColumn: firstColumn[s],
      columns: firstColumn[s + 1] - firstColumn[s],
      operations: work[s],
      subtreeOperations: below[s],
      critical: critical[s] === 1,
    });
  }
  let criticalFronts = 0;
  for (let s = 0; s < count; s++) criticalFronts += critical[s];
  return { blocks, fronts: count, operations: total, criticalOperations: longest, criticalFronts };
}

/** Marks the fronts of the longest way down from its root. */
function criticalWay(tree: AssemblyTree, work: Float64Array, reach: Float64Array, end: number): Uint8Array {
  const on = new Uint8Array(tree.count);
  const best = new Int32Array(tree.count).fill(-1);
  for (let s = 0; s < tree.count; s++) {
    const up = tree.parent[s];
    if (up >= 0 && reach[up] === reach[s] + work[up]) best[up] = s;
  }
  for (let s = end; s >= 0; s = best[s]) on[s] = 1;
  return on;
}

/** The work from which on at most `most` subtrees are drawn. */
function leastDrawn(below: Float64Array, most: number): number {
  if (below.length <= most) return 0;
  const sorted = Float64Array.from(below).sort();
  const at = sorted[sorted.length - most];
  // equal subtrees at the edge are drawn together or not at all
  return sorted[sorted.length - most - 1] === at ? at + Number.EPSILON * at : at;
}
