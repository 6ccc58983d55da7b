import { expect, test } from 'vitest';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { identityOrder } from '../../../engine/matrix/permutation.ts';
import { factorizeColumns } from '../../../engine/numeric/column/columnFactor.ts';
import { exportFactors } from '../../../engine/numeric/column/export.ts';
import { overwritingReport } from '../../../engine/numeric/forms/overwriting.ts';
import {
  choleskyToDiagonal,
  convertForm,
  type FormName,
  pivotsOf,
  type TriangularForm,
  unitLowerForm,
} from '../../../engine/numeric/forms/triangularForms.ts';
import { randomMatrix, randomOrder } from '../../support/random.ts';
import { sparseOf } from '../accuracy/denseSolver.ts';
import { type Complex, denseComplex } from '../column/support.ts';

const names: FormName[] = ['unit-lower', 'unit-upper', 'diagonal'];

function product(f: TriangularForm): { value: Complex; size: number }[][] {
  const n = f.lower.columns;
  const [l, u] = [denseComplex(f.lower), denseComplex(f.upper)];
  const complex = f.lower.field === 'complex';
  const d = Array.from({ length: n }, (_, k): Complex => {
    if (f.diagonal === null) return [1, 0];
    return complex ? [f.diagonal[2 * k], f.diagonal[2 * k + 1]] : [f.diagonal[k], 0];
  });
  const times = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
  return l.map((row) =>
    u[0].map((_, j) => {
      let [re, im, size] = [0, 0, 0];
      for (let k = 0; k < n; k++) {
        const t = times(times(row[k], d[k]), u[k][j]);
        re += t[0];
        im += t[1];
        size += Math.hypot(...t);
      }
      return { value: [re, im] as Complex, size };
    }),
  );
}

for (const complex of [false, true]) {
  test(`all conversions keep pattern and product, to rounding of each term, ${complex ? 'complex' : 'real'}, seeds 700…709`, () => {
    for (let seed = 700; seed < 710; seed++) {
      const n = 15;
      const a = randomMatrix({ rows: n, columns: n, entries: 45, seed, complex, diagonal: 1 });
      const { lower, upper } = exportFactors(factorizeColumns(a, randomOrder(n, seed)).factors);
      const start = unitLowerForm(lower, upper);
      const expected = product(start);
      for (const via of names) {
        for (const to of names) {
          const f = convertForm(convertForm(start, via), to);
          expect(f.form).toBe(to);
          expect(f.lower.rowIndex).toEqual(lower.rowIndex);
          expect(f.upper.rowIndex).toEqual(upper.rowIndex);
          const found = product(f);
          for (let i = 0; i < n; i++) {
            for (let j = 0; j < n; j++) {
              const error = Math.hypot(
                found[i][j].value[0] - expected[i][j].value[0],
                found[i][j].value[1] - expected[i][j].value[1],
              );
              // at most four roundings a term in the conversions, n in the sums; complex ones count up to four fold
              expect(error).toBeLessThanOrEqual(40 * 2 ** -53 * expected[i][j].size);
            }
          }
          const relative = pivotsOf(f).map((v, p) => v - pivotsOf(start)[p]);
          for (const r of relative) expect(Math.abs(r)).toBe(0);
          expectUnit(to === 'unit-lower' || to === 'diagonal' ? f.lower : null, 'first', complex);
          expectUnit(to === 'unit-upper' || to === 'diagonal' ? f.upper : null, 'last', complex);
        }
      }
    }
  });
}

function expectUnit(a: SparseMatrix | null, where: 'first' | 'last', complex: boolean): void {
  if (a === null) return;
  const w = complex ? 2 : 1;
  for (let k = 0; k < a.columns; k++) {
    const p = where === 'first' ? a.columnPointer[k] : a.columnPointer[k + 1] - 1;
    expect(a.rowIndex[p]).toBe(k);
    expect(a.values?.[p * w]).toBe(1);
    if (complex) expect(a.values?.[p * w + 1]).toBe(0);
  }
}

test('by hand: the three forms of [[2, 4], [6, 15]]', () => {
  const lower = sparseOf([
    [1, 0],
    [3, 1],
  ]);
  const upper = sparseOf([
    [2, 4],
    [0, 3],
  ]);
  const start = unitLowerForm(lower, upper);
  const crout = convertForm(start, 'unit-upper');
  expect(Array.from(crout.lower.values ?? [])).toEqual([2, 6, 3]);
  expect(Array.from(crout.upper.values ?? [])).toEqual([1, 2, 1]);
  const ldu = convertForm(crout, 'diagonal');
  expect(Array.from(ldu.diagonal ?? [])).toEqual([2, 3]);
  expect(Array.from(ldu.lower.values ?? [])).toEqual([1, 3, 1]);
  expect(Array.from(ldu.upper.values ?? [])).toEqual([1, 2, 1]);
  expect(Array.from(upper.values ?? [])).toEqual([2, 4, 3]);
});

test('broken factors and zero pivots are refused', () => {
  const upper = sparseOf([
    [2, 4],
    [0, 3],
  ]);
  expect(() => unitLowerForm(upper, upper)).toThrow(/does not start|invariant/);
  expect(() => unitLowerForm(sparseOf([[1]]), upper)).toThrow(/one size/);
  const zero = { ...sparseOf([[1]]), values: Float64Array.of(0) };
  expect(() => convertForm(unitLowerForm(sparseOf([[1]]), zero), 'diagonal')).toThrow(/zero/);
});

test('Cholesky to L·D·Lᵀ by hand', () => {
  const { lower, diagonal } = choleskyToDiagonal(
    sparseOf([
      [2, 0],
      [6, 3],
    ]),
  );
  expect(Array.from(diagonal)).toEqual([4, 9]);
  expect(Array.from(lower.values ?? [])).toEqual([1, 3, 1]);
});

test('overwriting a dense matrix: L and U fit in its own n² places, one matrix out of two is saved', () => {
  const n = 12;
  const dense = sparseOf(
    Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (__, j) => (i === j ? 20 : 1 + ((i * 7 + j * 3) % 5))),
    ),
  );
  const factor = factorizeColumns(dense, identityOrder(n));
  expect(factor.report.factorEntries).toBe(n * n);
  const report = overwritingReport(n, n * n, factor.report.factorEntries, false, n, { value: 8, index: 0, pointer: 0 });
  expect(report.fillEntries).toBe(0);
  expect(report.savedBytes).toBe(8 * n * n);
  expect(report.savedShare).toBe(0.5);
});

test('overwriting a sparse matrix by hand: symmetric stores one triangle', () => {
  // order 3, entries: diagonal 3, two mirrored pairs; L has 6 places
  const report = overwritingReport(3, 7, 6, true, 3, { value: 8, index: 4, pointer: 8 });
  expect(report.fillEntries).toBe(1);
  expect(report.overwrittenBytes).toBe(12 * 6 + 8 * 4);
  expect(report.savedBytes).toBe(12 * 5 + 8 * 4);
  expect(report.separateBytes).toBe(report.overwrittenBytes + report.savedBytes);
});
