/** Geometric dissection on grids, whose node coordinates are known. */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { checkPermutation } from '../../engine/matrix/check.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { Cancelled, noProgress } from '../../engine/matrix/progress.ts';
import { geometricDissection } from '../../engine/ordering/geometricDissection.ts';
import { nestedDissection } from '../../engine/ordering/nestedDissection.ts';
import { elasticity3d } from '../../engine/problems/brick.ts';
import { grid2d9, grid3d7 } from '../../engine/problems/modelGrids.ts';
import { analyseGraph } from '../../engine/symbolic/analyse.ts';

function gridCoordinates(k: number, dimensions: number): Float64Array {
  const out = new Float64Array(k ** dimensions * dimensions);
  for (let i = 0; i < k ** dimensions; i++) {
    for (let d = 0; d < dimensions; d++) out[i * dimensions + d] = Math.floor(i / k ** d) % k;
  }
  return out;
}

const operations = (a: Pattern, order: ReturnType<typeof geometricDissection>['order']): number =>
  analyseGraph(graphOf(a), order, { postorder: false }).columnCount.reduce((s, c) => s + c * c, 0);

describe('geometric dissection', () => {
  it('cuts a 9-point grid of 31 x 31 along its middle line', () => {
    const a = grid2d9(31);
    const { order, separators } = geometricDissection(
      a,
      { coordinates: gridCoordinates(31, 2), dimensions: 2 },
      noProgress,
    );
    checkPermutation(order, 961);
    const first = separators?.[0];
    expect(first).toEqual({ start: 930, end: 961, level: 0 });
    const columns = new Set([...order.slice(930)].map((i) => i % 31));
    expect(columns.size).toBe(1);
    expect(Math.abs([...columns][0] - 15)).toBeLessThanOrEqual(1);
  });
  it('the first separator separates: no edge leads from one side to the other', () => {
    const a = grid3d7(9);
    const { order, separators } = geometricDissection(
      a,
      { coordinates: gridCoordinates(9, 3), dimensions: 3, leafSize: 30 },
      noProgress,
    );
    const g = graphOf(a);
    const start = separators?.[0].start ?? 0;
    const side = new Int32Array(729).fill(-1);
    const isInside = new Uint8Array(729);
    for (let k = 0; k < start; k++) isInside[order[k]] = 1;
    const stack = [order[0]];
    side[order[0]] = 0;
    let reached = 0;
    for (let v = stack.pop(); v !== undefined; v = stack.pop()) {
      reached++;
      for (let p = g.pointer[v]; p < g.pointer[v + 1]; p++) {
        const u = g.neighbour[p];
        if (isInside[u] === 0 || side[u] === 0) continue;
        side[u] = 0;
        stack.push(u);
      }
    }
    expect(reached).toBeGreaterThan(0.2 * start);
    expect(reached).toBeLessThan(0.8 * start);
  });
  it('three unknowns to a node: operations within 1.3 of nested dissection', () => {
    const a = elasticity3d(8);
    const coordinates = gridCoordinates(8, 3);
    const { order } = geometricDissection(a, { coordinates, dimensions: 3, unknownsPerNode: 3 }, noProgress);
    checkPermutation(order, a.columns);
    expect(operations(a, order)).toBeLessThan(1.3 * operations(a, nestedDissection(a, {}, noProgress).order));
  });
  it('nodes all at one point still give a permutation', () => {
    const coordinates = new Float64Array(2 * 900).fill(3);
    const { order } = geometricDissection(grid2d9(30), { coordinates, dimensions: 2 }, noProgress);
    checkPermutation(order, 900);
  });
  it('keeps held-last unknowns at the end, coordinates unchanged, the same order twice', () => {
    const coordinates = gridCoordinates(30, 2);
    const copy = coordinates.slice();
    const heldLast = Int32Array.from([899, 0, 450]);
    const options = { coordinates, dimensions: 2, heldLast };
    const first = geometricDissection(grid2d9(30), options, noProgress);
    expect(first.order.slice(-3)).toEqual(heldLast);
    expect(coordinates).toEqual(copy);
    expect(geometricDissection(grid2d9(30), options, noProgress)).toEqual(first);
  });
  it('refuses coordinates that do not fit, are not finite, or have four dimensions', () => {
    const a = grid2d9(4);
    const run = (coordinates: Float64Array, dimensions: number, unknownsPerNode = 1) =>
      geometricDissection(a, { coordinates, dimensions, unknownsPerNode }, noProgress);
    expect(() => run(new Float64Array(30), 2)).toThrow(/16 nodes with 2 coordinates/);
    expect(() => run(new Float64Array(32), 2, 3)).toThrow(/do not fit/);
    expect(() => run(new Float64Array(64), 4)).toThrow(/must be 1, 2 or 3/);
    expect(() => run(new Float64Array(32).fill(Number.NaN, 5, 6), 2)).toThrow(/Coordinate 2 of node 3 is NaN/);
  });
  it('stops when progress throws', () => {
    const stop = (fraction: number): void => {
      if (fraction > 0.3) throw new Cancelled();
    };
    const coordinates = gridCoordinates(40, 2);
    expect(() => geometricDissection(grid2d9(40), { coordinates, dimensions: 2 }, stop)).toThrow(Cancelled);
  });
});
