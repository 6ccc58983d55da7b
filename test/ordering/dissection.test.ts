/** The parts of a dissection: arena, matching, contraction, refinement, matching-based improvement, leaves. */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { asNewToOld } from '../../engine/matrix/permutation.ts';
import { Random } from '../../engine/matrix/random.ts';
import { IntegerArena } from '../../engine/ordering/dissection/arena.ts';
import { contract } from '../../engine/ordering/dissection/contract.ts';
import { eliminationCost } from '../../engine/ordering/dissection/eliminationCost.ts';
import { GainHeap } from '../../engine/ordering/dissection/gainHeap.ts';
import { grow } from '../../engine/ordering/dissection/grow.ts';
import { growByDistance } from '../../engine/ordering/dissection/growByDistance.ts';
import { LeafOrdering } from '../../engine/ordering/dissection/leaf.ts';
import { matchInto } from '../../engine/ordering/dissection/matching.ts';
import { improveByMatching } from '../../engine/ordering/dissection/matchingImprovement.ts';
import { findSeparator } from '../../engine/ordering/dissection/multilevelSeparator.ts';
import { refine } from '../../engine/ordering/dissection/refine.ts';
import { SeparationWorkspace, separationCost, separationFlaw } from '../../engine/ordering/dissection/separation.ts';
import type { WeightedGraph } from '../../engine/ordering/dissection/weightedGraph.ts';
import { makeWholeGraph } from '../../engine/ordering/dissection/wholeGraph.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { grid2d5, grid2d9 } from '../../engine/problems/modelGrids.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomPattern } from '../support/random.ts';

function weighted(a: Pattern, weight?: Int32Array): WeightedGraph {
  const { order, pointer, neighbour } = graphOf(a);
  const w = weight ?? new Int32Array(order).fill(1);
  const totalWeight = w.reduce((s, x) => s + x, 0);
  return { order, pointer, neighbour, edgeWeight: new Int32Array(neighbour.length).fill(1), weight: w, totalWeight };
}

const tangled = (seed: number): Pattern =>
  randomPattern({ rows: 200, columns: 200, entries: 500, seed, symmetric: true });

/** Weights of sides and separator, from the part array alone. */
function sizesOf(g: WeightedGraph, part: Int32Array): number[] {
  const sizes = [0, 0, 0];
  for (let v = 0; v < g.order; v++) sizes[part[v]] += g.weight[v];
  return sizes;
}

describe('arena', () => {
  it('hands out disjoint views and takes them back to a mark', () => {
    const arena = new IntegerArena(1024);
    const a = arena.take(1000).fill(1);
    const mark = arena.mark();
    const b = arena.take(5000).fill(2);
    const c = arena.trim(arena.take(300), 100).fill(3);
    expect([a[999], b[4999], c.length]).toEqual([1, 2, 100]);
    arena.release(mark);
    arena.take(24).fill(4);
    expect(a.every((x) => x === 1)).toBe(true);
  });
});

describe('gain heap', () => {
  it.each([1, 2, 3])('gives the largest gain under random pushes, changes and removals, seed %i', (seed) => {
    const random = new Random(seed);
    const heap = new GainHeap(50);
    const gains = new Map<number, number>();
    for (let step = 0; step < 3000; step++) {
      const v = random.below(50);
      const x = random.below(41) - 20;
      if (!gains.has(v)) {
        heap.push(v, x);
        gains.set(v, x);
      } else if (random.below(2) === 0) {
        heap.change(v, x);
        gains.set(v, (gains.get(v) ?? 0) + x);
      } else {
        heap.remove(v);
        gains.delete(v);
      }
      expect(heap.size).toBe(gains.size);
      if (heap.size > 0) {
        expect(heap.topGain()).toBe(Math.max(...gains.values()));
        expect(gains.get(heap.top())).toBe(heap.topGain());
      }
    }
  });
});

