import type { Graph } from '../graph/graph.ts';
import type { Progress } from '../matrix/progress.ts';
import {
  elementBound,
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
import { FILL_LISTS, fillList, fillScore, finishElementByFill, ListSet, measureOverlap } from './minimumFillKernel.ts';

/**
 * Approximate minimum mean fill of a graph (Rothberg & Eisenstat 1998; Ng & Raghavan 1999) on the quotient graph of the minimum degree
 * method. Options and result as `minimumDegreeOfGraph`. No vertex is deferred here.
 */
export function minimumFillOfGraph(
  graph: Graph,
  options: StartOptions,
  progress: Progress,
): { readonly order: Int32Array; readonly pivots: number } {
  const q = startQuotientGraph(graph, options, () => FILL_LISTS + 1);
  const pivots = eliminateByFillInPlace(q, progress);
  return { order: collectOrder(q, pivots), pivots };
}

function eliminateByFillInPlace(graph: QuotientGraph, progress: Progress): number {
  const { w, layout, haloWeight, totalWeight } = graph;
  const { heads, buckets, bucketMask, order: n, end } = layout;
  const interiorEnd = RECORD * graph.interior;
  const haloList = heads + 2 * FILL_LISTS - NEXT;
  const occupied = linkByFillInPlace(graph, haloList);
  const overlap = new Float64Array(n);
  let free = graph.free;
  let remaining = totalWeight;
  let flag = 1;
  let largest = graph.largestElement;
  let pivots = 0;
  let work = 0;
  while (remaining > haloWeight) {
    // lists that have run empty are noticed here
    let least = occupied.least();
    let list = heads + 2 * least - NEXT;
    while (w[list + NEXT] === list) {
      occupied.remove(least);
      least = occupied.least();
      list = heads + 2 * least - NEXT;
    }
    const p = w[list + NEXT];
    const after = w[p + NEXT];
    w[list + NEXT] = after;
    w[after + PREVIOUS] = list;
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
    measureOverlap(w, p, flag, overlap);
    updateDegrees(w, p, flag, interiorEnd, buckets, bucketMask);
    flag = mergeIndistinguishable(w, p, flag + largest + 1, interiorEnd);
    remaining -= weight - w[p + DEGREE];
    const stop = finishElementByFill(w, p, remaining, interiorEnd, heads, haloList, overlap, occupied);
    if (!inPlace) free = stop;
    work += w[p + LENGTH] + 10;
    if (work > 50000) {
      work = 0;
      progress(1 - (remaining - haloWeight) / (totalWeight - haloWeight), 'minimum fill');
    }
  }
  return pivots;
}

/** First lists: nothing is joined yet. Sweep order among equal scores. */
function linkByFillInPlace(graph: QuotientGraph, haloList: number): ListSet {
  const { w, layout, interior, vertexAt } = graph;
  const { heads, buckets, bucketMask } = layout;
  for (let list = heads - NEXT; list <= haloList; list += 2) w[list + NEXT] = w[list + PREVIOUS] = list;
  w.fill(-1, buckets, buckets + bucketMask + 1);
  const occupied = new ListSet(FILL_LISTS);
  const entry = sweepOrder(w, interior);
  for (let k = 0; k < vertexAt.length; k++) {
    const r = k < interior ? entry[k] : RECORD * k;
    let list = haloList;
    if (k < interior) {
      const l = fillList(fillScore(w[r + DEGREE], w[r + WEIGHT], 0));
      occupied.add(l);
      list = heads + 2 * l - NEXT;
    }
    const last = w[list + PREVIOUS];
    w[r + PREVIOUS] = last;
    w[r + NEXT] = list;
    w[last + NEXT] = r;
    w[list + PREVIOUS] = r;
  }
  return occupied;
}
