import { describe, expect, it } from 'vitest';
import { assemble } from '../../../engine/matrix/assemble.ts';
import { Fault } from '../../../engine/matrix/fault.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { asNewToOld, identityOrder } from '../../../engine/matrix/permutation.ts';
import { extractFactors } from '../../../engine/numeric/fronts/extract.ts';
import { factorizeFronts } from '../../../engine/numeric/fronts/frontFactor.ts';
import { plainTree } from '../../support/plainTree.ts';
import { randomOrder } from '../../support/random.ts';
import { backwardError, dense, factorized, randomVector, shaped } from './support.ts';

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

function caught(f: () => unknown): Fault {
  try {
    f();
  } catch (error) {
    if (error instanceof Fault) return error;
    throw error;
  }
  throw new Error('nothing was thrown');
}

describe('pivots of order two', () => {
  it('are taken for n/2 blocks [0 1; 1 0], whose inertia is (n/2, n/2, 0)', () => {
    const n = 12;
    const entries: [number, number, number][] = [];
    for (let i = 0; i < n; i += 2) entries.push([i, i + 1, 1 + i], [i + 1, i, 1 + i]);
    const { report, factors } = factorized(real(n, entries), identityOrder(n), { kind: 'ldlt', pivoting: 'threshold' });
    expect(report.counts).toEqual({ offDiagonal: 0, delayed: 0, twoByTwo: n / 2, perturbed: 0 });
    expect(report.inertia).toEqual([n / 2, n / 2, 0]);
    expect(report.smallestPivot?.modulus).toBe(1);
    expect(report.largestPivot?.modulus).toBe(n - 1);
    expect([10, 11]).toContain(report.largestPivot?.row);
    const e = extractFactors(factors);
    expect(e.diagonal?.rowIndex.length).toBe(2 * n);
    expect(report.twoByTwoOperations).toBe((3 * n) / 2);
  });

  it('keep complex symmetric and Hermitian apart', () => {
    const values = Float64Array.of(0, 0, 0, 2, 0, 2, 0, 0);
    const pattern = { rows: 2, columns: 2, columnPointer: Int32Array.of(0, 2, 4), rowIndex: Int32Array.of(0, 1, 0, 1) };
    const symmetric: SparseMatrix = { ...pattern, field: 'complex', values };
    const s = factorized(symmetric, identityOrder(2), { kind: 'ldlt', pivoting: 'threshold' }).report;
    expect(s.inertia).toBeNull();
    // det [0 2i; 2i 0] = 4, det [0 −2i; 2i 0] = −4
    expect(s.determinantSign).toEqual([1, 0]);
    const conjugated = values.slice();
    conjugated[5] = -2;
    const hermitian: SparseMatrix = { ...pattern, field: 'complex', values: conjugated };
    const options = { kind: 'ldlt', pivoting: 'threshold', hermitian: true } as const;
    const h = factorized(hermitian, identityOrder(2), options).report;
    expect(h.inertia).toEqual([1, 1, 0]);
    expect(h.determinantSign?.[0]).toBe(-1);
    expect(h.logAbsDeterminant).toBeCloseTo(Math.log(4), 14);
  });
});

describe('delayed pivots', () => {
  it('wait for the front that can take them: leaves of a star with empty diagonals', () => {
    // saddle point: hub block positive, leaves zero; every leaf front has one column and must delay it
    const a = shaped('saddle', 60, false, 4);
    const order = asNewToOld(Int32Array.from({ length: 60 }, (_, k) => 59 - k));
    for (const kind of ['ldlt', 'lu'] as const) {
      const { tree, rows } = plainTree(a, order);
      const factor = factorizeFronts(a, tree, rows, { kind, pivoting: 'threshold' });
      expect(factor.report.counts.delayed).toBeGreaterThan(0);
      const b = randomVector(60, 5);
      const x = b.slice();
      factor.solveInPlace(x, 1);
      expect(backwardError(a, x, b)).toBeLessThan(1e-13);
      const { lower, upper } = extractFactors(factor.factors);
      const entries = lower.rowIndex.length + (upper === null ? 0 : upper.rowIndex.length - 60);
      expect(factor.report.factorEntries).toBe(entries);
    }
  });

  it('leave the forecast alone where there are none', () => {
    const a = shaped('definite', 80, false, 6);
    for (const kind of ['ldlt', 'lu'] as const) {
      const { tree, rows } = plainTree(a, randomOrder(80, 7), 0.3);
      const { report } = factorizeFronts(a, tree, rows, { kind, pivoting: 'threshold' });
      const stored = kind === 'lu' ? 2 * tree.storedFactorEntries - 80 : tree.storedFactorEntries;
      expect(report.counts.delayed).toBe(0);
      expect(report.factorEntries).toBe(kind === 'lu' ? 2 * tree.factorEntries - 80 : tree.factorEntries);
      expect(report.storedFactorEntries).toBe(stored);
    }
  });
});

