import { expect, test } from 'vitest';
import { Fault } from '../../../engine/matrix/fault.ts';
import { entryCount, type SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { identityOrder } from '../../../engine/matrix/permutation.ts';
import { Random } from '../../../engine/matrix/random.ts';
import { type ColumnFactor, factorizeColumns } from '../../../engine/numeric/column/columnFactor.ts';
import { columnPlan } from '../../../engine/numeric/column/columnPlan.ts';
import type { ColumnOptions } from '../../../engine/numeric/column/options.ts';
import { randomMatrix, randomOrder } from '../../support/random.ts';
import { figures, readReference } from '../../support/reference.ts';
import { sparseOf } from '../accuracy/denseSolver.ts';
import { denseBackwardError, factorizationError } from './support.ts';

/** L·U with n-term sums: each entry is off by at most about nε of |L||U| (Higham 2002, theorem 9.3). */
const tolerance = 60 * 2 ** -53;

function vector(length: number, seed: number): Float64Array {
  const random = new Random(seed);
  return new Float64Array(length).map(() => 2 * random.next() - 1);
}

/** Solves for `columns` right-hand sides both ways; the largest backward error. */
function solveErrors(a: SparseMatrix, factor: ColumnFactor, columns: number, seed: number): number {
  const w = factor.complex ? 2 : 1;
  const length = a.columns * w;
  let worst = 0;
  for (const transposed of [false, true]) {
    const b = vector(length * columns, seed);
    const x = b.slice();
    if (transposed) factor.solveTransposedInPlace(x, columns);
    else factor.solveInPlace(x, columns);
    for (let c = 0; c < columns; c++) {
      const part = (v: Float64Array) => v.subarray(c * length, (c + 1) * length);
      worst = Math.max(worst, denseBackwardError(a, part(x), part(b), transposed));
    }
  }
  return worst;
}

/** A matrix with a full structural rank, zeros on much of its diagonal, and values over many orders when `wild`. */
function shuffled(n: number, entries: number, seed: number, complex: boolean, wild: boolean): SparseMatrix {
  const random = new Random(seed);
  const base = randomMatrix({ rows: n, columns: n, entries, seed, complex, diagonal: 0.5 });
  const order = randomOrder(n, seed + 1);
  const rowSize = Array.from({ length: n }, () => (wild ? 10 ** (random.below(21) - 10) : 1));
  const w = complex ? 2 : 1;
  const columnPointer = base.columnPointer;
  const cells: { i: number; v: number[] }[][] = [];
  for (let j = 0; j < n; j++) {
    const column: { i: number; v: number[] }[] = [];
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = order[base.rowIndex[p]];
      const v = Array.from({ length: w }, (_, part) => (base.values?.[p * w + part] ?? 0) * rowSize[i]);
      column.push({ i, v });
    }
    cells.push(column.sort((x, y) => x.i - y.i));
  }
  return {
    rows: n,
    columns: n,
    columnPointer,
    rowIndex: Int32Array.from(cells.flat().map((c) => c.i)),
    field: base.field,
    values: Float64Array.from(cells.flat().flatMap((c) => c.v)),
  };
}

const choices: Record<string, ColumnOptions> = {
  'partial pivoting': {},
  'threshold 0.1': { threshold: 0.1 },
  'threshold 0.001': { threshold: 0.001 },
};

