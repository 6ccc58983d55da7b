import { graphOf } from '../graph/graph.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import { dissect } from './dissection/recursion.ts';
import { ASIDE, HELD, makeWholeGraph } from './dissection/wholeGraph.ts';
import type { OrderingMethod, OrderingOptions } from './ordering.ts';

/** Options of nested dissection. */
export interface NestedDissectionOptions extends OrderingOptions {
  /** pieces of at most so many (merged) unknowns are ordered by minimum degree; default 200 */
  readonly leafSize?: number;
  /** most share of a piece that one side of a separator may have, 0.5 to 0.9; default 0.7 */
  readonly balance?: number;
  /** growing starts for a separator of the coarsest graph; default 2 */
  readonly tries?: number;
  /** separators carried up from the coarsest graph; default 4 */
  readonly runs?: number;
}

/** Nested dissection, multilevel. */
export const nestedDissection: OrderingMethod<NestedDissectionOptions> = (pattern, options, progress) => {
  const g = graphOf(pattern);
  const n = g.order;
  const state = new Uint8Array(n);
  const held = options.heldLast ?? new Int32Array(0);
  for (let k = 0; k < held.length; k++) state[held[k]] = HELD;
  const limit = Math.max(16, 10 * Math.floor(Math.sqrt(n)));
  const dense: number[] = [];
  for (let i = 0; i < n; i++) {
    if (state[i] !== HELD && g.pointer[i + 1] - g.pointer[i] > limit) {
      state[i] = ASIDE;
      dense.push(i);
    }
  }
  const whole = makeWholeGraph(g, state);
  const settings = {
    leafSize: options.leafSize ?? 200,
    balance: options.balance ?? 0.7,
    tries: options.tries ?? 2,
    runs: options.runs ?? 4,
    seed: options.seed ?? 1,
  };
  const { order, separators } = dissect(whole, settings, progress);
  const out = new Int32Array(n);
  const start = new Int32Array(order.length + 1);
  let at = 0;
  for (let k = 0; k < order.length; k++) {
    for (let p = whole.unknownPointer[order[k]]; p < whole.unknownPointer[order[k] + 1]; p++)
      out[at++] = whole.unknown[p];
    start[k + 1] = at;
  }
  for (const i of dense) out[at++] = i;
  out.set(held, at);
  return {
    order: asNewToOld(out),
    notes: dense.length > 0 ? [`${dense.length} dense rows set aside (more than ${limit} neighbours)`] : [],
    separators: separators.map((s) => ({ start: start[s.start], end: start[s.end], level: s.level })),
  };
};
