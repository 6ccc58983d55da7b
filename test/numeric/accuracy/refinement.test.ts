import { expect, test } from 'vitest';
import { Random } from '../../../engine/matrix/random.ts';
import { backwardErrors } from '../../../engine/numeric/accuracy/backwardError.ts';
import { refine } from '../../../engine/numeric/accuracy/refine.ts';
import { measuredSystem } from '../../../engine/numeric/accuracy/system.ts';
import type { Solver } from '../../../engine/numeric/solver.ts';
import { randomMatrix } from '../../support/random.ts';
import { figures, readReference } from '../../support/reference.ts';
import { denseSolver, exactResidual, plainReport, sparseOf } from './denseSolver.ts';

/** Makes a good solver a bad one: every solution is off by a relative error of about `size`. */
function spoiled(solver: Solver, size: number): Solver {
  const spoil = (x: Float64Array): void => {
    for (let i = 0; i < x.length; i++) x[i] *= 1 + size * Math.sin(i + 1);
  };
  return {
    ...solver,
    solveInPlace(x, columns) {
      solver.solveInPlace(x, columns);
      spoil(x);
    },
    solveTransposedInPlace(x, columns) {
      solver.solveTransposedInPlace(x, columns);
      spoil(x);
    },
  };
}

/** Normwise backward error from the exact residual: shares no arithmetic with the code under test. */
function exactBackwardError(a: ReturnType<typeof randomMatrix>, x: Float64Array, b: Float64Array): number {
  const norms = measuredSystem(a).norms;
  const top = (v: Float64Array) => v.reduce((m, value) => Math.max(m, Math.abs(value)), 0);
  return top(exactResidual(a, x, b)) / (norms.infinity * top(x) + top(b));
}

test('backward errors by hand', () => {
  // A = diag(1, 1e6), x = (1, 1), b = (1.5, 1e6): r = (0.5, 0)
  const system = measuredSystem(
    sparseOf([
      [1, 0],
      [0, 1e6],
    ]),
  );
  const errors = backwardErrors(
    system,
    Float64Array.of(1, 1),
    Float64Array.of(1.5, 1e6),
    Float64Array.of(0.5, 0),
    false,
    new Float64Array(2),
  );
  expect(errors.normwise).toBeCloseTo(0.5 / 2e6, 20);
  // the first row alone is off by a fifth: |r|/(|A||x|+|b|) = 0.5/2.5
  expect(errors.componentwise).toBeCloseTo(0.2, 14);
});

test('where the denominator vanishes the one of Arioli, Demmel & Duff stands in', () => {
  // row 1 has x-part and b-part zero: x = (0, 1), row 1 = (1, 0), b₁ = 0, but a residual of 1e-20 there
  const system = measuredSystem(
    sparseOf([
      [1, 0],
      [0, 1],
    ]),
  );
  const errors = backwardErrors(
    system,
    Float64Array.of(0, 1),
    Float64Array.of(0, 1),
    Float64Array.of(1e-20, 0),
    false,
    new Float64Array(2),
  );
  expect(errors.componentwise).toBeCloseTo(1e-20, 30);
});

test('what overflows is never a small error', () => {
  const system = measuredSystem(
    sparseOf([
      [1, 0],
      [0, 1],
    ]),
  );
  const infinite = backwardErrors(
    system,
    Float64Array.of(Infinity, 1),
    Float64Array.of(1, 1),
    Float64Array.of(1, 0),
    false,
    new Float64Array(2),
  );
  expect(infinite.normwise).toBeNaN();
  expect(infinite.componentwise).toBeNaN();
});

for (const complex of [false, true]) {
  test(`refinement mends a spoiled solver, ${complex ? 'complex' : 'real'}, seed 41`, () => {
    const a = randomMatrix({ rows: 40, columns: 40, entries: 200, seed: 41, complex, diagonal: 4 });
    const random = new Random(42);
    const b = new Float64Array(40 * (complex ? 2 : 1) * 2).map(() => 2 * random.next() - 1);
    const columns = refine(measuredSystem(a), spoiled(denseSolver(a), 1e-3), b, 2, complex, { steps: 10 });
    expect(columns).toHaveLength(2);
    for (const column of columns) {
      expect(column.history[0].backwardError).toBeGreaterThan(1e-6);
      expect(column.history[column.returned].backwardError).toBeLessThan(2 ** -51);
      expect(column.history[column.returned].componentwiseBackwardError).toBeLessThan(2 ** -51);
    }
  });
}

