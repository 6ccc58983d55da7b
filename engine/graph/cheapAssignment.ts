import type { Pattern } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';

/** degree of a matched line; decreasing it never reaches 1 */
const matched = -(2 ** 30);

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
  // lines: column j is j, row i is columns + i; a matched line has a degree far below 0, so that one look tells both
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
        if (degree[v] < 0) continue;
        j = v;
        i = freeOf(a, j, degree, columns);
      } else {
        if (degree[v] < 0) continue;
        i = v - columns;
        j = freeOf(t, i, degree, 0);
      }
      if (i < 0 || j < 0) continue;
    } else {
      while (nextColumn < columns && degree[nextColumn] <= 0) nextColumn++;
      if (nextColumn === columns) return size;
      j = nextColumn;
      i = rarestRow(a, j, degree);
    }
    columnOf[i] = j;
    rowOf[j] = i;
    degree[j] = degree[columns + i] = matched;
    size++;
    if ((size & 0x7fff) === 0) progress(size / columns, 'cheap assignment');
    // the two no longer count as free partners; whoever has one left becomes urgent
    const columnEnd = a.columnPointer[j + 1];
    for (let p = a.columnPointer[j]; p < columnEnd; p++) {
      const r = a.rowIndex[p];
      if (--degree[columns + r] === 1) waiting[top++] = columns + r;
    }
    const rowEnd = t.columnPointer[i + 1];
    for (let p = t.columnPointer[i]; p < rowEnd; p++) {
      const c = t.rowIndex[p];
      if (--degree[c] === 1) waiting[top++] = c;
    }
  }
}

/** The first free partner of line v of `m`, −1 if there is none; lines of the other kind start at `offset`. */
function freeOf(m: Pattern, v: number, degree: Int32Array, offset: number): number {
  const { columnPointer, rowIndex } = m;
  const end = columnPointer[v + 1];
  for (let p = columnPointer[v]; p < end; p++) if (degree[offset + rowIndex[p]] >= 0) return rowIndex[p];
  return -1;
}

function rarestRow(a: Pattern, j: number, degree: Int32Array): number {
  let best = -1;
  let fewest = 0;
  for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
    const i = a.rowIndex[p];
    const d = degree[a.columns + i];
    if (d >= 0 && (best < 0 || d < fewest)) {
      best = i;
      fewest = d;
    }
  }
  return best;
}
