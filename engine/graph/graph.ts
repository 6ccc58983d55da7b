import type { Pattern } from '../matrix/pattern.ts';
import { symmetrize } from '../matrix/symmetrize.ts';

/** An undirected graph: symmetric, no loops, neighbours sorted. Vertex = unknown, 0-based. Treated as frozen. */
export interface Graph {
  /** number of vertices */
  readonly order: number;
  /** vertex -> its first neighbour in `neighbour`; length order + 1 */
  readonly pointer: Int32Array;
  /** position -> neighbouring vertex; each edge stands twice */
  readonly neighbour: Int32Array;
}

/** The graph of A + Aᵀ without its diagonal. Square patterns only. Linear in entries. */
export function graphOf(a: Pattern): Graph {
  const s = symmetrize(a, 'none');
  return { order: s.columns, pointer: s.columnPointer, neighbour: s.rowIndex };
}
