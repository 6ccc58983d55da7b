import { graphOf } from '../graph/graph.ts';
import { Fault } from '../matrix/fault.ts';
import type { Pattern } from '../matrix/pattern.ts';
import type { Progress } from '../matrix/progress.ts';
import { eliminationCost } from './dissection/eliminationCost.ts';
import { expandToUnknowns } from './dissection/expand.ts';
import { findSeparator } from './dissection/multilevelSeparator.ts';
import { type DissectionSettings, dissect, type SeparatorRange } from './dissection/recursion.ts';
import { ASIDE, HELD, makeWholeGraph, type WholeGraph } from './dissection/wholeGraph.ts';
import { heldFlags } from './heldLast.ts';
import { denseNotes, denseRowThreshold, denseVertices } from './minimumDegree.ts';
import { minimumDegreeOfGraph } from './minimumDegreeOfGraph.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

/** Options of nested dissection. */
export interface NestedDissectionOptions extends OrderingOptions {
  /**
   * pieces of at most so many vertices (indistinguishable unknowns merged) are ordered by minimum degree; at least 1.
   * Default 200, less where vertices have more than 8 neighbours on average, down to 50: minimum degree is weak on dense pieces.
   */
  readonly leafSize?: number;
  /** most share of both sides of a separator that one of them may have; default 0.7, from 0.5 to 0.9 */
  readonly balance?: number;
  /** growing starts on the coarsest graph for each separator that is carried up; default 2, at least 1 */
  readonly tries?: number;
  /** separators carried up from the coarsest graph; default 4, on small graphs (below 5000 vertices) 2; at least 1 */
  readonly runs?: number;
  /** vertices with more neighbours than this are ordered behind all others; default `denseRowThreshold(n)` */
  readonly denseThreshold?: number;
}

/**
 * Nested dissection (George 1973) on the graph of A + Aᵀ with multilevel vertex separators (Karypis & Kumar 1998;
 * Hendrickson & Rothberg 1998; Ashcraft & Liu 1998) and minimum degree with halo on the leaves (Pellegrini, Roman &
 * Amestoy 2000). Where the first separators are so small that minimum degree may do as well, both orders are counted
 * and the better one is kept. Square patterns only. `separators` lists every separator, each before those inside its
 * two sides; held-last unknowns and dense rows are in none.
 * Throws `Fault` "nested-dissection-option" for options out of range and those of `heldFlags`.
 */
export function nestedDissection(
  pattern: Pattern,
  options: NestedDissectionOptions,
  progress: Progress,
): OrderingResult {
  checkOptions(options);
  progress(0, 'graph');
  const g = graphOf(pattern);
  const n = g.order;
  const held = heldFlags(n, options.heldLast);
  const threshold = options.denseThreshold ?? denseRowThreshold(n);
  const dense = denseVertices(g, threshold, held);
  const state = new Uint8Array(n);
  if (held !== null) for (let i = 0; i < n; i++) if (held[i] === 1) state[i] = HELD;
  for (let k = 0; k < dense.length; k++) state[dense[k]] = ASIDE;
  const whole = makeWholeGraph(g, state);
  const settings = settingsOf(options, whole);
  progress(0, 'dissection');
  let { order, separators } = dissect(
    whole,
    settings,
    (piece, part, tools) => findSeparator(piece.graph, part, settings, tools),
    progress,
  );
  const notes = denseNotes(dense.length, threshold);
  if (held === null && isWeak(whole, separators)) {
    const other = minimumDegreeIfBetter(whole, order, progress);
    if (other !== null) {
      order = other;
      separators = [];
      notes.push('Ordered by minimum degree, which needs fewer operations here than the dissection found.');
    }
  }
  return expandToUnknowns(whole, order, separators, dense, options.heldLast ?? new Int32Array(0), notes);
}

function checkOptions({ leafSize = 1, balance = 0.5, tries = 1, runs = 1, seed = 1 }: NestedDissectionOptions): void {
  const refuse = (name: string, value: number, range: string): never => {
    throw new Fault('input', 'nested-dissection-option', `${name} is ${value}; it must be ${range}.`);
  };
  if (!(Number.isInteger(leafSize) && leafSize >= 1)) refuse('Leaf size', leafSize, 'a whole number of at least 1');
  if (!(balance >= 0.5 && balance <= 0.9)) refuse('Balance', balance, 'between 0.5 and 0.9');
  if (!(Number.isInteger(tries) && tries >= 1 && tries <= 1000)) refuse('Number of tries', tries, 'between 1 and 1000');
  if (!(Number.isInteger(runs) && runs >= 1 && runs <= 1000)) refuse('Number of runs', runs, 'between 1 and 1000');
  if (!Number.isInteger(seed)) refuse('Seed', seed, 'a whole number');
}

/** Below so many vertices further tries gain nothing: leaves are most of the work, and the level structures are good starts. Measured. */
const SMALL = 5000;

/** 200 vertices at 8 neighbours each. */
const LEAF = 200 * 8 * Math.sqrt(8);

function settingsOf(options: NestedDissectionOptions, whole: WholeGraph): DissectionSettings {
  const small = whole.freeOrder < SMALL;
  const { balance = 0.7, tries = 2, runs = small ? 2 : 4, seed = 1 } = options;
  const degree = Math.max(8, whole.neighbour.length / Math.max(1, whole.freeOrder));
  const leafSize = options.leafSize ?? Math.max(50, Math.floor(LEAF / (degree * Math.sqrt(degree))));
  return { leafSize, balance, tries, runs, seed };
}

/** Operations an unknown that the first separators may cost in all, for minimum degree to be worth a look. */
const WEAK_COST = 40;

/** Whether eliminating the outermost separators alone is cheap, as in power networks and circuits. */
function isWeak(whole: WholeGraph, separators: readonly SeparatorRange[]): boolean {
  let cost = 0;
  for (const s of separators) if (s.level === 0) cost += (s.end - s.start) ** 3 / 3;
  return cost <= WEAK_COST * whole.freeOrder;
}

/** Steps an unknown that counting an order may take: beyond, neither order is cheap. */
const MOST_STEPS = 100;

function minimumDegreeIfBetter(whole: WholeGraph, order: Int32Array, progress: Progress): Int32Array | null {
  const { pointer, neighbour, weight } = whole;
  const mostSteps = MOST_STEPS * whole.order;
  const cost = eliminationCost(whole, order, mostSteps);
  const graph = { order: whole.order, pointer, neighbour };
  const other = minimumDegreeOfGraph(graph, { weight }, progress).order;
  return eliminationCost(whole, other, mostSteps) < cost ? other : null;
}
