import { type Graph, graphOf } from '../graph/graph.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { leadersOf } from './compress.ts';
import { heldFlags } from './heldLast.ts';
import { minimumDegreeOfGraph } from './minimumDegreeOfGraph.ts';
import { ABSENT, FREE, HALO, type StartOptions } from './minimumDegreeStart.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

export interface MinimumDegreeOptions extends OrderingOptions {
  /**
   * Vertices with more neighbours than this are set aside and ordered behind all others. Default: `denseRowThreshold(n)`.
   * Infinity: none is.
   */
  readonly denseThreshold?: number;
}

/** More neighbours than max(16, 10·√n) make a row dense: Amestoy, Davis & Duff 2004. */
export function denseRowThreshold(n: number): number {
  return Math.max(16, Math.floor(10 * Math.sqrt(n)));
}

/**
 * Approximate minimum degree (Amestoy, Davis & Duff 1996) on the graph of A + Aᵀ; square patterns only.
 * Held-last unknowns take part in the degrees as a halo (Pellegrini, Roman & Amestoy 2000) and follow at the end in the order given.
 */
export function minimumDegree(pattern: Pattern, options: MinimumDegreeOptions, progress: Progress): OrderingResult {
  return orderWithDenseLast(pattern, options, (graph, start) => minimumDegreeOfGraph(graph, start, progress).order);
}

/**
 * The frame around an elimination on the quotient graph: dense rows are set aside and come behind, held-last unknowns take part as a halo
 * and come last of all, indistinguishable rows are merged where that pays. `eliminate` orders the free leaders.
 */
export function orderWithDenseLast(
  pattern: Pattern,
  options: MinimumDegreeOptions,
  eliminate: (graph: Graph, start: StartOptions) => Int32Array,
): OrderingResult {
  const n = pattern.columns;
  const graph = graphOf(pattern);
  const held = heldFlags(n, options.heldLast);
  const threshold = options.denseThreshold ?? denseRowThreshold(n);
  const dense = denseVertices(graph, threshold, held);
  const role = dense.length === 0 && held === null ? null : rolesOf(n, dense, options.heldLast);
  const { leader, merged } = leadersOf(graph, role);
  // merging beforehand pays once a fair share of the vertices goes
  const free =
    merged > n / 8
      ? expandLeaders(eliminate(graph, { role: role ?? undefined, leader, weight: groupWeights(leader) }), leader)
      : eliminate(graph, { role: role ?? undefined });
  const order = new Int32Array(n);
  order.set(free);
  order.set(dense, free.length);
  if (options.heldLast !== undefined) order.set(options.heldLast, free.length + dense.length);
  return { order: asNewToOld(order), notes: denseNotes(dense.length, threshold) };
}

function rolesOf(n: number, dense: Int32Array, heldLast: Int32Array | undefined): Uint8Array {
  const role = new Uint8Array(n).fill(FREE);
  if (heldLast !== undefined) for (let k = 0; k < heldLast.length; k++) role[heldLast[k]] = HALO;
  for (let k = 0; k < dense.length; k++) role[dense[k]] = ABSENT;
  return role;
}

function groupWeights(leader: Int32Array): Int32Array {
  const weight = new Int32Array(leader.length);
  for (let v = 0; v < leader.length; v++) weight[leader[v]]++;
  return weight;
}

/** Each leader followed by the vertices merged into it. */
function expandLeaders(order: Int32Array, leader: Int32Array): Int32Array {
  const n = leader.length;
  const next = new Int32Array(n).fill(-1);
  for (let v = n - 1; v >= 0; v--) {
    const u = leader[v];
    if (u === v) continue;
    next[v] = next[u];
    next[u] = v;
  }
  const out = new Int32Array(n);
  let at = 0;
  for (let k = 0; k < order.length; k++) for (let v = order[k]; v >= 0; v = next[v]) out[at++] = v;
  return out.subarray(0, at);
}

/** Vertices with more than `threshold` neighbours that are not held, fewest neighbours first, equal ones by number. */
export function denseVertices(graph: Graph, threshold: number, held: Uint8Array | null): Int32Array {
  const { pointer } = graph;
  const found: number[] = [];
  for (let i = 0; i < graph.order; i++) {
    if (pointer[i + 1] - pointer[i] > threshold && (held === null || held[i] === 0)) found.push(i);
  }
  found.sort((i, j) => pointer[i + 1] - pointer[i] - (pointer[j + 1] - pointer[j]) || i - j);
  return Int32Array.from(found);
}

/** The sentence for dense rows set aside, if any. */
export function denseNotes(count: number, threshold: number): string[] {
  if (count === 0) return [];
  const rows = count === 1 ? '1 dense row' : `${count.toLocaleString('en')} dense rows`;
  return [`${rows} set aside (more than ${threshold.toLocaleString('en')} neighbours)`];
}
