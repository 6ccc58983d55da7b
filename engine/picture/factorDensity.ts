import type { Pattern } from '../matrix/pattern.ts';
import type { NewToOld, OldToNew } from '../matrix/permutation.ts';
import type { RowIntervals } from '../symbolic/rowIntervals.ts';
import { countPatternInto } from './patternDensity.ts';
import { cellStart, cellTable, type DensityMap, emptyMap, type PictureWindow } from './window.ts';

export interface FactorPicture {
  readonly matrix: Pattern;
  /** effective order, both sides */
  readonly order: NewToOld;
  readonly position: OldToNew;
  readonly rows: RowIntervals;
  /** "lower": L only, and only that half of the matrix; "both": L and its mirror */
  readonly half: 'lower' | 'both';
}

/** Intervals formed in one picture beyond which only a share of the rows is counted. */
export const pictureWorkLimit = 2e7;
/** rows looked at to estimate the work of a picture */
const probes = 200;

/** Density of the factor in a window: entries of the matrix and fill-in apart. Costs the intervals of the window's rows (and columns, when both). */
export function factorDensity(
  f: FactorPicture,
  window: PictureWindow,
  cellRows: number,
  cellColumns: number,
  workLimit = pictureWorkLimit,
): DensityMap {
  const map = emptyMap(window, cellRows, cellColumns);
  const total = map.fill;
  const lowerStride = addLower(f.rows, window, cellRows, cellColumns, total, false, workLimit);
  let stride = lowerStride;
  if (f.half === 'both') {
    const mirrored = {
      rowStart: window.columnStart,
      rowEnd: window.columnEnd,
      columnStart: window.rowStart,
      columnEnd: window.rowEnd,
    };
    stride = Math.max(stride, addLower(f.rows, mirrored, cellColumns, cellRows, total, true, workLimit));
  }
  addDiagonal(window, cellRows, cellColumns, total);
  const { original } = map;
  if (f.half === 'both') countPatternInto(original, f.matrix, f.position, f.order, window, cellRows, cellColumns);
  else countLowerInto(original, f, window, cellRows, cellColumns);
  for (let c = 0; c < total.length; c++) total[c] = Math.max(0, Math.round(total[c]) - original[c]);
  return { ...map, kind: stride > 1 ? 'sampled' : 'exact' };
}

/**
 * Adds the strictly lower entries of L in `window` to `total`; transposed: to the mirrored cells of the other window.
 * @returns 1, or the stride by which rows were sampled
 */
function addLower(
  rows: RowIntervals,
  window: PictureWindow,
  cellRows: number,
  cellColumns: number,
  total: Float64Array,
  transposed: boolean,
  workLimit: number,
): number {
  const { rowStart, rowEnd, columnStart, columnEnd } = window;
  // rows above the window's first column hold nothing in it
  const from = Math.max(rowStart, columnStart);
  if (from >= rowEnd) return 1;
  const stride = strideFor(rows, from, rowEnd, workLimit);
  const width = columnEnd - columnStart;
  const rowCell = cellTable(rowEnd - rowStart, cellRows);
  const columnCell = cellTable(width, cellColumns);
  const start = Int32Array.from({ length: cellColumns + 1 }, (_, c) => cellStart(c, width, cellColumns));
  // full cells of a row of cells are kept as differences and summed when the row of cells is done
  const difference = new Float64Array(cellColumns + 1);
  const edge = new Float64Array(cellColumns);
  let current = -1;
  rows.reset();
  for (let i = from; i < rowEnd; i += stride) {
    const r = rowCell[i - rowStart];
    if (r !== current) {
      if (current >= 0) flush(current, difference, edge, start, total, cellRows, cellColumns, transposed, stride);
      current = r;
    }
    const used = rows.row(i);
    const list = rows.intervals;
    for (let k = 0; k < used; k += 2) {
      const a = Math.max(list[k], columnStart) - columnStart;
      const b = Math.min(list[k + 1], columnEnd - 1) - columnStart;
      if (a > b) continue;
      const ca = columnCell[a];
      const cb = columnCell[b];
      if (ca === cb) edge[ca] += b - a + 1;
      else {
        edge[ca] += start[ca + 1] - a;
        edge[cb] += b - start[cb] + 1;
        difference[ca + 1]++;
        difference[cb]--;
      }
    }
  }
  if (current >= 0) flush(current, difference, edge, start, total, cellRows, cellColumns, transposed, stride);
  return stride;
}

function flush(
  r: number,
  difference: Float64Array,
  edge: Float64Array,
  start: Int32Array,
  total: Float64Array,
  cellRows: number,
  cellColumns: number,
  transposed: boolean,
  stride: number,
): void {
  let full = 0;
  for (let c = 0; c < cellColumns; c++) {
    full += difference[c];
    const count = (full * (start[c + 1] - start[c]) + edge[c]) * stride;
    if (count !== 0) total[transposed ? c * cellRows + r : r * cellColumns + c] += count;
    difference[c] = 0;
    edge[c] = 0;
  }
  difference[cellColumns] = 0;
}

/** How many rows to go on by so that the work stays near the limit, judged from a few rows spread over the window. */
function strideFor(rows: RowIntervals, from: number, to: number, workLimit: number): number {
  const count = to - from;
  if (count <= 2 * probes) return 1;
  rows.reset();
  let work = 0;
  for (let k = 0; k < probes; k++) work += 4 + rows.row(from + Math.floor((k * count) / probes)) / 2;
  return Math.max(1, Math.ceil(((work / probes) * count) / workLimit));
}

function addDiagonal(w: PictureWindow, cellRows: number, cellColumns: number, total: Float64Array): void {
  const rowCell = cellTable(w.rowEnd - w.rowStart, cellRows);
  const columnCell = cellTable(w.columnEnd - w.columnStart, cellColumns);
  const end = Math.min(w.rowEnd, w.columnEnd);
  for (let i = Math.max(w.rowStart, w.columnStart); i < end; i++) {
    total[rowCell[i - w.rowStart] * cellColumns + columnCell[i - w.columnStart]]++;
  }
}

/** The lower half of the permuted matrix, diagonal included; an entry whose mirror is not stored counts too. */
function countLowerInto(
  count: Float64Array,
  f: FactorPicture,
  w: PictureWindow,
  cellRows: number,
  cellColumns: number,
): void {
  const rowCell = cellTable(w.rowEnd - w.rowStart, cellRows);
  const columnCell = cellTable(w.columnEnd - w.columnStart, cellColumns);
  const { matrix, order, position } = f;
  for (let l = w.columnStart; l < w.columnEnd; l++) {
    const j = order[l];
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++) {
      const k = position[matrix.rowIndex[p]];
      if (k >= l && k >= w.rowStart && k < w.rowEnd)
        count[rowCell[k - w.rowStart] * cellColumns + columnCell[l - w.columnStart]]++;
    }
  }
}
