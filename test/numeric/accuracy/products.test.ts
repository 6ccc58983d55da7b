import { Matrix } from 'ml-matrix';
import { expect, test } from 'vitest';
import { modulus } from '../../../engine/matrix/modulus.ts';
import { Random } from '../../../engine/matrix/random.ts';
import { doubledWorkspace, residualDoubledInto, residualInto } from '../../../engine/numeric/accuracy/doubled.ts';
import { largestModulus } from '../../../engine/numeric/accuracy/largestModulus.ts';
import { firstNotFinite, normsOf } from '../../../engine/numeric/accuracy/norms.ts';
import { multiplyInto, multiplyModuliInto, multiplyTransposedInto } from '../../../engine/numeric/accuracy/product.ts';
import { randomMatrix } from '../../support/random.ts';
import { denseOf, exactResidual, sparseOf } from './denseSolver.ts';

function randomVector(length: number, seed: number): Float64Array {
  const random = new Random(seed);
  return new Float64Array(length).map(() => 2 * random.next() - 1);
}

function expectClose(actual: Float64Array, expected: readonly number[], tolerance = 1e-14): void {
  expect(actual.length).toBe(expected.length);
  for (let i = 0; i < actual.length; i++) expect(Math.abs(actual[i] - expected[i])).toBeLessThanOrEqual(tolerance);
}

for (const complex of [false, true]) {
  test(`products agree with a dense library, ${complex ? 'complex' : 'real'}, seed 3`, () => {
    const a = randomMatrix({ rows: 17, columns: 12, entries: 60, seed: 3, complex });
    const w = complex ? 2 : 1;
    const x = randomVector(12 * w, 4);
    const y = new Float64Array(17 * w);
    const dense = new Matrix(denseOf(a));
    multiplyInto(a, x, y, complex);
    expectClose(y, dense.mmul(Matrix.columnVector(Array.from(x))).to1DArray());
    const z = randomVector(17 * w, 5);
    const t = new Float64Array(12 * w);
    multiplyTransposedInto(a, z, t, complex);
    // Aᵀz = conj(Aᴴ·conj(z)); the real form's transpose is that of Aᴴ
    const conjugate = (v: ArrayLike<number>) => Array.from(v, (value, p) => (complex && p % 2 === 1 ? -value : value));
    expectClose(
      t,
      conjugate(
        dense
          .transpose()
          .mmul(Matrix.columnVector(conjugate(z)))
          .to1DArray(),
      ),
    );
  });
}

test('a real matrix takes complex vectors: both parts side by side', () => {
  const a = randomMatrix({ rows: 9, columns: 9, entries: 40, seed: 8 });
  const x = randomVector(18, 9);
  const y = new Float64Array(18);
  const t = new Float64Array(18);
  multiplyInto(a, x, y, true);
  multiplyTransposedInto(a, x, t, true);
  for (const part of [0, 1]) {
    const only = x.filter((_, p) => p % 2 === part);
    const expected = new Float64Array(9);
    multiplyInto(a, only, expected, false);
    expect(y.filter((_, p) => p % 2 === part)).toEqual(expected);
    multiplyTransposedInto(a, only, expected, false);
    expect(t.filter((_, p) => p % 2 === part)).toEqual(expected);
  }
});

test('moduli: |A|·|x| bounds |A·x| and equals it for nonnegative data', () => {
  const a = randomMatrix({ rows: 9, columns: 9, entries: 40, seed: 10, complex: true });
  const x = randomVector(18, 11);
  const y = new Float64Array(18);
  const bound = new Float64Array(9);
  multiplyInto(a, x, y, true);
  multiplyModuliInto(a, x, bound, true);
  for (let i = 0; i < 9; i++) expect(modulus(y[2 * i], y[2 * i + 1])).toBeLessThanOrEqual(bound[i] * (1 + 1e-14));
  multiplyModuliInto(
    sparseOf([
      [1, 2],
      [3, 4],
    ]),
    Float64Array.of(1, 10),
    bound.subarray(0, 2),
    false,
  );
  expect(Array.from(bound.subarray(0, 2))).toEqual([21, 43]);
});

test('the doubled residual equals exact integer arithmetic to the last place, where working precision has no digit left; seeds 20…29', () => {
  let worstPlain = 0;
  for (let seed = 20; seed < 30; seed++) {
    const a = randomMatrix({ rows: 30, columns: 30, entries: 300, seed, diagonal: 1 });
    const x = randomVector(30, seed + 100);
    const b = new Float64Array(30);
    // b is A·x rounded, so b − A·x is rounding errors only
    multiplyInto(a, x, b, false);
    const exact = exactResidual(a, x, b);
    const doubled = new Float64Array(30);
    residualDoubledInto(a, x, b, doubled, false, doubledWorkspace(30));
    const plain = new Float64Array(30);
    residualInto(a, x, b, plain, false);
    for (let i = 0; i < 30; i++) {
      // n·2⁻¹⁰⁶·|A||x| is below 1e-29 here
      expect(Math.abs(doubled[i] - exact[i])).toBeLessThanOrEqual(2 ** -52 * Math.abs(exact[i]) + 1e-29);
      if (exact[i] !== 0) worstPlain = Math.max(worstPlain, Math.abs(plain[i] - exact[i]) / Math.abs(exact[i]));
    }
  }
  expect(worstPlain).toBeGreaterThan(0.5);
});

test('the complex doubled residual is that of the real form', () => {
  const a = randomMatrix({ rows: 12, columns: 12, entries: 60, seed: 31, complex: true, diagonal: 1 });
  const real = sparseOf(denseOf(a));
  const x = randomVector(24, 32);
  const b = new Float64Array(24);
  multiplyInto(a, x, b, true);
  const r = new Float64Array(24);
  residualDoubledInto(a, x, b, r, true, doubledWorkspace(24));
  const exact = exactResidual(real, x, b);
  for (let i = 0; i < 24; i++)
    expect(Math.abs(r[i] - exact[i])).toBeLessThanOrEqual(2 ** -52 * Math.abs(exact[i]) + 1e-29);
});

test('norms by hand, and the address of what is not finite', () => {
  const a = sparseOf([
    [1, -2, 0],
    [0, 3, 0.5],
    [-4, 0, 0],
  ]);
  const norms = normsOf(a);
  expect(norms).toMatchObject({ one: 5, infinity: 4, largest: 4, smallestNonzero: 0.5, notFinite: 0 });
  expect(Array.from(norms.rowSum)).toEqual([3, 3.5, 4]);
  expect(Array.from(norms.rowLargest)).toEqual([2, 3, 4]);
  expect(firstNotFinite(a)).toBeNull();
  const broken = sparseOf([
    [1, 0],
    [0, Number.NaN],
  ]);
  expect(firstNotFinite(broken)).toEqual({ row: 1, column: 1 });
  expect(normsOf(broken).notFinite).toBe(1);
});

test('moduli keep their digits near the ends of the range', () => {
  expect(modulus(3e200, 4e200)).toBeCloseTo(5e200, -188);
  expect(modulus(3e-200, 4e-200) / 5e-200).toBeCloseTo(1, 14);
  expect(modulus(3, 4)).toBe(5);
  expect(modulus(0, -7)).toBe(7);
  expect(largestModulus(Float64Array.of(1, Number.NaN, 5), false)).toBeNaN();
  expect(largestModulus(Float64Array.of(3, 4, 1, 1), true)).toBe(5);
});
