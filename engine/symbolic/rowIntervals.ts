import type { Graph } from '../graph/graph.ts';
import { type NewToOld, positionOf } from '../matrix/permutation.ts';

/**
 * The rows of L, held implicitly: row i is the union of the tree paths from its entries of A up to i (Liu 1990), and along a chain
 * (parent[j] = j + 1) a path is one interval of columns. Memory is a few arrays of length n, whatever L holds.
 * Diagonals are not in the intervals.
 */
export class RowIntervals {
  private readonly graph: Graph;
  private readonly order: NewToOld;
  private readonly position: Int32Array;
  private readonly parent: Int32Array;
  /** column -> last column of its chain */
  private readonly chainEnd: Int32Array;
  /** chain end -> last row that met the chain, and the lowest column it covers there */
  private readonly metBy: Int32Array;
  private readonly lowest: Int32Array;
  /** intervals of the row asked for last: start, end (inclusive), start, end … ; grows when needed */
  intervals = new Int32Array(64);

  /** `parent`: elimination tree of the graph in `order` (new-to-old). */
  constructor(graph: Graph, order: NewToOld, parent: Int32Array) {
    const n = graph.order;
    this.graph = graph;
    this.order = order;
    this.position = positionOf(order);
    this.parent = parent;
    this.chainEnd = new Int32Array(n);
    for (let j = n - 1; j >= 0; j--) this.chainEnd[j] = parent[j] === j + 1 ? this.chainEnd[j + 1] : j;
    this.metBy = new Int32Array(n).fill(-1);
    this.lowest = new Int32Array(n);
  }

  /**
   * Forms the intervals of row i (a position of the order). They are disjoint and in no particular order.
   * @returns how many numbers of `intervals` are in use (two for each interval)
   */
  row(i: number): number {
    const { graph, position, parent, chainEnd, metBy, lowest } = this;
    const v = this.order[i];
    let used = 0;
    for (let p = graph.pointer[v]; p < graph.pointer[v + 1]; p++) {
      let r = position[graph.neighbour[p]];
      while (r < i) {
        const end = chainEnd[r];
        if (used + 2 > this.intervals.length) this.grow();
        if (metBy[end] === i) {
          if (lowest[end] > r) {
            this.intervals[used++] = r;
            this.intervals[used++] = lowest[end] - 1;
            lowest[end] = r;
          }
          break;
        }
        metBy[end] = i;
        lowest[end] = r;
        this.intervals[used++] = r;
        this.intervals[used++] = end < i ? end : i - 1;
        if (end >= i) break;
        r = parent[end];
        if (r < 0) break;
      }
    }
    return used;
  }

  /** Lets rows be asked for a second time. */
  reset(): void {
    this.metBy.fill(-1);
  }

  private grow(): void {
    const bigger = new Int32Array(2 * this.intervals.length);
    bigger.set(this.intervals);
    this.intervals = bigger;
  }
}
