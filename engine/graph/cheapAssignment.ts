import type { Pattern } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';

/**
 * A first matching that leaves little to improve (Karp & Sipser 1981): as long as some row or column has a single free partner left,
 * the two are matched, which never costs a pair; else the next free column takes its free row with the fewest free columns.
 * Linear: every line is scanned at most twice. `t` is the pattern of Aᵀ. Fills `columnOf` and `rowOf` (all −1 at the start),
 * returns the number of pairs.
 */
export function assignInto(
  columnOf: Int32Array,
  rowOf: Int32Array,
  a: Pattern,
  t: Pattern,
  progress: Progress = noProgress,
): number {
  const { rows, columns } = a;
  // lines: column j is j, row i is columns + i
  const degree = new Int32Array(columns + rows);
  const waiting = new Int32Array(columns + rows);
  let top = 0;
  for (let j = 0; j < columns; j++) degree[j] = a.columnPointer[j + 1] - a.columnPointer[j];
  for (let i = 0; i < rows; i++) degree[columns + i] = t.columnPointer[i + 1] - t.columnPointer[i];
  for (let v = columns + rows - 1; v >= 0; v--) if (degree[v] === 1) waiting[top++] = v;
  let size = 0;
  let nextColumn = 0;
  for (;;) {
    let i = -1;
    let j = -1;
    if (top > 0) {
      const v = waiting[--top];
      if (v < columns) {
        if (rowOf[v] >= 0) continue;
        j = v;
        i = freeOf(a, j, columnOf);
      } else {
        if (columnOf[v - columns] >= 0) continue;
        i = v - columns;
        j = freeOf(t, i, rowOf);
      }
      if (i < 0 || j < 0) continue;
    } else {
      while (nextColumn < columns && (rowOf[nextColumn] >= 0 || degree[nextColumn] === 0)) nextColumn++;
      if (nextColumn === columns) return size;
      j = nextColumn;
      i = rarestRow(a, j, columnOf, degree);
    }
    columnOf[i] = j;
    rowOf[j] = i;
    size++;
    if ((size & 0x7fff) === 0) progress(size / columns, 'cheap assignment');
    // the two no longer count as free partners; whoever has one left becomes urgent
    const columnEnd = a.columnPointer[j + 1];
    for (let p = a.columnPointer[j]; p < columnEnd; p++) {
      const r = a.rowIndex[p];
      if (--degree[columns + r] === 1 && columnOf[r] < 0) waiting[top++] = columns + r;
    }
    const rowEnd = t.columnPointer[i + 1];
    for (let p = t.columnPointer[i]; p < rowEnd; p++) {
      const c = t.rowIndex[p];
      if (--degree[c] === 1 && rowOf[c] < 0) waiting[top++] = c;
    }
  }
}

/** The first free partner of line v of `m`, −1 if there is none. */
function freeOf(m: Pattern, v: number, partner: Int32Array): number {
  for (let p = m.columnPointer[v]; p < m.columnPointer[v + 1]; p++)
    if (partner[m.rowIndex[p]] < 0) return m.rowIndex[p];
  return -1;
}

function rarestRow(a: Pattern, j: number, columnOf: Int32Array, degree: Int32Array): number {
  let best = -1;
  let fewest = 0;
  for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
    const i = a.rowIndex[p];
    if (columnOf[i] >= 0) continue;
    const d = degree[a.columns + i];
    if (best < 0 || d < fewest) {
      best = i;
      fewest = d;
    }
  }
  return best;
}
