import type { Pattern } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';

/**
 * Elimination tree of AᵀA in a column order without forming it (Liu 1990; Gilbert & Ng 1993): column -> parent column, −1 at a root. The
 * columns of a row are a clique of AᵀA and lie on one path, so each joins the one before it in its row. A postorder of this tree keeps the
 * columns of every row in their order, and with them the factors under any row interchanges. Any shape; near-linear in entries.
 */
export function columnTree(a: Pattern, order: NewToOld): Int32Array {
  const n = a.columns;
  const parent = new Int32Array(n).fill(-1);
  const ancestor = new Int32Array(n).fill(-1);
  // row -> last column that met it, −1 at first
  const last = new Int32Array(a.rows).fill(-1);
  for (let k = 0; k < n; k++) {
    const j = order[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      let r = last[i];
      last[i] = k;
      while (r >= 0 && r !== k) {
        const up = ancestor[r];
        ancestor[r] = k;
        if (up < 0) parent[r] = k;
        r = up;
      }
    }
  }
  return parent;
}
