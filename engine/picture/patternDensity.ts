import type { Pattern } from '../matrix/pattern.ts';
import type { NewToOld, OldToNew } from '../matrix/permutation.ts';
import { cellTable, type DensityMap, emptyMap, type PictureWindow } from './window.ts';

/**
 * Density of P·A·Q in a window: entry A(i,j) is drawn at (rowPosition[i], k) with columnOrder[k] = j.
 * Costs the entries of the columns in the window, memory by cells and by the window's rows.
 */
export function patternDensity(
  a: Pattern,
  rowPosition: OldToNew | null,
  columnOrder: NewToOld | null,
  window: PictureWindow,
  cellRows: number,
  cellColumns: number,
): DensityMap {
  const map = emptyMap(window, cellRows, cellColumns);
  countPatternInto(map.original, a, rowPosition, columnOrder, window, cellRows, cellColumns);
  return map;
}

/** Adds the counts of `patternDensity` to `count` (cellRows · cellColumns cells). */
export function countPatternInto(
  count: Float64Array,
  a: Pattern,
  rowPosition: OldToNew | null,
  columnOrder: NewToOld | null,
  window: PictureWindow,
  cellRows: number,
  cellColumns: number,
): void {
  const { rowStart, rowEnd, columnStart, columnEnd } = window;
  const rowCell = cellTable(rowEnd - rowStart, cellRows);
  const columnCell = cellTable(columnEnd - columnStart, cellColumns);
  for (let k = columnStart; k < columnEnd; k++) {
    const j = columnOrder === null ? k : columnOrder[k];
    const c = columnCell[k - columnStart];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = rowPosition === null ? a.rowIndex[p] : rowPosition[a.rowIndex[p]];
      if (i >= rowStart && i < rowEnd) count[rowCell[i - rowStart] * cellColumns + c]++;
    }
  }
}
