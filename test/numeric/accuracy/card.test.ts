import { expect, test } from 'vitest';
import { Fault } from '../../../engine/matrix/fault.ts';
import { accuracyCard, measureAccuracy } from '../../../engine/numeric/accuracy/card.ts';
import { judge, limits } from '../../../engine/numeric/accuracy/verdict.ts';
import type { Solver } from '../../../engine/numeric/solver.ts';
import { randomMatrix } from '../../support/random.ts';
import { denseSolver, integerHilbert, plainReport, sparseOf } from './denseSolver.ts';

const column = { name: 'A·1', backwardError: 1e-16, componentwiseBackwardError: 1e-15, finite: true };

test('the verdict at each of its limits', () => {
  expect(judge([column], 1e-5, 5, null).verdict).toBe('green');
  const cases: [Partial<typeof column>, number | null, number | null, string][] = [
    [{ backwardError: limits.greenNormwise }, 1e-5, 5, 'green'],
    [{ backwardError: 1.01e-12 }, 1e-5, 5, 'amber'],
    [{ componentwiseBackwardError: limits.greenComponentwise }, 1e-5, 5, 'green'],
    [{ componentwiseBackwardError: 1.01e-10 }, 1e-5, 5, 'amber'],
    [{ backwardError: limits.redNormwise }, 1e-5, 5, 'amber'],
    [{ backwardError: 1.01e-8 }, 1e-5, 5, 'red'],
    [{ backwardError: Number.NaN }, 1e-5, 5, 'red'],
    [{ componentwiseBackwardError: Number.POSITIVE_INFINITY }, 1e-5, 5, 'red'],
    [{ finite: false }, 1e-5, 5, 'red'],
    [{}, 0.05, 1, 'green'],
    [{}, 0.5, 0, 'amber'],
    [{}, null, null, 'amber'],
  ];
  for (const [change, forward, digits, verdict] of cases) {
    const judged = judge([column, { ...column, ...change }], forward, digits, forward === null ? 'why' : null);
    expect(judged.verdict).toBe(verdict);
    expect(judged.reasons.length).toBeGreaterThan(0);
  }
});

for (const complex of [false, true]) {
  test(`a good solver is green, real numbers only in the card, ${complex ? 'complex' : 'real'}, seed 90`, () => {
    const a = randomMatrix({ rows: 30, columns: 30, entries: 150, seed: 90, complex, diagonal: 4 });
    const card = accuracyCard(a, denseSolver(a));
    expect(card.verdict).toBe('green');
    expect(card.rightHandSides.map((c) => c.name)).toEqual(['A·1', 'random, seed 1', 'random, seed 2']);
    expect(card.trustedDigits).toBeGreaterThanOrEqual(12);
    // plain data: a round trip through JSON loses nothing
    expect(JSON.parse(JSON.stringify(card))).toEqual(card);
    expect(accuracyCard(a, denseSolver(a))).toEqual(card);
  });
}

test('never green for a wrong answer: solvers that cheat', () => {
  const a = randomMatrix({ rows: 30, columns: 30, entries: 150, seed: 91, diagonal: 4 });
  const good = denseSolver(a);
  const cheats: Record<string, (x: Float64Array, columns: number) => void> = {
    // right for A·1, wrong for everything else
    'always ones': (x) => void x.fill(1),
    'does nothing': () => {},
    zero: (x) => void x.fill(0),
    'not finite': (x) => void x.fill(Number.NaN),
    infinite: (x) => void x.fill(Number.POSITIVE_INFINITY),
    huge: (x) => void x.fill(1e300),
    'last unknown forgotten': (x, k) => {
      good.solveInPlace(x, k);
      for (let c = 1; c <= k; c++) x[30 * c - 1] = 0;
    },
  };
  for (const [name, solveInPlace] of Object.entries(cheats)) {
    const card = accuracyCard(a, { ...good, solveInPlace });
    expect(card.verdict, name).toBe('red');
    expect(card.reasons.length).toBeGreaterThan(0);
    for (const [field, value] of Object.entries(card))
      if (value === null) expect(card.missing[field], field).toBeTruthy();
  }
});