describe('static pivoting (Li & Demmel 1998)', () => {
  it('replaces, counts, and refinement against the original matrix mends the solution', () => {
    for (const kind of ['ldlt', 'lu'] as const) {
      const a = shaped('saddle', 40, false, 9);
      const order = asNewToOld(Int32Array.from({ length: 40 }, (_, k) => 39 - k));
      const factor = factorized(a, order, { kind, pivoting: 'static', perturbation: 1e-8 });
      expect(factor.report.counts.perturbed).toBeGreaterThan(0);
      expect(factor.report.logAbsDeterminant).toBeNull();
      expect(factor.report.inertia).toBeNull();
      const b = randomVector(40, 10);
      const x = b.slice();
      factor.solveInPlace(x, 1);
      const d = dense(a);
      for (let step = 0; step < 6; step++) {
        const r = b.slice();
        for (let j = 0; j < 40; j++) for (let i = 0; i < 40; i++) r[i] -= d.re[j * 40 + i] * x[j];
        factor.solveInPlace(r, 1);
        for (let i = 0; i < 40; i++) x[i] += r[i];
      }
      expect(backwardError(a, x, b)).toBeLessThan(1e-12);
    }
  });
});

describe('without pivoting', () => {
  it('an indefinite matrix passes, and its residual shows that it should not have', () => {
    const n = 40;
    const a = shaped('symmetric', n, false, 22);
    const values = (a.values as Float64Array).slice();
    for (let j = 0; j < n; j++) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) if (a.rowIndex[p] === j) values[p] = 1e-15;
    }
    const small = { ...a, values };
    const error = (pivoting: 'none' | 'threshold'): number => {
      const b = randomVector(n, 1);
      const x = b.slice();
      factorized(small, identityOrder(n), { kind: 'ldlt', pivoting }).solveInPlace(x, 1);
      return backwardError(small, x, b);
    };
    expect(error('none')).toBeGreaterThan(1e-8);
    expect(error('threshold')).toBeLessThan(1e-13);
  });

  it('a zero pivot ends the run with its original row', () => {
    const a = real(3, [
      [0, 0, 2],
      [1, 2, 1],
      [2, 1, 1],
      [1, 1, 0],
      [2, 2, 0],
    ]);
    for (const kind of ['ldlt', 'lu'] as const) {
      const fault = caught(() => factorized(a, identityOrder(3), { kind, pivoting: 'none' }));
      expect([fault.kind, fault.code, fault.place.row]).toEqual(['not-completed', 'zero-pivot', 1]);
    }
  });
});

describe('rows paired with columns (a matching)', () => {
  it('put the paired entries on the diagonal: none is off-diagonal, solution and determinant are those of A', () => {
    const n = 37;
    const a = shaped('shifted', n, false, 3);
    // entry (i, i + 1) is large: column j is paired with row j − 1, a permutation that is not its own inverse
    const rowPermutation = Int32Array.from({ length: n }, (_, j) => (j + n - 1) % n);
    const t = {
      rows: n,
      columns: n,
      field: 'real' as const,
      row: new Int32Array(a.rowIndex.length),
      column: new Int32Array(a.rowIndex.length),
      values: a.values,
    };
    for (let j = 0; j < n; j++) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
        t.row[p] = (a.rowIndex[p] + 1) % n;
        t.column[p] = j;
      }
    }
    const paired = assemble(t).matrix;
    const { tree, rows } = plainTree(paired, randomOrder(n, 4), 0.2);
    const factor = factorizeFronts(a, tree, rows, {
      kind: 'lu',
      pivoting: 'threshold',
      threshold: 0.01,
      rowPermutation,
    });
    expect(factor.report.counts.offDiagonal).toBe(0);
    const b = randomVector(n, 6);
    for (const isTransposed of [false, true]) {
      const x = b.slice();
      if (isTransposed) factor.solveTransposedInPlace(x, 1);
      else factor.solveInPlace(x, 1);
      expect(backwardError(a, x, b, isTransposed)).toBeLessThan(1e-14);
    }
    const plain = factorized(a, randomOrder(n, 5), { kind: 'lu', pivoting: 'threshold' }).report;
    expect(factor.report.logAbsDeterminant).toBeCloseTo(plain.logAbsDeterminant as number, 10);
    expect(factor.report.determinantSign).toEqual(plain.determinantSign);
    const e = extractFactors(factor.factors);
    for (let t = 0; t < n; t++) expect(e.rowOrder[t]).toBe(rowPermutation[e.columnOrder[t]]);
  });
});

describe('badly scaled matrices', () => {
  it('solve to a small backward error with values over 200 orders of magnitude', () => {
    const n = 50;
    for (const complex of [false, true]) {
      const a = shaped('symmetric', n, complex, 31);
      const values = (a.values as Float64Array).slice();
      const width = complex ? 2 : 1;
      for (let j = 0; j < n; j++) {
        for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
          const f = 10 ** (((j * 37) % 201) - 100 + ((a.rowIndex[p] * 37) % 201) - 100);
          for (let w = 0; w < width; w++) values[width * p + w] *= f;
        }
      }
      const wild = { ...a, values };
      const rowScale = Float64Array.from({ length: n }, (_, i) => 10 ** (100 - ((i * 37) % 201)));
      for (const kind of ['ldlt', 'lu'] as const) {
        const b = randomVector(width * n, 8);
        const x = b.slice();
        const options = { kind, pivoting: 'threshold', rowScale, columnScale: rowScale } as const;
        factorized(wild, randomOrder(n, 2), options).solveInPlace(x, 1);
        expect(x.every(Number.isFinite)).toBe(true);
        expect(backwardError(wild, x, b)).toBeLessThan(1e-14);
      }
    }
  });
});

