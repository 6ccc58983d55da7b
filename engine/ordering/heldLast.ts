import { Fault } from '../matrix/fault.ts';
import { asNewToOld, type NewToOld } from '../matrix/permutation.ts';

/**
 * Which of n unknowns are held last: 1 for each of `heldLast`. Null when none are.
 * Throws `Fault` "held-last-out-of-range" or "held-last-repeated", unknown named 1-based as users count.
 */
export function heldFlags(n: number, heldLast: Int32Array | undefined): Uint8Array | null {
  if (heldLast === undefined || heldLast.length === 0) return null;
  const held = new Uint8Array(n);
  for (let k = 0; k < heldLast.length; k++) {
    const i = heldLast[k];
    if (!(i >= 0 && i < n)) {
      throw new Fault(
        'input',
        'held-last-out-of-range',
        `Unknown ${i + 1}, number ${k + 1} of the list of unknowns held last, is not between 1 and ${n}.`,
      );
    }
    if (held[i] === 1) {
      throw new Fault(
        'input',
        'held-last-repeated',
        `Unknown ${i + 1} stands twice in the list of unknowns held last.`,
        {
          row: i,
        },
      );
    }
    held[i] = 1;
  }
  return held;
}

/** The order with the given unknowns taken out and put at its end, in the order given. New-to-old; a new array unless none are held. */
export function withHeldLast(order: NewToOld, heldLast: Int32Array | undefined): NewToOld {
  const held = heldFlags(order.length, heldLast);
  if (held === null || heldLast === undefined) return order;
  const out = new Int32Array(order.length);
  let at = 0;
  for (let k = 0; k < order.length; k++) if (held[order[k]] === 0) out[at++] = order[k];
  out.set(heldLast, at);
  return asNewToOld(out);
}
