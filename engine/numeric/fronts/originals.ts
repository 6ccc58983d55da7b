import { Fault } from '../../matrix/fault.ts';
import { entryCount } from '../../matrix/pattern.ts';
import type { Front } from './front.ts';
import type { FrontRun } from './run.ts';

/**
 * Entries of an unsymmetric matrix sorted by the elimination step that meets them first (the smaller of internal row and column): a
 * front needs rows as well as columns. Symmetric kinds need columns only and read the matrix as it is.
 */
export interface EntryList {
  /** internal column -> first entry; length n + 1 */
  readonly start: Int32Array;
  /** position -> entry of the matrix */
  readonly entry: Int32Array;
  /** position -> original column of that entry */
  readonly column: Int32Array;
}

/** Sorts the entries a run will assemble; null for the symmetric kinds. Linear. */
export function listEntries(run: FrontRun): EntryList | null {
  const { matrix, rowPosition, columnPosition, size: n } = run;
  if (run.symmetric) return null;
  const start = run.allocator.int32(n + 1);
  for (let j = 0; j < n; j++) {
    const c = columnPosition[j];
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++) {
      const r = rowPosition[matrix.rowIndex[p]];
      start[(r < c ? r : c) + 1]++;
    }
  }
  for (let c = 0; c < n; c++) start[c + 1] += start[c];
  const next = start.slice(0, n);
  const entry = run.allocator.int32(entryCount(matrix));
  const column = run.allocator.int32(entry.length);
  for (let j = 0; j < n; j++) {
    const c = columnPosition[j];
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++) {
      const r = rowPosition[matrix.rowIndex[p]];
      const q = next[r < c ? r : c]++;
      entry[q] = p;
      column[q] = j;
    }
  }
  return { start, entry, column };
}

/**
 * Adds the entries of A (scaled) that belong to the front's own fully summed columns (and, for LU, rows) to its panel.
 * Symmetric: lower trapezoid at `base`. LU: columns at `base` (m rows), rows transposed behind them (m − summed rows).
 */
export function addOriginals(run: FrontRun, list: EntryList | null, front: Front): void {
  const end = front.first + front.own;
  if (list === null) addColumns(run, front, front.panel, front.base, 0, front.first, end);
  else addListed(run, list, front);
}

/** Adds the entries of held own columns, which are not eliminated, to the contribution block whose place 0 is front place `gone`. */
export function addHeldOriginals(
  run: FrontRun,
  list: EntryList | null,
  front: Front,
  block: number,
  gone: number,
): void {
  const end = run.tree.firstColumn[front.s + 1];
  const begin = front.first + front.own;
  if (list === null) {
    addColumns(run, front, run.stack.array, block, gone, begin, end);
    return;
  }
  const s = front.m - gone;
  for (let q = list.start[begin]; q < list.start[end]; q++) {
    const r = rowPlace(run, front, run.rowPosition[run.matrix.rowIndex[list.entry[q]]]) - gone;
    const c = columnPlace(run, front, run.columnPosition[list.column[q]]) - gone;
    addEntry(run, list.entry[q], list.column[q], run.stack.array, block + c * s + r);
  }
}

/** Lower parts of internal columns begin … end − 1 into a packed lower trapezoid at `base` whose place 0 is front place `gone`. */
function addColumns(
  run: FrontRun,
  front: Front,
  x: Float64Array,
  base: number,
  gone: number,
  begin: number,
  end: number,
): void {
  const { rowPosition, localRow, rowList, tree } = run;
  const { columnPointer, rowIndex } = run.matrix;
  const values = run.matrix.values as Float64Array;
  const plain = run.kernels.width === 1 && run.options.rowScale === null;
  const s = front.m - gone;
  for (let c = begin; c < end; c++) {
    const j = tree.order[c];
    const column = localRow[c] - gone;
    const to = base + column * s - ((column * (column + 1)) >> 1) - gone;
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const r = rowPosition[rowIndex[p]];
      if (r < c) continue;
      const place = localRow[r];
      if (place >= front.m || rowList[front.list + place] !== r) throw strange();
      if (plain) x[to + place] += values[p];
      else addEntry(run, p, j, x, to + place);
    }
  }
}

function addListed(run: FrontRun, list: EntryList, front: Front): void {
  const { m, summed, base, panel } = front;
  const behind = base + m * summed;
  const below = m - summed;
  const { rowPosition, columnPosition } = run;
  const { rowIndex } = run.matrix;
  const values = run.matrix.values as Float64Array;
  const { rowScale, columnScale } = run.options;
  const plain = run.kernels.width === 1 && rowScale === null && columnScale === null;
  for (let q = list.start[front.first]; q < list.start[front.first + front.own]; q++) {
    const p = list.entry[q];
    const r = rowPlace(run, front, rowPosition[rowIndex[p]]);
    const c = columnPlace(run, front, columnPosition[list.column[q]]);
    const to = c < summed ? base + c * m + r : behind + r * below + c - summed;
    if (plain) panel[to] += values[p];
    else addEntry(run, p, list.column[q], panel, to);
  }
}

function rowPlace(run: FrontRun, front: Front, r: number): number {
  const place = run.localRow[r];
  if (place >= front.m || run.rowList[front.list + place] !== r) throw strange();
  return place;
}

function columnPlace(run: FrontRun, front: Front, c: number): number {
  const place = run.localColumn[c];
  if (place >= front.m || run.columnList[front.list + place] !== c) throw strange();
  return place;
}

function strange(): Fault {
  return new Fault(
    'input',
    'tree-of-another-pattern',
    'The matrix has an entry that the assembly tree does not foresee: the tree belongs to another pattern. Analyse this matrix anew.',
  );
}

/** Adds entry p, of original column j, scaled, to scalar `to` of x. */
function addEntry(run: FrontRun, p: number, j: number, x: Float64Array, to: number): void {
  const { rowScale, columnScale } = run.options;
  const values = run.matrix.values as Float64Array;
  let f = 1;
  if (rowScale !== null) f = rowScale[run.matrix.rowIndex[p]];
  if (columnScale !== null) f *= columnScale[j];
  if (run.kernels.width === 1) {
    x[to] += values[p] * f;
    return;
  }
  x[2 * to] += values[2 * p] * f;
  x[2 * to + 1] += values[2 * p + 1] * f;
}
