/** The graph a dissection works on: weights on vertices (unknowns they stand for) and edges (edges they stand for). */
export interface WeightedGraph {
  /** number of vertices */
  readonly order: number;
  /** vertex -> its first neighbour; length order + 1 */
  readonly pointer: Int32Array;
  /** position -> neighbouring vertex, no loops, each edge twice; in no particular order */
  readonly neighbour: Int32Array;
  /** position -> number of original edges this edge stands for */
  readonly edgeWeight: Int32Array;
  /** vertex -> number of original vertices it stands for */
  readonly weight: Int32Array;
  /** sum of `weight` */
  readonly totalWeight: number;
}
