import { describe, expect, it } from 'vitest';
import { Fault } from '../../../engine/matrix/fault.ts';
import { asNewToOld, identityOrder } from '../../../engine/matrix/permutation.ts';
import { Cancelled, noProgress } from '../../../engine/matrix/progress.ts';
import { factorizeFronts, refactorizeFronts } from '../../../engine/numeric/fronts/frontFactor.ts';
import type { FrontOptions } from '../../../engine/numeric/fronts/options.ts';
import { predictPeakBytes } from '../../../engine/numeric/fronts/plan.ts';
import { solveComplexInPlace } from '../../../engine/numeric/solver.ts';
import { plainTree } from '../../support/plainTree.ts';
import { randomOrder } from '../../support/random.ts';
import { backwardError, dense, factorized, randomVector, residual, type Shape, shaped } from './support.ts';

const cases: [Shape, FrontOptions][] = [
  ['definite', { kind: 'cholesky', pivoting: 'none' }],
  ['symmetric', { kind: 'ldlt', pivoting: 'threshold' }],
  ['hermitian', { kind: 'ldlt', pivoting: 'threshold', hermitian: true }],
  ['general', { kind: 'lu', pivoting: 'threshold' }],
  ['shifted', { kind: 'lu', pivoting: 'threshold' }],
];

describe.each([false, true])('solves, complex: %s', (complex) => {
  it.each(cases)('%s: 37 right-hand sides, plain and transposed, equal one at a time', (shape, options) => {
    const n = 70;
    const a = shaped(shape, n, complex, 17);
    const length = (complex ? 2 : 1) * n;
    const columns = 37;
    const factor = factorized(a, randomOrder(n, 3), options, 0.3);
    const b = randomVector(length * columns, 9);
    for (const isTransposed of [false, true]) {
      const solve = (x: Float64Array, k: number) =>
        isTransposed ? factor.solveTransposedInPlace(x, k) : factor.solveInPlace(x, k);
      const x = b.slice();
      solve(x, columns);
      for (let c = 0; c < columns; c++) {
        const bc = b.slice(length * c, length * (c + 1));
        const xc = x.slice(length * c, length * (c + 1));
        expect(backwardError(a, xc, bc, isTransposed)).toBeLessThan(1e-14);
        const single = bc.slice();
        solve(single, 1);
        expect(single).toEqual(xc);
      }
    }
  });
});

describe('a complex right-hand side for a real matrix', () => {
  it('is its real and imaginary parts side by side', () => {
    const n = 40;
    const a = shaped('general', n, false, 2);
    const factor = factorized(a, randomOrder(n, 3), { kind: 'lu', pivoting: 'threshold' });
    for (const isTransposed of [false, true]) {
      const x = randomVector(2 * n * 3, 4);
      const b = x.slice();
      solveComplexInPlace(factor, x, 3, isTransposed);
      for (let c = 0; c < 3; c++) {
        for (const part of [0, 1]) {
          const pick = (v: Float64Array) => Float64Array.from({ length: n }, (_, i) => v[2 * n * c + 2 * i + part]);
          expect(backwardError(a, pick(x), pick(b), isTransposed)).toBeLessThan(1e-14);
        }
      }
    }
  });
});

describe('a permutation that is not its own inverse', () => {
  it('is applied new-to-old: the solution comes out in the original numbering', () => {
    const n = 30;
    const a = shaped('general', n, false, 8);
    const order = asNewToOld(Int32Array.from({ length: n }, (_, k) => (k * 7 + 3) % n));
    const factor = factorized(a, order, { kind: 'lu', pivoting: 'threshold' });
    const wanted = Float64Array.from({ length: n }, (_, i) => i + 1);
    const d = dense(a);
    const b = new Float64Array(n);
    for (let j = 0; j < n; j++) for (let i = 0; i < n; i++) b[i] += d.re[j * n + i] * wanted[j];
    factor.solveInPlace(b, 1);
    for (let i = 0; i < n; i++) expect(b[i]).toBeCloseTo(wanted[i], 10);
  });
});

describe('new values on the same analysis', () => {
  it.each(cases)('%s', (shape, options) => {
    const n = 50;
    const a = shaped(shape, n, false, 21);
    const { tree, rows } = plainTree(a, randomOrder(n, 3), 0.2);
    const first = factorizeFronts(a, tree, rows, options);
    const before = randomVector(n, 1);
    const x0 = before.slice();
    first.solveInPlace(x0, 1);
    const a2 = { ...a, values: (a.values as Float64Array).map((v) => v * 3) };
    const second = refactorizeFronts(first, a2, noProgress);
    const x = before.slice();
    second.solveInPlace(x, 1);
    expect(backwardError(a2, x, before)).toBeLessThan(1e-14);
    // the old factors stay those of the old matrix
    const again = before.slice();
    first.solveInPlace(again, 1);
    expect(again).toEqual(x0);
  });
});

