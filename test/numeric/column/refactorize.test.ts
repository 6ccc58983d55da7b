import { expect, test } from 'vitest';
import { Fault } from '../../../engine/matrix/fault.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { identityOrder } from '../../../engine/matrix/permutation.ts';
import { Random } from '../../../engine/matrix/random.ts';
import { factorizeColumns } from '../../../engine/numeric/column/columnFactor.ts';
import { columnPlan } from '../../../engine/numeric/column/columnPlan.ts';
import { refactorizeColumns } from '../../../engine/numeric/column/refactorize.ts';
import { randomMatrix, randomOrder } from '../../support/random.ts';
import { sparseOf } from '../accuracy/denseSolver.ts';
import { denseBackwardError, factorizationError } from './support.ts';

/** The same pattern with every value changed by up to `size` of itself. */
function perturbed(a: SparseMatrix, size: number, seed: number): SparseMatrix {
  const random = new Random(seed);
  return { ...a, values: Float64Array.from(a.values ?? [], (v) => v * (1 + size * (2 * random.next() - 1))) };
}

for (const complex of [false, true]) {
  test(`new values, same pattern and pivots, ${complex ? 'complex' : 'real'}, with blocks and scalings, seeds 200…209`, () => {
    for (let seed = 200; seed < 210; seed++) {
      const n = 30;
      const a = randomMatrix({ rows: n, columns: n, entries: 35, seed, complex, diagonal: 2 });
      const plan = columnPlan(a, (block) => randomOrder(block.columns, seed));
      const random = new Random(seed);
      const rowScaling = new Float64Array(n).map(() => 2 ** (random.below(5) - 2));
      const first = factorizeColumns(a, plan.columnOrder, { ...plan, threshold: 0.1, rowScaling });
      const b = perturbed(a, 0.3, seed);
      const second = refactorizeColumns(first, a, b);
      expect(factorizationError(b, second)).toBeLessThan(60 * 2 ** -53);
      expect(second.factors.lower.index).toBe(first.factors.lower.index);
      expect(second.factors.rowOrder).toBe(first.factors.rowOrder);
      const x = new Float64Array(complex ? 2 * n : n).fill(1);
      const rightHandSide = x.slice();
      second.solveInPlace(x, 1);
      expect(denseBackwardError(b, x, rightHandSide)).toBeLessThan(1e-13);
      // the old factor is as it was
      expect(factorizationError(a, first)).toBeLessThan(60 * 2 ** -53);
      // with the same values it is the same factorization
      const again = refactorizeColumns(first, a, a);
      expect(again.report.executedOperations).toBe(first.report.executedOperations);
      expect(again.report.logAbsDeterminant).toBeCloseTo(first.report.logAbsDeterminant ?? Number.NaN, 12);
    }
  });
}

test('another pattern is refused with counts; unfit values ask for a new analysis', () => {
  const a = sparseOf([
    [4, 1, 0],
    [1, 4, 1],
    [0, 1, 4],
  ]);
  const factor = factorizeColumns(a, identityOrder(3));
  const faultOf = (f: () => unknown): Fault | null => {
    try {
      f();
    } catch (error) {
      if (error instanceof Fault) return error;
    }
    return null;
  };
  const other = sparseOf([
    [4, 1, 1],
    [0, 4, 1],
    [0, 1, 4],
  ]);
  const differs = faultOf(() => refactorizeColumns(factor, a, other));
  expect(differs?.code).toBe('pattern-differs');
  expect(differs?.message).toContain('1 new positions, 1 gone');
  const zero = { ...a, values: Float64Array.of(0, 1, 1, 4, 1, 1, 4) };
  const unfit = faultOf(() => refactorizeColumns(factor, a, zero));
  expect(unfit?.code).toBe('pivots-unfit');
  expect(unfit?.kind).toBe('not-completed');
  expect(unfit?.place).toEqual({ row: 0, column: 0 });
  const tiny = { ...a, values: Float64Array.of(1e-9, 1, 1, 4, 1, 1, 4) };
  expect(faultOf(() => refactorizeColumns(factor, a, tiny))?.code).toBe('pivots-unfit');
  expect(faultOf(() => refactorizeColumns(factor, a, tiny, { growthLimit: 1e12, multiplierLimit: 1e12 }))).toBeNull();
});
