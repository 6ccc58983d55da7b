/** Closed forms and bounds of the forecast room. */
import { describe, expect, it } from 'vitest';
import { calibrate, modelErrors } from '../../engine/forecast/calibrate.ts';
import { delayedGrowth } from '../../engine/forecast/delayed.ts';
import { workOfFronts } from '../../engine/forecast/frontWork.ts';
import { fitGrowth, growthAt, largestSize } from '../../engine/forecast/growth.ts';
import { listSchedule, parallelProfile, waysToRoot } from '../../engine/forecast/parallel.ts';
import { reconcile } from '../../engine/forecast/reconcile.ts';
import { storageOf } from '../../engine/forecast/storage.ts';
import { defaultTarget } from '../../engine/forecast/target.ts';
import { rateAt } from '../../engine/forecast/time.ts';
import { compareWorkload, workloadSeconds } from '../../engine/forecast/workload.ts';
import { identityOrder } from '../../engine/matrix/permutation.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { planFronts } from '../../engine/numeric/fronts/plan.ts';
import { nestedDissection } from '../../engine/ordering/nestedDissection.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { noAmalgamation } from '../../engine/symbolic/amalgamate.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { assemblyTree } from '../../engine/symbolic/assemblyTree.ts';
import { denseOperations, factorOperations } from '../../engine/symbolic/operations.ts';
import { stackPeak } from '../../engine/symbolic/stack.ts';
import { randomOrder, randomPattern } from '../support/random.ts';

const treeOf = (seed: number, n = 60) => {
  const a = randomPattern({ rows: n, columns: n, entries: 3 * n, seed });
  const factor = analyse(a, randomOrder(n, seed), { postorder: true });
  return { factor, tree: assemblyTree(factor, { amalgamation: noAmalgamation }) };
};

describe('work of fronts', () => {
  it('adds up to the operations by column counts for every factorization when nothing is padded (seeds 1 to 20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { factor, tree } = treeOf(seed);
      for (const kind of ['cholesky', 'ldlt', 'lu'] as const) {
        const sum = workOfFronts(kind, tree).reduce((a, b) => a + b, 0);
        expect(sum).toBe(factorOperations(kind, factor.columnCount));
      }
    }
  });

  it('dense n: Cholesky n(n+1)(2n+1)/6; LU (4n³ − 3n² − n)/6 (Golub & Van Loan; from memory)', () => {
    for (const n of [1, 2, 7, 30]) {
      expect(denseOperations('cholesky', n, n)).toBe((n * (n + 1) * (2 * n + 1)) / 6);
      expect(denseOperations('lu', n, n)).toBe((4 * n ** 3 - 3 * n ** 2 - n) / 6);
    }
  });
});

describe('storage', () => {
  it('dense n: L and U fit in the n² places of A, the unit diagonal not stored; substitution takes n² multiplications and divisions (common practice, no source)', () => {
    const n = 25;
    const a = {
      rows: n,
      columns: n,
      columnPointer: Int32Array.from({ length: n + 1 }, (_, j) => j * n),
      rowIndex: Int32Array.from({ length: n * n }, (_, p) => p % n),
    };
    const factor = analyse(a, identityOrder(n), { postorder: false });
    const l = factor.factorEntries;
    expect(l + l - n).toBe(n * n);
    // forward: one multiplication for each entry below the diagonal; back: one for each above, and n divisions
    expect(l - n + (l - n) + n).toBe(n * n);
    const storage = storageOf({
      size: n,
      lowerEntries: l,
      upperEntries: l,
      envelope: (n * (n - 1)) / 2,
      matrixEntries: n * n,
      tree: null,
      layout: { valueBytes: 8, indexBytes: 4, pointerBytes: 8 },
      kind: 'exact',
    });
    expect(storage.overwriting.value).not.toBeNull();
    expect(storage.dense.value).toBe(8 * n * n);
    expect(storage.compressedColumns.value).toBe(12 * n * n + 2 * 8 * (n + 1));
  });

  it('band of half width w in natural order: the envelope layout holds the band (closed form)', () => {
    const n = 40;
    const w = 3;
    const env = n * w - (w * (w + 1)) / 2;
    const s = storageOf({
      size: n,
      lowerEntries: env + n,
      upperEntries: null,
      envelope: env,
      matrixEntries: 2 * env + n,
      tree: null,
      layout: { valueBytes: 8, indexBytes: 4, pointerBytes: 8 },
      kind: 'exact',
    });
    expect(s.envelope.value).toBe(8 * (env + n) + 8 * (n + 1));
  });

  it('the stack equals the numeric room’s own plan (seeds 1 to 20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { tree } = treeOf(seed);
      expect(stackPeak(tree, { blocks: 'packed', parent: 'before' })).toBe(planFronts(tree, true, 0).stack);
      expect(stackPeak(tree, { blocks: 'square', parent: 'before' })).toBe(planFronts(tree, false, 0).stack);
    }
  });

  it('Liu’s order of children never needs more stack than the plain postorder (Liu 1986)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { factor } = treeOf(seed);
      for (const blocks of ['packed', 'square'] as const) {
        const layout = { blocks, parent: 'before' } as const;
        const best = stackPeak(assemblyTree(factor, { amalgamation: noAmalgamation, blocks }), layout);
        const plain = stackPeak(assemblyTree(factor, { amalgamation: noAmalgamation, bestChildren: false }), layout);
        expect(best).toBeLessThanOrEqual(plain);
      }
    }
  });
});

