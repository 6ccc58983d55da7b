import type { Pattern } from '../../engine/matrix/pattern.ts';

/** Pattern of AᵀA by rows of A. */
export function productPattern(a: Pattern): Pattern {
  const rows: number[][] = Array.from({ length: a.rows }, () => []);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) rows[a.rowIndex[p]].push(j);
  }
  const columns = Array.from({ length: a.columns }, () => new Set<number>());
  for (const row of rows) for (const j of row) for (const i of row) columns[j].add(i);
  const columnPointer = [0];
  const rowIndex: number[] = [];
  for (const c of columns) {
    rowIndex.push(...[...c].sort((x, y) => x - y));
    columnPointer.push(rowIndex.length);
  }
  const { columns: n } = a;
  return { rows: n, columns: n, columnPointer: Int32Array.from(columnPointer), rowIndex: Int32Array.from(rowIndex) };
}
