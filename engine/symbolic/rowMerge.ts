import type { Pattern } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import { postorder } from './postorder.ts';

/** Bound on the factors of A·Q under every sequence of row interchanges. Columns are positions of the column order. */
export interface RowMergeBound {
  /** column -> parent in the row-merge forest, −1 where no row is left over; parent > column */
  readonly parent: Int32Array;
  /** column -> most entries of this column of L, diagonal included */
  readonly lower: Int32Array;
  /** column -> most entries of this row of U, diagonal included */
  readonly upper: Int32Array;
  /** Σ lower */
  readonly lowerEntries: number;
  /** Σ upper */
  readonly upperEntries: number;
}

/**
 * Row-merge bound (George & Ng 1985, 1987; Gilbert & Ng 1993): at each step all rows that may be the pivot row take the union of their
 * structures, one of them leaves as the row of U. Counted without forming AᵀA (Gilbert, Li, Ng & Peyton 2001): eliminating the leftmost
 * column of a row joins its other columns, so the star of a row stands for its clique. Near-linear in entries. Where the last
 * row of a group leaves, the group ends and fills nothing further, so the bound can be below that of the Cholesky factor of AᵀA.
 * The diagonal should be free of zeros (permute rows by a matching first); a column without a candidate row counts its diagonal.
 * @param a any number of rows, as many columns as `columnOrder`
 */
export function rowMergeBound(a: Pattern, columnOrder: NewToOld): RowMergeBound {
  const n = a.columns;
  const leftmost = leftmostColumns(a, columnOrder);
  const { parent, lower } = rowMergeForest(a, columnOrder, leftmost);
  const upper = unionCounts(a, columnOrder, leftmost, parent);
  let lowerEntries = 0;
  let upperEntries = 0;
  for (let k = 0; k < n; k++) {
    lowerEntries += lower[k];
    upperEntries += upper[k];
  }
  return { parent, lower, upper, lowerEntries, upperEntries };
}

/** row -> position of its leftmost column, −1 for an empty row. */
function leftmostColumns(a: Pattern, columnOrder: NewToOld): Int32Array {
  const leftmost = new Int32Array(a.rows).fill(-1);
  for (let k = 0; k < a.columns; k++) {
    const j = columnOrder[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (leftmost[a.rowIndex[p]] < 0) leftmost[a.rowIndex[p]] = k;
    }
  }
  return leftmost;
}

/** Forest and rows that take part at each column: own rows, and what the children leave over. */
function rowMergeForest(
  a: Pattern,
  columnOrder: NewToOld,
  leftmost: Int32Array,
): { parent: Int32Array; lower: Int32Array } {
  const n = a.columns;
  const parent = new Int32Array(n).fill(-1);
  const ancestor = new Int32Array(n).fill(-1);
  const lower = new Int32Array(n);
  for (let i = 0; i < a.rows; i++) if (leftmost[i] >= 0) lower[leftmost[i]]++;
  // row -> the last column that its group is known to have joined: the way to the root is shorter from there
  const joined = leftmost.slice();
  for (let k = 0; k < n; k++) {
    const j = columnOrder[k];
    for (let p = a.columnPointer[j], end = a.columnPointer[j + 1]; p < end; p++) {
      const i = a.rowIndex[p];
      const f = joined[i];
      let r = f;
      while (r !== k && ancestor[r] >= 0) r = ancestor[r];
      if (r === k) {
        shorten(ancestor, f, k, k);
        joined[i] = k;
        continue;
      }
      // a group of one row left with it: nothing goes on, its tree keeps its root
      const goesOn = lower[r] > 1;
      shorten(ancestor, f, r, goesOn ? k : r);
      if (!goesOn) continue;
      joined[i] = k;
      ancestor[r] = k;
      parent[r] = k;
      lower[k] += lower[r] - 1;
    }
    if (lower[k] === 0) lower[k] = 1;
  }
  return { parent, lower };
}

/** Lets every node on the way from `from` to `top` (not `top` itself) point to `to`. */
function shorten(ancestor: Int32Array, from: number, top: number, to: number): void {
  for (let r = from; r !== top; ) {
    const up = ancestor[r];
    ancestor[r] = to;
    r = up;
  }
}

/**
 * Columns in the union at each step: the counts of Gilbert, Ng & Peyton 1994 on the stars, in a forest that may be cut.
 * A path counts from its leaf up to where it meets the path of the leaf before, or to the root of its tree, or to its own column.
 */
function unionCounts(a: Pattern, columnOrder: NewToOld, leftmost: Int32Array, parent: Int32Array): Int32Array {
  const n = a.columns;
  const { pointer, target } = stars(a, columnOrder, leftmost);
  const { post, first, tree } = postorderOf(parent);
  const weight = new Int32Array(n).fill(1);
  for (let k = 0; k < n; k++) if (parent[k] >= 0) weight[parent[k]] = 0;
  const lastNeighbour = new Int32Array(n).fill(-1);
  const lastLeaf = new Int32Array(n).fill(-1);
  const set = new Int32Array(n);
  for (let k = 0; k < n; k++) set[k] = k;
  for (let t = 0; t < n; t++) {
    const k = post[t];
    const up = parent[k];
    // the path of column k itself ends at k
    if (up >= 0) weight[up]--;
    for (let p = pointer[k]; p < pointer[k + 1]; p++) {
      const l = target[p];
      if (first[k] > lastNeighbour[l]) {
        weight[k]++;
        const leaf = lastLeaf[l];
        if (leaf >= 0 && tree[leaf] === tree[k]) {
          let q = leaf;
          while (set[q] !== q) {
            set[q] = set[set[q]];
            q = set[q];
          }
          weight[q]--;
        }
        lastLeaf[l] = k;
      }
      lastNeighbour[l] = t;
    }
    if (up >= 0) set[k] = up;
  }
  for (let t = 0; t < n; t++) {
    const k = post[t];
    if (parent[k] >= 0) weight[parent[k]] += weight[k];
  }
  return weight;
}

/** leftmost column -> the other columns of its rows (repeats allowed). */
function stars(a: Pattern, columnOrder: NewToOld, leftmost: Int32Array): { pointer: Int32Array; target: Int32Array } {
  const n = a.columns;
  const pointer = new Int32Array(n + 1);
  for (let k = 0; k < n; k++) {
    const j = columnOrder[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const f = leftmost[a.rowIndex[p]];
      if (f !== k) pointer[f + 1]++;
    }
  }
  for (let k = 0; k < n; k++) pointer[k + 1] += pointer[k];
  const next = pointer.slice(0, n);
  const target = new Int32Array(pointer[n]);
  for (let k = 0; k < n; k++) {
    const j = columnOrder[k];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const f = leftmost[a.rowIndex[p]];
      if (f !== k) target[next[f]++] = k;
    }
  }
  return { pointer, target };
}

/** Postorder of a forest, with the postorder position of each subtree's first node and the root of each node's tree. */
function postorderOf(parent: Int32Array): { post: Int32Array; first: Int32Array; tree: Int32Array } {
  const n = parent.length;
  const post = postorder(parent);
  const first = new Int32Array(n).fill(-1);
  for (let t = 0; t < n; t++) {
    const k = post[t];
    if (first[k] < 0) first[k] = t;
    const up = parent[k];
    if (up >= 0 && first[up] < 0) first[up] = first[k];
  }
  const tree = new Int32Array(n);
  for (let k = n - 1; k >= 0; k--) tree[k] = parent[k] < 0 ? k : tree[parent[k]];
  return { post, first, tree };
}