for (const complex of [false, true]) {
  for (const [name, options] of Object.entries(choices)) {
    test(`P·R·A·C·Q = L·U and both solves, random orders, ${complex ? 'complex' : 'real'}, ${name}, seeds 100…119`, () => {
      for (let seed = 100; seed < 120; seed++) {
        const n = 5 + (seed % 25);
        const a = shuffled(n, 3 * n, seed, complex, false);
        const factor = factorizeColumns(a, randomOrder(n, seed + 7), options);
        expect(factorizationError(a, factor), `seed ${seed}`).toBeLessThanOrEqual(tolerance);
        if (options.threshold === undefined) expect(solveErrors(a, factor, 1, seed)).toBeLessThan(1e-13);
        for (const l of multipliers(factor)) expect(l).toBeLessThanOrEqual((1 + 1e-12) / (options.threshold ?? 1));
      }
    });
  }

  test(`block triangular form gives the same solutions, ${complex ? 'complex' : 'real'}, seeds 120…139`, () => {
    let severalBlocks = 0;
    for (let seed = 120; seed < 140; seed++) {
      const n = 12 + (seed % 20);
      // sparse enough to fall apart
      const a = shuffled(n, n, seed, complex, false);
      const plan = columnPlan(a, (block) => randomOrder(block.columns, seed));
      if (plan.blockStart.length > 2) severalBlocks++;
      const factor = factorizeColumns(a, plan.columnOrder, plan);
      expect(factorizationError(a, factor)).toBeLessThanOrEqual(tolerance);
      for (const columns of [1, 3, 4, 6]) expect(solveErrors(a, factor, columns, seed)).toBeLessThan(1e-13);
      expect(factor.lowerEntries + factor.upperEntries - n).toBe(factor.report.factorEntries);
    }
    expect(severalBlocks).toBeGreaterThan(15);
  });

  test(`badly scaled matrices, with and without scalings, ${complex ? 'complex' : 'real'}, seeds 140…149`, () => {
    for (let seed = 140; seed < 150; seed++) {
      const n = 20;
      const a = shuffled(n, 3 * n, seed, complex, true);
      const random = new Random(seed);
      const scaling = () => new Float64Array(n).map(() => 2 ** (random.below(21) - 10));
      const plain = factorizeColumns(a, identityOrder(n));
      const scaled = factorizeColumns(a, identityOrder(n), { rowScaling: scaling(), columnScaling: scaling() });
      for (const factor of [plain, scaled]) {
        expect(factorizationError(a, factor)).toBeLessThanOrEqual(tolerance);
        expect(solveErrors(a, factor, 5, seed)).toBeLessThan(1e-12);
      }
      // scalings are taken out of the determinant again
      const difference = (plain.report.logAbsDeterminant ?? 0) - (scaled.report.logAbsDeterminant ?? 1);
      expect(Math.abs(difference)).toBeLessThan(1e-9);
      plain.report.determinantSign?.forEach((s, p) => {
        expect(s).toBeCloseTo(scaled.report.determinantSign?.[p] ?? Number.NaN, 9);
      });
    }
  });
}

function multipliers(factor: ColumnFactor): number[] {
  const { lower, size } = factor.factors;
  const w = factor.complex ? 2 : 1;
  return Array.from({ length: lower.pointer[size] }, (_, p) =>
    Math.hypot(lower.values[p * w], w === 2 ? lower.values[2 * p + 1] : 0),
  );
}

test('counts by hand: an arrowhead with its hub first fills, hub last does not', () => {
  const n = 6;
  const rows = Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (__, j) => (i === j ? 10 : i === 0 || j === 0 ? 1 : 0)),
  );
  const a = sparseOf(rows);
  const first = factorizeColumns(a, identityOrder(n));
  expect([first.lowerEntries, first.upperEntries]).toEqual([21, 21]);
  // Σ lⱼ(1 + 2uⱼ) with lⱼ = uⱼ = 5, 4, …, 0
  expect(first.report.executedOperations).toBe([5, 4, 3, 2, 1, 0].reduce((s, l) => s + l * (1 + 2 * l), 0));
  const order = randomOrder(n, 1);
  order.set([1, 2, 3, 4, 5, 0]);
  const last = factorizeColumns(a, order, { threshold: 0.5 });
  expect([last.lowerEntries, last.upperEntries]).toEqual([11, 11]);
  expect(last.report.executedOperations).toBe(5 * 3);
  expect(last.report.counts.offDiagonal).toBe(0);
});

test('entries and operations counted apart from the code: Σ lⱼ(1 + 2uⱼ) from the exported pattern, seeds 150…159', () => {
  for (let seed = 150; seed < 160; seed++) {
    for (const complex of [false, true]) {
      const a = shuffled(25, 60, seed, complex, false);
      const factor = factorizeColumns(a, randomOrder(25, seed));
      const { lower, upper } = factor.factors;
      const row = new Array<number>(25).fill(0);
      for (let p = 0; p < upper.pointer[25]; p++) row[upper.index[p]]++;
      let operations = 0;
      for (let j = 0; j < 25; j++) {
        const l = lower.pointer[j + 1] - lower.pointer[j];
        operations += complex ? l * (11 + 8 * row[j]) : l * (1 + 2 * row[j]);
      }
      expect(factor.report.executedOperations).toBe(operations);
      expect(factor.report.factorEntries).toBe(lower.pointer[25] + upper.pointer[25] + 25);
      expect(factor.report.storedFactorEntries).toBe(factor.report.factorEntries);
    }
  }
});