describe('stack', () => {
  /** Least stack over every order of the children of every node, by trying all. */
  function leastStack(tree: ReturnType<typeof treeOf>['tree'], square: boolean): number {
    const children: number[][] = Array.from({ length: tree.count }, () => []);
    const roots: number[] = [];
    for (let s = 0; s < tree.count; s++) (tree.parent[s] < 0 ? roots : children[tree.parent[s]]).push(s);
    const block = (s: number): number => {
      const rest = tree.frontOrder[s] - (tree.firstColumn[s + 1] - tree.firstColumn[s]);
      return square ? rest * rest : (rest * (rest + 1)) / 2;
    };
    const orders = (list: readonly number[]): number[][] =>
      list.length < 2 ? [[...list]] : list.flatMap((x) => orders(list.filter((y) => y !== x)).map((o) => [x, ...o]));
    const need = (s: number): number => {
      let least = Number.POSITIVE_INFINITY;
      const needs = new Map(children[s].map((c) => [c, need(c)]));
      for (const order of orders(children[s])) {
        let held = 0;
        let peak = 0;
        for (const c of order) {
          peak = Math.max(peak, held + (needs.get(c) ?? 0));
          held += block(c);
        }
        least = Math.min(least, Math.max(peak, held + block(s)));
      }
      return least;
    };
    return Math.max(...roots.map(need));
  }

  it('Liu’s order of children is the best of all orders, packed and square (seeds 1 to 25)', () => {
    for (let seed = 1; seed <= 25; seed++) {
      const n = 24;
      const a = randomPattern({ rows: n, columns: n, entries: 34, seed });
      const factor = analyse(a, randomOrder(n, seed), { postorder: true });
      for (const blocks of ['packed', 'square'] as const) {
        const tree = assemblyTree(factor, { amalgamation: noAmalgamation, blocks });
        const counts = new Int32Array(tree.count);
        for (let s = 0; s < tree.count; s++) if (tree.parent[s] >= 0) counts[tree.parent[s]]++;
        if (counts.some((c) => c > 7)) continue;
        expect(stackPeak(tree, { blocks, parent: 'before' })).toBe(leastStack(tree, blocks === 'square'));
      }
    }
  });
});

describe('parallelism', () => {
  it('list schedule: not below the larger of path and fair share, not above Graham’s bound W/p + (1 − 1/p)·path (Graham 1969, Brent 1974)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const { tree } = treeOf(seed, 150);
      const work = workOfFronts('cholesky', tree);
      const total = work.reduce((a, b) => a + b, 0);
      const path = waysToRoot(tree.parent, work).reduce((a, b) => Math.max(a, b), 0);
      for (const p of [1, 2, 3, 8, 64]) {
        const { span } = listSchedule(tree, work, p);
        expect(span).toBeGreaterThanOrEqual(Math.max(path, total / p) * (1 - 1e-12));
        expect(span).toBeLessThanOrEqual((total / p + (1 - 1 / p) * path) * (1 + 1e-12));
      }
    }
  });

  it('a chain has no parallelism, independent fronts have all (closed form)', () => {
    const chain = {
      count: 4,
      parent: Int32Array.of(1, 2, 3, -1),
      frontOrder: new Int32Array(4).fill(2),
      firstColumn: Int32Array.of(0, 1, 2, 3, 4),
    };
    expect(listSchedule(chain, Float64Array.of(5, 5, 5, 5), 8).span).toBe(20);
    const free = { ...chain, parent: new Int32Array(4).fill(-1) };
    expect(listSchedule(free, Float64Array.of(5, 5, 5, 5), 4).span).toBe(5);
    expect(listSchedule(free, Float64Array.of(5, 5, 5, 5), 3).span).toBe(10);
  });

  it('a profile: one worker has no speed-up and no idle time, no row is above its own bound', () => {
    const a = modelProblems.grid2d5(40);
    const { order } = nestedDissection(a, {}, noProgress);
    const tree = assemblyTree(analyse(a, order, { postorder: true }));
    const profile = parallelProfile(tree, workOfFronts('cholesky', tree));
    expect(profile.rows[0].speedup).toBeCloseTo(1, 12);
    expect(profile.rows[0].idle).toBeCloseTo(0, 12);
    for (const row of profile.rows) {
      expect(row.speedup).toBeLessThanOrEqual(row.bound * (1 + 1e-12));
      expect(row.splitSpeedup).toBeLessThanOrEqual(row.splitBound * (1 + 1e-12));
      expect(row.splitSpeedup).toBeLessThanOrEqual(row.workers * (1 + 1e-12));
    }
    expect(profile.divisibleFrontsSpeedup).toBeGreaterThan(profile.sequentialFrontsSpeedup);
  });
});

