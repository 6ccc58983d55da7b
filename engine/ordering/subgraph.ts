import type { Graph } from '../graph/graph.ts';

/** A graph on some of the vertices of another one. */
export interface Subgraph {
  readonly graph: Graph;
  /** vertex of the part -> vertex of the whole; null when they are the same */
  readonly vertexOf: Int32Array | null;
}

/** The graph without the given vertices and their edges. The rest keeps its order. */
export function withoutVertices(graph: Graph, removed: Int32Array): Subgraph {
  const { order: n, pointer, neighbour } = graph;
  const name = new Int32Array(n);
  for (let k = 0; k < removed.length; k++) name[removed[k]] = -1;
  let size = 0;
  for (let i = 0; i < n; i++) if (name[i] === 0) name[i] = size++;
  const vertexOf = new Int32Array(size);
  const newPointer = new Int32Array(size + 1);
  const newNeighbour = new Int32Array(neighbour.length);
  let at = 0;
  for (let i = 0; i < n; i++) {
    const v = name[i];
    if (v < 0) continue;
    vertexOf[v] = i;
    for (let q = pointer[i]; q < pointer[i + 1]; q++) {
      const u = name[neighbour[q]];
      if (u >= 0) newNeighbour[at++] = u;
    }
    newPointer[v + 1] = at;
  }
  return { graph: { order: size, pointer: newPointer, neighbour: newNeighbour.slice(0, at) }, vertexOf };
}
