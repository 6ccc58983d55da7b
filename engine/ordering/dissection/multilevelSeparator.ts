import type { Random } from '../../matrix/random.ts';
import type { IntegerArena } from './arena.ts';
import { contract } from './contract.ts';
import { grow } from './grow.ts';
import { matchInto } from './matching.ts';
import { refine } from './refine.ts';
import { SEPARATOR, type SeparationWorkspace, separationCost } from './separation.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * A vertex separator by the multilevel method (Karypis & Kumar 1998; Hendrickson & Rothberg 1998): the graph is made
 * coarser by matchings, the coarsest one separated by growing from several seeds, and the best separator projected back
 * level by level, improved on each.
 */
export interface SeparatorSettings {
  /** most share of the weight a side may have, above 0.5 */
  readonly balance: number;
  /** growing starts on the coarsest graph */
  readonly tries: number;
  /** whole multilevel runs from the middle of the hierarchy */
  readonly runs: number;
}

/** What a search for separators needs besides its graph. */
export interface SeparatorTools {
  readonly arena: IntegerArena;
  readonly workspace: SeparationWorkspace;
  readonly random: Random;
  /** called on every level of large graphs */
  readonly pulse: () => void;
}

/** Graphs of at most this order are separated directly. */
const COARSEST = 90;
/** A matching must leave at most this share of the vertices, or coarsening stops. */
const STALLED = 0.95;

/**
 * Fills `part` (length order) with a separation of g; `tools.workspace.sizes` and `.list` describe it on return.
 * Returns its cost.
 */
export function findSeparator(
  g: WeightedGraph,
  part: Int32Array,
  settings: SeparatorSettings,
  tools: SeparatorTools,
): number {
  return descend(g, part, settings, tools, settings.runs, g.order / MIDDLE_SHARE);
}

/** Independent runs start where the graph has shrunk to one part in so many. */
const MIDDLE_SHARE = 7;

function descend(
  g: WeightedGraph,
  part: Int32Array,
  settings: SeparatorSettings,
  tools: SeparatorTools,
  runs: number,
  middleOrder: number,
): number {
  const { arena, workspace: w } = tools;
  const largestSide = settings.balance * g.totalWeight;
  if (g.order <= COARSEST) return separateCoarsest(g, part, settings, tools, largestSide);
  if (g.order > 4096) tools.pulse();
  if (runs > 1 && g.order <= middleOrder) return bestOfRuns(g, part, settings, tools, runs);
  const mark = arena.mark();
  const coarseOf = arena.take(g.order);
  const match = arena.take(g.order);
  const coarseOrder = matchInto(g, match, coarseOf, COARSEST, tools.random.integer());
  if (coarseOrder > STALLED * g.order) {
    arena.release(mark);
    return separateCoarsest(g, part, settings, tools, largestSide);
  }
  const coarse = contract(g, match, coarseOf, coarseOrder, w.scratch, arena);
  const coarsePart = arena.take(coarseOrder);
  descend(coarse, coarsePart, settings, tools, runs, middleOrder);
  project(g, part, coarseOf, coarsePart, w);
  arena.release(mark);
  return refine(g, part, w, largestSide, passesFor(g), patienceFor(w.count));
}

/** The separation of the coarse graph carried to the fine one; sizes stay, the list is renewed. */
function project(
  g: WeightedGraph,
  part: Int32Array,
  coarseOf: Int32Array,
  coarsePart: Int32Array,
  w: SeparationWorkspace,
): void {
  const { list } = w;
  const n = g.order;
  let count = 0;
  for (let v = 0; v < n; v++) {
    const k = coarsePart[coarseOf[v]];
    part[v] = k;
    if (k === SEPARATOR) list[count++] = v;
  }
  w.count = count;
}

function passesFor(g: WeightedGraph): number {
  return g.order > 100000 ? 6 : 8;
}

function patienceFor(separator: number): number {
  return Math.max(25, Math.min(300, separator >> 1));
}

function bestOfRuns(
  g: WeightedGraph,
  part: Int32Array,
  settings: SeparatorSettings,
  tools: SeparatorTools,
  runs: number,
): number {
  const { arena, workspace: w } = tools;
  const mark = arena.mark();
  const trial = arena.take(g.order);
  let best = Infinity;
  for (let r = 0; r < runs; r++) {
    const cost = descend(g, trial, settings, tools, 1, 0);
    if (cost < best) {
      best = cost;
      part.set(trial);
    }
  }
  arena.release(mark);
  w.measure(g, part);
  return best;
}

/** Growing from several seeds, each improved; the best is kept. Every other seed is a vertex far from the one before. */
function separateCoarsest(
  g: WeightedGraph,
  part: Int32Array,
  settings: SeparatorSettings,
  tools: SeparatorTools,
  largestSide: number,
): number {
  const { arena, workspace: w, random } = tools;
  const n = g.order;
  const mark = arena.mark();
  const trial = arena.take(n);
  const tries = n > 4 * COARSEST ? Math.min(2, settings.tries) : settings.tries;
  let best = Infinity;
  for (let r = 0; r < tries; r++) {
    const start = random.below(n);
    const seed = (r & 1) === 0 ? farthestFrom(g, start, w) : start;
    grow(g, trial, w, seed);
    const cost = refine(g, trial, w, largestSide, 8, Math.max(20, Math.min(100, n >> 2)));
    if (cost < best) {
      best = cost;
      part.set(trial);
    }
  }
  arena.release(mark);
  w.measure(g, part);
  return separationCost(w.sizes[0], w.sizes[1], w.sizes[2], largestSide);
}

/** The vertex reached last by a breadth-first search. */
function farthestFrom(g: WeightedGraph, start: number, w: SeparationWorkspace): number {
  const { pointer, neighbour } = g;
  const queue = w.scratch;
  const { moved } = w;
  const stamp = ++w.stamp;
  let head = 0;
  let tail = 0;
  queue[tail++] = start;
  moved[start] = stamp;
  while (head < tail) {
    const v = queue[head++];
    for (let p = pointer[v]; p < pointer[v + 1]; p++) {
      const u = neighbour[p];
      if (moved[u] === stamp) continue;
      moved[u] = stamp;
      queue[tail++] = u;
    }
  }
  return queue[tail - 1];
}
