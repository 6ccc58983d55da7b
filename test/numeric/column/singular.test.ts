import { expect, test } from 'vitest';
import { identityOrder } from '../../../engine/matrix/permutation.ts';
import { accuracyCard } from '../../../engine/numeric/accuracy/card.ts';
import { factorizeColumns } from '../../../engine/numeric/column/columnFactor.ts';
import { columnPlan } from '../../../engine/numeric/column/columnPlan.ts';
import { SingularFault, structuralFinding } from '../../../engine/numeric/column/singular.ts';
import { randomOrder } from '../../support/random.ts';
import { figures, readReference } from '../../support/reference.ts';
import { sparseOf } from '../accuracy/denseSolver.ts';

function faultOf(f: () => unknown): SingularFault {
  try {
    f();
  } catch (error) {
    if (error instanceof SingularFault) return error;
    throw error;
  }
  throw new Error('nothing was thrown');
}

test('a structurally singular open matrix is refused with its rank and its rows (figures: structural rank 131 of 136)', () => {
  const a = readReference('virginia_queen');
  const expected = a.columns - figures.virginia_queen.structuralRank;
  for (const order of [identityOrder(a.columns), randomOrder(a.columns, 4)]) {
    const fault = faultOf(() => factorizeColumns(a, order));
    expect(fault.kind).toBe('not-completed');
    expect(fault.code).toBe('structurally-singular');
    expect(fault.finding.deficiency).toBe(expected);
    // Hall 1935: the rows at fault reach fewer columns than they are
    const reached = new Set<number>();
    const rows = new Set(fault.finding.rows);
    for (let j = 0; j < a.columns; j++) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) if (rows.has(a.rowIndex[p])) reached.add(j);
    }
    expect(rows.size - reached.size).toBe(expected);
  }
  const plan = columnPlan(a, (block) => identityOrder(block.columns));
  expect(faultOf(() => factorizeColumns(a, plan.columnOrder, plan)).finding.deficiency).toBe(expected);
});

test('an empty row and an empty column have their numbers in the message, 1-based', () => {
  const a = sparseOf([
    [1, 0, 2, 0],
    [0, 0, 0, 0],
    [3, 0, 1, 0],
    [0, 0, 0, 5],
  ]);
  const fault = faultOf(() => factorizeColumns(a, identityOrder(4)));
  expect(fault.finding).toMatchObject({ kind: 'structural', deficiency: 1, rows: [1], columns: [1] });
  expect(fault.message).toContain('Rows 2 ');
  expect(fault.message).toContain('columns 2 ');
  expect(structuralFinding(sparseOf([[1]]))).toBeNull();
});

test('numerically singular: a duplicated row, with the rows and columns that take part', () => {
  // row 3 = 2·row 1; powers of two keep elimination exact
  const a = sparseOf([
    [4, 1, 0, 0, 0],
    [1, 0, 2, 0, 4],
    [0, 1, 8, 0, 0],
    [2, 0, 4, 0, 8],
    [0, 0, 0, 2, 1],
  ]);
  for (const order of [identityOrder(5), randomOrder(5, 2)]) {
    const fault = faultOf(() => factorizeColumns(a, order));
    expect(fault.code).toBe('numerically-singular');
    expect(fault.finding.deficiency).toBe(1);
    expect([...fault.finding.rows].sort()).toEqual([1, 3]);
    // left null vector (0, 2, 0, −1, 0), to about the replaced pivot's 2⁻²⁶
    const share = (row: number) => fault.finding.rowComponents.find((c) => c.index === row)?.share;
    expect(share(1)).toBe(1);
    expect(share(3)).toBeCloseTo(0.5, 6);
    expect(fault.message).toMatch(/1-based/);
  }
});

test('closed Neumann problem: the null vector is constant, every row and column takes part', () => {
  const n = 8;
  const a = sparseOf(
    Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (__, j) =>
        i === j ? (i === 0 || i === n - 1 ? 1 : 2) : Math.abs(i - j) === 1 ? -1 : 0,
      ),
    ),
  );
  const { finding } = faultOf(() => factorizeColumns(a, identityOrder(n)));
  expect(finding.rowComponents.length).toBe(n);
  for (const c of [...finding.rowComponents, ...finding.columnComponents]) expect(c.share).toBeCloseTo(1, 6);
});

test('a zero matrix and a complex singular one', () => {
  expect(faultOf(() => factorizeColumns(sparseOf([[0]]), identityOrder(1))).finding.deficiency).toBe(1);
  const real = sparseOf([
    [1, 2],
    [2, 4],
  ]);
  // times i in the second row
  const a = { ...real, field: 'complex' as const, values: Float64Array.of(1, 0, 0, 2, 2, 0, 0, 4) };
  const { finding, code } = faultOf(() => factorizeColumns(a, identityOrder(2)));
  expect(code).toBe('numerically-singular');
  expect([...finding.rows].sort()).toEqual([0, 1]);
});

test('nearly singular passes but is never green, and the card says how bad it is', () => {
  const a = sparseOf([
    [1, 2, 3],
    [4, 5, 6],
    [7, 8, 9 + 2 ** -50],
  ]);
  const card = accuracyCard(a, factorizeColumns(a, identityOrder(3)));
  expect(card.verdict).toBe('amber');
  expect(card.trustedDigits ?? 0).toBe(0);
});