test('a small backward error without a digit is not green: a singular matrix to working precision', () => {
  // the rows differ in the last place of one entry: condition number 4·2⁵² and a bit
  const a = sparseOf([
    [1, 1],
    [1, 1 + 2 ** -52],
  ]);
  const card = accuracyCard(a, denseSolver(a));
  expect(card.verdict).toBe('amber');
  expect(card.trustedDigits ?? 0).toBe(0);
  expect(card.conditionEstimate === null || card.conditionEstimate > 1e14).toBe(true);
});

test('Hilbert of order 8: digits trusted are fewer than 6, backward error stays tiny', () => {
  const a = integerHilbert(8);
  const card = accuracyCard(a, denseSolver(a));
  expect(card.backwardError as number).toBeLessThan(1e-15);
  expect(card.trustedDigits as number).toBeLessThanOrEqual(6);
});

test('right-hand sides of the user come first and are returned refined; complex ones for a real matrix too', () => {
  const a = sparseOf([
    [2, 0, 1],
    [0, 4, 0],
    [1, 0, 1],
  ]);
  const run = measureAccuracy(a, denseSolver(a), {
    rightHandSides: { columns: 1, complex: true, values: Float64Array.of(3, 1, 4, 0, 2, 1) },
  });
  expect(run.card.rightHandSides.map((c) => c.name)[0]).toBe('right-hand side 1');
  expect(run.card.rightHandSides).toHaveLength(4);
  // x = (1, 1, 1) + i(0, 0, 1)
  const expected = [1, 0, 1, 0, 1, 1];
  run.solutions?.values.forEach((v, p) => {
    expect(v).toBeCloseTo(expected[p], 14);
  });
  expect(run.card.verdict).toBe('green');
});

test('refusals: wrong length, no values, not square, not finite', () => {
  const a = sparseOf([
    [2, 1],
    [1, 2],
  ]);
  const codeOf = (f: () => unknown): string => {
    try {
      f();
    } catch (error) {
      if (error instanceof Fault) return error.code;
    }
    return 'none';
  };
  const solver = denseSolver(a);
  const rightHandSides = { columns: 2, complex: false, values: new Float64Array(3) };
  expect(codeOf(() => accuracyCard(a, solver, { rightHandSides }))).toBe('right-hand-side-length');
  expect(codeOf(() => accuracyCard({ ...a, field: 'pattern', values: null }, solver))).toBe('values-missing');
  expect(codeOf(() => accuracyCard({ ...a, rows: 3 }, solver))).toBe('not-square');
  expect(codeOf(() => accuracyCard({ ...a, values: Float64Array.of(1, Number.NaN, 1, 1) }, solver))).toBe('not-finite');
});

test('an empty matrix has a card too: nothing measured, reasons given', () => {
  const empty: Solver = {
    size: 0,
    complex: false,
    report: plainReport,
    solveInPlace: () => {},
    solveTransposedInPlace: () => {},
  };
  const a = sparseOf([]);
  const card = accuracyCard(a, empty);
  expect(card.verdict).toBe('amber');
  expect(card.backwardError).toBeNull();
  expect(card.missing.backwardError).toBe('nothing was solved');
  expect(card.missing.conditionEstimate).toMatch(/empty/);
});

test('a zero right-hand side is answered by zero, without a false alarm', () => {
  const a = sparseOf([
    [2, 1],
    [1, 2],
  ]);
  const rightHandSides = { columns: 1, complex: false, values: new Float64Array(2) };
  const run = measureAccuracy(a, denseSolver(a), { rightHandSides });
  expect(Array.from(run.solutions?.values ?? [])).toEqual([0, 0]);
  expect(run.card.verdict).toBe('green');
});

test('the input is left as it was', () => {
  const a = randomMatrix({ rows: 10, columns: 10, entries: 40, seed: 92, diagonal: 3 });
  const values = Float64Array.from(a.values ?? []);
  accuracyCard(a, denseSolver(a));
  expect(a.values).toEqual(values);
});