describe('failures have an address', () => {
  it('not positive definite: original row and value of the pivot', () => {
    // row 2 is reached with 1 − 4²/4 = −3
    const a = real(3, [
      [0, 0, 4],
      [0, 2, 4],
      [2, 0, 4],
      [1, 1, 9],
      [2, 2, 1],
    ]);
    const fault = caught(() =>
      factorized(a, asNewToOld(Int32Array.of(1, 0, 2)), { kind: 'cholesky', pivoting: 'none' }),
    );
    expect([fault.kind, fault.code, fault.place.row]).toEqual(['not-completed', 'not-positive-definite', 2]);
    expect(fault.message).toContain('original row 2');
    expect(fault.message).toContain('-3');
  });

  it('the row is right in large fronts too, real and complex', () => {
    for (const complex of [false, true]) {
      const n = 90;
      const a = shaped('definite', n, complex, 41, 8);
      const values = (a.values as Float64Array).slice();
      const bad = 57;
      for (let p = a.columnPointer[bad]; p < a.columnPointer[bad + 1]; p++) {
        if (a.rowIndex[p] === bad) values[complex ? 2 * p : p] = -1000;
      }
      const fault = caught(() =>
        factorized({ ...a, values }, randomOrder(n, 2), { kind: 'cholesky', pivoting: 'none' }, 0.5),
      );
      expect([fault.code, fault.place.row]).toEqual(['not-positive-definite', bad]);
    }
  });

  it('singular: the dependent rows, also when static pivoting would go on', () => {
    const a = real(4, [
      [0, 0, 1],
      [0, 1, 1],
      [1, 0, 1],
      [1, 1, 1],
      [2, 2, 1],
      [3, 3, 5],
    ]);
    for (const kind of ['ldlt', 'lu'] as const) {
      const fault = caught(() => factorized(a, identityOrder(4), { kind, pivoting: 'threshold' }));
      expect([fault.kind, fault.code]).toEqual(['not-completed', 'singular']);
      expect([0, 1]).toContain(fault.place.row);
      expect(factorized(a, identityOrder(4), { kind, pivoting: 'static' }).report.counts.perturbed).toBe(1);
    }
  });

  it('an empty row', () => {
    const a = real(3, [
      [0, 0, 1],
      [2, 2, 1],
    ]);
    const fault = caught(() => factorized(a, identityOrder(3), { kind: 'lu', pivoting: 'threshold' }));
    expect([fault.code, fault.place.row, fault.place.column]).toEqual(['singular', 1, 1]);
  });

  it('values that are not finite', () => {
    const a = real(2, [
      [0, 0, Number.NaN],
      [0, 1, 1],
      [1, 0, 1],
      [1, 1, 1],
    ]);
    for (const kind of ['ldlt', 'lu'] as const) {
      const fault = caught(() => factorized(a, identityOrder(2), { kind, pivoting: 'threshold' }));
      expect([fault.kind, fault.code]).toEqual(['not-completed', 'not-finite']);
    }
  });

  it('calls that cannot be', () => {
    const a = shaped('definite', 10, false, 1);
    const { tree, rows } = plainTree(a, identityOrder(10));
    const code = (o: object) =>
      caught(() => factorizeFronts(a, tree, rows, { kind: 'ldlt', pivoting: 'threshold', ...o })).code;
    expect(code({ threshold: 0 })).toBe('threshold-out-of-range');
    expect(code({ threshold: 0.6 })).toBe('threshold-out-of-range');
    expect(code({ threshold: Number.NaN })).toBe('threshold-out-of-range');
    expect(code({ kind: 'lu', threshold: 1.1 })).toBe('threshold-out-of-range');
    expect(code({ perturbation: 2 })).toBe('perturbation-out-of-range');
    expect(code({ schur: 11 })).toBe('held-out-of-range');
    expect(code({ rowScale: new Float64Array(9) })).toBe('length-mismatch');
    expect(code({ rowPermutation: new Int32Array(10) })).toBe('pairing-not-symmetric');
    const other = shaped('definite', 10, false, 2);
    const options = { kind: 'cholesky', pivoting: 'none' } as const;
    expect(caught(() => factorizeFronts(other, tree, rows, options)).code).toBe('tree-of-another-pattern');
    expect(caught(() => factorizeFronts(shaped('definite', 11, false, 1), tree, rows, options)).code).toBe(
      'not-square',
    );
    const pattern = { ...a, field: 'pattern' as const, values: null };
    expect(caught(() => factorizeFronts(pattern, tree, rows, options)).code).toBe('no-values');
    const factor = factorizeFronts(a, tree, rows, options);
    expect(caught(() => factor.solveInPlace(new Float64Array(11), 1)).code).toBe('length-mismatch');
  });
});