test('the history never loses its best: the returned iterate is the smallest, also when refinement diverges', () => {
  const a = randomMatrix({ rows: 20, columns: 20, entries: 80, seed: 43, diagonal: 3 });
  const good = denseSolver(a);
  let call = 0;
  // the first solution is good, every correction is rubbish
  const diverging: Solver = {
    ...good,
    solveInPlace(x, columns) {
      good.solveInPlace(x, columns);
      if (call++ > 0) for (let i = 0; i < x.length; i++) x[i] = 1e10 * (i + 1);
    },
  };
  const b = new Float64Array(20).fill(1);
  const [column] = refine(measuredSystem(a), diverging, b, 1, false, { steps: 4 });
  expect(column.history.length).toBeGreaterThan(1);
  expect(column.returned).toBe(0);
  expect(exactBackwardError(a, column.solution, b)).toBeLessThan(1e-14);
});

test('recomputed in exact arithmetic the returned iterate is no worse than the plain one beyond 4ε', () => {
  const names = Object.keys(figures).filter((name) => ['pores_1', 'bcsstk01', 'arc130', 'lund_a'].includes(name));
  expect(names.length).toBe(4);
  for (const name of names) {
    const a = readReference(name);
    const solver = denseSolver(a);
    const random = new Random(44);
    for (const b of [new Float64Array(a.rows).fill(1), new Float64Array(a.rows).map(() => random.next() - 0.5)]) {
      const system = measuredSystem(a);
      const [plain] = refine(system, solver, b, 1, false, { steps: 0 });
      for (const residual of ['working', 'doubled'] as const) {
        const [refined] = refine(system, solver, b, 1, false, { steps: 5, residual });
        const rise = exactBackwardError(a, refined.solution, b) - exactBackwardError(a, plain.solution, b);
        expect(rise, `${name}, ${residual}`).toBeLessThanOrEqual(4 * 2 ** -52);
        expect(plain.history).toHaveLength(1);
      }
    }
  }
});

test('a system with entries near the ends of the range is measured like any other', () => {
  for (const factor of [1e-300, 1e300, 1e-160, 1e160]) {
    const rows = [
      [2 * factor, 1 * factor, 0],
      [1 * factor, -3 * factor, 0.5 * factor],
      [0, 0.5 * factor, 1 * factor],
    ];
    const a = sparseOf(rows);
    const b = Float64Array.of(3 * factor, -1.5 * factor, 1.5 * factor);
    const good = denseSolver(sparseOf(rows.map((row) => row.map((v) => v / factor))));
    const solver: Solver = {
      ...good,
      solveInPlace(x, columns) {
        for (let i = 0; i < x.length; i++) x[i] /= factor;
        good.solveInPlace(x, columns);
      },
    };
    const [column] = refine(measuredSystem(a), solver, b, 1, false);
    for (const value of column.solution) expect(value).toBeCloseTo(1, 13);
    // off by 1 ‰ in one component only, so that scaling b could not explain it
    const wrong: Solver = {
      ...solver,
      solveInPlace(x, columns) {
        solver.solveInPlace(x, columns);
        x[0] *= 1.001;
      },
    };
    const [bad] = refine(measuredSystem(a), wrong, b, 1, false, { steps: 0 });
    expect(bad.history[0].backwardError).toBeGreaterThan(1e-5);
  }
});

test('NaN from the solver stays visible', () => {
  const a = sparseOf([
    [1, 0],
    [0, 1],
  ]);
  const broken: Solver = {
    size: 2,
    complex: false,
    report: plainReport,
    solveInPlace: (x) => void x.fill(Number.NaN),
    solveTransposedInPlace: (x) => void x.fill(Number.NaN),
  };
  const [column] = refine(measuredSystem(a), broken, Float64Array.of(1, 1), 1, false);
  expect(column.history).toHaveLength(1);
  expect(column.history[0].backwardError).toBeNaN();
});
