import type { IntegerArena } from './arena.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/** A subgraph with the names its vertices have in the whole graph. */
export interface Piece {
  readonly graph: WeightedGraph;
  /** vertex of the piece -> vertex of the whole graph */
  readonly name: Int32Array;
}

/**
 * The part of a piece whose vertices have the value `side` in `part`. `local`: workspace as long as the piece is;
 * `ones`: as many ones as the whole graph has neighbours (pieces are uncoarsened, so all their edges weigh one).
 */
export function induce(
  piece: Piece,
  part: Int32Array,
  side: number,
  local: Int32Array,
  ones: Int32Array,
  arena: IntegerArena,
): Piece {
  const { order: n, pointer, neighbour, weight } = piece.graph;
  let order = 0;
  let bound = 0;
  for (let v = 0; v < n; v++) {
    if (part[v] !== side) continue;
    local[v] = order++;
    bound += pointer[v + 1] - pointer[v];
  }
  const name = arena.take(order);
  const subWeight = arena.take(order);
  const subPointer = arena.take(order + 1);
  const block = arena.take(bound);
  let totalWeight = 0;
  let q = 0;
  let k = 0;
  for (let v = 0; v < n; v++) {
    if (part[v] !== side) continue;
    name[k] = piece.name[v];
    subWeight[k] = weight[v];
    totalWeight += weight[v];
    subPointer[k++] = q;
    for (let p = pointer[v], end = pointer[v + 1]; p < end; p++) {
      const u = neighbour[p];
      if (part[u] === side) block[q++] = local[u];
    }
  }
  subPointer[k] = q;
  const subNeighbour = arena.trim(block, q);
  return {
    graph: { order, pointer: subPointer, neighbour: subNeighbour, edgeWeight: ones, weight: subWeight, totalWeight },
    name,
  };
}
