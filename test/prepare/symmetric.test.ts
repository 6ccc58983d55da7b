import { expect, test } from 'vitest';
import { assemble } from '../../engine/matrix/assemble.ts';
import { checkPermutation } from '../../engine/matrix/check.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { Random } from '../../engine/matrix/random.ts';
import { applyScaling } from '../../engine/prepare/scaling.ts';
import { symmetricMatching } from '../../engine/prepare/symmetricMatching.ts';
import { randomMatrix } from '../support/random.ts';
import { readReference } from '../support/reference.ts';

/** [H Bᵀ; B 0] with m constraints on n unknowns, values over many orders. */
function saddlePoint(n: number, m: number, seed: number): SparseMatrix {
  const random = new Random(seed);
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  const push = (i: number, j: number, v: number): void => {
    row.push(i);
    column.push(j);
    values.push(v);
    if (i === j) return;
    row.push(j);
    column.push(i);
    values.push(v);
  };
  for (let i = 0; i < n; i++) push(i, i, 10 ** (random.below(9) - 4));
  for (let k = 0; k < m; k++) {
    push(n + k, k, 10 ** (random.below(5) - 1));
    push(n + k, m + random.below(n - m), random.next());
  }
  return assemble({
    rows: n + m,
    columns: n + m,
    field: 'real',
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: Float64Array.from(values),
  }).matrix;
}

function expectInvolution(partner: Int32Array): void {
  checkPermutation(partner, partner.length);
  for (let i = 0; i < partner.length; i++) expect(partner[partner[i]]).toBe(i);
}

test('saddle points: every constraint gets a partner that it is joined with, no entry above 1 after scaling; seeds 600…609', () => {
  for (let seed = 600; seed < 610; seed++) {
    const a = saddlePoint(30, 10, seed);
    const s = symmetricMatching(a);
    expectInvolution(s.partner);
    expect(s.size).toBe(40);
    expect(s.zeroSingles).toBe(0);
    for (let k = 30; k < 40; k++) {
      const p = s.partner[k];
      expect(p).not.toBe(k);
      const column = Array.from(a.rowIndex.subarray(a.columnPointer[k], a.columnPointer[k + 1]));
      expect(column).toContain(p);
    }
    const scaled = applyScaling(a, { rowScaling: s.scaling, columnScaling: s.scaling });
    let atOne = 0;
    for (const v of scaled.values ?? []) {
      expect(Math.abs(v)).toBeLessThanOrEqual(1 + 1e-12);
      if (Math.abs(Math.abs(v) - 1) < 1e-9) atOne++;
    }
    expect(atOne).toBeGreaterThanOrEqual(40);
  }
});

test('random symmetric and Hermitian-like complex matrices: pairs are joined by an entry, seeds 610…629', () => {
  for (let seed = 610; seed < 630; seed++) {
    const a = randomMatrix({ rows: 25, columns: 25, entries: 40, seed, symmetric: true, complex: seed % 2 === 0 });
    const s = symmetricMatching(a);
    expectInvolution(s.partner);
    let pairs = 0;
    for (let i = 0; i < 25; i++) {
      if (s.partner[i] === i) continue;
      pairs++;
      expect(Array.from(a.rowIndex.subarray(a.columnPointer[i], a.columnPointer[i + 1]))).toContain(s.partner[i]);
    }
    expect(pairs).toBe(2 * s.pairs);
  }
});

test('a cycle of three: the 1×1 pivot is the one whose diagonal leaves the largest product', () => {
  // edges 0–1, 1–2, 2–0 all of size 1 after scaling; only unknown 2 has a diagonal
  const a = assemble({
    rows: 3,
    columns: 3,
    field: 'real',
    row: Int32Array.of(0, 1, 1, 2, 2, 0, 2),
    column: Int32Array.of(1, 0, 2, 1, 0, 2, 2),
    values: Float64Array.of(1, 1, 1, 1, 1, 1, 0.5),
  }).matrix;
  const s = symmetricMatching(a);
  expect(Array.from(s.partner)).toEqual([1, 0, 2]);
  expect(s.zeroSingles).toBe(0);
});

test('an even cycle is split in the better of its two ways', () => {
  // a ring of four without diagonals: 0–1 and 2–3 weigh 1, 1–2 and 3–0 weigh 100
  const edges: [number, number, number][] = [
    [0, 1, 1],
    [1, 2, 100],
    [2, 3, 1],
    [3, 0, 100],
  ];
  const a = assemble({
    rows: 4,
    columns: 4,
    field: 'real',
    row: Int32Array.from(edges.flatMap((edge) => edge.slice(0, 2))),
    column: Int32Array.from(edges.flatMap(([i, j]) => [j, i])),
    values: Float64Array.from(edges.flatMap(([, , v]) => [v, v])),
  }).matrix;
  expect(Array.from(symmetricMatching(a).partner)).toEqual([3, 2, 1, 0]);
});

test('an open saddle-like matrix without any diagonal (virginia_queen), and refusal of an unsymmetric one', () => {
  const s = symmetricMatching(readReference('virginia_queen'));
  expectInvolution(s.partner);
  expect(s.size).toBe(131);
  expect(() => symmetricMatching(readReference('arc130'))).toThrow(/symmetric/);
});
