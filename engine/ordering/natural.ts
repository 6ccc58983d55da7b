import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { withHeldLast } from './heldLast.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

/** The unknowns as they come: 0, 1, 2, …, held-last ones moved to the end. Any shape; length = columns. */
export function natural(pattern: Pattern, options: OrderingOptions, _progress: Progress): OrderingResult {
  const order = new Int32Array(pattern.columns);
  for (let i = 0; i < order.length; i++) order[i] = i;
  return { order: withHeldLast(asNewToOld(order), options.heldLast), notes: [] };
}
