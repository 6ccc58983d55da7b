import type { Graph } from '../graph/graph.ts';
import type { Progress } from '../matrix/progress.ts';
import {
  elementBound,
  finishElement,
  formElement,
  mergeIndistinguishable,
  updateDegrees,
  weighElements,
} from './minimumDegreeKernel.ts';
import {
  collectOrder,
  type QuotientGraph,
  type StartOptions,
  startQuotientGraph,
  sweepOrder,
} from './minimumDegreeStart.ts';
import {
  collectListsInPlace,
  DEGREE,
  ELEMENTS,
  FLAG_LIMIT,
  LENGTH,
  lowerMarksInPlace,
  NEXT,
  PREVIOUS,
  RECORD,
  WEIGHT,
} from './minimumDegreeWorkspace.ts';

/** What `minimumDegreeOfGraph` understands. */
export interface MinimumDegreeGraphOptions extends StartOptions {
  /** called before each pivot with vertex, unknowns and approximate external degree: for tests */
  readonly onPivot?: ((pivot: number, weight: number, degree: number) => void) | undefined;
}

export interface MinimumDegreeGraphResult {
  /** position -> vertex; free vertices only, leaders only */
  readonly order: Int32Array;
  /** pivots: supervariables eliminated */
  readonly pivots: number;
}

/**
 * Approximate minimum degree of a graph: Amestoy, Davis & Duff 1996. With a halo: Pellegrini, Roman & Amestoy 2000.
 * No vertex is deferred here. Near-linear in practice, O(vertices · edges) at worst.
 */
export function minimumDegreeOfGraph(
  graph: Graph,
  options: MinimumDegreeGraphOptions,
  progress: Progress,
): MinimumDegreeGraphResult {
  const q = startQuotientGraph(graph, options, (totalWeight) => 2 * (totalWeight + 2));
  const haloList = q.layout.heads + 4 * (q.totalWeight + 1) - NEXT;
  linkInPlace(q, sweepOrder(q.w, q.interior), haloList);
  const pivots = eliminateByDegreeInPlace(q, haloList, false, options.onPivot, progress);
  return { order: collectOrder(q, pivots), pivots };
}

/**
 * Eliminates every interior vertex, one pivot of least approximate degree after the other; `atFront`: ties to the latest instead of the
 * earliest. Returns the number of pivots.
 */
export function eliminateByDegreeInPlace(
  graph: QuotientGraph,
  haloList: number,
  atFront: boolean,
  onPivot: MinimumDegreeGraphOptions['onPivot'],
  progress: Progress,
): number {
  const { w, layout, haloWeight, totalWeight, vertexAt } = graph;
  const { heads, buckets, bucketMask, order: n, end } = layout;
  const interiorEnd = RECORD * graph.interior;
  let free = graph.free;
  let list = heads - NEXT;
  let remaining = totalWeight;
  // above the marks of elements there are from the start, which are 1
  let flag = 2;
  let largest = graph.largestElement;
  let pivots = 0;
  let work = 0;
  while (remaining > haloWeight) {
    while (w[list + NEXT] === list) list += 2;
    const p = w[list + NEXT];
    const after = w[p + NEXT];
    w[list + NEXT] = after;
    w[after + PREVIOUS] = list;
    if (onPivot !== undefined) onPivot(vertexAt[p / RECORD], w[p + WEIGHT], w[p + DEGREE]);
    remaining -= w[p + WEIGHT];
    const inPlace = w[p + ELEMENTS] === 0;
    if (!inPlace) {
      const bound = elementBound(w, p);
      if (free + (bound < n ? bound : n) > end) free = collectListsInPlace(w, layout, free);
    }
    formElement(w, p, free);
    w[p + PREVIOUS] = pivots++;
    if (flag > FLAG_LIMIT) flag = lowerMarksInPlace(w, layout);
    const weight = w[p + DEGREE];
    if (weight > largest) largest = weight;
    weighElements(w, p, flag);
    updateDegrees(w, p, flag, interiorEnd, buckets, bucketMask);
    flag = mergeIndistinguishable(w, p, flag + largest + 1, interiorEnd);
    remaining -= weight - w[p + DEGREE];
    const stop = finishElement(w, p, remaining, interiorEnd, heads, haloList, atFront);
    if (!inPlace) free = stop;
    if (w[p + NEXT] < list) list = w[p + NEXT];
    work += w[p + LENGTH] + 10;
    if (work > 50000) {
      work = 0;
      progress(1 - (remaining - haloWeight) / (totalWeight - haloWeight), 'minimum degree');
    }
  }
  return pivots;
}

/** Puts the free vertices into the degree lists in the given order, halo vertices into a list of their own, and empties the buckets. */
export function linkInPlace(graph: QuotientGraph, entry: Int32Array, haloList: number): void {
  const { w, layout, vertexAt } = graph;
  const { heads, buckets, bucketMask } = layout;
  for (let list = heads - NEXT; list <= haloList; list += 2) {
    w[list + NEXT] = list;
    w[list + PREVIOUS] = list;
  }
  w.fill(-1, buckets, buckets + bucketMask + 1);
  for (let k = 0; k < entry.length; k++) {
    const r = entry[k];
    append(w, heads + 4 * w[r + DEGREE] + (w[r + WEIGHT] > 1 ? 2 : 0) - NEXT, r);
  }
  for (let k = entry.length; k < vertexAt.length; k++) append(w, haloList, RECORD * k);
}

function append(w: Int32Array, list: number, r: number): void {
  const last = w[list + PREVIOUS];
  w[r + PREVIOUS] = last;
  w[r + NEXT] = list;
  w[last + NEXT] = r;
  w[list + PREVIOUS] = r;
}
