import { describe, expect, it } from 'vitest';
import type { Graph } from '../../engine/graph/graph.ts';

import { checkPermutation } from '../../engine/matrix/check.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { Cancelled, noProgress } from '../../engine/matrix/progress.ts';
import { Random } from '../../engine/matrix/random.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { minimumDegreeOfGraph } from '../../engine/ordering/minimumDegreeOfGraph.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomPattern } from '../support/random.ts';
import { fromEdges } from './graphs.ts';

const undeferred = { denseThreshold: Number.POSITIVE_INFINITY };

function shuffled(n: number, seed: number): Int32Array {
  const a = new Int32Array(n);
  for (let i = 0; i < n; i++) a[i] = i;
  return new Random(seed).shuffleInPlace(a);
}

describe('minimum degree: graphs without fill', () => {
  for (const seed of Array.from({ length: 30 }, (_, k) => k + 1)) {
    it(`a random tree of 300 has no fill (Parter 1961), seed ${seed}`, () => {
      const random = new Random(seed);
      const name = shuffled(300, seed);
      const edges: [number, number][] = [];
      for (let i = 1; i < 300; i++) edges.push([name[i], name[random.below(i)]]);
      const { order } = minimumDegree(fromEdges(300, edges), undeferred, noProgress);
      expect(naiveElimination(fromEdges(300, edges), order).factorEntries).toBe(599);
    });
    it(`a random 2-tree of 200 has no fill, seed ${seed}`, () => {
      const random = new Random(seed);
      const name = shuffled(200, seed);
      const edges: [number, number][] = [[0, 1]];
      for (let i = 2; i < 200; i++) {
        const [u, v] = edges[random.below(edges.length)];
        edges.push([i, u], [i, v]);
      }
      const a = fromEdges(
        200,
        edges.map(([u, v]) => [name[u], name[v]] as const),
      );
      const { order } = minimumDegree(a, undeferred, noProgress);
      expect(naiveElimination(a, order).factorEntries).toBe(200 + edges.length);
    });
  }
});

/** Replays the pivots and compares each approximate degree with the true external one. Returns [too low, exact, too high]. */
function compareDegrees(a: Pattern, graph: Graph): [number, number, number] {
  const events: { pivot: number; weight: number; degree: number }[] = [];
  const { order } = minimumDegreeOfGraph(
    graph,
    { onPivot: (pivot, weight, degree) => events.push({ pivot, weight, degree }) },
    noProgress,
  );
  const columns = naiveElimination(a, order).columns;
  const position = new Map<number, number>();
  for (let k = 0; k < order.length; k++) position.set(order[k], k);
  const tally: [number, number, number] = [0, 0, 0];
  for (const { pivot, weight, degree } of events) {
    const truth = columns[position.get(pivot) ?? -1].length - weight;
    tally[degree < truth ? 0 : degree === truth ? 1 : 2]++;
  }
  return tally;
}

describe('minimum degree: the approximate degree', () => {
  for (const seed of [11, 12, 13, 14, 15, 16, 17, 18]) {
    it(`is never below the true external degree (Amestoy, Davis & Duff 1996, theorem), seed ${seed}`, () => {
      const n = 60 + 10 * (seed % 4);
      const a = randomPattern({ rows: n, columns: n, entries: 2 * n + (seed % 3) * 40, seed, symmetric: true });
      const [low, exact] = compareDegrees(a, graphOfPattern(a));
      expect(low).toBe(0);
      expect(exact).toBeGreaterThan(0);
    });
  }
});

function graphOfPattern(a: Pattern): Graph {
  const pointer = new Int32Array(a.columns + 1);
  const neighbour: number[] = [];
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (a.rowIndex[p] !== j) neighbour.push(a.rowIndex[p]);
    }
    pointer[j + 1] = neighbour.length;
  }
  return { order: a.columns, pointer, neighbour: Int32Array.from(neighbour) };
}

describe('minimum degree: halo, held-last and shape of the result', () => {
  it('orders random patterns, seeds 21 … 40, as permutations', () => {
    for (let seed = 21; seed <= 40; seed++) {
      const n = 1 + ((seed * 7) % 90);
      const a = randomPattern({ rows: n, columns: n, entries: 3 * n, seed });
      checkPermutation(minimumDegree(a, {}, noProgress).order, n);
    }
  });
  it('keeps held-last unknowns at the end in the given order, seed 5', () => {
    const a = randomPattern({ rows: 80, columns: 80, entries: 200, seed: 5, symmetric: true });
    const heldLast = Int32Array.from([7, 3, 70, 12]);
    const { order } = minimumDegree(a, { heldLast }, noProgress);
    checkPermutation(order, 80);
    expect([...order.slice(76)]).toEqual([7, 3, 70, 12]);
  });
  it('stops when asked', () => {
    const a = randomPattern({ rows: 60000, columns: 60000, entries: 150000, seed: 5, symmetric: true });
    const stop = (): void => {
      throw new Cancelled();
    };
    expect(() => minimumDegree(a, {}, stop)).toThrow(Cancelled);
  });
});
