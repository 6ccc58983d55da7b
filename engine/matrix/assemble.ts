import type { Field, SparseMatrix } from './pattern.ts';

/** Coordinate entries in any order, duplicates allowed. 0-based. */
export interface Triplets {
  readonly rows: number;
  readonly columns: number;
  readonly field: Field;
  /** entry -> row */
  readonly row: Int32Array;
  /** entry -> column; same length as `row` */
  readonly column: Int32Array;
  /** one double an entry (two for complex, real part first), or null for a pattern */
  readonly values: Float64Array | null;
}

/**
 * Compressed columns of a set of triplets: sorted by row, duplicates summed in input order. A sum of exactly zero stays an entry.
 * Two stable counting sorts (by row, then by column), so linear in entries + rows + columns.
 * @returns the matrix and how many triplets were merged into another one.
 */
export function assemble(t: Triplets): { matrix: SparseMatrix; duplicates: number } {
  const count = t.row.length;
  const width = t.values === null ? 0 : t.field === 'complex' ? 2 : 1;
  const byRow = countingSort(t.row, t.rows, null);
  const perm = countingSort(t.column, t.columns, byRow);
  const columnPointer = new Int32Array(t.columns + 1);
  const rowIndex = new Int32Array(count);
  const values = t.values === null ? null : new Float64Array(count * width);
  let fill = 0;
  let k = 0;
  for (let j = 0; j < t.columns; j++) {
    columnPointer[j] = fill;
    const start = fill;
    for (; k < count && t.column[perm[k]] === j; k++) {
      const e = perm[k];
      const i = t.row[e];
      const same = fill > start && rowIndex[fill - 1] === i;
      const q = same ? fill - 1 : fill++;
      rowIndex[q] = i;
      if (values === null || t.values === null) continue;
      for (let w = 0; w < width; w++) {
        const v = t.values[e * width + w];
        values[q * width + w] = same ? values[q * width + w] + v : v;
      }
    }
  }
  columnPointer[t.columns] = fill;
  const matrix: SparseMatrix = {
    rows: t.rows,
    columns: t.columns,
    columnPointer,
    rowIndex: fill === count ? rowIndex : rowIndex.slice(0, fill),
    field: t.field,
    values: values === null ? null : fill === count ? values : values.slice(0, fill * width),
  };
  return { matrix, duplicates: count - fill };
}

/** Stable order of entries by key; `before` is the order to refine, or null for 0, 1, 2, … */
function countingSort(key: Int32Array, range: number, before: Int32Array | null): Int32Array {
  const next = new Int32Array(range + 1);
  for (let e = 0; e < key.length; e++) next[key[e] + 1]++;
  for (let r = 0; r < range; r++) next[r + 1] += next[r];
  const out = new Int32Array(key.length);
  for (let k = 0; k < key.length; k++) {
    const e = before === null ? k : before[k];
    out[next[key[e]]++] = e;
  }
  return out;
}
