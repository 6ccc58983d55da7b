import type { Graph } from '../../graph/graph.ts';
import type { IntegerArena } from './arena.ts';
import type { Piece } from './induce.ts';

/**
 * The graph a dissection starts from: unknowns set aside taken out, indistinguishable unknowns merged (Ashcraft 1995),
 * vertices renumbered along a breadth-first search, component after component, so that near vertices are near in memory
 * however the unknowns were numbered.
 */
export interface WholeGraph {
  /** number of vertices, held ones included */
  readonly order: number;
  /** vertices 0 … freeOrder − 1 are to be dissected, the others are held last and only count as halo */
  readonly freeOrder: number;
  readonly pointer: Int32Array;
  readonly neighbour: Int32Array;
  /** vertex -> number of unknowns it stands for */
  readonly weight: Int32Array;
  /** vertex -> its first unknown in `unknown`; length order + 1 */
  readonly unknownPointer: Int32Array;
  readonly unknown: Int32Array;
  /** component -> its first vertex; one more at the end, which is freeOrder */
  readonly component: Int32Array;
}

/** States of an unknown before the graph is made. */
export const FREE = 0;
export const HELD = 1;
export const ASIDE = 2;

/** Linear in the edges. `state`: unknown -> FREE, HELD or ASIDE (not in the graph at all). */
export function makeWholeGraph(g: Graph, state: Uint8Array): WholeGraph {
  const n = g.order;
  const { pointer, neighbour } = g;
  const leader = mergeIndistinguishable(g, state);
  // breadth-first numbering of the leaders
  const vertexOf = new Int32Array(n).fill(-1);
  const visited = new Int32Array(n);
  const starts: number[] = [];
  let tail = 0;
  let edges = 0;
  for (let s = 0; s < n; s++) {
    if (state[s] !== FREE || leader[s] !== s || vertexOf[s] >= 0) continue;
    starts.push(tail);
    let head = tail;
    vertexOf[s] = tail;
    visited[tail++] = s;
    while (head < tail) {
      const v = visited[head++];
      for (let p = pointer[v]; p < pointer[v + 1]; p++) {
        const u = neighbour[p];
        if (leader[u] !== u || vertexOf[u] >= 0 || state[u] !== FREE) continue;
        vertexOf[u] = tail;
        visited[tail++] = u;
      }
      edges += pointer[v + 1] - pointer[v];
    }
  }
  const freeOrder = tail;
  starts.push(freeOrder);
  for (let v = 0; v < n; v++) {
    if (state[v] !== HELD) continue;
    vertexOf[v] = tail;
    visited[tail++] = v;
  }
  return assembleWhole(g, state, leader, vertexOf, visited, tail, freeOrder, edges, Int32Array.from(starts));
}

function assembleWhole(
  g: Graph,
  state: Uint8Array,
  leader: Int32Array,
  vertexOf: Int32Array,
  visited: Int32Array,
  order: number,
  freeOrder: number,
  edges: number,
  component: Int32Array,
): WholeGraph {
  const { pointer, neighbour } = g;
  const wholePointer = new Int32Array(order + 1);
  const wholeNeighbour = new Int32Array(edges);
  let q = 0;
  for (let k = 0; k < freeOrder; k++) {
    const v = visited[k];
    for (let p = pointer[v]; p < pointer[v + 1]; p++) {
      const u = neighbour[p];
      if (leader[u] === u && state[u] !== ASIDE) wholeNeighbour[q++] = vertexOf[u];
    }
    wholePointer[k + 1] = q;
  }
  // rows of held vertices stay empty: nothing walks from them
  for (let k = freeOrder; k < order; k++) wholePointer[k + 1] = q;
  const weight = new Int32Array(order);
  const unknownPointer = new Int32Array(order + 1);
  for (let i = 0; i < g.order; i++) {
    if (state[i] === ASIDE) continue;
    vertexOf[i] = vertexOf[leader[i]];
    weight[vertexOf[i]]++;
  }
  for (let k = 0; k < order; k++) unknownPointer[k + 1] = unknownPointer[k] + weight[k];
  const unknown = new Int32Array(unknownPointer[order]);
  const next = unknownPointer.slice(0, order);
  for (let i = 0; i < g.order; i++) if (state[i] !== ASIDE) unknown[next[vertexOf[i]]++] = i;
  return {
    order,
    freeOrder,
    pointer: wholePointer,
    neighbour: wholeNeighbour.subarray(0, q),
    weight,
    unknownPointer,
    unknown,
    component,
  };
}

/** unknown -> the first unknown with the same neighbours and itself; itself for held ones. */
function mergeIndistinguishable(g: Graph, state: Uint8Array): Int32Array {
  const n = g.order;
  const { pointer, neighbour } = g;
  const leader = new Int32Array(n);
  const hash = new Int32Array(n);
  let bits = 4;
  while (bits < 24 && 1 << bits < n) bits++;
  const head = new Int32Array(1 << bits).fill(-1);
  const next = new Int32Array(n);
  const mark = new Int32Array(n).fill(-1);
  for (let v = 0; v < n; v++) {
    leader[v] = v;
    if (state[v] !== FREE) continue;
    let h = Math.imul(v + 1, 0x9e3779b1) | 0;
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      if (state[neighbour[p]] !== ASIDE) h = (h + Math.imul(neighbour[p] + 1, 0x9e3779b1)) | 0;
    }
    hash[v] = h;
    const slot = (h ^ (h >>> 15)) & ((1 << bits) - 1);
    let u = head[slot];
    let marked = false;
    while (u >= 0) {
      if (hash[u] === h && pointer[u + 1] - pointer[u] === pointer[v + 1] - pointer[v]) {
        if (!marked) {
          marked = true;
          mark[v] = v;
          for (let p = pointer[v]; p < pointer[v + 1]; p++) mark[neighbour[p]] = v;
        }
        let same = mark[u] === v;
        for (let p = pointer[u]; same && p < pointer[u + 1]; p++) same = mark[neighbour[p]] === v;
        if (same) break;
      }
      u = next[u];
    }
    if (u >= 0) leader[v] = u;
    else {
      next[v] = head[slot];
      head[slot] = v;
    }
  }
  return leader;
}

/** The free vertices from … to − 1, which are whole components, as a piece. */
export function pieceOf(whole: WholeGraph, from: number, to: number, ones: Int32Array, arena: IntegerArena): Piece {
  const order = to - from;
  const { pointer, neighbour, weight, freeOrder } = whole;
  const name = arena.take(order);
  const subPointer = arena.take(order + 1);
  const block = arena.take(pointer[to] - pointer[from]);
  let q = 0;
  let totalWeight = 0;
  for (let v = from; v < to; v++) {
    name[v - from] = v;
    totalWeight += weight[v];
    subPointer[v - from] = q;
    for (let p = pointer[v]; p < pointer[v + 1]; p++) {
      const u = neighbour[p];
      if (u < freeOrder) block[q++] = u - from;
    }
  }
  subPointer[order] = q;
  const subNeighbour = arena.trim(block, q);
  const graph = {
    order,
    pointer: subPointer,
    neighbour: subNeighbour,
    edgeWeight: ones,
    weight: weight.subarray(from, to),
    totalWeight,
  };
  return { graph, name };
}
