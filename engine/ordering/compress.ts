import type { Graph } from '../graph/graph.ts';

/** A graph whose vertices stand for groups of vertices of another one. */
export interface Compressed {
  readonly graph: Graph;
  /** compressed vertex -> vertices in its group */
  readonly weight: Int32Array;
  /** compressed vertex -> first of its vertices in `member`; length order + 1 */
  readonly memberPointer: Int32Array;
  /** vertices of the whole, group by group, each group by number */
  readonly member: Int32Array;
}

/** Multiplier of the hash sums: 2³² / golden ratio (Knuth), which spreads neighbouring numbers. */
const SPREAD = 0x9e3779b1;

/**
 * vertex -> the first vertex indistinguishable from it: same neighbours, itself counted among them (Ashcraft 1995, "Compressed graphs and
 * the minimum degree algorithm"). Only vertices of the same `role` (absent: all the same) are merged. Expected time linear in edges.
 */
export function leadersOf(graph: Graph, role: Uint8Array | null = null): { leader: Int32Array; merged: number } {
  const { order: n, pointer, neighbour } = graph;
  let slots = 16;
  while (slots < n) slots *= 2;
  const head = new Int32Array(slots).fill(-1);
  const next = new Int32Array(n);
  const hashOf = new Int32Array(n);
  const mark = new Int32Array(n).fill(-1);
  const leader = new Int32Array(n);
  let merged = 0;
  for (let v = 0; v < n; v++) {
    const from = pointer[v];
    const to = pointer[v + 1];
    let hash = Math.imul(v + 1, SPREAD);
    for (let q = from; q < to; q++) hash = (hash + Math.imul(neighbour[q] + 1, SPREAD)) | 0;
    hashOf[v] = hash;
    leader[v] = v;
    const slot = (hash ^ (hash >>> 16)) & (slots - 1);
    let u = head[slot];
    for (; u >= 0; u = next[u]) {
      if (hashOf[u] !== hash || pointer[u + 1] - pointer[u] !== to - from) continue;
      if (role !== null && role[u] !== role[v]) continue;
      if (mark[v] !== v) {
        mark[v] = v;
        for (let q = from; q < to; q++) mark[neighbour[q]] = v;
      }
      let same = mark[u] === v;
      for (let q = pointer[u]; same && q < pointer[u + 1]; q++) same = mark[neighbour[q]] === v;
      if (same) break;
    }
    if (u >= 0) {
      leader[v] = u;
      merged++;
    } else {
      next[v] = head[slot];
      head[slot] = v;
    }
  }
  return { leader, merged };
}

/** The graph with indistinguishable vertices merged. Groups are numbered by their first vertex. */
export function compressGraph(graph: Graph, role: Uint8Array | null = null): Compressed {
  const { leader } = leadersOf(graph, role);
  const groupOf = new Int32Array(graph.order);
  let groups = 0;
  for (let v = 0; v < graph.order; v++) groupOf[v] = leader[v] === v ? groups++ : groupOf[leader[v]];
  return contractGroups(graph, groupOf, groups);
}

/** The graph of any groups: two of them are neighbours when some of their vertices are. `groupOf`: vertex -> 0 … groups − 1. Linear. */
export function contractGroups(graph: Graph, groupOf: Int32Array, groups: number): Compressed {
  const { order: n, pointer, neighbour } = graph;
  const memberPointer = new Int32Array(groups + 1);
  for (let v = 0; v < n; v++) memberPointer[groupOf[v] + 1]++;
  for (let g = 0; g < groups; g++) memberPointer[g + 1] += memberPointer[g];
  const member = new Int32Array(n);
  const next = memberPointer.slice(0, groups);
  for (let v = 0; v < n; v++) member[next[groupOf[v]]++] = v;
  const weight = new Int32Array(groups);
  for (let g = 0; g < groups; g++) weight[g] = memberPointer[g + 1] - memberPointer[g];
  // unsorted lists first; the second pass distributes them by neighbour, which sorts
  const lists = new Int32Array(neighbour.length);
  const listPointer = new Int32Array(groups + 1);
  const mark = new Int32Array(groups).fill(-1);
  let at = 0;
  for (let g = 0; g < groups; g++) {
    mark[g] = g;
    for (let k = memberPointer[g]; k < memberPointer[g + 1]; k++) {
      const v = member[k];
      for (let q = pointer[v]; q < pointer[v + 1]; q++) {
        const h = groupOf[neighbour[q]];
        if (mark[h] === g) continue;
        mark[h] = g;
        lists[at++] = h;
      }
    }
    listPointer[g + 1] = at;
  }
  const sorted = new Int32Array(at);
  const place = listPointer.slice(0, groups);
  for (let g = 0; g < groups; g++)
    for (let q = listPointer[g]; q < listPointer[g + 1]; q++) sorted[place[lists[q]]++] = g;
  return { graph: { order: groups, pointer: listPointer, neighbour: sorted }, weight, memberPointer, member };
}

/** The order of all vertices from an order of their groups, each group by number. */
export function expandOrder(compressed: Compressed, groupOrder: Int32Array): Int32Array {
  const { memberPointer, member } = compressed;
  const out = new Int32Array(member.length);
  let at = 0;
  for (let k = 0; k < groupOrder.length; k++) {
    const g = groupOrder[k];
    for (let q = memberPointer[g]; q < memberPointer[g + 1]; q++) out[at++] = member[q];
  }
  return at === out.length ? out : out.slice(0, at);
}
