/**
 * Exact counts: against figures counted twice outside, in Python and C++ (test/reference/README.md), against closed forms, and against
 * elimination on sets.
 */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { asNewToOld, identityOrder } from '../../engine/matrix/permutation.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { choleskyOperations } from '../../engine/symbolic/operations.ts';
import { profileOf } from '../../engine/symbolic/profile.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomOrder, randomPattern } from '../support/random.ts';
import { figures, generatedFigures, readableNames, readReference } from '../support/reference.ts';

describe('analyse against outside figures', () => {
  const matrices = [
    ...readableNames().map((name) => ({ name, figure: figures[name], make: () => readReference(name) })),
    ...Object.entries(generatedFigures)
      .filter(([name]) => name.split('-')[0] in modelProblems)
      .map(([name, figure]) => {
        const [kind, size] = name.split('-');
        return { name, figure, make: () => modelProblems[kind](Number(size)) };
      }),
  ];
  for (const { name, figure, make } of matrices) {
    for (const [ordering, expected] of Object.entries(figure.orderings ?? {})) {
      const natural = ordering === 'natural';
      if (!natural && expected.order === undefined) continue;
      it(`${name}, ${ordering}: entries, operations, height, bandwidth, envelope`, () => {
        const a = make();
        const order = natural ? identityOrder(a.columns) : asNewToOld(Int32Array.from(expected.order ?? []));
        for (const post of [false, true]) {
          const s = analyse(a, order, { postorder: post });
          expect(s.factorEntries).toBe(expected.factorEntries);
          expect(choleskyOperations(s.columnCount)).toBe(expected.operations);
          expect(s.treeHeight).toBe(expected.treeHeight);
        }
        const { bandwidth, envelope } = profileOf(graphOf(a), order);
        if (expected.bandwidth !== undefined) expect(bandwidth).toBe(expected.bandwidth);
        if (expected.envelope !== undefined) expect(envelope).toBe(expected.envelope);
      });
    }
  }
});

describe('analyse against elimination on sets', () => {
  for (let seed = 1; seed <= 40; seed++) {
    it(`random pattern and order (seed ${seed})`, () => {
      const n = 1 + (seed % 37);
      const a = randomPattern({ rows: n, columns: n, entries: Math.floor(n * (0.5 + (seed % 5))), seed });
      const order = randomOrder(n, seed + 100);
      const naive = naiveElimination(a, order);
      const s = analyse(a, order, { postorder: false });
      expect(Array.from(s.parent)).toEqual(naive.parent);
      expect(Array.from(s.columnCount)).toEqual(naive.columns.map((c) => c.length));
      const held = seed % 4;
      const p = analyse(a, order, { postorder: true, heldLast: Math.min(n, held) });
      const again = naiveElimination(a, p.order);
      expect(Array.from(p.parent)).toEqual(again.parent);
      expect(Array.from(p.columnCount)).toEqual(again.columns.map((c) => c.length));
      expect(p.factorEntries).toBe(naive.factorEntries);
      for (let k = n - Math.min(n, held); k < n; k++) expect(p.order[k]).toBe(order[k]);
    });
  }
});

describe('closed forms', () => {
  it('natural order of a k×k grid fills the envelope: k³ + k − 1 entries, height k² (George & Liu 1981; from memory)', () => {
    for (const k of [2, 3, 10, 40]) {
      const s = analyse(modelProblems.grid2d5(k), identityOrder(k * k), { postorder: false });
      expect(s.factorEntries).toBe(k ** 3 + k - 1);
      expect(s.treeHeight).toBe(k * k);
    }
  });

  it('arrowhead: hub first fills completely, hub last not at all (common practice, no source)', () => {
    const n = 50;
    const a = modelProblems.arrow(n);
    expect(analyse(a, identityOrder(n), { postorder: false }).factorEntries).toBe((n * (n + 1)) / 2);
    const last = asNewToOld(Int32Array.from({ length: n }, (_, k) => (k + 1) % n));
    expect(analyse(a, last, { postorder: false }).factorEntries).toBe(2 * n - 1);
  });

  it('empty and one-row matrices', () => {
    const empty = { rows: 0, columns: 0, columnPointer: new Int32Array(1), rowIndex: new Int32Array(0) };
    expect(analyse(empty, identityOrder(0), { postorder: true })).toMatchObject({ factorEntries: 0, treeHeight: 0 });
    const bare = { rows: 3, columns: 3, columnPointer: new Int32Array(4), rowIndex: new Int32Array(0) };
    expect(analyse(bare, identityOrder(3), { postorder: true })).toMatchObject({ factorEntries: 3, treeHeight: 1 });
  });
});
