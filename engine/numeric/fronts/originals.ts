import { Fault } from '../../matrix/fault.ts';
import { entryCount } from '../../matrix/pattern.ts';
import type { Front } from './front.ts';
import type { FrontRun } from './run.ts';

/** Entries of a matrix sorted by the elimination step that meets them first (the smaller of internal row and column). */
export interface EntryList {
  /** internal column -> first entry; length n + 1 */
  readonly start: Int32Array;
  /** position -> entry of the matrix */
  readonly entry: Int32Array;
  /** position -> original column of that entry */
  readonly column: Int32Array;
}

/** Sorts the entries a run will assemble. Symmetric: those of the lower triangle in the tree's order only. Linear. */
export function listEntries(run: FrontRun): EntryList {
  const { matrix, rowPosition, columnPosition, size: n, symmetric } = run;
  const start = run.allocator.int32(n + 1);
  for (let j = 0; j < n; j++) {
    const c = columnPosition[j];
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++) {
      const r = rowPosition[matrix.rowIndex[p]];
      if (symmetric && r < c) continue;
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
      if (symmetric && r < c) continue;
      const q = next[r < c ? r : c]++;
      entry[q] = p;
      column[q] = j;
    }
  }
  return { start, entry, column };
}

/**
 * Adds the entries of A (scaled) that belong to the fully summed unknowns of the front's own columns to its panel.
 * Symmetric: lower trapezoid at `base`. LU: columns at `base` (m rows), rows transposed behind them (m − summed rows).
 */
export function addOriginals(run: FrontRun, list: EntryList, front: Front): void {
  const { m, summed, base } = front;
  const behind = base + m * summed;
  const below = m - summed;
  for (let q = list.start[front.first]; q < list.start[front.first + front.own]; q++) {
    const r = rowPlace(run, front, list, q);
    const c = columnPlace(run, front, list, q);
    let to: number;
    if (run.symmetric) to = base + c * m - ((c * (c + 1)) >> 1) + r;
    else if (c < summed) to = base + c * m + r;
    else to = behind + r * below + c - summed;
    addEntry(run, list, q, front.panel, to);
  }
}

/** Adds the entries of held own columns, which are not eliminated, to the contribution block whose place 0 is front place `gone`. */
export function addHeldOriginals(run: FrontRun, list: EntryList, front: Front, block: number, gone: number): void {
  const end = run.tree.firstColumn[front.s + 1];
  const s = front.m - gone;
  for (let q = list.start[front.first + front.own]; q < list.start[end]; q++) {
    const r = rowPlace(run, front, list, q) - gone;
    const c = columnPlace(run, front, list, q) - gone;
    const to = run.symmetric ? block + c * s - ((c * (c + 1)) >> 1) + r : block + c * s + r;
    addEntry(run, list, q, run.stack.array, to);
  }
}

function rowPlace(run: FrontRun, front: Front, list: EntryList, q: number): number {
  const r = run.rowPosition[run.matrix.rowIndex[list.entry[q]]];
  const place = run.localRow[r];
  if (place >= front.m || run.rowList[front.list + place] !== r) throw strange();
  return place;
}

function columnPlace(run: FrontRun, front: Front, list: EntryList, q: number): number {
  const c = run.columnPosition[list.column[q]];
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

function addEntry(run: FrontRun, list: EntryList, q: number, x: Float64Array, to: number): void {
  const { rowScale, columnScale } = run.options;
  const p = list.entry[q];
  const values = run.matrix.values as Float64Array;
  let f = 1;
  if (rowScale !== null) f = rowScale[run.matrix.rowIndex[p]];
  if (columnScale !== null) f *= columnScale[list.column[q]];
  if (run.kernels.width === 1) {
    x[to] += values[p] * f;
    return;
  }
  x[2 * to] += values[2 * p] * f;
  x[2 * to + 1] += values[2 * p + 1] * f;
}
