import { graphOf } from '../graph/graph.ts';
import { Fault } from '../matrix/fault.ts';
import type { Pattern } from '../matrix/pattern.ts';
import type { Progress } from '../matrix/progress.ts';
import { coordinateSeparator, type VertexCoordinates } from './dissection/coordinateSeparator.ts';
import { expandToUnknowns } from './dissection/expand.ts';
import { dissect } from './dissection/recursion.ts';
import { ASIDE, HELD, makeWholeGraph, type WholeGraph } from './dissection/wholeGraph.ts';
import { heldFlags } from './heldLast.ts';
import { denseNotes, denseRowThreshold, denseVertices } from './minimumDegree.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

/** Options of geometric dissection. */
export interface GeometricDissectionOptions extends OrderingOptions {
  /** coordinates of the mesh nodes, node by node: length nodes · dimensions, finite */
  readonly coordinates: Float64Array;
  /** coordinates to a node: 1, 2 or 3 */
  readonly dimensions: number;
  /** unknowns to a node, numbered node by node: unknown i belongs to node ⌊i / unknownsPerNode⌋; default 1 */
  readonly unknownsPerNode?: number;
  /** pieces of at most so many vertices are ordered by minimum degree; default 200 */
  readonly leafSize?: number;
}

/**
 * Dissection by the coordinates of the mesh nodes (recursive coordinate bisection, Simon 1991), with vertex separators
 * taken from the graph of A + Aᵀ, so that they separate whatever the coordinates are; leaves by minimum degree with
 * halo. Uses no chance; `seed` has no effect. `separators` as in nested dissection, to be drawn on the mesh.
 * Throws `Fault` "coordinates-count", "coordinates-not-finite", "coordinates-dimensions" and those of `heldFlags`.
 */
export function geometricDissection(
  pattern: Pattern,
  options: GeometricDissectionOptions,
  progress: Progress,
): OrderingResult {
  const { coordinates, dimensions, unknownsPerNode = 1, leafSize = 200 } = options;
  const n = pattern.columns;
  checkCoordinates(n, coordinates, dimensions, unknownsPerNode);
  progress(0, 'graph');
  const g = graphOf(pattern);
  const held = heldFlags(n, options.heldLast);
  const threshold = denseRowThreshold(n);
  const dense = denseVertices(g, threshold, held);
  const state = new Uint8Array(n);
  if (held !== null) for (let i = 0; i < n; i++) if (held[i] === 1) state[i] = HELD;
  for (let k = 0; k < dense.length; k++) state[dense[k]] = ASIDE;
  const whole = makeWholeGraph(g, state);
  const at = vertexCoordinates(whole, coordinates, dimensions, unknownsPerNode);
  progress(0, 'dissection');
  const { order, separators } = dissect(
    whole,
    { leafSize, seed: 1 },
    (piece, part, tools) => coordinateSeparator(piece, part, at, tools),
    progress,
  );
  const notes = denseNotes(dense.length, threshold);
  return expandToUnknowns(whole, order, separators, dense, options.heldLast ?? new Int32Array(0), notes);
}

function checkCoordinates(n: number, coordinates: Float64Array, dimensions: number, unknownsPerNode: number): void {
  if (dimensions !== 1 && dimensions !== 2 && dimensions !== 3) {
    throw new Fault('input', 'coordinates-dimensions', `${dimensions} coordinates to a node; there must be 1, 2 or 3.`);
  }
  const nodes = n / unknownsPerNode;
  if (!Number.isInteger(unknownsPerNode) || unknownsPerNode < 1 || coordinates.length !== nodes * dimensions) {
    throw new Fault(
      'input',
      'coordinates-count',
      `${coordinates.length} coordinates do not fit ${n} unknowns with ${unknownsPerNode} to a node: ` +
        `${nodes} nodes with ${dimensions} coordinates each are needed.`,
    );
  }
  for (let k = 0; k < coordinates.length; k++) {
    if (!Number.isFinite(coordinates[k])) {
      const node = Math.floor(k / dimensions);
      throw new Fault(
        'input',
        'coordinates-not-finite',
        `Coordinate ${(k % dimensions) + 1} of node ${node + 1} is ${coordinates[k]}.`,
      );
    }
  }
}

/** Merged unknowns stand where the first of them does. */
function vertexCoordinates(
  whole: WholeGraph,
  coordinates: Float64Array,
  dimensions: number,
  unknownsPerNode: number,
): VertexCoordinates {
  const values = new Float64Array(whole.order * dimensions);
  for (let v = 0; v < whole.order; v++) {
    const node = Math.floor(whole.unknown[whole.unknownPointer[v]] / unknownsPerNode);
    for (let d = 0; d < dimensions; d++) values[v * dimensions + d] = coordinates[node * dimensions + d];
  }
  return { dimensions, values };
}
