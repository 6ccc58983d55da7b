/**
 * The slow, obvious symbolic elimination on sets: the oracle for counts, trees and fill. For small sizes.
 */
import type { Pattern } from '../../engine/matrix/pattern.ts';

/** What elimination of A + Aᵀ + I in the given order (new-to-old, 0-based) produces. */
export interface NaiveElimination {
  /** column -> sorted rows of this column of L, diagonal first */
  readonly columns: number[][];
  /** column -> its parent in the elimination tree, −1 at a root */
  readonly parent: number[];
  /** nnz(L), diagonal counted once */
  readonly factorEntries: number;
  /** Cholesky operations, Σ cⱼ² */
  readonly operations: number;
  /** nodes on the longest path to a root */
  readonly treeHeight: number;
}

/** Eliminates one unknown after the other, joining its later neighbours pairwise (Rose 1972). */
export function naiveElimination(a: Pattern, order: ArrayLike<number>): NaiveElimination {
  const n = a.columns;
  const position = new Array<number>(n);
  for (let k = 0; k < n; k++) position[order[k]] = k;
  const later: Set<number>[] = Array.from({ length: n }, () => new Set<number>());
  for (let j = 0; j < n; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const k = position[a.rowIndex[p]];
      const l = position[j];
      if (k !== l) later[Math.min(k, l)].add(Math.max(k, l));
    }
  }
  const columns: number[][] = [];
  const parent: number[] = [];
  let factorEntries = 0;
  let operations = 0;
  for (let k = 0; k < n; k++) {
    const rest = [...later[k]].sort((x, y) => x - y);
    columns.push([k, ...rest]);
    parent.push(rest.length > 0 ? rest[0] : -1);
    for (let x = 0; x < rest.length; x++) {
      for (let y = x + 1; y < rest.length; y++) later[rest[x]].add(rest[y]);
    }
    const count = rest.length + 1;
    factorEntries += count;
    operations += count * count;
  }
  const depth = new Array<number>(n).fill(1);
  let treeHeight = 0;
  for (let k = n - 1; k >= 0; k--) {
    if (parent[k] >= 0) depth[k] = depth[parent[k]] + 1;
    treeHeight = Math.max(treeHeight, depth[k]);
  }
  return { columns, parent, factorEntries, operations, treeHeight };
}
