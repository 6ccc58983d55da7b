import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { transposePattern } from '../matrix/transpose.ts';
import { type ColumnRole, startColumnGraph, sweepColumns } from './columnMinimumDegreeStart.ts';
import { heldFlags } from './heldLast.ts';
import { eliminateByDegreeInPlace, linkInPlace } from './minimumDegreeOfGraph.ts';
import { ABSENT, collectOrder, FREE, HALO } from './minimumDegreeStart.ts';
import { NEXT } from './minimumDegreeWorkspace.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

export interface ColumnMinimumDegreeOptions extends OrderingOptions {
  /** rows with more entries are left out of account; default `denseLimit(columns)`; Infinity: none */
  readonly denseRowThreshold?: number;
  /** columns with more entries are ordered behind the others; default `denseLimit(min(rows, columns))`; Infinity: none */
  readonly denseColumnThreshold?: number;
}

/** max(16, 10·√n): Davis, Gilbert, Larimore & Ng 2004. */
export function denseLimit(n: number): number {
  return Math.max(16, Math.floor(10 * Math.sqrt(n)));
}

/**
 * Column approximate minimum degree for LU with row interchanges (Davis, Gilbert, Larimore & Ng 2004). Any shape; the order is one of
 * columns. It is the approximate minimum degree method on AᵀA without forming it: every row of A is an element of the first quotient graph
 * whose variables are its columns, so that eliminating a column merges the rows that hold it. Dense rows are left out of account; dense
 * columns come behind the others, then columns without entries, then the held-last ones.
 */
export function columnMinimumDegree(
  pattern: Pattern,
  options: ColumnMinimumDegreeOptions,
  progress: Progress,
): OrderingResult {
  const n = pattern.columns;
  const held = heldFlags(n, options.heldLast);
  const rowLimit = options.denseRowThreshold ?? denseLimit(n);
  const columnLimit = options.denseColumnThreshold ?? denseLimit(Math.min(n, pattern.rows));
  const byRow = transposePattern(pattern);
  const role: ColumnRole = { column: new Uint8Array(n).fill(FREE), row: new Uint8Array(pattern.rows) };
  const dense: number[] = [];
  const empty: number[] = [];
  for (let j = 0; j < n; j++) {
    const length = pattern.columnPointer[j + 1] - pattern.columnPointer[j];
    if (held !== null && held[j] === 1) role.column[j] = HALO;
    else if (length > columnLimit) dense.push(j);
    else if (length === 0) empty.push(j);
    if (role.column[j] === FREE && (length > columnLimit || length === 0)) role.column[j] = ABSENT;
  }
  let denseRows = 0;
  for (let i = 0; i < pattern.rows; i++) {
    if (byRow.columnPointer[i + 1] - byRow.columnPointer[i] <= rowLimit) continue;
    role.row[i] = ABSENT;
    denseRows++;
  }
  dense.sort((j, k) => lengthOf(pattern, j) - lengthOf(pattern, k) || j - k);
  const graph = startColumnGraph(pattern, byRow, role);
  const haloList = graph.layout.heads + 4 * (graph.totalWeight + 1) - NEXT;
  linkInPlace(graph, sweepColumns(graph), haloList);
  const pivots = eliminateByDegreeInPlace(graph, haloList, true, undefined, progress);
  const free = collectOrder(graph, pivots);
  const order = new Int32Array(n);
  order.set(free);
  order.set(dense, free.length);
  order.set(empty, free.length + dense.length);
  if (options.heldLast !== undefined) order.set(options.heldLast, n - options.heldLast.length);
  return { order: asNewToOld(order), notes: notesOf(denseRows, rowLimit, dense.length, columnLimit) };
}

function lengthOf(a: Pattern, j: number): number {
  return a.columnPointer[j + 1] - a.columnPointer[j];
}

function notesOf(rows: number, rowLimit: number, columns: number, columnLimit: number): string[] {
  const notes: string[] = [];
  const count = (k: number, word: string): string => `${k.toLocaleString('en')} dense ${word}${k === 1 ? '' : 's'}`;
  const limit = (k: number): string => `(more than ${k.toLocaleString('en')} entries)`;
  if (rows > 0) notes.push(`${count(rows, 'row')} left out of account ${limit(rowLimit)}`);
  if (columns > 0) notes.push(`${count(columns, 'column')} set aside ${limit(columnLimit)}`);
  return notes;
}