test('the structure without interchanges is that of the reference set (exact fill with diagonal pivots)', () => {
  for (const name of ['g20', 'utm300', 'pores_1', 'bcsstk01', 'lund_a', 'LFAT5']) {
    const expected = figures[name]?.luWithoutInterchanges;
    if (expected === undefined || expected === null) throw new Error(`no figure for ${name}`);
    const a = readReference(name);
    const factor = factorizeColumns(a, identityOrder(a.columns), { pivoting: 'static' });
    expect([factor.lowerEntries, factor.upperEntries], name).toEqual([expected.lowerEntries, expected.upperEntries]);
  }
});

test('tridiagonal (−1, 2, −1): determinant n + 1, inverse min(i,j)(n + 1 − max(i,j))/(n + 1)', () => {
  const n = 40;
  const a = sparseOf(
    Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (__, j) => (i === j ? 2 : Math.abs(i - j) === 1 ? -1 : 0)),
    ),
  );
  for (const order of [identityOrder(n), randomOrder(n, 5)]) {
    const factor = factorizeColumns(a, order);
    expect(factor.report.logAbsDeterminant).toBeCloseTo(Math.log(n + 1), 12);
    expect(factor.report.determinantSign).toEqual([1, 0]);
    const x = new Float64Array(n * n);
    for (let j = 0; j < n; j++) x[j * n + j] = 1;
    factor.solveInPlace(x, n);
    for (let j = 1; j <= n; j++) {
      for (let i = 1; i <= n; i++) {
        const exact = (Math.min(i, j) * (n + 1 - Math.max(i, j))) / (n + 1);
        expect(Math.abs(x[(j - 1) * n + i - 1] - exact)).toBeLessThan(1e-12);
      }
    }
  }
});

test('five-point grid: log-determinant from the closed-form eigenvalues 4 − 2cos(πp/(k+1)) − 2cos(πq/(k+1))', () => {
  const k = 12;
  const n = k * k;
  const rows = Array.from({ length: n }, () => new Array<number>(n).fill(0));
  for (let y = 0; y < k; y++) {
    for (let x = 0; x < k; x++) {
      const i = y * k + x;
      rows[i][i] = 4;
      if (x > 0) rows[i][i - 1] = rows[i - 1][i] = -1;
      if (y > 0) rows[i][i - k] = rows[i - k][i] = -1;
    }
  }
  let expected = 0;
  for (let p = 1; p <= k; p++) {
    for (let q = 1; q <= k; q++) {
      expected += Math.log(4 - 2 * Math.cos((Math.PI * p) / (k + 1)) - 2 * Math.cos((Math.PI * q) / (k + 1)));
    }
  }
  const factor = factorizeColumns(sparseOf(rows), randomOrder(n, 3));
  expect(factor.report.logAbsDeterminant).toBeCloseTo(expected, 9);
});

test('growth 2^(n−1) under partial pivoting (Wilkinson 1961: 1 on the diagonal and in the last column, −1 below)', () => {
  const n = 24;
  const rows = Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (__, j) => (j === n - 1 || i === j ? 1 : i > j ? -1 : 0)),
  );
  const factor = factorizeColumns(sparseOf(rows), identityOrder(n));
  expect(factor.report.pivotGrowth).toBe(2 ** (n - 1));
  expect(factor.report.counts.offDiagonal).toBe(0);
});

test('reference figures (dense LAPACK): determinants of the open matrices', () => {
  for (const name of ['bcsstk01', 'lund_a', 'pores_1', 'LFAT5', 'utm300', 'g20', 'arc130', 'cg20']) {
    const expected = figures[name];
    if (typeof expected?.logAbsDeterminant !== 'number') continue;
    const a = readReference(name);
    for (const factor of [
      factorizeColumns(a, randomOrder(a.columns, 9)),
      (() => {
        const plan = columnPlan(a, (block) => randomOrder(block.columns, 2));
        return factorizeColumns(a, plan.columnOrder, { ...plan, threshold: 0.1 });
      })(),
    ]) {
      const scale = Math.max(1, Math.abs(expected.logAbsDeterminant));
      expect(Math.abs((factor.report.logAbsDeterminant ?? 0) - expected.logAbsDeterminant) / scale, name).toBeLessThan(
        1e-8,
      );
      if (typeof expected.determinantSign === 'number') {
        expect(factor.report.determinantSign?.[0], name).toBe(expected.determinantSign);
      }
    }
  }
});

