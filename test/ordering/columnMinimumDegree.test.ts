import { describe, expect, it } from 'vitest';
import { checkPermutation } from '../../engine/matrix/check.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { permutePattern } from '../../engine/matrix/permute.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { relabellingOf } from '../../engine/ordering/bestOf.ts';
import { columnMinimumDegree } from '../../engine/ordering/columnMinimumDegree.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomPattern } from '../support/random.ts';
import { readReference } from '../support/reference.ts';
import { fromEdges } from './graphs.ts';

/** Pattern of AᵀA, formed: the slow way. */
function normal(a: Pattern): Pattern {
  const edges: [number, number][] = [];
  const rows: number[][] = Array.from({ length: a.rows }, () => []);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      for (const k of rows[a.rowIndex[p]]) edges.push([j, k]);
      rows[a.rowIndex[p]].push(j);
    }
  }
  return fromEdges(a.columns, edges);
}

const identity = (n: number): number[] => Array.from({ length: n }, (_, k) => k);

describe('column minimum degree (Davis, Gilbert, Larimore & Ng 2004)', () => {
  for (const [rows, columns, seed] of [
    [60, 60, 1],
    [120, 50, 2],
    [40, 70, 3],
    [200, 80, 4],
  ] as const) {
    it(`leaves less fill in the factor of AᵀA than the natural order: ${rows} × ${columns}, seed ${seed}`, () => {
      const a = randomPattern({ rows, columns, entries: 2 * rows, seed });
      const { order } = columnMinimumDegree(a, {}, noProgress);
      checkPermutation(order, columns);
      const square = normal(a);
      expect(naiveElimination(square, order).factorEntries).toBeLessThan(
        naiveElimination(square, identity(columns)).factorEntries,
      );
    });
  }
  it('ends with every column once on a nine-point grid under many numberings (rows were lost with the first pivot, and it ran for ever)', () => {
    const a = modelProblems.grid2d9(30);
    for (let seed = 1; seed <= 12; seed++) {
      const p = relabellingOf(a.columns, seed);
      checkPermutation(columnMinimumDegree(permutePattern(a, p, p), {}, noProgress).order, a.columns);
    }
  });
  it('has no fill where AᵀA is a path, whatever the numbering', () => {
    // rows {j, j + 1}: AᵀA is tridiagonal
    const n = 200;
    const a: Pattern = {
      rows: n - 1,
      columns: n,
      columnPointer: Int32Array.from({ length: n + 1 }, (_, j) => (j === 0 ? 0 : j === n ? 2 * n - 2 : 2 * j - 1)),
      rowIndex: Int32Array.from({ length: 2 * n - 2 }, (_, p) => p >> 1),
    };
    const { order } = columnMinimumDegree(a, {}, noProgress);
    expect(naiveElimination(normal(a), order).factorEntries).toBe(2 * n - 1);
  });
  it('orders a rectangular outside matrix (lsq, 1850 × 712): columns once each, empty columns last', () => {
    const { order } = columnMinimumDegree(readReference('lsq'), {}, noProgress);
    checkPermutation(order, 712);
  });
  it('leaves dense rows out of account and sets dense columns aside, with notes', () => {
    const n = 400;
    const pointer = [0];
    const index: number[] = [];
    for (let j = 0; j < n; j++) {
      // row 0 is full, column 7 is full, the rest is a diagonal
      if (j === 7) for (let i = 0; i < n; i++) index.push(i);
      else index.push(...(j === 0 ? [0] : [0, j]));
      pointer.push(index.length);
    }
    const a = { rows: n, columns: n, columnPointer: Int32Array.from(pointer), rowIndex: Int32Array.from(index) };
    const { order, notes } = columnMinimumDegree(a, {}, noProgress);
    expect(order[n - 1]).toBe(7);
    expect(notes).toEqual([
      '1 dense row left out of account (more than 200 entries)',
      '1 dense column set aside (more than 200 entries)',
    ]);
  });
});
