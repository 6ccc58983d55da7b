/** From the rows and columns of A to the first quotient graph of AᵀA: columns are variables, rows are elements. */
import { entryCount, type Pattern } from '../matrix/pattern.ts';
import { ABSENT, FREE, HALO, type QuotientGraph } from './minimumDegreeStart.ts';
import {
  DEGREE,
  ELEMENTS,
  IS_ELEMENT,
  LENGTH,
  layoutFor,
  MARK,
  RECORD,
  START,
  WEIGHT,
} from './minimumDegreeWorkspace.ts';

/** Roles: column -> FREE, HALO or ABSENT; row -> FREE or ABSENT. */
export interface ColumnRole {
  readonly column: Uint8Array;
  readonly row: Uint8Array;
}

/** Columns and rows in the order of breadth-first searches over both: near ones get near numbers. */
interface Numbering {
  readonly columnAt: Int32Array;
  readonly interior: number;
  readonly rowAt: Int32Array;
}

function numberBreadthFirst(a: Pattern, byRow: Pattern, role: ColumnRole): Numbering {
  const columnAt = new Int32Array(a.columns);
  const rowAt = new Int32Array(a.rows);
  const columnSeen = new Uint8Array(a.columns);
  const rowSeen = Uint8Array.from(role.row, (r) => (r === ABSENT ? 1 : 0));
  let end = 0;
  let rows = 0;
  for (let j = 0; j < a.columns; j++) if (role.column[j] !== FREE) columnSeen[j] = 1;
  for (let root = 0, head = 0; root < a.columns; root++) {
    if (columnSeen[root] === 1) continue;
    columnSeen[root] = 1;
    columnAt[end++] = root;
    for (; head < end; head++) {
      const j = columnAt[head];
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
        const i = a.rowIndex[p];
        if (rowSeen[i] === 1) continue;
        rowSeen[i] = 1;
        rowAt[rows++] = i;
        for (let q = byRow.columnPointer[i]; q < byRow.columnPointer[i + 1]; q++) {
          const k = byRow.rowIndex[q];
          if (columnSeen[k] === 1) continue;
          columnSeen[k] = 1;
          columnAt[end++] = k;
        }
      }
    }
  }
  const interior = end;
  for (let j = 0; j < a.columns; j++) if (role.column[j] === HALO) columnAt[end++] = j;
  return { columnAt: columnAt.subarray(0, end), interior, rowAt: rowAt.subarray(0, rows) };
}

/** Rows that hold no column to be eliminated are left out: they never matter. `byRow`: the transpose of `a`. */
export function startColumnGraph(a: Pattern, byRow: Pattern, role: ColumnRole): QuotientGraph {
  const { columnAt, interior, rowAt } = numberBreadthFirst(a, byRow, role);
  const variables = columnAt.length;
  const columnAddress = new Int32Array(a.columns).fill(-1);
  const rowAddress = new Int32Array(a.rows).fill(-1);
  for (let k = 0; k < variables; k++) columnAddress[columnAt[k]] = RECORD * k;
  for (let k = 0; k < rowAt.length; k++) rowAddress[rowAt[k]] = RECORD * (variables + k);
  const layout = layoutFor(variables + rowAt.length, 2 * entryCount(a), 2 * (variables + 2));
  const w = new Int32Array(layout.end);
  let largestElement = 0;
  let at = layout.lists;
  for (let k = 0; k < rowAt.length; k++) {
    const r = RECORD * (variables + k);
    const from = at;
    at = listInto(w, at, byRow, rowAt[k], columnAddress);
    const length = at - from;
    w[r + START] = from;
    w[r + LENGTH] = length;
    w[r + DEGREE] = length;
    w[r + ELEMENTS] = IS_ELEMENT;
    w[r + MARK] = length > 0 ? 1 : 0;
    if (length > largestElement) largestElement = length;
  }
  for (let k = 0; k < variables; k++) {
    const r = RECORD * k;
    const from = at;
    at = listInto(w, at, a, columnAt[k], rowAddress);
    let degree = 0;
    for (let q = from; q < at; q++) degree += w[w[q] + DEGREE] - 1;
    w[r + START] = from;
    w[r + LENGTH] = at - from;
    w[r + ELEMENTS] = at - from;
    w[r + WEIGHT] = 1;
    // the sum counts a column as often as it shares a row
    w[r + DEGREE] = degree < variables - 1 ? degree : variables - 1;
  }
  return {
    w,
    layout,
    free: at,
    vertexAt: columnAt,
    interior,
    totalWeight: variables,
    haloWeight: variables - interior,
    largestElement,
  };
}

/** Writes the addresses of the entries of column j that have one; returns the new end. */
function listInto(w: Int32Array, start: number, a: Pattern, j: number, address: Int32Array): number {
  let at = start;
  for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
    const r = address[a.rowIndex[p]];
    if (r >= 0) w[at++] = r;
  }
  return at;
}

/**
 * The order in which columns of equal degree queue: breadth-first from a pseudo-peripheral column, as `sweepOrder` does it for a graph.
 * Addresses of the columns to be eliminated.
 */
export function sweepColumns(graph: QuotientGraph): Int32Array {
  const { w, interior, layout } = graph;
  const queue = new Int32Array(interior);
  const limit = RECORD * interior;
  let done = 0;
  for (let r = 0; r < limit; r += RECORD) {
    if (w[r + MARK] > 0) continue;
    let root = r;
    let end = done;
    for (let round = 2; round <= 4; round++) {
      end = searchInto(queue, w, root, done, limit, round);
      if (round < 4) root = queue[end - 1];
    }
    done = end;
  }
  for (let r = 0; r < limit; r += RECORD) w[r + MARK] = 0;
  for (let r = RECORD * graph.vertexAt.length; r < RECORD * layout.order; r += RECORD)
    if (w[r + MARK] !== 0) w[r + MARK] = 1;
  return queue;
}

function searchInto(
  queue: Int32Array,
  w: Int32Array,
  root: number,
  start: number,
  limit: number,
  round: number,
): number {
  queue[start] = root;
  w[root + MARK] = round;
  let end = start + 1;
  for (let k = start; k < end; k++) {
    const c = queue[k];
    for (let q = w[c + START], stop = q + w[c + ELEMENTS]; q < stop; q++) {
      const e = w[q];
      if (w[e + MARK] === round || w[e + MARK] === 0) continue;
      w[e + MARK] = round;
      for (let s = w[e + START], last = s + w[e + LENGTH]; s < last; s++) {
        const u = w[s];
        if (u >= limit || w[u + MARK] === round) continue;
        w[u + MARK] = round;
        queue[end++] = u;
      }
    }
  }
  return end;
}
