import { describe, expect, it } from 'vitest';
import { assemble } from '../../../engine/matrix/assemble.ts';
import { Fault } from '../../../engine/matrix/fault.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { asNewToOld, identityOrder } from '../../../engine/matrix/permutation.ts';
import type { FrontOptions } from '../../../engine/numeric/fronts/options.ts';
import { randomOrder } from '../../support/random.ts';
import { type Dense, dense, factorized, randomVector, type Shape, shaped } from './support.ts';

/** A₂₂ − A₂₁·A₁₁⁻¹·A₁₂ by dense elimination with partial pivoting of the first unknowns, by the definition. */
function denseSchur(a: SparseMatrix, rows: readonly number[], columns: readonly number[]): Dense {
  const d = dense(a);
  const all = [...Array(d.n).keys()];
  const rowOrder = [...all.filter((i) => !rows.includes(i)), ...rows];
  const columnOrder = [...all.filter((j) => !columns.includes(j)), ...columns];
  const n = d.n;
  const re = new Float64Array(n * n);
  const im = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    for (let i = 0; i < n; i++) {
      re[j * n + i] = d.re[columnOrder[j] * n + rowOrder[i]];
      im[j * n + i] = d.im[columnOrder[j] * n + rowOrder[i]];
    }
  }
  const e = n - rows.length;
  for (let k = 0; k < e; k++) {
    let pivot = k;
    const size = (i: number) => Math.hypot(re[k * n + i], im[k * n + i]);
    for (let i = k + 1; i < e; i++) if (size(i) > size(pivot)) pivot = i;
    for (let j = 0; j < n; j++) {
      for (const x of [re, im]) [x[j * n + k], x[j * n + pivot]] = [x[j * n + pivot], x[j * n + k]];
    }
    const pr = re[k * n + k];
    const pi = im[k * n + k];
    const square = pr * pr + pi * pi;
    for (let i = k + 1; i < n; i++) {
      const fr = (re[k * n + i] * pr + im[k * n + i] * pi) / square;
      const fi = (im[k * n + i] * pr - re[k * n + i] * pi) / square;
      for (let j = k; j < n; j++) {
        re[j * n + i] -= fr * re[j * n + k] - fi * im[j * n + k];
        im[j * n + i] -= fr * im[j * n + k] + fi * re[j * n + k];
      }
    }
  }
  const h = rows.length;
  const out: Dense = { n: h, re: new Float64Array(h * h), im: new Float64Array(h * h) };
  for (let j = 0; j < h; j++) {
    for (let i = 0; i < h; i++) {
      out.re[j * h + i] = re[(e + j) * n + e + i];
      out.im[j * h + i] = im[(e + j) * n + e + i];
    }
  }
  return out;
}

const cases: [Shape, FrontOptions][] = [
  ['definite', { kind: 'cholesky', pivoting: 'none' }],
  ['symmetric', { kind: 'ldlt', pivoting: 'threshold' }],
  ['hermitian', { kind: 'ldlt', pivoting: 'threshold', hermitian: true }],
  ['general', { kind: 'lu', pivoting: 'threshold', threshold: 1e-3 }],
  ['definite', { kind: 'lu', pivoting: 'threshold' }],
  ['definite', { kind: 'ldlt', pivoting: 'threshold', hermitian: true }],
];

describe.each([false, true])('Schur complement onto held unknowns, complex: %s', (complex) => {
  it.each(cases)('%s %o equals dense elimination', (shape, options) => {
    const n = 45;
    const schur = 7;
    const a = shaped(shape, n, complex, 51);
    const order = randomOrder(n, 3);
    for (const padding of [0, 0.4]) {
      for (const scaled of [false, true]) {
        const rowScale = randomVector(n, 2).map((v) => 1.5 + v);
        const factor = factorized(a, order, { ...options, schur, ...(scaled ? { rowScale } : {}) }, padding);
        const s = factor.schur;
        if (s === null) throw new Error('no Schur complement');
        expect(s.size).toBe(schur + s.appended);
        if (shape === 'definite') expect(s.appended).toBe(0);
        expect(Array.from(s.rows.subarray(0, schur))).toEqual(Array.from(s.columns.subarray(0, schur)));
        expect(Array.from(s.rows.subarray(0, schur)).sort()).toEqual(Array.from(order.subarray(n - schur)).sort());
        const expected = denseSchur(a, Array.from(s.rows), Array.from(s.columns));
        const width = complex ? 2 : 1;
        for (let q = 0; q < s.size * s.size; q++) {
          expect(Math.abs(s.values[width * q] - expected.re[q])).toBeLessThan(1e-9);
          if (complex) expect(Math.abs(s.values[2 * q + 1] - expected.im[q])).toBeLessThan(1e-9);
        }
      }
    }
  });
});

describe('pivots that fail at the boundary', () => {
  // unknowns 0 … 2 chained to held 3 and 4; unknown 1 has an empty diagonal and only held neighbours
  const a = assemble({
    rows: 5,
    columns: 5,
    field: 'real',
    row: Int32Array.of(0, 1, 3, 1, 4, 2, 4, 2, 3, 4, 0, 3),
    column: Int32Array.of(0, 3, 1, 4, 1, 4, 2, 2, 3, 4, 3, 0),
    values: Float64Array.of(2, 1, 1, 5, 5, 1, 1, 4, 7, 8, 1, 1),
  }).matrix;

  it('are appended to it, with their address', () => {
    for (const kind of ['ldlt', 'lu'] as const) {
      const factor = factorized(a, identityOrder(5), { kind, pivoting: 'threshold', schur: 2 });
      const s = factor.schur;
      expect(Array.from(s?.rows ?? [])).toEqual([3, 4, 1]);
      expect(s?.appended).toBe(1);
      const expected = denseSchur(a, [3, 4, 1], [3, 4, 1]);
      for (let q = 0; q < 9; q++) expect(s?.values[q]).toBeCloseTo(expected.re[q], 13);
    }
  });

  it('are perturbed by choice', () => {
    const factor = factorized(a, identityOrder(5), { kind: 'ldlt', pivoting: 'static', schur: 2 });
    expect(factor.schur?.size).toBe(2);
    expect(factor.report.counts.perturbed).toBe(1);
  });

  it('no solution is claimed from factors that hold unknowns back', () => {
    const factor = factorized(a, asNewToOld(Int32Array.of(0, 1, 2, 3, 4)), {
      kind: 'ldlt',
      pivoting: 'static',
      schur: 2,
    });
    expect(() => factor.solveInPlace(new Float64Array(5), 1)).toThrow(Fault);
    expect(factor.report.logAbsDeterminant).toBeNull();
  });
});
