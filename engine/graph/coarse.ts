import type { Pattern } from '../matrix/pattern.ts';
import { transposePattern } from '../matrix/transpose.ts';
import { type Matching, maximumTransversal } from './transversal.ts';

/** Rows and columns of one part, original numbers, increasing. */
export interface CoarsePart {
  readonly rows: Int32Array;
  readonly columns: Int32Array;
}

/** The Dulmage–Mendelsohn coarse decomposition; it does not depend on which maximum matching was used. */
export interface CoarseDecomposition {
  readonly structuralRank: number;
  /** more columns than rows (unless empty): what a free column reaches by alternating paths */
  readonly underdetermined: CoarsePart;
  /** as many rows as columns, perfectly matched */
  readonly wellDetermined: CoarsePart;
  /** more rows than columns (unless empty): what reaches a free row by alternating paths */
  readonly overdetermined: CoarsePart;
}

/**
 * Coarse decomposition of any pattern (Dulmage & Mendelsohn 1958; Pothen & Fan 1990). In the order under-, well-, overdetermined
 * the matrix is block upper triangular. Linear once the matching is known.
 */
export function coarseDecomposition(
  a: Pattern,
  matching: Matching = maximumTransversal(a),
  transposed: (() => Pattern) | null = null,
): CoarseDecomposition {
  const under = alternatingReach(a, matching.rowOf, matching.columnOf);
  const t = matching.size === a.rows ? null : transposed === null ? transposePattern(a) : transposed();
  const over = t === null ? null : alternatingReach(t, matching.columnOf, matching.rowOf);
  const overRows = over === null ? new Uint8Array(a.rows) : over.near;
  const overColumns = over === null ? new Uint8Array(a.columns) : over.far;
  return {
    structuralRank: matching.size,
    underdetermined: { rows: listed(under.far, 1), columns: listed(under.near, 1) },
    wellDetermined: { rows: listed(union(under.far, overRows), 0), columns: listed(union(under.near, overColumns), 0) },
    overdetermined: { rows: listed(overRows, 1), columns: listed(overColumns, 1) },
  };
}

/**
 * From each free column: to all rows of the column, from each row to the column matched with it, and so on.
 * `near` marks columns, `far` rows. With the transpose and the two halves of the matching exchanged it starts from free rows.
 */
function alternatingReach(a: Pattern, rowOf: Int32Array, columnOf: Int32Array): { near: Uint8Array; far: Uint8Array } {
  const near = new Uint8Array(a.columns);
  const far = new Uint8Array(a.rows);
  const queue = new Int32Array(a.columns);
  let tail = 0;
  for (let j = 0; j < a.columns; j++) {
    if (rowOf[j] >= 0) continue;
    near[j] = 1;
    queue[tail++] = j;
  }
  for (let head = 0; head < tail; head++) {
    const j = queue[head];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      if (far[i]) continue;
      far[i] = 1;
      // the matching is maximum: a row reached from a free column is matched
      const k = columnOf[i];
      if (near[k]) continue;
      near[k] = 1;
      queue[tail++] = k;
    }
  }
  return { near, far };
}

function union(a: Uint8Array, b: Uint8Array): Uint8Array {
  return a.map((x, i) => x | b[i]);
}

function listed(mark: Uint8Array, wanted: 0 | 1): Int32Array {
  let count = 0;
  for (let i = 0; i < mark.length; i++) if (mark[i] === wanted) count++;
  const out = new Int32Array(count);
  let q = 0;
  for (let i = 0; i < mark.length; i++) if (mark[i] === wanted) out[q++] = i;
  return out;
}