describe('workload', () => {
  const slow = { name: 'A', factorEntries: 10, analysis: 1, factorization: 4, solve: 0.5, refinementStep: 0 };
  const quick = { name: 'B', factorEntries: 20, analysis: 30, factorization: 2, solve: 0.1, refinementStep: 0 };

  it('break-evens are where the totals cross, by direct evaluation', () => {
    const w = { factorizations: 1, rightHandSides: 1, refinementSteps: 0 };
    const { breakEvens, lines } = compareWorkload([slow, quick], w);
    expect(lines.find((l) => l.best)?.name).toBe('A');
    for (const b of breakEvens) {
      const better = b.better === 'A' ? slow : quick;
      const other = b.better === 'A' ? quick : slow;
      const at = (k: number) => (b.by === 'factorizations' ? { ...w, factorizations: k } : { ...w, rightHandSides: k });
      expect(workloadSeconds(better, at(b.from))).toBeLessThan(workloadSeconds(other, at(b.from)));
      expect(workloadSeconds(better, at(b.from - 1))).toBeGreaterThanOrEqual(workloadSeconds(other, at(b.from - 1)));
    }
    expect(breakEvens.some((b) => b.by === 'factorizations' && b.from === 13)).toBe(true);
  });

  it('says when least fill is not least time', () => {
    const { remark } = compareWorkload([slow, quick], { factorizations: 100, rightHandSides: 1, refinementSteps: 0 });
    expect(remark).toContain('Least fill is not least time');
  });
});

describe('time model', () => {
  it('calibration on samples of the model itself finds its rates', () => {
    const truth = { ...defaultTarget, largeRate: 7e9, smallRate: 5e8 };
    const samples = [20, 80, 300, 900].map((m) => ({
      operations: 1e9,
      seconds: 1e9 / rateAt(m, truth),
      frontOrder: m,
    }));
    const found = calibrate(samples, defaultTarget);
    expect(found.largeRate / truth.largeRate).toBeCloseTo(1, 6);
    expect(found.smallRate / truth.smallRate).toBeCloseTo(1, 6);
    expect(Math.max(...modelErrors(samples, found))).toBeLessThan(1e-6);
    // a model twice too slow is wrong by a factor of two
    const slow = { ...truth, largeRate: truth.largeRate / 2, smallRate: truth.smallRate / 2 };
    for (const error of modelErrors(samples, slow)) expect(error).toBeCloseTo(1, 9);
  });

  it('calibration on samples of many fronts each, and with nothing to tell the two rates apart', () => {
    const truth = { ...defaultTarget, largeRate: 3e9, smallRate: 4e8 };
    const seconds = (fronts: readonly { order: number; operations: number }[]) =>
      fronts.reduce((sum, f) => sum + f.operations / rateAt(f.order, truth), 0);
    const samples = [1, 2, 3].map((k) => {
      const fronts = [8, 40, 200, 500].map((order) => ({ order, operations: 1e6 * order ** k }));
      return {
        operations: fronts.reduce((a, f) => a + f.operations, 0),
        seconds: seconds(fronts),
        frontOrder: 0,
        fronts,
      };
    });
    const found = calibrate(samples, defaultTarget);
    expect(found.largeRate / truth.largeRate).toBeCloseTo(1, 5);
    expect(found.smallRate / truth.smallRate).toBeCloseTo(1, 5);
    const one = calibrate([{ operations: 1e9, seconds: 0.5, frontOrder: 100 }], defaultTarget);
    expect(rateAt(100, one)).toBeCloseTo(2e9, -3);
    expect(one.largeRate).toBeGreaterThanOrEqual(one.smallRate);
  });
});

