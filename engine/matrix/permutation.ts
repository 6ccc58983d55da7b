/**
 * Permutations with their direction in the type: the two directions have the same shape and are confused for ever otherwise.
 */

declare const direction: unique symbol;

/** `order[k] = i`: position k of the reordered system holds the original unknown i; (P A Pᵀ)(k,l) = A(order[k], order[l]). */
export type NewToOld = Int32Array & { readonly [direction]: 'new-to-old' };

/** `position[i] = k`: the original unknown i goes to position k. The inverse of a `NewToOld`. */
export type OldToNew = Int32Array & { readonly [direction]: 'old-to-new' };

/** States that `indices` is a new-to-old order. Does not copy and does not check; see `checkPermutation`. */
export function asNewToOld(indices: Int32Array): NewToOld {
  return indices as NewToOld;
}

/** States that `indices` is an old-to-new position. Does not copy and does not check. */
export function asOldToNew(indices: Int32Array): OldToNew {
  return indices as OldToNew;
}

/** The identity of size n, which is its own inverse. */
export function identityOrder(n: number): NewToOld {
  const order = new Int32Array(n);
  for (let i = 0; i < n; i++) order[i] = i;
  return asNewToOld(order);
}

function inverse(p: Int32Array): Int32Array {
  const q = new Int32Array(p.length);
  for (let k = 0; k < p.length; k++) q[p[k]] = k;
  return q;
}

/** Old-to-new of a new-to-old. */
export function positionOf(order: NewToOld): OldToNew {
  return asOldToNew(inverse(order));
}

/** New-to-old of an old-to-new. */
export function orderOf(position: OldToNew): NewToOld {
  return asNewToOld(inverse(position));
}

/** The order that applies `first` and then `second`: result[k] = first[second[k]]. */
export function composeOrders(first: NewToOld, second: NewToOld): NewToOld {
  const n = first.length;
  const out = new Int32Array(n);
  for (let k = 0; k < n; k++) out[k] = first[second[k]];
  return asNewToOld(out);
}
