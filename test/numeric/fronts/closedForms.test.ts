import { describe, expect, it } from 'vitest';
import { assemble } from '../../../engine/matrix/assemble.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { identityOrder } from '../../../engine/matrix/permutation.ts';
import { randomOrder } from '../../support/random.ts';
import { figures, readableNames, readReference } from '../../support/reference.ts';
import { factorized } from './support.ts';

function real(n: number, entries: readonly (readonly [number, number, number])[]): SparseMatrix {
  return assemble({
    rows: n,
    columns: n,
    field: 'real',
    row: Int32Array.from(entries, (e) => e[0]),
    column: Int32Array.from(entries, (e) => e[1]),
    values: Float64Array.from(entries, (e) => e[2]),
  }).matrix;
}

/** Tridiagonal (−1, 2 − shift, −1): eigenvalues 2 − 2·cos(kπ/(n + 1)) − shift. */
function second(n: number, shift = 0): SparseMatrix {
  const entries: [number, number, number][] = [];
  for (let i = 0; i < n; i++) {
    entries.push([i, i, 2 - shift]);
    if (i > 0) entries.push([i, i - 1, -1], [i - 1, i, -1]);
  }
  return real(n, entries);
}

/** Five-point grid minus a shift: eigenvalues 4 − 2·cos(pπ/(k+1)) − 2·cos(qπ/(k+1)) − shift. */
function grid(k: number, shift: number): SparseMatrix {
  const entries: [number, number, number][] = [];
  for (let y = 0; y < k; y++) {
    for (let x = 0; x < k; x++) {
      const i = y * k + x;
      entries.push([i, i, 4 - shift]);
      if (x > 0) entries.push([i, i - 1, -1], [i - 1, i, -1]);
      if (y > 0) entries.push([i, i - k, -1], [i - k, i, -1]);
    }
  }
  return real(k * k, entries);
}

describe('determinant of (−1, 2, −1) is n + 1 (closed form)', () => {
  it.each(['cholesky', 'ldlt', 'lu'] as const)('%s', (kind) => {
    for (const n of [1, 2, 3, 10, 57, 400]) {
      const { report } = factorized(second(n), randomOrder(n, n), { kind, pivoting: 'threshold' }, 0.2);
      expect(report.logAbsDeterminant).toBeCloseTo(Math.log(n + 1), 10);
      expect(report.determinantSign).toEqual([1, 0]);
      if (kind !== 'lu') expect(report.inertia).toEqual([n, 0, 0]);
    }
  });

  it('has the scalings taken out again', () => {
    const n = 50;
    const rowScale = Float64Array.from({ length: n }, (_, i) => 2 ** ((i % 7) - 3));
    const columnScale = Float64Array.from({ length: n }, (_, i) => (i % 3 === 0 ? -1 : 1) * 2 ** ((i % 5) - 2));
    for (const kind of ['cholesky', 'ldlt', 'lu'] as const) {
      const options = { kind, pivoting: 'threshold', rowScale, columnScale } as const;
      const { report } = factorized(second(n), randomOrder(n, 3), options);
      expect(report.logAbsDeterminant).toBeCloseTo(Math.log(n + 1), 10);
      expect(report.determinantSign).toEqual([1, 0]);
    }
  });
});

describe('inertia and determinant of shifted grids from their known eigenvalues (closed form; Sylvester)', () => {
  it.each([0.37, 1.9, 3.3, 4.001, 6.1])('shift %f', (shift) => {
    const k = 9;
    let negative = 0;
    let logarithm = 0;
    for (let p = 1; p <= k; p++) {
      for (let q = 1; q <= k; q++) {
        const value = 4 - 2 * Math.cos((p * Math.PI) / (k + 1)) - 2 * Math.cos((q * Math.PI) / (k + 1)) - shift;
        if (value < 0) negative++;
        logarithm += Math.log(Math.abs(value));
      }
    }
    const n = k * k;
    for (const threshold of [0.5, 0.1, 0.001]) {
      const options = { kind: 'ldlt', pivoting: 'threshold', threshold } as const;
      const { report } = factorized(grid(k, shift), randomOrder(n, 7), options, 0.3);
      expect(report.inertia).toEqual([n - negative, negative, 0]);
      expect(report.logAbsDeterminant).toBeCloseTo(logarithm, 8);
      expect(report.determinantSign?.[0]).toBe(negative % 2 === 0 ? 1 : -1);
    }
    const lu = factorized(grid(k, shift), randomOrder(n, 8), { kind: 'lu', pivoting: 'threshold' }).report;
    expect(lu.logAbsDeterminant).toBeCloseTo(logarithm, 8);
    expect(lu.determinantSign?.[0]).toBe(negative % 2 === 0 ? 1 : -1);
    expect(lu.inertia).toBeNull();
  });
});

