import type { IntegerArena } from './arena.ts';
import { SEPARATOR, type SeparationWorkspace, separationCost } from './separation.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/**
 * Improvement of a separator S by bipartite matching (Liu 1989; Ashcraft & Liu 1998). Between S and its neighbours on
 * one side, a set Z ⊂ S whose neighbours there weigh less than Z shows in the Dulmage–Mendelsohn decomposition: Z goes
 * to the other side and its neighbours take its place. With weights the matching is a flow with capacities at the
 * vertices. It takes whole steps out of a layered separator, where single moves gain nothing.
 *
 * `w` describes `part` before and after. Returns the cost, never above the one on entry.
 */
export function improveByMatching(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  balance: number,
  arena: IntegerArena,
): number {
  const { sizes } = w;
  let cost = separationCost(sizes[0], sizes[1], sizes[2], balance, w.evenness);
  let idle = 0;
  // a side that gave nothing is tried again only after the other one gave something
  for (let round = 0; idle < 2 && round < MOST_ROUNDS; round++) {
    const mark = arena.mark();
    const reached = improveToward(g, part, w, balance, round & 1, cost, arena);
    arena.release(mark);
    if (reached < cost) {
      cost = reached;
      idle = 0;
    } else idle++;
  }
  return cost;
}

const MOST_ROUNDS = 12;

/** The flow network between separator and side: rows are separator vertices, columns their neighbours on the side. */
interface Bipartite {
  readonly rows: number;
  readonly columns: number;
  /** row -> first edge; edge -> column; column -> first place in `columnEdge`; place -> edge; edge -> row */
  readonly rowPointer: Int32Array;
  readonly edgeColumn: Int32Array;
  readonly columnPointer: Int32Array;
  readonly columnEdge: Int32Array;
  readonly edgeRow: Int32Array;
  /** column -> vertex of the graph */
  readonly columnVertex: Int32Array;
  readonly flow: Int32Array;
  readonly rowRest: Int32Array;
  readonly columnRest: Int32Array;
}

function improveToward(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  balance: number,
  side: number,
  cost: number,
  arena: IntegerArena,
): number {
  const { list, sizes } = w;
  const { weight } = g;
  const b = bipartite(g, part, w, side, arena);
  fillGreedily(b);
  const reached = maximizeFlow(b, arena);
  let out = 0;
  for (let r = 0; r < b.rows; r++) if (reached[r] !== 0) out += weight[list[r]];
  if (out === 0) return cost;
  let into = 0;
  for (let c = 0; c < b.columns; c++) if (reached[b.rows + c] !== 0) into += weight[b.columnVertex[c]];
  const size0 = sizes[0] + (side === 0 ? -into : out);
  const size1 = sizes[1] + (side === 0 ? out : -into);
  const newCost = separationCost(size0, size1, sizes[2] + into - out, balance, w.evenness);
  if (!(newCost < cost)) return cost;
  let count = 0;
  for (let r = 0; r < b.rows; r++) {
    if (reached[r] === 0) list[count++] = list[r];
    else part[list[r]] = 1 - side;
  }
  for (let c = 0; c < b.columns; c++) {
    if (reached[b.rows + c] === 0) continue;
    part[b.columnVertex[c]] = SEPARATOR;
    list[count++] = b.columnVertex[c];
  }
  w.count = count;
  sizes[0] = size0;
  sizes[1] = size1;
  sizes[2] += into - out;
  return newCost;
}