describe('matching and contraction', () => {
  const graphs: [string, Pattern][] = [
    ['grid of 30 x 30', grid2d5(30)],
    ['star of 400', modelProblems.arrow(400)],
    ['random, seed 3', tangled(3)],
  ];
  for (const [name, a] of graphs) {
    it(`${name}: a matching, a coarse graph that keeps weights and crossing edges, and no stall`, () => {
      const g = weighted(a);
      const match = new Int32Array(g.order);
      const coarseOf = new Int32Array(g.order);
      const order = matchInto(g, match, coarseOf, 20, 12345);
      expect(order).toBeLessThan(0.65 * g.order);
      for (let v = 0; v < g.order; v++) {
        expect(match[match[v]]).toBe(v);
        expect(coarseOf[match[v]]).toBe(coarseOf[v]);
      }
      const coarse = contract(g, match, coarseOf, order, new Int32Array(order), new IntegerArena(0));
      const expected = new Map<string, number>();
      const weight = new Array(order).fill(0);
      for (let v = 0; v < g.order; v++) {
        weight[coarseOf[v]] += g.weight[v];
        for (let p = g.pointer[v]; p < g.pointer[v + 1]; p++) {
          const key = `${coarseOf[v]} ${coarseOf[g.neighbour[p]]}`;
          if (coarseOf[v] !== coarseOf[g.neighbour[p]]) expected.set(key, (expected.get(key) ?? 0) + 1);
        }
      }
      expect([...coarse.weight]).toEqual(weight);
      const found = new Map<string, number>();
      for (let c = 0; c < order; c++) {
        for (let p = coarse.pointer[c]; p < coarse.pointer[c + 1]; p++) {
          found.set(`${c} ${coarse.neighbour[p]}`, coarse.edgeWeight[p]);
        }
      }
      expect(coarse.neighbour.length).toBe(expected.size);
      expect(found).toEqual(expected);
    });
  }
});

describe('separations', () => {
  it('the checker names an edge between the sides and a value that is no part', () => {
    const g = weighted(grid2d5(3));
    const good = Int32Array.from([0, 2, 1, 0, 2, 1, 0, 2, 1]);
    expect(separationFlaw(g, good)).toBeNull();
    expect(separationFlaw(g, Int32Array.from([0, 2, 1, 0, 0, 1, 0, 2, 1]))).toMatch(
      /vertices 4 \(side 0\) and 5 \(side 1\)/,
    );
    expect(separationFlaw(g, Int32Array.from([0, 2, 1, 0, 3, 1, 0, 2, 1]))).toMatch(/part\[4\] = 3/);
  });
  for (const seed of [1, 2, 3, 4, 5, 6]) {
    it(`growing, refining and matching keep a separation, its bookkeeping, and never worsen it, seed ${seed}`, () => {
      const random = new Random(seed);
      const a = seed % 2 === 0 ? tangled(seed) : grid2d9(14);
      const weight = new Int32Array(a.columns).map(() => 1 + random.below(4));
      const g = weighted(a, weight);
      const w = new SeparationWorkspace(g.order);
      const part = new Int32Array(g.order);
      const check = (cost: number): void => {
        expect(separationFlaw(g, part)).toBeNull();
        expect([...w.sizes]).toEqual(sizesOf(g, part));
        const listed = [...w.list.slice(0, w.count)].sort((x, y) => x - y);
        expect(listed).toEqual([...part.keys()].filter((v) => part[v] === 2));
        expect(cost).toBeCloseTo(separationCost(w.sizes[0], w.sizes[1], w.sizes[2], 0.65, w.evenness), 9);
      };
      for (const start of [grow, growByDistance]) {
        const grown = start(g, part, w, random.below(g.order), 0.65);
        check(grown);
        const matched = improveByMatching(g, part, w, 0.65, new IntegerArena(0));
        check(matched);
        expect(matched).toBeLessThanOrEqual(grown);
        const refined = refine(g, part, w, 0.65, 5, 20);
        check(refined);
        expect(refined).toBeLessThanOrEqual(matched);
      }
    });
  }
  it('a step in a layered separator of a 9-point grid goes in one matching, to the straight line of 12', () => {
    const g = weighted(grid2d9(12));
    const part = new Int32Array(144);
    // rows 0 to 5 have the separator in column 5, rows 6 to 11 in column 6, with the corner doubled
    for (let y = 0; y < 12; y++) {
      for (let x = 0; x < 12; x++) {
        const at = y < 6 ? 5 : 6;
        part[12 * y + x] = x < at ? 0 : x > at ? 1 : 2;
      }
    }
    part[12 * 6 + 5] = 2;
    expect(separationFlaw(g, part)).toBeNull();
    const w = new SeparationWorkspace(144);
    w.measure(g, part);
    improveByMatching(g, part, w, 0.7, new IntegerArena(0));
    expect(separationFlaw(g, part)).toBeNull();
    expect(w.sizes[2]).toBe(12);
  });
  it.each([1, 2, 3])('the whole search separates a random graph, seed %i', (seed) => {
    const g = weighted(tangled(seed));
    const part = new Int32Array(200);
    const workspace = new SeparationWorkspace(200);
    const tools = { arena: new IntegerArena(0), workspace, random: new Random(seed), pulse: () => {} };
    findSeparator(g, part, { balance: 0.7, tries: 2, runs: 3 }, tools);
    expect(separationFlaw(g, part)).toBeNull();
    expect([...workspace.sizes]).toEqual(sizesOf(g, part));
  });
});