describe('growth', () => {
  it('is 2^(n−1) under partial pivoting for the matrix of Wilkinson 1963', () => {
    const n = 30;
    const entries: [number, number, number][] = [];
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < i; j++) if (j < n - 1) entries.push([i, j, -1]);
      if (i < n - 1) entries.push([i, i, 1]);
      entries.push([i, n - 1, 1]);
    }
    const options = { kind: 'lu', pivoting: 'threshold', threshold: 1 } as const;
    const { report } = factorized(real(n, entries), identityOrder(n), options);
    expect(report.pivotGrowth).toBe(2 ** (n - 1));
    expect(report.counts.offDiagonal).toBe(0);
  });

  it('is 1/ε for [ε 1; 1 1] without pivoting and stays below 2 with threshold pivots', () => {
    const a = real(2, [
      [0, 0, 2 ** -40],
      [0, 1, 1],
      [1, 0, 1],
      [1, 1, 1],
    ]);
    const growth = (kind: 'ldlt' | 'lu', pivoting: 'none' | 'threshold') =>
      factorized(a, identityOrder(2), { kind, pivoting, threshold: 0.5 }).report.pivotGrowth as number;
    expect(growth('lu', 'none')).toBeGreaterThan(2 ** 39);
    expect(growth('ldlt', 'none')).toBeGreaterThan(2 ** 39);
    expect(growth('lu', 'threshold')).toBeLessThan(2);
    expect(growth('ldlt', 'threshold')).toBeLessThan(2);
  });
});

describe('the parity of row interchanges', () => {
  it('gives a cyclic shift of n rows its determinant (−1)^(n−1) (closed form)', () => {
    for (const n of [2, 3, 8, 9]) {
      const a = real(
        n,
        [...Array(n).keys()].map((i) => [i, (i + 1) % n, 1] as const),
      );
      const { report } = factorized(a, identityOrder(n), { kind: 'lu', pivoting: 'threshold' });
      expect(report.determinantSign).toEqual([(-1) ** (n - 1), 0]);
      expect(report.logAbsDeterminant).toBe(0);
      expect(report.counts.offDiagonal).toBe(n);
    }
  });
});

describe('open matrices against dense LAPACK through NumPy (test/reference)', () => {
  const names = readableNames().filter((name) => {
    const f = figures[name];
    return (
      f.field !== 'pattern' &&
      f.rows === f.columns &&
      f.rows <= 1200 &&
      typeof f.logAbsDeterminant === 'number' &&
      (f.condition1 ?? 1e99) < 1e13
    );
  });
  it('are there', () => expect(names.length).toBeGreaterThan(3));
  it.each(names)('%s: determinant and inertia', (name) => {
    const f = figures[name];
    const a = readReference(name);
    const given = f.orderings?.['minimum-degree']?.order;
    const order =
      given === undefined ? identityOrder(a.rows) : (Int32Array.from(given) as ReturnType<typeof identityOrder>);
    const close = Math.abs(f.logAbsDeterminant as number) * 1e-9 + 1e-4;
    const sign = typeof f.determinantSign === 'number' ? [f.determinantSign, 0] : (f.determinantSign as number[]);
    const lu = factorized(a, order, { kind: 'lu', pivoting: 'threshold', threshold: 0.1 }, 0.2).report;
    expect(Math.abs((lu.logAbsDeterminant as number) - (f.logAbsDeterminant as number))).toBeLessThan(close);
    expect(lu.determinantSign?.[0]).toBeCloseTo(sign[0], 5);
    expect(lu.determinantSign?.[1]).toBeCloseTo(sign[1], 5);
    if (f.valueSymmetric !== true) return;
    const ldlt = factorized(a, order, { kind: 'ldlt', pivoting: 'threshold' }, 0.2).report;
    expect(Math.abs((ldlt.logAbsDeterminant as number) - (f.logAbsDeterminant as number))).toBeLessThan(close);
    if (f.inertia !== undefined && f.field === 'real') expect(ldlt.inertia).toEqual(f.inertia);
    if (f.inertia?.[0] !== a.rows) return;
    const cholesky = factorized(a, order, { kind: 'cholesky', pivoting: 'none' }, 0.2).report;
    expect(Math.abs((cholesky.logAbsDeterminant as number) - (f.logAbsDeterminant as number))).toBeLessThan(close);
    expect(cholesky.factorEntries).toBe(f.orderings?.['minimum-degree']?.factorEntries);
  });
});
