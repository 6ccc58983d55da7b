import type { WeightedGraph } from './weightedGraph.ts';

/**
 * Matching for coarsening: heavy edges first (Karypis & Kumar 1998), rated w²/(wᵤ wᵥ) so that light vertices are
 * preferred and weights stay even (the rating is Holtgrewe, Sanders & Schulz 2010). Where many vertices stay alone, as
 * around hubs of stars and power-law graphs, vertices that share a neighbour are paired (two-hop matching).
 */

/** A pair may not weigh more than this many average vertices of the coarsest graph. */
const HEAVIEST_PAIR = 1.5;

/** Two-hop pairs are looked for when more than this share of the vertices stays alone. */
const LONELY_SHARE = 0.1;

/** Vertices are visited at most so many places before or behind their own, mostly. */
const SHUFFLE_REACH = 128;

/**
 * Fills `match` (vertex -> partner, itself when alone) and `coarseOf` (vertex -> coarse vertex), both of length order.
 * `targetOrder`: order of the coarsest graph wanted; `salt`: any integer, decides between equal edges and the order
 * in which vertices choose. Returns the number of coarse vertices; they are numbered like their first members, which
 * keeps near vertices near. `coarseOf` serves as workspace on the way.
 */
export function matchInto(
  g: WeightedGraph,
  match: Int32Array,
  coarseOf: Int32Array,
  targetOrder: number,
  salt: number,
): number {
  const n = g.order;
  const heaviest = Math.max(2, Math.floor((HEAVIEST_PAIR * g.totalWeight) / targetOrder));
  match.fill(-1);
  const lonely = matchHeavyEdges(g, match, coarseOf, heaviest, salt);
  if (lonely > LONELY_SHARE * n) matchTwoHops(g, match, heaviest);
  let coarse = 0;
  for (let v = 0; v < n; v++) {
    const u = match[v];
    if (u < 0) match[v] = v;
    coarseOf[v] = u >= 0 && u < v ? coarseOf[u] : coarse++;
  }
  return coarse;
}

function matchHeavyEdges(
  g: WeightedGraph,
  match: Int32Array,
  walk: Int32Array,
  heaviest: number,
  salt: number,
): number {
  const { order: n, pointer, neighbour, edgeWeight, weight } = g;
  let lonely = 0;
  let chance = salt | 1;
  // a shuffle in which vertices stay within reach of their place: chance enough, and near in memory
  for (let k = 0; k < n; k++) walk[k] = k;
  for (let k = 0; k < n; k++) {
    chance ^= chance << 13;
    chance ^= chance >>> 17;
    chance ^= chance << 5;
    const room = n - k < SHUFFLE_REACH ? n - k : SHUFFLE_REACH;
    const other = k + Math.floor((chance >>> 8) * (room / 16777216));
    const v = walk[other];
    walk[other] = walk[k];
    walk[k] = v;
  }
  for (let k = 0; k < n; k++) {
    const v = walk[k];
    if (match[v] >= 0) continue;
    const begin = pointer[v];
    const end = pointer[v + 1];
    const room = heaviest - weight[v];
    let best = -1;
    let bestRating = 0;
    chance = (Math.imul(chance, 1664525) + 1013904223) | 0;
    const fromEnd = chance < 0;
    for (let q = begin; q < end; q++) {
      const p = fromEnd ? end - 1 - (q - begin) : q;
      const u = neighbour[p];
      if (match[u] >= 0 || weight[u] > room) continue;
      const w = edgeWeight[p];
      const rating = (w * w) / weight[u];
      if (rating > bestRating) {
        bestRating = rating;
        best = u;
      }
    }
    if (best >= 0) {
      match[v] = best;
      match[best] = v;
    } else lonely++;
  }
  return lonely;
}

/** Pairs, around every vertex in turn, the neighbours that are still alone. */
function matchTwoHops(g: WeightedGraph, match: Int32Array, heaviest: number): void {
  const { order: n, pointer, neighbour, weight } = g;
  for (let v = 0; v < n; v++) {
    let waiting = -1;
    for (let p = pointer[v]; p < pointer[v + 1]; p++) {
      const u = neighbour[p];
      if (match[u] >= 0) continue;
      if (waiting < 0) waiting = u;
      else if (weight[u] + weight[waiting] <= heaviest) {
        match[u] = waiting;
        match[waiting] = u;
        waiting = -1;
      }
    }
  }
}