describe('new values over the old factors', () => {
  it.each(cases)('%s: same arrays, same result, the old factor refuses to solve', (shape, options) => {
    const n = 60;
    const a = shaped(shape, n, true, 23);
    const { tree, rows } = plainTree(a, randomOrder(n, 3), 0.2);
    const first = factorizeFronts(a, tree, rows, options);
    const arrays = [...first.factors.chunks];
    const a2 = { ...a, values: (a.values as Float64Array).map((v) => v * 2) };
    const fresh = factorizeFronts(a2, tree, rows, options);
    const second = refactorizeFronts(first, a2, noProgress, true);
    second.factors.chunks.forEach((chunk, c) => {
      expect(chunk).toBe(arrays[c]);
      expect(chunk).toEqual(fresh.factors.chunks[c]);
    });
    expect(() => first.solveInPlace(new Float64Array(2 * n), 1)).toThrow(Fault);
    expect(second.report).toEqual(fresh.report);
  });
});

describe.each([false, true])('factors in single precision, complex: %s', (complex) => {
  it.each(cases)('%s: half the memory, an error of single size, mended by refinement', (shape, options) => {
    const n = 60;
    const width = complex ? 2 : 1;
    const a = shaped(shape, n, complex, 29);
    const { tree, rows } = plainTree(a, randomOrder(n, 3), 0.2);
    const factor = factorizeFronts(a, tree, rows, { ...options, precision: 'single' });
    expect(factor.factors.chunks.every((c) => c instanceof Float32Array)).toBe(true);
    const question = { kind: options.kind, complex, entries: a.rowIndex.length, single: true };
    if (factor.report.counts.delayed === 0)
      expect(factor.report.peakBytes).toBe(predictPeakBytes(tree, question).total);
    const b = randomVector(width * n * 2, 9);
    for (const isTransposed of [false, true]) {
      const x = b.slice();
      const solve = (v: Float64Array, k: number) =>
        isTransposed ? factor.solveTransposedInPlace(v, k) : factor.solveInPlace(v, k);
      solve(x, 2);
      const first = x.slice(0, width * n);
      const rhs = b.slice(0, width * n);
      const before = backwardError(a, first, rhs, isTransposed);
      expect(before).toBeLessThan(1e-5);
      expect(before).toBeGreaterThan(1e-11);
      for (let step = 0; step < 5; step++) {
        const r = residual(a, first, rhs, isTransposed);
        solve(r, 1);
        for (let i = 0; i < r.length; i++) first[i] += r[i];
      }
      expect(backwardError(a, first, rhs, isTransposed)).toBeLessThan(1e-15);
    }
  });

  it('says so where values leave its range', () => {
    for (const factor of [1e300, 1e-100]) {
      const a = shaped('definite', 20, complex, 1);
      const wild = { ...a, values: (a.values as Float64Array).map((v) => v * factor) };
      const options = { kind: 'lu', pivoting: 'threshold', precision: 'single' } as const;
      expect(() => factorized(wild, identityOrder(20), options)).toThrow(/outside the range of single precision/);
    }
  });
});

describe('small and empty', () => {
  it('n = 0, n = 1, diagonal', () => {
    for (const kind of ['cholesky', 'ldlt', 'lu'] as const) {
      const none = factorized(shaped('definite', 0, false, 1), identityOrder(0), { kind, pivoting: 'none' });
      none.solveInPlace(new Float64Array(0), 1);
      expect(none.report.smallestPivot).toBeNull();
      expect(none.report.factorEntries).toBe(0);
      expect(none.report.logAbsDeterminant).toBe(0);
      const one = factorized(shaped('definite', 1, false, 1), identityOrder(1), { kind, pivoting: 'none' });
      const x = Float64Array.of(5);
      one.solveInPlace(x, 1);
      expect(x[0]).toBeCloseTo(0.5, 14);
    }
  });
});

describe('inputs and cancelling', () => {
  it('mutates nothing it was given', () => {
    const a = shaped('shifted', 40, true, 5);
    const { tree, rows } = plainTree(a, randomOrder(40, 3));
    const kept = JSON.stringify([a, tree, rows]);
    factorizeFronts(a, tree, rows, { kind: 'lu', pivoting: 'threshold' });
    expect(JSON.stringify([a, tree, rows])).toBe(kept);
  });

  it('lets a cancel pass, from inside a large front', () => {
    const a = shaped('definite', 600, false, 5, 60);
    const { tree, rows } = plainTree(a, identityOrder(600));
    const phases = new Set<string>();
    let calls = 0;
    let last = 0;
    const run = (stop: number) =>
      factorizeFronts(a, tree, rows, { kind: 'lu', pivoting: 'threshold' }, (fraction, phase) => {
        phases.add(phase);
        expect(fraction).toBeGreaterThanOrEqual(last);
        expect(fraction).toBeLessThanOrEqual(1);
        last = fraction;
        if (++calls === stop) throw new Cancelled();
      });
    expect(() => run(3)).toThrow(Cancelled);
    last = 0;
    run(-1);
    expect(calls).toBeGreaterThan(5);
    expect([...phases]).toEqual(['factorizing']);
  });
});
