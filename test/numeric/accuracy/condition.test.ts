import { expect, test } from 'vitest';
import { Random } from '../../../engine/matrix/random.ts';
import { estimateCondition } from '../../../engine/numeric/accuracy/condition.ts';
import { estimateForwardError, trustedDigits } from '../../../engine/numeric/accuracy/forwardError.ts';
import { nearNullVectors } from '../../../engine/numeric/accuracy/nearNull.ts';
import { estimateOneNorm } from '../../../engine/numeric/accuracy/oneNorm.ts';
import { multiplyInto, multiplyTransposedInto } from '../../../engine/numeric/accuracy/product.ts';
import { refine } from '../../../engine/numeric/accuracy/refine.ts';
import { measuredSystem } from '../../../engine/numeric/accuracy/system.ts';
import { randomMatrix } from '../../support/random.ts';
import { figures, readReference } from '../../support/reference.ts';
import { denseCondition, denseOf, denseSolver, hilbertCondition, integerHilbert, sparseOf } from './denseSolver.ts';

test('the 1-norm estimate is a lower bound, and within a third, of explicit matrices; seeds 50…79', () => {
  for (let seed = 50; seed < 80; seed++) {
    const complex = seed % 2 === 1;
    const a = randomMatrix({ rows: 15, columns: 15, entries: 120, seed, complex });
    const exact = measuredSystem(a).norms.one;
    const copy = new Float64Array(complex ? 30 : 15);
    const conjugate = (x: Float64Array): void => {
      for (let p = 1; complex && p < x.length; p += 2) x[p] = -x[p];
    };
    const estimate = estimateOneNorm({
      size: 15,
      complex,
      apply(x) {
        copy.set(x);
        multiplyInto(a, copy, x, complex);
      },
      applyAdjoint(x) {
        conjugate(x);
        copy.set(x);
        multiplyTransposedInto(a, copy, x, complex);
        conjugate(x);
      },
    });
    expect(estimate).toBeLessThanOrEqual(exact * (1 + 1e-14));
    expect(estimate).toBeGreaterThanOrEqual(exact / 3);
  }
});

test('Hilbert matrices up to n = 10: between a third of the exact condition number and the exact one (closed-form inverse)', () => {
  for (let n = 1; n <= 10; n++) {
    const a = integerHilbert(n);
    const exact = hilbertCondition(n);
    // each solve corrected once with a doubled residual: the solves behind the estimate are then right to about (κε)²
    const { value } = estimateCondition(measuredSystem(a), denseSolver(a), 0);
    expect(value).not.toBeNull();
    expect(value as number, `n = ${n}`).toBeLessThanOrEqual(exact * (1 + 1e-3));
    expect(value as number, `n = ${n}`).toBeGreaterThanOrEqual(exact / 3);
  }
  // published: 748 for n = 3, 28375 for n = 4 (Higham 2002, chapter 28, from memory)
  expect(hilbertCondition(3)).toBeCloseTo(748, 8);
  expect(hilbertCondition(4)).toBeCloseTo(28375, 6);
});

test('reference figures (dense LAPACK): within a third of condition1', () => {
  for (const name of ['bcsstk01', 'lund_a', 'pores_1', 'LFAT5', 'utm300', 'g20']) {
    const exact = figures[name]?.condition1;
    if (typeof exact !== 'number') throw new Error(`no condition1 for ${name}`);
    const a = readReference(name);
    const { value } = estimateCondition(measuredSystem(a), denseSolver(a));
    expect(value as number, name).toBeLessThanOrEqual(exact * 1.001);
    expect(value as number, name).toBeGreaterThanOrEqual(exact / 3);
  }
});

test('a complex matrix: the real form has a condition number within a factor of two', () => {
  const a = randomMatrix({ rows: 12, columns: 12, entries: 60, seed: 81, complex: true, diagonal: 1 });
  const { value } = estimateCondition(measuredSystem(a), denseSolver(a));
  const real = denseCondition(sparseOf(denseOf(a)));
  // |re|+|im| lies between the modulus and √2 times it, in A and in its inverse
  expect(value as number).toBeGreaterThanOrEqual(real / 6);
  expect(value as number).toBeLessThanOrEqual(real * 1.0001);
});

test('solves that are too inexact give no figure but a reason', () => {
  const a = randomMatrix({ rows: 10, columns: 10, entries: 40, seed: 82, diagonal: 3 });
  const other = denseSolver(randomMatrix({ rows: 10, columns: 10, entries: 40, seed: 83, diagonal: 3 }));
  const { value, reason } = estimateCondition(measuredSystem(a), other);
  expect(value).toBeNull();
  expect(reason).toMatch(/too inexact/);
});

test('the forward error estimate bounds the true error, on badly conditioned and badly scaled systems; seeds 84…95', () => {
  for (let seed = 84; seed < 96; seed++) {
    const random = new Random(seed);
    const n = 8;
    // integers: A·x is exact in doubles, so x is exactly the solution
    const scale = Array.from({ length: n }, () => 2 ** (random.below(40) - 20));
    const rows = Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (__, j) => (random.below(19) - 9 + (i === j ? 1 : 0)) * scale[i]),
    );
    // nearly dependent rows
    rows[1] = rows[0].map((v, j) => (v / scale[0]) * 2 ** 12 + (j === 1 ? 1 : 0));
    const a = sparseOf(rows);
    const truth = new Float64Array(n).map(() => random.below(9) + 1);
    const b = new Float64Array(n);
    multiplyInto(a, truth, b, false);
    const system = measuredSystem(a);
    const solver = denseSolver(a);
    const columns = refine(system, solver, b, 1, false, { steps: 0 });
    const { value } = estimateForwardError(system, solver, columns, false);
    const norm = columns[0].solution.reduce((m, v) => Math.max(m, Math.abs(v)), 0);
    const error = columns[0].solution.reduce((m, v, i) => Math.max(m, Math.abs(v - truth[i])), 0) / norm;
    expect(error).toBeLessThanOrEqual(3 * (value as number));
  }
});

test('trusted digits follow the formula of the design', () => {
  expect(trustedDigits(1e-3)).toBe(3);
  expect(trustedDigits(0.99e-3)).toBe(3);
  expect(trustedDigits(2e-3)).toBe(2);
  expect(trustedDigits(0.5)).toBe(0);
  expect(trustedDigits(7)).toBe(0);
  expect(trustedDigits(0)).toBe(15);
  expect(trustedDigits(Number.NaN)).toBeNull();
  expect(trustedDigits(null)).toBeNull();
});

test('near-null vectors name the rows and columns that take part', () => {
  // rows 1 and 3 are nearly equal; columns 0 and 2 nearly opposite inside them
  const a = sparseOf([
    [4, 0, 0, 0, 1],
    [1, 2, 0, 3, 0],
    [0, 0, 5, 0, 0],
    [1, 2, 0, 3 + 1e-12, 0],
    [0, 1, 0, 0, 6],
  ]);
  const found = nearNullVectors(a, denseSolver(a));
  expect(found).not.toBeNull();
  expect(
    found?.rows
      .map((c) => c.index)
      .slice(0, 2)
      .sort(),
  ).toEqual([1, 3]);
  expect(found?.rows.length).toBe(2);
  expect(found?.relativeResidual as number).toBeLessThan(1e-12);
  expect(found?.columns.some((c) => c.index === 2)).toBe(false);
});