describe('leaves', () => {
  it.each([1, 2, 3, 4])(
    'operations of a leaf with halo are those of the elimination with the halo last, seed %i',
    (seed) => {
      const a = randomPattern({ rows: 60, columns: 60, entries: 90, seed, symmetric: true });
      const g = graphOf(a);
      const leaf = new LeafOrdering(60, g.pointer, g.neighbour, new Int32Array(60).fill(1));
      const target = new Int32Array(60);
      leaf.orderInto(
        Int32Array.from({ length: 40 }, (_, k) => k),
        target,
        0,
      );
      for (let k = 40; k < 60; k++) target[k] = k;
      expect([...target].sort((x, y) => x - y)).toEqual([...new Array(60).keys()]);
      const { columns } = naiveElimination(a, target);
      let operations = 0;
      for (const c of columns.slice(0, 40)) operations += c.length ** 2;
      expect(leaf.operations).toBe(operations);
    },
  );
  it('weights count as so many unknowns: a merged graph costs what the whole one does', () => {
    // each vertex of a 6 x 6 grid stands for three unknowns
    const g = graphOf(grid2d5(6));
    const leaf = new LeafOrdering(36, g.pointer, g.neighbour, new Int32Array(36).fill(3));
    const order = new Int32Array(36);
    leaf.orderInto(Int32Array.from(order.keys()), order, 0);
    const row: number[] = [];
    const columnPointer = [0];
    for (let v = 0; v < 36; v++) {
      for (let x = 0; x < 3; x++) {
        const near = [v, ...g.neighbour.slice(g.pointer[v], g.pointer[v + 1])].sort((s, t) => s - t);
        for (const u of near) row.push(3 * u, 3 * u + 1, 3 * u + 2);
        columnPointer.push(row.length);
      }
    }
    const pattern = {
      rows: 108,
      columns: 108,
      columnPointer: Int32Array.from(columnPointer),
      rowIndex: Int32Array.from(row),
    };
    const whole = [...order].flatMap((v) => [3 * v, 3 * v + 1, 3 * v + 2]);
    const outside = naiveElimination(pattern, whole).operations;
    expect(leaf.operations).toBe(outside);
    const merged = makeWholeGraph(graphOf(pattern), new Uint8Array(108));
    expect(merged.order).toBe(36);
    const sameOrder = Int32Array.from(order, (v) => merged.unknown.indexOf(3 * v) / 3);
    expect(eliminationCost(merged, sameOrder, 1e9)).toBe(outside);
    expect(eliminationCost(merged, sameOrder, 5)).toBe(Number.POSITIVE_INFINITY);
  });
  it('the cost of an order is that of the elimination of its pattern, seed 8', () => {
    const a = randomPattern({ rows: 80, columns: 80, entries: 150, seed: 8, symmetric: true });
    const whole = makeWholeGraph(graphOf(a), new Uint8Array(80));
    const order = Int32Array.from({ length: whole.order }, (_, k) => k);
    const unknowns = asNewToOld(whole.unknown.slice());
    expect(eliminationCost(whole, order, 1e9)).toBe(naiveElimination(a, unknowns).operations);
  });
});