function bipartite(
  g: WeightedGraph,
  part: Int32Array,
  w: SeparationWorkspace,
  side: number,
  arena: IntegerArena,
): Bipartite {
  const { pointer, neighbour, weight } = g;
  const { list, moved, scratch } = w;
  const rows = w.count;
  const stamp = ++w.stamp;
  let bound = 0;
  for (let r = 0; r < rows; r++) bound += pointer[list[r] + 1] - pointer[list[r]];
  const rowPointer = arena.take(rows + 1);
  const edgeColumn = arena.take(bound);
  const edgeRow = arena.take(bound);
  const columnVertex = arena.take(Math.min(bound, g.order));
  const rowRest = arena.take(rows);
  let edges = 0;
  let columns = 0;
  for (let r = 0; r < rows; r++) {
    const v = list[r];
    rowPointer[r] = edges;
    rowRest[r] = weight[v];
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const u = neighbour[p];
      if (part[u] !== side) continue;
      if (moved[u] !== stamp) {
        moved[u] = stamp;
        scratch[u] = columns;
        columnVertex[columns++] = u;
      }
      edgeRow[edges] = r;
      edgeColumn[edges++] = scratch[u];
    }
  }
  rowPointer[rows] = edges;
  const columnRest = arena.take(columns);
  const columnPointer = arena.take(columns + 1).fill(0);
  for (let c = 0; c < columns; c++) columnRest[c] = weight[columnVertex[c]];
  for (let e = 0; e < edges; e++) columnPointer[edgeColumn[e]]++;
  let sum = 0;
  for (let c = 0; c < columns; c++) columnPointer[c] = sum += columnPointer[c];
  columnPointer[columns] = sum;
  const columnEdge = arena.take(edges);
  for (let e = edges - 1; e >= 0; e--) columnEdge[--columnPointer[edgeColumn[e]]] = e;
  const flow = arena.take(edges).fill(0);
  return {
    rows,
    columns,
    rowPointer,
    edgeColumn,
    columnPointer,
    columnEdge,
    edgeRow,
    columnVertex,
    flow,
    rowRest,
    columnRest,
  };
}

function fillGreedily(b: Bipartite): void {
  const { rows, rowPointer, edgeColumn, flow, rowRest, columnRest } = b;
  for (let r = 0; r < rows; r++) {
    for (let e = rowPointer[r]; e < rowPointer[r + 1] && rowRest[r] > 0; e++) {
      const c = edgeColumn[e];
      const amount = rowRest[r] < columnRest[c] ? rowRest[r] : columnRest[c];
      if (amount === 0) continue;
      flow[e] += amount;
      rowRest[r] -= amount;
      columnRest[c] -= amount;
    }
  }
}

/**
 * Augments in phases (Hopcroft & Karp 1973): in one phase no row or column is looked at twice. Returns the marks of the
 * last phase, which found nothing: rows first, 1 for what is seen from rows with capacity left.
 */
function maximizeFlow(b: Bipartite, arena: IntegerArena): Int32Array {
  const { rows, columns, rowRest } = b;
  const seen = arena.take(rows + columns);
  // row or column (offset by rows) -> edge it was reached by
  const from = arena.take(rows + columns);
  const queue = arena.take(rows);
  for (let found = true; found; ) {
    found = false;
    seen.fill(0);
    for (let root = 0; root < rows; root++) {
      if (rowRest[root] === 0 || seen[root] !== 0) continue;
      const end = searchFrom(b, root, seen, from, queue);
      if (end < 0) continue;
      augment(b, root, end, from);
      found = true;
    }
  }
  return seen;
}

/** Breadth-first search from a row to a column with capacity left; that column, or −1. */
function searchFrom(b: Bipartite, root: number, seen: Int32Array, from: Int32Array, queue: Int32Array): number {
  const { rows, rowPointer, edgeColumn, columnPointer, columnEdge, edgeRow, flow, columnRest } = b;
  let head = 0;
  let tail = 0;
  queue[tail++] = root;
  seen[root] = 1;
  while (head < tail) {
    const r = queue[head++];
    for (let e = rowPointer[r]; e < rowPointer[r + 1]; e++) {
      const c = edgeColumn[e];
      if (seen[rows + c] !== 0) continue;
      seen[rows + c] = 1;
      from[rows + c] = e;
      if (columnRest[c] > 0) return c;
      for (let k = columnPointer[c]; k < columnPointer[c + 1]; k++) {
        const back = columnEdge[k];
        const other = edgeRow[back];
        if (flow[back] === 0 || seen[other] !== 0) continue;
        seen[other] = 1;
        from[other] = back;
        queue[tail++] = other;
      }
    }
  }
  return -1;
}

/** Sends what fits along the path found. */
function augment(b: Bipartite, root: number, end: number, from: Int32Array): void {
  const { rows, edgeColumn, edgeRow, flow, rowRest, columnRest } = b;
  let amount = rowRest[root] < columnRest[end] ? rowRest[root] : columnRest[end];
  for (let c = end; edgeRow[from[rows + c]] !== root; ) {
    const back = from[edgeRow[from[rows + c]]];
    if (flow[back] < amount) amount = flow[back];
    c = edgeColumn[back];
  }
  columnRest[end] -= amount;
  rowRest[root] -= amount;
  for (let c = end; ; ) {
    const e = from[rows + c];
    flow[e] += amount;
    if (edgeRow[e] === root) break;
    const back = from[edgeRow[e]];
    flow[back] -= amount;
    c = edgeColumn[back];
  }
}
