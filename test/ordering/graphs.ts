/** Small families of graphs with known answers, for the tests of this folder. */
import { assemble } from '../../engine/matrix/assemble.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';

/** The symmetric pattern of an undirected edge list; no diagonal. */
export function fromEdges(n: number, edges: readonly (readonly [number, number])[]): Pattern {
  const row = Int32Array.from(edges.flat());
  const column = Int32Array.from(edges.flatMap(([i, j]) => [j, i]));
  return assemble({ rows: n, columns: n, field: 'pattern', row, column, values: null }).matrix;
}

/** The k × k five-point grid. */
export function grid(k: number): Pattern {
  const edges: [number, number][] = [];
  for (let y = 0; y < k; y++) {
    for (let x = 0; x < k; x++) {
      if (x + 1 < k) edges.push([y * k + x, y * k + x + 1]);
      if (y + 1 < k) edges.push([y * k + x, y * k + x + k]);
    }
  }
  return fromEdges(k * k, edges);
}

/** Vertex 0 joined to all others. */
export function star(n: number): Pattern {
  return fromEdges(
    n,
    Array.from({ length: n - 1 }, (_, k) => [0, k + 1] as const),
  );
}

/** All pairs of 0 … n − 1. */
export function clique(n: number): [number, number][] {
  const edges: [number, number][] = [];
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) edges.push([i, j]);
  return edges;
}

/** Two cliques of k joined by one edge. */
export function twoCliques(k: number): Pattern {
  return fromEdges(2 * k, [...clique(k), ...clique(k).map(([i, j]) => [i + k, j + k] as const), [0, k]]);
}

/** 0 – 1 – 2 – … */
export function path(n: number): Pattern {
  const columnPointer = new Int32Array(n + 1);
  const rowIndex = new Int32Array(Math.max(0, 2 * n - 2));
  let at = 0;
  for (let j = 0; j < n; j++) {
    if (j > 0) rowIndex[at++] = j - 1;
    if (j + 1 < n) rowIndex[at++] = j + 1;
    columnPointer[j + 1] = at;
  }
  return { rows: n, columns: n, columnPointer, rowIndex };
}
