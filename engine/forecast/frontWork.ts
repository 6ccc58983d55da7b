import { type Arithmetic, denseOperations, type FactorKind } from '../symbolic/operations.ts';
import type { AssemblyTree } from '../symbolic/types.ts';

/** supernode -> operations of its front, padding included; complex ones counted as real ones. */
export function workOfFronts(kind: FactorKind, tree: AssemblyTree, arithmetic: Arithmetic = 'real'): Float64Array {
  const work = new Float64Array(tree.count);
  for (let s = 0; s < tree.count; s++) {
    work[s] = denseOperations(kind, tree.frontOrder[s], tree.firstColumn[s + 1] - tree.firstColumn[s], arithmetic);
  }
  return work;
}
