/**
 * From a graph to the first quotient graph: which vertices take part, how they are numbered, in which order those of equal degree queue.
 */
import type { Graph } from '../graph/graph.ts';
import {
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

/** Roles of a vertex: to be eliminated, only counted in degrees, not there at all. */
export const FREE = 0;
export const HALO = 1;
export const ABSENT = 2;

/** Which vertices take part and under which number. */
export interface Numbering {
  /** number -> vertex: free ones first, then halo */
  readonly vertexAt: Int32Array;
  /** free vertices */
  readonly interior: number;
}

/**
 * Numbers the vertices along breadth-first searches, so that neighbours lie near each other in memory however the caller numbered them.
 * `leader`: vertices that are not their own leader are merged into it and get no number.
 */
export function numberBreadthFirst(graph: Graph, role: Uint8Array | null, leader: Int32Array | null): Numbering {
  const { order: n, pointer, neighbour } = graph;
  const queue = new Int32Array(n);
  const seen = new Uint8Array(n);
  let end = 0;
  for (let v = 0; v < n; v++) {
    if ((role !== null && role[v] !== FREE) || (leader !== null && leader[v] !== v)) seen[v] = 1;
  }
  for (let root = 0, head = 0; root < n; root++) {
    if (seen[root] === 1) continue;
    seen[root] = 1;
    queue[end++] = root;
    for (; head < end; head++) {
      const v = queue[head];
      for (let q = pointer[v], stop = pointer[v + 1]; q < stop; q++) {
        const u = neighbour[q];
        if (seen[u] === 1) continue;
        seen[u] = 1;
        queue[end++] = u;
      }
    }
  }
  const interior = end;
  if (role !== null) {
    for (let v = 0; v < n; v++) if (role[v] === HALO && (leader === null || leader[v] === v)) queue[end++] = v;
  }
  return { vertexAt: end === n ? queue : queue.slice(0, end), interior };
}

/**
 * Writes records and lists into `w`; returns the first free place behind the lists. Halo vertices keep their neighbours too.
 * `weight`: vertex -> unknowns, null for 1 each.
 */
export function fillInPlace(
  w: Int32Array,
  layout: Layout,
  graph: Graph,
  vertexAt: Int32Array,
  weight: Int32Array | null,
): number {
  const { pointer, neighbour } = graph;
  const count = vertexAt.length;
  const address = new Int32Array(graph.order);
  if (count < graph.order) address.fill(-1);
  for (let k = 0; k < count; k++) address[vertexAt[k]] = RECORD * k;
  let at = layout.lists;
  for (let k = 0; k < count; k++) {
    const v = vertexAt[k];
    const r = RECORD * k;
    w[r + START] = at;
    let degree = 0;
    for (let q = pointer[v], stop = pointer[v + 1]; q < stop; q++) {
      const u = neighbour[q];
      const a = address[u];
      if (a < 0) continue;
      degree += weight === null ? 1 : weight[u];
      w[at++] = a;
    }
    w[r + WEIGHT] = weight === null ? 1 : weight[v];
    w[r + MARK] = 0;
    w[r + LENGTH] = at - w[r + START];
    w[r + ELEMENTS] = 0;
    w[r + DEGREE] = degree;
  }
  return at;
}

/**
 * The order in which vertices of equal degree queue: component by component, breadth-first from a pseudo-peripheral vertex (two rounds
 * of George & Liu 1979). Record addresses of the free vertices. On grids this order of ties decides between good and poor: the
 * eliminations then sweep over the grid and leave even pieces.
 */
export function sweepOrder(w: Int32Array, interior: number): Int32Array {
  const queue = new Int32Array(interior);
  const limit = RECORD * interior;
  let done = 0;
  for (let r = 0; r < limit; r += RECORD) {
    if (w[r + MARK] !== 0) continue;
    let root = r;
    let end = done;
    for (let round = 1; round <= 3; round++) {
      const lastLevel = searchInto(queue, w, root, done, limit, round);
      end = lastLevel.end;
      if (round < 3) root = leastDegree(queue, w, lastLevel.start, end);
    }
    done = end;
  }
  for (let r = 0; r < limit; r += RECORD) w[r + MARK] = 0;
  return queue;
}

/** Breadth-first search from `root` into queue[start …]; visited vertices get `round` as mark. Returns the last level. */
function searchInto(
  queue: Int32Array,
  w: Int32Array,
  root: number,
  start: number,
  limit: number,
  round: number,
): { start: number; end: number } {
  queue[start] = root;
  w[root + MARK] = round;
  let end = start + 1;
  let level = start;
  for (;;) {
    const stop = end;
    for (let k = level; k < stop; k++) {
      const r = queue[k];
      const from = w[r + START];
      for (let q = from, to = from + w[r + LENGTH]; q < to; q++) {
        const u = w[q];
        if (u >= limit || w[u + MARK] === round) continue;
        w[u + MARK] = round;
        queue[end++] = u;
      }
    }
    if (end === stop) return { start: level, end };
    level = stop;
  }
}

function leastDegree(queue: Int32Array, w: Int32Array, from: number, to: number): number {
  let best = queue[from];
  for (let k = from + 1; k < to; k++) if (w[queue[k] + DEGREE] < w[best + DEGREE]) best = queue[k];
  return best;
}

/** A quotient graph ready for its first pivot; degree lists not yet made. */
export interface QuotientGraph {
  readonly w: Int32Array;
  readonly layout: Layout;
  /** first free place behind the lists */
  readonly free: number;
  /** number -> vertex */
  readonly vertexAt: Int32Array;
  /** vertices to be eliminated; their numbers come first */
  readonly interior: number;
  /** unknowns in all, and in the halo */
  readonly totalWeight: number;
  readonly haloWeight: number;
  /** largest weight of an element there is from the start; 0 without any */
  readonly largestElement: number;
}

/** What any elimination of least degree or least fill starts from. */
export interface StartOptions {
  /** vertex -> FREE, HALO (counts in degrees, is never eliminated, not in the order) or ABSENT; default all free */
  readonly role?: Uint8Array | undefined;
  /** vertex -> unknowns it stands for, at least 1; default 1 each */
  readonly weight?: Int32Array | undefined;
  /** vertex -> the vertex it is merged into, from `leadersOf`; only leaders are in the order, with the weight given for them */
  readonly leader?: Int32Array | undefined;
  /** memory to be reused over many calls; default a fresh one of exactly the size needed */
  readonly workspace?: Workspace | undefined;
}

/** Numbers, fills, and lays out; `lists`: how many ordering lists for a total weight. */
export function startQuotientGraph(
  graph: Graph,
  options: StartOptions,
  lists: (totalWeight: number) => number,
): QuotientGraph {
  const { vertexAt, interior } = numberBreadthFirst(graph, options.role ?? null, options.leader ?? null);
  const weight = options.weight ?? null;
  let haloWeight = 0;
  let totalWeight = 0;
  for (let k = 0; k < vertexAt.length; k++) {
    const wk = weight === null ? 1 : weight[vertexAt[k]];
    totalWeight += wk;
    if (k >= interior) haloWeight += wk;
  }
  const layout = layoutFor(vertexAt.length, graph.neighbour.length, lists(totalWeight));
  const w = options.workspace === undefined ? new Int32Array(layout.end) : options.workspace.take(layout.end);
  const free = fillInPlace(w, layout, graph, vertexAt, weight);
  return { w, layout, free, vertexAt, interior, totalWeight, haloWeight, largestElement: 0 };
}

/** After the last pivot, the order of the interior vertices: pivot after pivot, each followed by the vertices that went with it. */
export function collectOrder(graph: QuotientGraph, pivots: number): Int32Array {
  const { w, interior, vertexAt } = graph;
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
      order[next[w[p + PREVIOUS]]++] = vertexAt[k];
    }
  }
  return order;
}
