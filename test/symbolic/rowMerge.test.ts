/**
 * Row-merge bound: against merging sets of rows, and never above the Cholesky factor of AᵀA (George & Ng 1985; the figures
 * `normalEquations` were counted outside, test/reference/README.md).
 */
import { describe, expect, it } from 'vitest';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { identityOrder } from '../../engine/matrix/permutation.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { columnMinimumDegree } from '../../engine/ordering/columnMinimumDegree.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { rowMergeBound } from '../../engine/symbolic/rowMerge.ts';
import { productPattern } from '../support/product.ts';
import { randomOrder, randomPattern } from '../support/random.ts';
import { figures, readableNames, readReference } from '../support/reference.ts';

/** All candidate rows take the union; one leaves. */
function bruteForce(a: Pattern, order: ArrayLike<number>): { lower: number[]; upper: number[] } {
  const n = a.columns;
  let rows: Set<number>[] = Array.from({ length: a.rows }, () => new Set<number>());
  for (let k = 0; k < n; k++) {
    for (let p = a.columnPointer[order[k]]; p < a.columnPointer[order[k] + 1]; p++) rows[a.rowIndex[p]].add(k);
  }
  const lower: number[] = [];
  const upper: number[] = [];
  for (let k = 0; k < n; k++) {
    const candidates = rows.filter((row) => row.has(k));
    rows = rows.filter((row) => !row.has(k));
    const union = new Set<number>();
    for (const row of candidates) for (const l of row) union.add(l);
    lower.push(Math.max(1, candidates.length));
    upper.push(Math.max(1, union.size));
    union.delete(k);
    for (let c = 1; c < candidates.length; c++) rows.push(new Set(union));
  }
  return { lower, upper };
}

describe('row-merge bound', () => {
  for (let seed = 1; seed <= 60; seed++) {
    it(`equals merging of sets (seed ${seed})`, () => {
      const n = 2 + (seed % 23);
      const a = randomPattern({
        rows: n,
        columns: n,
        entries: Math.floor(n * (0.4 + (seed % 4) * 0.4)),
        seed,
        diagonal: 1,
      });
      const order = randomOrder(n, seed + 9);
      const bound = rowMergeBound(a, order);
      const expected = bruteForce(a, order);
      expect(Array.from(bound.lower)).toEqual(expected.lower);
      expect(Array.from(bound.upper)).toEqual(expected.upper);
    });
  }

  for (const name of readableNames()) {
    const normal = figures[name].normalEquations;
    if (normal === undefined) continue;
    it(`${name}: U is never above the factor of AᵀA`, () => {
      const a = readReference(name);
      const bound = rowMergeBound(a, identityOrder(a.columns));
      expect(bound.upperEntries).toBeLessThanOrEqual(normal.factorEntries);
      if (a.rows >= a.columns) expect(bound.upperEntries).toBeGreaterThan(0.3 * normal.factorEntries);
    });
  }

  for (const name of readableNames()) {
    const f = figures[name];
    if (f.rows !== f.columns || f.symmetry !== 'general' || f.rows > 1300) continue;
    it(`${name}: row by row of U never above the factor of AᵀA, in every ordering (George & Ng 1985)`, () => {
      const a = readReference(name);
      const product = productPattern(a);
      const orders = [
        identityOrder(a.columns),
        randomOrder(a.columns, 3),
        minimumDegree(a, {}, noProgress).order,
        columnMinimumDegree(a, {}, noProgress).order,
      ];
      for (const order of orders) {
        const bound = rowMergeBound(a, order);
        const { columnCount } = analyse(product, order, { postorder: false });
        let beyond = 0;
        for (let k = 0; k < a.columns; k++) if (bound.upper[k] > columnCount[k]) beyond++;
        expect(beyond).toBe(0);
      }
    });
  }
});
