import type { Random } from '../../matrix/random.ts';
import type { IntegerArena } from './arena.ts';
import { contract } from './contract.ts';
import { grow } from './grow.ts';
import { growByDistance } from './growByDistance.ts';
import { matchInto } from './matching.ts';
import { improveByMatching } from './matchingImprovement.ts';
import { refine } from './refine.ts';
import { evennessFor, SEPARATOR, type SeparationWorkspace } from './separation.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * A vertex separator by the multilevel method (Karypis & Kumar 1998; Hendrickson & Rothberg 1998): the graph is made
 * coarser by matchings, the coarsest one separated by growing from several seeds, and the separators projected back
 * level by level, improved on each. Weights of coarse separators say little about the separators they become, so
 * several are carried up to the finest level and compared there, together with level structures of the fine graph.
 */
export interface SeparatorSettings {
  /** most share of the weight a side may have, above 0.5 */
  readonly balance: number;
  /** growing starts on the coarsest graph for each separator that is carried up */
  readonly tries: number;
  /** separators carried up */
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
  const { arena, workspace: w } = tools;
  const n = g.order;
  const mark = arena.mark();
  // level structures from the last and the first vertex, which the numbering puts far apart
  const byDistance = arena.take(2 * n);
  const starts = [n - 1, 0];
  w.evenness = 1;
  let separator = Number.POSITIVE_INFINITY;
  for (let end = 0; end < 2; end++) {
    const trial = byDistance.subarray(end * n, end * n + n);
    starts[end] = growByDistance(g, trial, w, starts[end], settings.balance);
    if (w.sizes[2] < separator) separator = w.sizes[2];
  }
  w.evenness = evennessFor(separator, g.totalWeight);
  const carried = carriedAt(n, n, settings.runs);
  const parts = arena.take(carried * n);
  const costs = new Float64Array(carried);
  descend(g, parts, costs, n, settings, tools);
  const best = cheapest(costs);
  let cost = costs[best];
  part.set(parts.subarray(best * n, best * n + n));
  for (let end = 0; end < 2; end++) {
    if (starts[end] > HOPELESS * cost) continue;
    const trial = byDistance.subarray(end * n, end * n + n);
    w.measure(g, trial);
    const reached = improve(g, trial, settings, tools);
    if (reached < cost) {
      cost = reached;
      part.set(trial);
    }
  }
  arena.release(mark);
  w.measure(g, part);
  return cost;
}

/** A level structure is not improved when it starts at more than so many times the best cost. */
const HOPELESS = 1.5;

/** Separators carried on a level of `order` vertices when the finest has `finest`: fewer where levels are dear. */
function carriedAt(order: number, finest: number, runs: number): number {
  if (2.5 * order > finest) return 1;
  if (6 * order > finest) return Math.min(2, runs);
  return runs;
}

/** Passes, a matching, and passes again when the matching found something. */
function improve(g: WeightedGraph, part: Int32Array, settings: SeparatorSettings, tools: SeparatorTools): number {
  const { workspace: w, arena } = tools;
  const cost = refine(g, part, w, settings.balance, PASSES, patienceFor(w.count));
  const matched = improveByMatching(g, part, w, settings.balance, arena);
  return matched < cost ? refine(g, part, w, settings.balance, PASSES, patienceFor(w.count)) : cost;
}
/** Matchings pay where the finest graph has fewer than so many times the vertices. */
const MATCHED_LEVELS = 6;

/** Most passes of a refinement. */
const PASSES = 8;

/** The place of the least cost. */
function cheapest(costs: Float64Array): number {
  let best = 0;
  for (let r = 1; r < costs.length; r++) if (costs[r] < costs[best]) best = r;
  return best;
}

/** Fills one part array after another, each of length g.order, and their costs. */
function descend(
  g: WeightedGraph,
  parts: Int32Array,
  costs: Float64Array,
  finest: number,
  settings: SeparatorSettings,
  tools: SeparatorTools,
): void {
  const { arena, workspace: w } = tools;
  const n = g.order;
  const runs = costs.length;
  if (n > 4096) tools.pulse();
  const mark = arena.mark();
  let coarseOrder = n;
  let coarseOf = parts;
  let match = parts;
  if (n > COARSEST) {
    coarseOf = arena.take(n);
    match = arena.take(n);
    coarseOrder = matchInto(g, match, coarseOf, COARSEST, tools.random.integer());
  }
  if (coarseOrder > STALLED * n) {
    for (let r = 0; r < runs; r++) {
      costs[r] = separateCoarsest(g, parts.subarray(r * n, r * n + n), settings, tools);
    }
  } else {
    const coarse = contract(g, match, coarseOf, coarseOrder, w.scratch, arena);
    const carried = carriedAt(coarseOrder, finest, settings.runs);
    const coarseParts = arena.take(carried * coarseOrder);
    const coarseCosts = new Float64Array(carried);
    descend(coarse, coarseParts, coarseCosts, finest, settings, tools);
    for (let r = 0; r < runs; r++) {
      const from = cheapest(coarseCosts);
      coarseCosts[from] = Infinity;
      const part = parts.subarray(r * n, r * n + n);
      project(g, part, coarseOf, coarseParts, from * coarseOrder, w);
      costs[r] =
        MATCHED_LEVELS * n > finest
          ? improve(g, part, settings, tools)
          : refine(g, part, w, settings.balance, PASSES, patienceFor(w.count));
    }
  }
  arena.release(mark);
}

/** The separation of the coarse graph carried to the fine one. */
function project(
  g: WeightedGraph,
  part: Int32Array,
  coarseOf: Int32Array,
  coarseParts: Int32Array,
  offset: number,
  w: SeparationWorkspace,
): void {
  const { list, sizes } = w;
  const { order: n, weight } = g;
  let count = 0;
  let size0 = 0;
  let separator = 0;
  for (let v = 0; v < n; v++) {
    const k = coarseParts[offset + coarseOf[v]];
    part[v] = k;
    if (k === SEPARATOR) {
      list[count++] = v;
      separator += weight[v];
    } else if (k === 0) size0 += weight[v];
  }
  w.count = count;
  sizes[0] = size0;
  sizes[1] = g.totalWeight - size0 - separator;
  sizes[2] = separator;
}

function patienceFor(separator: number): number {
  return Math.max(12, Math.min(300, separator >> 1));
}

/** Growing from several seeds, each improved; the best is kept. Every other seed is a vertex far from a random one. */
function separateCoarsest(
  g: WeightedGraph,
  part: Int32Array,
  settings: SeparatorSettings,
  tools: SeparatorTools,
): number {
  const { arena, workspace: w, random } = tools;
  const n = g.order;
  const mark = arena.mark();
  const trial = arena.take(n);
  const tries = n > 4 * COARSEST ? Math.min(2, settings.tries) : settings.tries;
  let best = Infinity;
  for (let r = 0; r < tries; r++) {
    const start = random.below(n);
    if ((r & 1) === 0) growByDistance(g, trial, w, start, settings.balance);
    else grow(g, trial, w, start, settings.balance);
    const cost = refine(g, trial, w, settings.balance, 8, Math.max(20, Math.min(100, n >> 2)));
    if (cost < best) {
      best = cost;
      part.set(trial);
    }
  }
  arena.release(mark);
  return best;
}
