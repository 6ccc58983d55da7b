import { type Arithmetic, denseOperations, type FactorKind } from '../symbolic/operations.ts';
import type { AssemblyTree } from '../symbolic/types.ts';

/** What a factorization costs when a share of the pivots is handed up once. Modelled. */
export interface DelayedRow {
  /** share of the pivots, over all fronts that can hand them on, that fail in their front */
  readonly share: number;
  readonly storedFactorEntries: number;
  readonly operations: number;
  /** factor panels: scalars, one index list for each front */
  readonly bytes: number;
}

/** Widths in bytes. */
interface EntryWidths {
  readonly valueBytes: number;
  readonly indexBytes: number;
}

/**
 * Modelled growth when in every front that has a parent the given share of its pivots is delayed to it: the parent's front grows by that many
 * rows and pivots. Fractions are carried on from front to front, so that the share holds over all of them. Roots take what comes.
 */
export function delayedGrowth(
  kind: FactorKind,
  tree: AssemblyTree,
  arithmetic: Arithmetic = 'real',
  { valueBytes, indexBytes }: EntryWidths = { valueBytes: 8, indexBytes: 4 },
  shares: readonly number[] = [0, 0.01, 0.05, 0.2],
): readonly DelayedRow[] {
  return shares.map((share) => {
    const extra = new Int32Array(tree.count);
    let stored = 0;
    let operations = 0;
    let subscripts = 0;
    let carried = 0;
    for (let s = 0; s < tree.count; s++) {
      const planned = tree.firstColumn[s + 1] - tree.firstColumn[s] + extra[s];
      const m = tree.frontOrder[s] + extra[s];
      const wanted = tree.parent[s] < 0 ? 0 : share * planned + carried;
      const handed = Math.min(planned, Math.floor(wanted));
      if (tree.parent[s] >= 0) carried = wanted - handed;
      const p = planned - handed;
      if (tree.parent[s] >= 0) extra[tree.parent[s]] += handed;
      const half = p * m - (p * (p - 1)) / 2;
      stored += kind === 'lu' ? 2 * half - p : half;
      operations += denseOperations(kind, m, p, arithmetic);
      subscripts += m;
    }
    return { share, storedFactorEntries: stored, operations, bytes: valueBytes * stored + indexBytes * subscripts };
  });
}
