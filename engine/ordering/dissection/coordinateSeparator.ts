import type { Piece } from './induce.ts';
import { improveByMatching } from './matchingImprovement.ts';
import type { SeparatorTools } from './multilevelSeparator.ts';
import { SEPARATOR } from './separation.ts';

/** Coordinates of the vertices of the whole graph, `dimensions` to a vertex. */
export interface VertexCoordinates {
  readonly dimensions: number;
  readonly values: Float64Array;
}

/** A matching may leave one side at most this share: the cut through the middle is to stay one. */
const BALANCE = 0.75;

/**
 * Recursive coordinate bisection (Simon 1991): the piece is cut at the median of its longest axis, vertices of equal
 * coordinate on one side; the separator is the smaller of the two rows of vertices along the cut, thinned by matching.
 */
export function coordinateSeparator(
  piece: Piece,
  part: Int32Array,
  coordinates: VertexCoordinates,
  tools: SeparatorTools,
): void {
  const { graph: g, name } = piece;
  const n = g.order;
  const { dimensions, values } = coordinates;
  const axis = longestAxis(name, coordinates);
  const sorted = new Float64Array(n);
  for (let v = 0; v < n; v++) sorted[v] = values[name[v] * dimensions + axis];
  sorted.sort();
  const cut = nearestGap(sorted);
  // all vertices at one point: halves by number
  for (let v = 0; v < n; v++) {
    const low = cut === sorted[0] ? 2 * v < n : values[name[v] * dimensions + axis] < cut;
    part[v] = low ? 0 : 1;
  }
  const boundary = [0, 0];
  const onBoundary = tools.workspace.scratch;
  for (let v = 0; v < n; v++) {
    onBoundary[v] = 0;
    for (let p = g.pointer[v]; p < g.pointer[v + 1]; p++) if (part[g.neighbour[p]] !== part[v]) onBoundary[v] = 1;
    if (onBoundary[v] === 1) boundary[part[v]] += g.weight[v];
  }
  const side = boundary[0] < boundary[1] ? 0 : 1;
  for (let v = 0; v < n; v++) if (part[v] === side && onBoundary[v] === 1) part[v] = SEPARATOR;
  tools.workspace.measure(g, part);
  improveByMatching(g, part, tools.workspace, BALANCE, tools.arena);
}

function longestAxis(name: Int32Array, { dimensions, values }: VertexCoordinates): number {
  let axis = 0;
  let longest = -1;
  for (let d = 0; d < dimensions; d++) {
    let low = values[name[0] * dimensions + d];
    let high = low;
    for (let v = 1; v < name.length; v++) {
      const x = values[name[v] * dimensions + d];
      if (x < low) low = x;
      if (x > high) high = x;
    }
    if (high - low > longest) {
      longest = high - low;
      axis = d;
    }
  }
  return axis;
}

/** The value at which a new coordinate starts nearest to the middle of the sorted list; the first value when all are equal. */
function nearestGap(sorted: Float64Array): number {
  const middle = sorted.length >> 1;
  for (let reach = 0; reach <= middle; reach++) {
    const up = middle + reach;
    const down = middle - reach;
    if (up > 0 && up < sorted.length && sorted[up] > sorted[up - 1]) return sorted[up];
    if (down > 0 && sorted[down] > sorted[down - 1]) return sorted[down];
  }
  return sorted[0];
}
