import { describe, expect, it } from 'vitest';
import { checkPermutation } from '../../engine/matrix/check.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { asNewToOld } from '../../engine/matrix/permutation.ts';
import { permutePattern } from '../../engine/matrix/permute.ts';
import { Cancelled, noProgress } from '../../engine/matrix/progress.ts';
import { columnMinimumDegree } from '../../engine/ordering/columnMinimumDegree.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { minimumFill } from '../../engine/ordering/minimumFill.ts';
import { natural } from '../../engine/ordering/natural.ts';
import type { OrderingMethod } from '../../engine/ordering/ordering.ts';
import { reverseCuthillMcKee } from '../../engine/ordering/reverseCuthillMcKee.ts';
import { sloan } from '../../engine/ordering/sloan.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { randomOrder, randomPattern } from '../support/random.ts';
import { clique, fromEdges, grid, path, star, twoCliques } from './graphs.ts';

const methods: Record<string, OrderingMethod> = {
  natural,
  reverseCuthillMcKee,
  sloan,
  minimumDegree,
  minimumFill,
  columnMinimumDegree,
};

const hostile: Record<string, Pattern> = {
  empty: fromEdges(0, []),
  'one vertex': fromEdges(1, []),
  'a thousand isolated vertices': fromEdges(1000, []),
  'star of 500': star(500),
  'clique of 60': fromEdges(60, clique(60)),
  'two cliques of 40 joined by an edge': twoCliques(40),
  'diagonal only': {
    rows: 3,
    columns: 3,
    columnPointer: Int32Array.from([0, 1, 2, 3]),
    rowIndex: Int32Array.from([0, 1, 2]),
  },
  'unsymmetric, seed 3': randomPattern({ rows: 90, columns: 90, entries: 250, seed: 3 }),
  'grid of 25 × 25': grid(25),
  'path of 100,000': path(100_000),
};

const fillOf = (a: Pattern, order: Int32Array): number =>
  analyse(a, asNewToOld(order), { postorder: false }).factorEntries;

for (const [name, method] of Object.entries(methods)) {
  describe(name, () => {
    for (const [title, a] of Object.entries(hostile)) {
      it(`orders ${title}: a permutation, the same twice, input untouched`, () => {
        const before = { pointer: a.columnPointer.slice(), index: a.rowIndex.slice() };
        const { order } = method(a, {}, noProgress);
        checkPermutation(order, a.columns);
        expect(method(a, {}, noProgress).order).toEqual(order);
        expect(a.columnPointer).toEqual(before.pointer);
        expect(a.rowIndex).toEqual(before.index);
      });
    }
    it('keeps held-last unknowns at the end in the order given', () => {
      const { order } = method(grid(12), { heldLast: Int32Array.from([60, 5, 143]) }, noProgress);
      checkPermutation(order, 144);
      expect([...order.slice(141)]).toEqual([60, 5, 143]);
    });
    it('refuses held-last unknowns that are repeated or out of range', () => {
      expect(() => method(grid(3), { heldLast: Int32Array.from([1, 1]) }, noProgress)).toThrow(/twice/);
      expect(() => method(grid(3), { heldLast: Int32Array.from([9]) }, noProgress)).toThrow(/between 1 and 9/);
    });
  });
}

describe('closed forms', () => {
  it('star, path and two joined cliques have no fill under minimum degree and minimum fill', () => {
    const undeferred = { denseThreshold: Number.POSITIVE_INFINITY };
    for (const method of [minimumDegree, minimumFill]) {
      expect(fillOf(star(500), method(star(500), undeferred, noProgress).order)).toBe(999);
      expect(fillOf(path(2000), method(path(2000), undeferred, noProgress).order)).toBe(3999);
      expect(fillOf(twoCliques(40), method(twoCliques(40), undeferred, noProgress).order)).toBe(
        (2 * (40 * 41)) / 2 + 1,
      );
    }
  });
  it('a path of a million has no fill and bandwidth 1', () => {
    const a = path(1_000_000);
    expect(fillOf(a, minimumDegree(a, {}, noProgress).order)).toBe(1_999_999);
    const { order } = reverseCuthillMcKee(a, {}, noProgress);
    for (let k = 1; k < order.length; k += 999) expect(Math.abs(order[k] - order[k - 1])).toBe(1);
  });
  it('the hub of a star is set aside as dense, and a switch turns that off', () => {
    expect(minimumDegree(star(5000), {}, noProgress).notes).toEqual([
      '1 dense row set aside (more than 707 neighbours)',
    ]);
    expect(minimumDegree(star(5000), { denseThreshold: Number.POSITIVE_INFINITY }, noProgress).notes).toEqual([]);
  });
  it('relabelling a 40 × 40 grid changes the fill of minimum degree by less than 12 % (our own limit), seeds 1 … 6', () => {
    const a = grid(40);
    const fills = [1, 2, 3, 4, 5, 6].map((seed) => {
      const p = randomOrder(1600, seed);
      const b = permutePattern(a, p, p);
      return fillOf(b, minimumDegree(b, {}, noProgress).order);
    });
    expect(Math.max(...fills) / Math.min(...fills)).toBeLessThan(1.12);
  });
});

describe('cancel', () => {
  const a = randomPattern({ rows: 20000, columns: 20000, entries: 60000, seed: 5, symmetric: true });
  const stop = (): void => {
    throw new Cancelled();
  };
  for (const name of ['reverseCuthillMcKee', 'sloan', 'minimumDegree', 'minimumFill', 'columnMinimumDegree']) {
    it(`${name} stops when asked`, () => {
      expect(() => methods[name](a, {}, stop)).toThrow(Cancelled);
    });
  }
});
