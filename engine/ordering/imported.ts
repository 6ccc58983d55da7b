import { Fault } from '../matrix/fault.ts';
import { asNewToOld, asOldToNew, orderOf } from '../matrix/permutation.ts';
import { withHeldLast } from './heldLast.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

/** Which way an imported permutation is to be read: see engine/matrix/permutation.ts. */
export type Direction = 'new-to-old' | 'old-to-new';

/**
 * A permutation the user brought, as an ordering. `indices`: n integers, 0-based, in the stated direction; copied, not kept.
 * Throws `Fault` "permutation-length", "permutation-out-of-range" or "permutation-repeated" that names the first bad position (1-based).
 */
export function imported(
  indices: Int32Array,
  direction: Direction,
  n: number,
  options: OrderingOptions = {},
): OrderingResult {
  checkImported(indices, n);
  const order = direction === 'new-to-old' ? asNewToOld(indices.slice()) : orderOf(asOldToNew(indices));
  return { order: withHeldLast(order, options.heldLast), notes: [`Imported permutation, read as ${direction}`] };
}

/** Both readings of a permutation whose file does not state its direction. `same`: it is its own inverse, so both are one. */
export function importedBothWays(
  indices: Int32Array,
  n: number,
  options: OrderingOptions = {},
): { readonly newToOld: OrderingResult; readonly oldToNew: OrderingResult; readonly same: boolean } {
  const newToOld = imported(indices, 'new-to-old', n, options);
  const oldToNew = imported(indices, 'old-to-new', n, options);
  return { newToOld, oldToNew, same: newToOld.order.every((i, k) => i === oldToNew.order[k]) };
}

function checkImported(indices: Int32Array, n: number): void {
  if (indices.length !== n) {
    throw new Fault(
      'input',
      'permutation-length',
      `The permutation has ${indices.length} values; this matrix needs ${n}, one for each unknown.`,
    );
  }
  const firstAt = new Int32Array(n).fill(-1);
  for (let k = 0; k < n; k++) {
    const i = indices[k];
    if (!(i >= 0 && i < n)) {
      throw new Fault(
        'input',
        'permutation-out-of-range',
        `Value ${k + 1} of the permutation, counted from 1, is not one of the ${n} unknowns.`,
      );
    }
    if (firstAt[i] >= 0) {
      throw new Fault(
        'input',
        'permutation-repeated',
        `Value ${k + 1} of the permutation repeats value ${firstAt[i] + 1}: both stand for unknown ${i + 1} (counted from 1).`,
      );
    }
    firstAt[i] = k;
  }
}
