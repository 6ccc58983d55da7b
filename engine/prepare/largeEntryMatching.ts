import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { exponential, naturalLogarithm } from './logarithm.ts';
import { moduliOf } from './moduli.ts';
import { RowHeap } from './rowHeap.ts';
import type { Scaling } from './scaling.ts';

/** A matching of largest product with the scalings its dual variables give. Value-dependent. */
export interface LargeEntryMatching extends Scaling {
  /** column -> matched row, −1 if none */
  readonly rowOf: Int32Array;
  /** row -> matched column, −1 if none */
  readonly columnOf: Int32Array;
  /** pairs; fewer than the order when no full matching over entries that are not zero exists */
  readonly size: number;
  /** matched entries off the diagonal */
  readonly offDiagonal: number;
  /** Σ ln|matched entry|; the largest among all matchings when the matching is full */
  readonly logProduct: number;
}

/**
 * Row permutation that puts large entries on the diagonal: among all full matchings the one with the largest product of moduli,
 * and scalings R, C such that in R·A·C matched entries have modulus 1 and no entry is larger (Duff & Koster 1999, 2001; Olschowka &
 * Neumaier 1996). The assignment problem with costs ln maxₖ|aₖⱼ| − ln|aᵢⱼ| ≥ 0 is solved by shortest augmenting paths with
 * dual variables; entries that are exactly zero do not count. Where costs tie the diagonal is preferred.
 *
 * When no full matching exists the result has the largest possible size, and no entry of R·A·C is larger than 1 (rows and columns of
 * zeros keep the factor 1).
 */
export function largeEntryMatching(a: SparseMatrix, progress: Progress = noProgress): LargeEntryMatching {
  if (a.rows !== a.columns) {
    throw new Fault(
      'input',
      'not-square',
      `Matching large entries needs a square matrix; this one is ${a.rows} × ${a.columns}.`,
    );
  }
  const problem = assignmentProblem(a);
  const state = newState(a.columns);
  startDuals(problem, state);
  takeTight(problem, state);
  takeOneExchange(problem, state);
  const search = newSearch(a.columns);
  for (let j = 0; j < a.columns; j++) {
    if ((j & 0xff) === 0) progress(j / a.columns, 'matching large entries');
    if (state.rowOf[j] < 0) augment(problem, state, search, j);
  }
  return resultOf(problem, state);
}

/** Costs of the entries that are not zero, column by column. */
interface Assignment {
  readonly n: number;
  /** column -> first entry; length n + 1 */
  readonly pointer: Int32Array;
  /** entry -> row */
  readonly row: Int32Array;
  /** entry -> ln(largest of the column) − ln(modulus) ≥ 0 */
  readonly cost: Float64Array;
  /** column -> ln of its largest modulus */
  readonly columnLog: Float64Array;
}

function assignmentProblem(a: SparseMatrix): Assignment {
  const n = a.columns;
  const moduli = moduliOf(a);
  const pointer = new Int32Array(n + 1);
  const row = new Int32Array(moduli.length);
  const cost = new Float64Array(moduli.length);
  const columnLog = new Float64Array(n);
  let q = 0;
  for (let j = 0; j < n; j++) {
    let top = 0;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) if (moduli[p] > top) top = moduli[p];
    columnLog[j] = top > 0 ? naturalLogarithm(top) : 0;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (moduli[p] === 0) continue;
      row[q] = a.rowIndex[p];
      cost[q++] = moduli[p] === top ? 0 : Math.max(0, columnLog[j] - naturalLogarithm(moduli[p]));
    }
    pointer[j + 1] = q;
  }
  return { n, pointer, row, cost, columnLog };
}

/** Primal and dual variables: cost(i,j) − u[i] − v[j] ≥ 0 always, = 0 on matched entries. */
interface State {
  readonly u: Float64Array;
  readonly v: Float64Array;
  readonly rowOf: Int32Array;
  readonly columnOf: Int32Array;
  /** column -> cost of its matched entry */
  readonly matchedCost: Float64Array;
}

function newState(n: number): State {
  return {
    u: new Float64Array(n),
    v: new Float64Array(n),
    rowOf: new Int32Array(n).fill(-1),
    columnOf: new Int32Array(n).fill(-1),
    matchedCost: new Float64Array(n),
  };
}

function startDuals({ n, pointer, row, cost }: Assignment, { u, v }: State): void {
  u.fill(Infinity);
  for (let p = 0; p < pointer[n]; p++) if (cost[p] < u[row[p]]) u[row[p]] = cost[p];
  for (let i = 0; i < n; i++) if (u[i] === Infinity) u[i] = 0;
  for (let j = 0; j < n; j++) {
    let least = Infinity;
    for (let p = pointer[j]; p < pointer[j + 1]; p++) {
      const reduced = cost[p] - u[row[p]];
      if (reduced < least) least = reduced;
    }
    v[j] = least === Infinity ? 0 : least;
  }
}

function match(s: State, j: number, i: number, cost: number): void {
  s.rowOf[j] = i;
  s.columnOf[i] = j;
  s.matchedCost[j] = cost;
}

/** Takes entries of reduced cost zero: first on the diagonal, then the first free row of each column. */
function takeTight({ n, pointer, row, cost }: Assignment, s: State): void {
  for (const diagonalOnly of [true, false]) {
    for (let j = 0; j < n; j++) {
      if (s.rowOf[j] >= 0) continue;
      for (let p = pointer[j]; p < pointer[j + 1]; p++) {
        const i = row[p];
        if ((diagonalOnly && i !== j) || s.columnOf[i] >= 0 || cost[p] - s.u[i] - s.v[j] > 0) continue;
        match(s, j, i, cost[p]);
        break;
      }
    }
  }
}

