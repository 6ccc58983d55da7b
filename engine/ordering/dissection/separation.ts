import { GainHeap } from './gainHeap.ts';
import type { WeightedGraph } from './weightedGraph.ts';

/** Values of a `part` array: the two sides and the separator between them. */
export const SIDE_0 = 0;
export const SIDE_1 = 1;
export const SEPARATOR = 2;

/** Workspace of separator improvement, allocated once for the largest graph and used for all of them. */
export class SeparationWorkspace {
  /** weights of side 0, side 1 and separator of the separation in hand */
  readonly sizes = new Float64Array(3);
  /** vertices of the separator in hand, in places 0 … count − 1 */
  readonly list: Int32Array;
  count = 0;
  /** what unevenness counts in the graph in hand */
  evenness = 0.3;
  /** separator vertex -> weight of its neighbours in side 0 and in side 1; undefined for others */
  readonly reach0: Int32Array;
  readonly reach1: Int32Array;
  /** separator vertices by gain of a move into side 0 and into side 1 */
  readonly heap0: GainHeap;
  readonly heap1: GainHeap;
  /** vertex -> stamp of the pass that moved it */
  readonly moved: Int32Array;
  /** moves of the present pass, for taking them back */
  readonly log: Int32Array;
  /** free workspace of the matching, the contraction and the extraction of subgraphs */
  readonly scratch: Int32Array;
  stamp = 0;

  /** `order`: vertices of the largest graph. */
  constructor(order: number) {
    this.list = new Int32Array(order);
    this.reach0 = new Int32Array(order);
    this.reach1 = new Int32Array(order);
    this.heap0 = new GainHeap(order);
    this.heap1 = new GainHeap(order);
    this.moved = new Int32Array(order);
    this.log = new Int32Array(4 * order + 16);
    this.scratch = new Int32Array(order + 1);
  }

  /** Reads `sizes` and `list` from a part array. */
  measure(g: WeightedGraph, part: Int32Array): void {
    const { sizes, list } = this;
    sizes.fill(0);
    this.count = 0;
    for (let v = 0; v < g.order; v++) {
      const k = part[v];
      sizes[k] += g.weight[v];
      if (k === SEPARATOR) list[this.count++] = v;
    }
  }
}

/**
 * What a separation costs: the separator's weight, more when the sides are uneven (as the evaluator of Ashcraft & Liu
 * 1998, with another form of the balance term), far more when a side has more than the share `balance` of the two.
 * Smaller is better. `evenness`: what unevenness counts, see `evennessFor`.
 */
export function separationCost(
  size0: number,
  size1: number,
  separator: number,
  balance: number,
  evenness: number,
): number {
  const larger = size0 > size1 ? size0 : size1;
  const smaller = size0 > size1 ? size1 : size0;
  const total = larger + smaller;
  if (total === 0) return separator;
  const uneven = (larger - smaller) / total;
  let cost = separator * (1 + evenness * uneven * uneven) + 0.01 * uneven;
  if (larger > balance * total) cost += 2 * (larger - balance * total);
  return cost;
}

/**
 * The weight of unevenness in a graph whose separators weigh about `separator`: 0.3 where they weigh √total, as in the
 * plane (a split of 60 to 40 counts as a separator larger by 1.2 %), up to 1 where they are heavier, as in space,
 * because then the separators inside the larger side are dear.
 */
export function evennessFor(separator: number, total: number): number {
  if (total === 0) return 0.3;
  return Math.max(0.3, Math.min(1, (0.3 * separator) / Math.sqrt(total)));
}

/** Names the first edge between the two sides, the first value that is no part, or returns null: the separator separates. */
export function separationFlaw(g: WeightedGraph, part: ArrayLike<number>): string | null {
  for (let v = 0; v < g.order; v++) {
    if (part[v] !== SIDE_0 && part[v] !== SIDE_1 && part[v] !== SEPARATOR)
      return `part[${v}] = ${part[v]} is not 0, 1 or 2`;
    for (let p = g.pointer[v]; p < g.pointer[v + 1]; p++) {
      const u = g.neighbour[p];
      if (part[v] + part[u] === 1) return `vertices ${v} (side ${part[v]}) and ${u} (side ${part[u]}) are neighbours`;
    }
  }
  return null;
}
