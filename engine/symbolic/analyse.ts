import { type Graph, graphOf } from '../graph/graph.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld, composeOrders, type NewToOld, positionOf } from '../matrix/permutation.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { columnCounts } from './columnCounts.ts';
import { eliminationTree } from './eliminationTree.ts';
import { postorder } from './postorder.ts';
import type { SymbolicFactor } from './types.ts';

export interface AnalyseOptions {
  /** whether the requested order is followed by a postorder of its tree: same fill, contiguous subtrees */
  readonly postorder: boolean;
  /** how many unknowns at the end of the order no postorder may move; default 0 */
  readonly heldLast?: number;
}

/** Symbolic Cholesky factor of P(A + Aᵀ + I)Pᵀ; square patterns only. See `analyseGraph`. */
export function analyse(
  pattern: Pattern,
  order: NewToOld,
  options: AnalyseOptions,
  progress: Progress = noProgress,
): SymbolicFactor {
  return analyseGraph(graphOf(pattern), order, options, progress);
}

/** The same from a ready graph, so that many orderings symmetrise once. Near-linear in edges. */
export function analyseGraph(
  graph: Graph,
  order: NewToOld,
  options: AnalyseOptions,
  progress: Progress = noProgress,
): SymbolicFactor {
  const n = graph.order;
  progress(0, 'elimination tree');
  const position = positionOf(order);
  const tree = eliminationTree(graph, order, position);
  progress(0.4, 'postorder');
  const post = postorder(tree, options.heldLast ?? 0);
  // the walk for counts needs a postorder of the whole tree, held-last columns or not
  const fullPost = (options.heldLast ?? 0) > 0 ? postorder(tree) : post;
  progress(0.5, 'column counts');
  const counts = columnCounts(graph, order, tree, fullPost);
  progress(0.95, 'totals');
  let effective = order;
  let parent = tree;
  let columnCount = counts;
  if (options.postorder) {
    effective = composeOrders(order, asNewToOld(post));
    const to = new Int32Array(n);
    for (let k = 0; k < n; k++) to[post[k]] = k;
    parent = new Int32Array(n);
    columnCount = new Int32Array(n);
    for (let k = 0; k < n; k++) {
      const up = tree[post[k]];
      parent[k] = up < 0 ? -1 : to[up];
      columnCount[k] = counts[post[k]];
    }
  }
  let factorEntries = 0;
  let largestFront = 0;
  for (let j = 0; j < n; j++) {
    factorEntries += columnCount[j];
    if (columnCount[j] > largestFront) largestFront = columnCount[j];
  }
  return {
    size: n,
    order: effective,
    postordered: options.postorder,
    parent,
    columnCount,
    factorEntries,
    treeHeight: heightOf(parent),
    largestFront,
  };
}

/** Nodes on the longest path to a root; 0 for an empty forest. */
export function heightOf(parent: Int32Array): number {
  const depth = new Int32Array(parent.length);
  let height = 0;
  for (let j = parent.length - 1; j >= 0; j--) {
    depth[j] = parent[j] < 0 ? 1 : depth[parent[j]] + 1;
    if (depth[j] > height) height = depth[j];
  }
  return height;
}
