import { type Graph, graphOf } from '../graph/graph.ts';
import { levelStructure } from '../graph/levels.ts';
import { pseudoPeripheral } from '../graph/peripheral.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { withHeldLast } from './heldLast.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

/**
 * Reverse Cuthill–McKee (Cuthill & McKee 1969; reversed: George 1971), component by component, each from a pseudo-peripheral vertex
 * (George & Liu 1979). It lowers bandwidth and envelope of A + Aᵀ; square patterns only. Near-linear: O(entries + Σ sorting of neighbours).
 */
export function reverseCuthillMcKee(pattern: Pattern, options: OrderingOptions, progress: Progress): OrderingResult {
  const graph = graphOf(pattern);
  const order = cuthillMcKee(graph, progress);
  order.reverse();
  return { order: withHeldLast(asNewToOld(order), options.heldLast), notes: [] };
}

/** Cuthill–McKee order of a graph, not reversed: position -> vertex. Components start in the order of their least degree. */
export function cuthillMcKee(graph: Graph, progress: Progress): Int32Array {
  const n = graph.order;
  const order = new Int32Array(n);
  const rank = degreeRanks(graph);
  const placed = new Uint8Array(n);
  const work = levelStructure(n);
  let done = 0;
  for (let k = 0; k < n; k++) {
    const seed = rank.vertexAt[k];
    if (placed[seed] === 1) continue;
    const isolated = graph.pointer[seed] === graph.pointer[seed + 1];
    const root = isolated ? seed : pseudoPeripheral(graph, seed, work);
    if (!isolated) progress(done / n, 'Cuthill–McKee');
    done = appendComponent(graph, root, order, done, placed, rank);
  }
  progress(1, 'Cuthill–McKee');
  return order;
}

interface Ranks {
  /** vertices by increasing degree, equal degrees by increasing number */
  readonly vertexAt: Int32Array;
  /** its inverse */
  readonly rankOf: Int32Array;
}

function degreeRanks(graph: Graph): Ranks {
  const { order: n, pointer } = graph;
  const next = new Int32Array(n + 1);
  for (let i = 0; i < n; i++) next[pointer[i + 1] - pointer[i] + 1]++;
  for (let d = 0; d < n; d++) next[d + 1] += next[d];
  const vertexAt = new Int32Array(n);
  const rankOf = new Int32Array(n);
  for (let i = 0; i < n; i++) {
    const k = next[pointer[i + 1] - pointer[i]]++;
    vertexAt[k] = i;
    rankOf[i] = k;
  }
  return { vertexAt, rankOf };
}

/** Below this many children insertion sort wins. */
const INSERTION_LIMIT = 32;

/** Appends the component of `root`: each vertex followed, in time, by its new neighbours, least degree first. Returns the new length. */
function appendComponent(
  graph: Graph,
  root: number,
  order: Int32Array,
  start: number,
  placed: Uint8Array,
  ranks: Ranks,
): number {
  const { pointer, neighbour } = graph;
  const { rankOf, vertexAt } = ranks;
  order[start] = root;
  placed[root] = 1;
  let end = start + 1;
  for (let k = start; k < end; k++) {
    const i = order[k];
    const first = end;
    for (let q = pointer[i]; q < pointer[i + 1]; q++) {
      const j = neighbour[q];
      if (placed[j] === 1) continue;
      placed[j] = 1;
      if (end - first < INSERTION_LIMIT) {
        const degree = pointer[j + 1] - pointer[j];
        let at = end;
        for (; at > first && pointer[order[at - 1] + 1] - pointer[order[at - 1]] > degree; at--)
          order[at] = order[at - 1];
        order[at] = j;
      } else order[end] = j;
      end++;
    }
    if (end - first <= INSERTION_LIMIT) continue;
    for (let at = first; at < end; at++) order[at] = rankOf[order[at]];
    order.subarray(first, end).sort();
    for (let at = first; at < end; at++) order[at] = vertexAt[order[at]];
  }
  return end;
}
