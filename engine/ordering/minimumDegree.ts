import { type Graph, graphOf } from '../graph/graph.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { heldFlags } from './heldLast.ts';
import { minimumDegreeOfGraph } from './minimumDegreeOfGraph.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';
import { type Subgraph, withoutVertices } from './subgraph.ts';

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
  const n = pattern.columns;
  const graph = graphOf(pattern);
  const held = heldFlags(n, options.heldLast);
  const threshold = options.denseThreshold ?? denseRowThreshold(n);
  const dense = denseVertices(graph, threshold, held);
  const part: Subgraph = dense.length === 0 ? { graph, vertexOf: null } : withoutVertices(graph, dense);
  const halo = held === null ? undefined : part.vertexOf === null ? held : part.vertexOf.map((i) => held[i]);
  const inner = minimumDegreeOfGraph(
    part.graph,
    { halo: halo === undefined ? undefined : Uint8Array.from(halo) },
    progress,
  );
  const order = new Int32Array(n);
  const inside = inner.order.length;
  for (let k = 0; k < inside; k++) order[k] = part.vertexOf === null ? inner.order[k] : part.vertexOf[inner.order[k]];
  order.set(dense, inside);
  if (options.heldLast !== undefined) order.set(options.heldLast, inside + dense.length);
  return { order: asNewToOld(order), notes: denseNotes(dense.length, threshold) };
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