test('pivots with their addresses', () => {
  const a = sparseOf([
    [0, 2, 0],
    [8, 0, 0],
    [0, 0, 0.25],
  ]);
  const { report } = factorizeColumns(a, identityOrder(3));
  expect(report.smallestPivot).toEqual({ modulus: 0.25, row: 2, column: 2 });
  expect(report.largestPivot).toEqual({ modulus: 8, row: 1, column: 0 });
  expect(report.counts.offDiagonal).toBe(2);
  expect(report.determinantSign).toEqual([-1, 0]);
  expect(report.logAbsDeterminant).toBeCloseTo(Math.log(4), 14);
  expect(report.inertia).toBeNull();
});

test('static pivoting replaces tiny pivots, tells it, and withholds the determinant', () => {
  const a = sparseOf([
    [1e-20, 1],
    [1, 1],
  ]);
  const { report } = factorizeColumns(a, identityOrder(2), { pivoting: 'static' });
  expect(report.counts).toEqual({ offDiagonal: 0, delayed: 0, twoByTwo: 0, perturbed: 1 });
  expect(report.smallestPivot?.modulus).toBe(2 ** -26);
  expect(report.logAbsDeterminant).toBeNull();
  expect(report.determinantSign).toBeNull();
});

test('refusals with an address: no pivoting on a zero diagonal, a threshold out of range, not square, not finite', () => {
  const codeOf = (f: () => unknown): string => {
    try {
      f();
    } catch (error) {
      if (error instanceof Fault) return `${error.code} ${error.place.row ?? ''}`.trim();
    }
    return 'none';
  };
  const a = sparseOf([
    [1, 1, 0],
    [1, 1, 2],
    [0, 2, 1],
  ]);
  expect(codeOf(() => factorizeColumns(a, identityOrder(3), { pivoting: 'none' }))).toBe('zero-pivot 1');
  expect(codeOf(() => factorizeColumns(a, identityOrder(3), { threshold: 0 }))).toBe('threshold-range');
  expect(codeOf(() => factorizeColumns({ ...a, rows: 4 }, identityOrder(3)))).toBe('not-square');
  const broken = { ...a, values: Float64Array.from(a.values ?? [], (v, p) => (p === 2 ? Number.NaN : v)) };
  expect(codeOf(() => factorizeColumns(broken, identityOrder(3)))).toMatch(/^not-finite/);
  const huge = sparseOf([
    [1e-200, 1e200],
    [1e-200 * 0.9, 1],
  ]);
  expect(factorizeColumns(huge, identityOrder(2)).report.pivotGrowth).toBeGreaterThan(0);
});

test('wrong blocks are an invariant broken, not a wrong answer', () => {
  const a = sparseOf([
    [1, 0],
    [1, 1],
  ]);
  expect(() => factorizeColumns(a, identityOrder(2), { blockStart: Int32Array.of(0, 1, 2) })).toThrow(/below block 0/);
  expect(() => factorizeColumns(a, identityOrder(2), { blockStart: Int32Array.of(0, 1) })).toThrow(/run from 0 to 2/);
});

test('edges: empty, order one, diagonal, triangular; progress and cancel; input untouched', () => {
  const empty = factorizeColumns(sparseOf([]), identityOrder(0));
  expect(empty.report.factorEntries).toBe(0);
  expect(empty.report.logAbsDeterminant).toBe(0);
  expect(factorizeColumns(sparseOf([[-4]]), identityOrder(1)).report.determinantSign).toEqual([-1, 0]);
  const upper = sparseOf([
    [1, 2, 3],
    [0, 4, 5],
    [0, 0, 6],
  ]);
  const before = Float64Array.from(upper.values ?? []);
  const plan = columnPlan(upper, (block) => identityOrder(block.columns));
  const factor = factorizeColumns(upper, plan.columnOrder, plan);
  expect(factor.report.factorEntries).toBe(3);
  expect(factor.offDiagonalBlockEntries).toBe(entryCount(upper) - 3);
  expect(factor.report.executedOperations).toBe(0);
  expect(upper.values).toEqual(before);
  const stop = new Error('stop');
  expect(() =>
    factorizeColumns(upper, identityOrder(3), {}, () => {
      throw stop;
    }),
  ).toThrow(stop);
});
