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
  collectListsInPlace,
  DEGREE,
  ELEMENTS,
  IS_ELEMENT,
  type Layout,
  LENGTH,
  layoutFor,
  MARK,
  NEXT,
  PREVIOUS,
  RECORD,
  START,
  WEIGHT,
  type Workspace,
} from './minimumDegreeWorkspace.ts';

/** What `minimumDegreeOfGraph` understands. */
export interface MinimumDegreeGraphOptions {
  /** vertex -> 1 for a halo vertex: it counts in degrees, is never eliminated and not in the order; default none */
  readonly halo?: Uint8Array | undefined;
  /** vertex -> unknowns it stands for, at least 1; default 1 each */
  readonly weight?: Int32Array | undefined;
  /** order in which the vertices enter the degree lists (new-to-old, all vertices); default 0, 1, 2, … */
  readonly initialOrder?: Int32Array | undefined;
  /** whether a vertex with a new degree queues behind the others of that degree (true) or before them */
  readonly queue?: boolean | undefined;
  /** memory to be reused over many calls; default a fresh one of exactly the size needed */
  readonly workspace?: Workspace | undefined;
  /** called before each pivot with vertex, unknowns and approximate external degree: for tests */
  readonly onPivot?: ((pivot: number, weight: number, degree: number) => void) | undefined;
}

export interface MinimumDegreeGraphResult {
  /** position -> vertex, halo vertices absent */
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
  const n = graph.order;
  const { halo, weight } = options;
  const vertexAt = numbering(n, halo, options.initialOrder);
  let interior = n;
  if (halo !== undefined) for (let i = 0; i < n; i++) interior -= halo[i];
  let totalWeight = 0;
  let interiorWeight = 0;
  for (let i = 0; i < n; i++) {
    const wi = weight === undefined ? 1 : weight[i];
    totalWeight += wi;
    if (halo === undefined || halo[i] === 0) interiorWeight += wi;
  }
  const layout = layoutFor(n, graph.neighbour.length, totalWeight);
  const w = options.workspace === undefined ? new Int32Array(layout.end) : options.workspace.take(layout.end);
  const free = fillInPlace(w, layout, graph, vertexAt, weight);
  linkInPlace(w, layout, interior, totalWeight);
  const pivots = eliminateInPlace(
    w,
    layout,
    free,
    { interior, interiorWeight, totalWeight, vertexAt, queue: options.queue ?? false, onPivot: options.onPivot },
    progress,
  );
  return { order: collectOrder(w, interior, pivots, vertexAt), pivots };
}

interface Elimination {
  readonly interior: number;
  readonly interiorWeight: number;
  readonly totalWeight: number;
  readonly vertexAt: Int32Array | null;
  readonly queue: boolean;
  readonly onPivot: MinimumDegreeGraphOptions['onPivot'];
}

/** Marks stay below this, far from the end of 32 bits. */
const FLAG_LIMIT = 1 << 30;

/** Eliminates every interior vertex, one pivot of least approximate degree after the other. Returns the number of pivots. */
function eliminateInPlace(w: Int32Array, layout: Layout, lists: number, o: Elimination, progress: Progress): number {
  const { heads, buckets, bucketMask, order: n, end } = layout;
  const { queue, interiorWeight, totalWeight, onPivot } = o;
  const interiorEnd = RECORD * o.interior;
  const haloList = heads + 2 * (totalWeight + 1) - NEXT;
  let free = lists;
  let list = heads - NEXT;
  let remaining = totalWeight;
  let flag = 1;
  let largest = 0;
  let pivots = 0;
  let work = 0;
  const stopAt = totalWeight - interiorWeight;
  while (remaining > stopAt) {
    while (w[list + NEXT] === list) list += 2;
    const p = w[list + NEXT];
    const after = w[p + NEXT];
    w[list + NEXT] = after;
    w[after + PREVIOUS] = list;
    if (onPivot !== undefined) {
      onPivot(o.vertexAt === null ? p / RECORD : o.vertexAt[p / RECORD], w[p + WEIGHT], w[p + DEGREE]);
    }
    remaining -= w[p + WEIGHT];
    const inPlace = w[p + ELEMENTS] === 0;
    if (!inPlace) {
      const bound = elementBound(w, p);
      if (free + (bound < n ? bound : n) > end) free = collectListsInPlace(w, layout, free);
    }
    formElement(w, p, free);
    w[p + PREVIOUS] = pivots++;
    if (flag > FLAG_LIMIT) {
      for (let r = 0; r < RECORD * n; r += RECORD) if (w[r + MARK] !== 0) w[r + MARK] = 1;
      flag = 2;
    }
    const weight = w[p + DEGREE];
    if (weight > largest) largest = weight;
    weighElements(w, p, flag);
    updateDegrees(w, p, flag, interiorEnd, buckets, bucketMask);
    flag = mergeIndistinguishable(w, p, flag + largest + 1, interiorEnd);
    remaining -= weight - w[p + DEGREE];
    const stop = finishElement(w, p, remaining, interiorEnd, heads, haloList, queue);
    if (!inPlace) free = stop;
    if (w[p + NEXT] < list) list = w[p + NEXT];
    work += w[p + LENGTH] + 10;
    if (work > 50000) {
      work = 0;
      progress(1 - (remaining - stopAt) / interiorWeight, 'minimum degree');
    }
  }
  return pivots;
}

