import type { Random } from '../../matrix/random.ts';
import type { IntegerArena } from './arena.ts';
import { contract } from './contract.ts';
import { grow } from './grow.ts';
import { growByDistance } from './growByDistance.ts';
import { matchInto } from './matching.ts';
import { refine } from './refine.ts';
import { SEPARATOR, type SeparationWorkspace } from './separation.ts';
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
  const { runs } = settings;
  const parts = arena.take(runs * n);
  const costs = new Float64Array(runs);
  descend(g, parts, costs, settings, tools);
  let best = 0;
  for (let r = 1; r < runs; r++) if (costs[r] < costs[best]) best = r;
  let cost = costs[best];
  part.set(parts.subarray(best * n, best * n + n));
  const trial = parts.subarray(0, n);
  for (let end = 0; end < 2; end++) {
    const start = growByDistance(g, trial, w, end === 0 ? n - 1 : 0, settings.balance);
    if (start > 3 * cost) continue;
    const reached = refine(g, trial, w, settings.balance, passesFor(g), patienceFor(w.count));
    if (reached < cost) {
      cost = reached;
      part.set(trial);
    }
  }
  arena.release(mark);
  w.measure(g, part);
  return cost;
}

/** Fills one part array after another, each of length g.order, and their costs. */
function descend(
  g: WeightedGraph,
  parts: Int32Array,
  costs: Float64Array,
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
    const coarseParts = arena.take(runs * coarseOrder);
    descend(coarse, coarseParts, costs, settings, tools);
    for (let r = 0; r < runs; r++) {
      const part = parts.subarray(r * n, r * n + n);
      project(g, part, coarseOf, coarseParts, r * coarseOrder, w);
      costs[r] = refine(g, part, w, settings.balance, passesFor(g), patienceFor(w.count));
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

function passesFor(g: WeightedGraph): number {
  return g.order > 100000 ? 6 : 8;
}

function patienceFor(separator: number): number {
  return Math.max(25, Math.min(300, separator));
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
