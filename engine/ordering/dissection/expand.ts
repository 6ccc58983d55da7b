import { asNewToOld } from '../../matrix/permutation.ts';
import type { OrderingResult } from '../ordering.ts';
import type { SeparatorRange } from './recursion.ts';
import type { WholeGraph } from './wholeGraph.ts';

/** From vertices of the whole graph to unknowns: dense rows behind, held ones last. */
export function expandToUnknowns(
  whole: WholeGraph,
  order: Int32Array,
  separators: readonly SeparatorRange[],
  dense: Int32Array,
  held: Int32Array,
  notes: string[],
): OrderingResult {
  const { unknownPointer, unknown } = whole;
  const out = new Int32Array(unknown.length + dense.length);
  const start = new Int32Array(order.length + 1);
  let at = 0;
  for (let k = 0; k < order.length; k++) {
    for (let p = unknownPointer[order[k]]; p < unknownPointer[order[k] + 1]; p++) out[at++] = unknown[p];
    start[k + 1] = at;
  }
  out.set(dense, at);
  out.set(held, at + dense.length);
  return {
    order: asNewToOld(out),
    notes,
    separators: separators.map((s) => ({ start: start[s.start], end: start[s.end], level: s.level })),
  };
}