describe('growth', () => {
  const sizes2d = [20, 40, 60, 90, 130];
  const measured = sizes2d.map((k) => {
    const a = modelProblems.grid2d5(k);
    const { order } = nestedDissection(a, {}, noProgress);
    const s = analyse(a, order, { postorder: true });
    return { n: k * k, entries: s.factorEntries, operations: factorOperations('cholesky', s.columnCount) };
  });

  it('leaving out the largest size predicts it within 10 % (2-D, entries and operations; theory: George 1973)', () => {
    for (const [key, law] of [
      ['entries', 'n log n'],
      ['operations', 'n^(3/2)'],
    ] as const) {
      const points = measured.map((m) => ({ n: m.n, value: m[key] }));
      const last = points[points.length - 1];
      const fit = fitGrowth(points.slice(0, -1), law);
      expect(Math.abs(growthAt(fit, last.n) / last.value - 1)).toBeLessThan(0.1);
      expect(fit.confident).toBe(true);
    }
  });

  it('answers how large n can be, with the distance of the extrapolation', () => {
    const fit = fitGrowth(
      [
        { n: 100, value: 1000 },
        { n: 1000, value: 100_000 },
      ],
      'free exponent',
    );
    expect(fit.b).toBeCloseTo(2, 10);
    const { n, distance } = largestSize(fit, 1e7, 1000);
    expect(Math.abs(n - 10_000)).toBeLessThanOrEqual(1);
    expect(distance).toBeCloseTo(10, 2);
  });
});

describe('reconcile', () => {
  const own = {
    size: 100,
    name: 'minimum-degree',
    lowerEntries: 1234,
    upperEntries: null,
    storedFactorEntries: 1300,
    kind: 'cholesky' as const,
    operations: 50_000,
    paddedOperations: 52_000,
    complex: false,
    layouts: [['panels', 17_000]] as const,
  };

  it('finds the convention that explains a figure, or none', () => {
    expect(reconcile('entries', 2 * 1234 - 100, [own])[0]).toMatchObject({
      convention: 'entries of L and U, one diagonal',
      distance: 0,
    });
    // Cholesky: n roots, l − n divisions, the rest multiply–adds
    expect(reconcile('operations', (50_000 - 1234) / 2, [own])[0].convention).toContain('multiply–adds, each as one');
    expect(reconcile('operations', 50_000, [own])[0].convention).toContain('as two');
    expect(reconcile('bytes', 17_000, [own])[0].convention).toBe('panels');
    expect(reconcile('bytes', 1234 * 12, [own])[0].convention).toContain('8-byte values and 4-byte indices');
    expect(reconcile('entries', 777, [own])).toEqual([]);
  });
});

describe('delayed pivots', () => {
  it('a chain of fronts: the share holds over all of them, fractions carried on', () => {
    // fronts of one pivot and order 2: a fifth of the pivots of the first 50 are handed on, so every fifth front hands one up
    const count = 51;
    const chain = {
      size: count,
      count,
      order: identityOrder(count),
      firstColumn: Int32Array.from({ length: count + 1 }, (_, s) => s),
      parent: Int32Array.from({ length: count }, (_, s) => (s + 1 < count ? s + 1 : -1)),
      frontOrder: Int32Array.from({ length: count }, (_, s) => (s + 1 < count ? 2 : 1)),
      storedFactorEntries: 101,
      factorEntries: 101,
    };
    const [plan, fifth] = delayedGrowth('ldlt', chain, 'real', { valueBytes: 8, indexBytes: 4 }, [0, 0.2]);
    expect(plan.storedFactorEntries).toBe(101);
    // a pivot handed on costs one row more in its parent, and is eliminated there
    expect(fifth.storedFactorEntries).toBeGreaterThan(101);
    expect(fifth.storedFactorEntries).toBeLessThan(101 + 3 * 15);
  });

  it('none delayed is the plan; more delayed is never less', () => {
    for (let seed = 1; seed <= 10; seed++) {
      const { factor, tree } = treeOf(seed);
      const rows = delayedGrowth('ldlt', tree);
      expect(rows[0].storedFactorEntries).toBe(tree.storedFactorEntries);
      expect(rows[0].operations).toBe(factorOperations('ldlt', factor.columnCount));
      for (let k = 1; k < rows.length; k++)
        expect(rows[k].storedFactorEntries).toBeGreaterThanOrEqual(rows[k - 1].storedFactorEntries);
    }
  });
});