/** position -> vertex: interior vertices before halo vertices, each in the initial order; null for 0, 1, 2, … */
function numbering(n: number, halo: Uint8Array | undefined, initialOrder: Int32Array | undefined): Int32Array | null {
  if (halo === undefined) return initialOrder ?? null;
  const out = new Int32Array(n);
  let at = 0;
  for (let side = 0; side < 2; side++) {
    for (let k = 0; k < n; k++) {
      const i = initialOrder === undefined ? k : initialOrder[k];
      if (halo[i] === side) out[at++] = i;
    }
  }
  return out;
}

/** Writes records and lists; returns the first free place behind the lists. */
function fillInPlace(
  w: Int32Array,
  layout: Layout,
  graph: Graph,
  vertexAt: Int32Array | null,
  weight: Int32Array | undefined,
): number {
  const { pointer, neighbour } = graph;
  const n = graph.order;
  const address = new Int32Array(vertexAt === null ? 0 : n);
  if (vertexAt !== null) for (let k = 0; k < n; k++) address[vertexAt[k]] = RECORD * k;
  let at = layout.lists;
  for (let k = 0; k < n; k++) {
    const i = vertexAt === null ? k : vertexAt[k];
    const r = RECORD * k;
    const from = pointer[i];
    const to = pointer[i + 1];
    w[r + START] = at;
    let degree = 0;
    for (let q = from; q < to; q++) {
      const j = neighbour[q];
      degree += weight === undefined ? 1 : weight[j];
      w[at++] = vertexAt === null ? RECORD * j : address[j];
    }
    w[r + WEIGHT] = weight === undefined ? 1 : weight[i];
    w[r + MARK] = 0;
    w[r + LENGTH] = to - from;
    w[r + ELEMENTS] = 0;
    w[r + DEGREE] = degree;
  }
  return at;
}

/** Puts the vertices into the degree lists, halo vertices into a list of their own, and empties the hash buckets. */
function linkInPlace(w: Int32Array, layout: Layout, interior: number, totalWeight: number): void {
  const { order: n, heads, buckets, bucketMask } = layout;
  for (let d = 0; d <= totalWeight + 1; d++) {
    const head = heads + 2 * d - NEXT;
    w[head + NEXT] = head;
    w[head + PREVIOUS] = head;
  }
  w.fill(-1, buckets, buckets + bucketMask + 1);
  for (let k = 0; k < n; k++) {
    const r = RECORD * k;
    const head = heads + 2 * (k < interior ? w[r + DEGREE] : totalWeight + 1) - NEXT;
    const last = w[head + PREVIOUS];
    w[r + PREVIOUS] = last;
    w[r + NEXT] = head;
    w[last + NEXT] = r;
    w[head + PREVIOUS] = r;
  }
}

/** The order of the interior vertices: pivot after pivot, each followed by the vertices that went with it. */
function collectOrder(w: Int32Array, interior: number, pivots: number, vertexAt: Int32Array | null): Int32Array {
  const next = new Int32Array(pivots + 1);
  for (let r = 0; r < RECORD * interior; r += RECORD) {
    let p = r;
    while (w[p + ELEMENTS] !== IS_ELEMENT) p = w[p + NEXT];
    // shorten the chain just walked
    for (let q = r; q !== p; ) {
      const up = w[q + NEXT];
      w[q + NEXT] = p;
      q = up;
    }
    next[w[p + PREVIOUS] + 1]++;
  }
  for (let k = 0; k < pivots; k++) next[k + 1] += next[k];
  const order = new Int32Array(interior);
  for (let side = 0; side < 2; side++) {
    for (let k = 0; k < interior; k++) {
      const r = RECORD * k;
      const isPivot = w[r + ELEMENTS] === IS_ELEMENT;
      if (isPivot !== (side === 0)) continue;
      const p = isPivot ? r : w[r + NEXT];
      order[next[w[p + PREVIOUS]]++] = vertexAt === null ? k : vertexAt[k];
    }
  }
  return order;
}