/** Augmenting paths of length two over entries of reduced cost zero: a cheap step that saves most searches. */
function takeOneExchange({ n, pointer, row, cost }: Assignment, s: State): void {
  for (let j = 0; j < n; j++) {
    if (s.rowOf[j] >= 0) continue;
    search: for (let p = pointer[j]; p < pointer[j + 1]; p++) {
      const i = row[p];
      if (cost[p] - s.u[i] - s.v[j] > 0) continue;
      const other = s.columnOf[i];
      if (other < 0) {
        match(s, j, i, cost[p]);
        break;
      }
      for (let q = pointer[other]; q < pointer[other + 1]; q++) {
        const free = row[q];
        if (s.columnOf[free] >= 0 || cost[q] - s.u[free] - s.v[other] > 0) continue;
        match(s, other, free, cost[q]);
        match(s, j, i, cost[p]);
        break search;
      }
    }
  }
}

/** Workspace of the searches, reset by what was touched. */
interface Search {
  /** row -> length of the shortest path found so far */
  readonly distance: Float64Array;
  readonly heap: RowHeap;
  /** row -> column from which it was reached, and the cost of that entry */
  readonly from: Int32Array;
  readonly fromCost: Float64Array;
  /** row -> its path is final */
  readonly final: Uint8Array;
  readonly touched: Int32Array;
  readonly finished: Int32Array;
}

function newSearch(n: number): Search {
  const distance = new Float64Array(n).fill(Infinity);
  return {
    distance,
    heap: new RowHeap(n, distance),
    from: new Int32Array(n),
    fromCost: new Float64Array(n),
    final: new Uint8Array(n),
    touched: new Int32Array(n),
    finished: new Int32Array(n),
  };
}

/** Shortest augmenting path from a free column (Dijkstra 1959 on reduced costs), then the dual update that keeps it tight. */
function augment({ pointer, row, cost }: Assignment, s: State, w: Search, start: number): void {
  const { distance, heap, from, fromCost, final, touched, finished } = w;
  let touchedCount = 0;
  let finishedCount = 0;
  let shortest = Infinity;
  let end = -1;
  let base = 0;
  let j = start;
  for (;;) {
    for (let p = pointer[j]; p < pointer[j + 1]; p++) {
      const i = row[p];
      if (final[i]) continue;
      // rounding must not make a reduced cost negative
      const reduced = cost[p] - s.u[i] - s.v[j];
      const d = base + (reduced > 0 ? reduced : 0);
      if (d >= shortest || d >= distance[i]) continue;
      if (distance[i] === Infinity) touched[touchedCount++] = i;
      from[i] = j;
      fromCost[i] = cost[p];
      if (s.columnOf[i] < 0) {
        distance[i] = d;
        shortest = d;
        end = i;
      } else heap.lower(i, d);
    }
    if (heap.isEmpty || distance[heap.top()] >= shortest) break;
    const i = heap.pop();
    final[i] = 1;
    finished[finishedCount++] = i;
    base = distance[i];
    j = s.columnOf[i];
  }
  if (end >= 0) {
    for (let k = 0; k < finishedCount; k++) s.u[finished[k]] += distance[finished[k]] - shortest;
    // flip the path
    for (let i = end; ; ) {
      const column = from[i];
      const next = s.rowOf[column];
      match(s, column, i, fromCost[i]);
      if (column === start) break;
      i = next;
    }
    for (let k = 0; k < finishedCount; k++) retighten(s, s.columnOf[finished[k]], finished[k]);
    retighten(s, s.columnOf[end], end);
  }
  heap.clear();
  for (let k = 0; k < touchedCount; k++) {
    distance[touched[k]] = Infinity;
    final[touched[k]] = 0;
  }
}

function retighten(s: State, j: number, i: number): void {
  s.v[j] = s.matchedCost[j] - s.u[i];
}

function resultOf(problem: Assignment, s: State): LargeEntryMatching {
  const { n, pointer, row, cost, columnLog } = problem;
  let size = 0;
  let offDiagonal = 0;
  let logProduct = 0;
  for (let j = 0; j < n; j++) {
    if (s.rowOf[j] >= 0) {
      size++;
      if (s.rowOf[j] !== j) offDiagonal++;
      logProduct += columnLog[j] - s.matchedCost[j];
      continue;
    }
    // a free column: as large as the rows allow
    let least = Infinity;
    for (let p = pointer[j]; p < pointer[j + 1]; p++) least = Math.min(least, cost[p] - s.u[row[p]]);
    s.v[j] = least === Infinity ? 0 : least;
  }
  const rowScaling = new Float64Array(n);
  const columnScaling = new Float64Array(n);
  const shift = centre(s.u, s.v, columnLog);
  for (let i = 0; i < n; i++) rowScaling[i] = inRange(exponential(s.u[i] + shift));
  for (let j = 0; j < n; j++) columnScaling[j] = inRange(exponential(s.v[j] - columnLog[j] - shift));
  return { rowOf: s.rowOf, columnOf: s.columnOf, size, offDiagonal, logProduct, rowScaling, columnScaling };
}

/** R·e^t and C·e^−t scale alike: the t that brings the ranges of both to the same middle keeps them clear of overflow. */
function centre(u: Float64Array, v: Float64Array, columnLog: Float64Array): number {
  const n = u.length;
  if (n === 0) return 0;
  let rowSum = 0;
  let columnSum = 0;
  for (let i = 0; i < n; i++) {
    rowSum += u[i];
    columnSum += v[i] - columnLog[i];
  }
  return (columnSum - rowSum) / (2 * n);
}

/** Factors stay normal doubles, whatever the values were. */
function inRange(x: number): number {
  return Math.min(1e300, Math.max(1e-300, x));
}
