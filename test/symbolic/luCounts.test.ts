/** LU without interchanges: outside figures `luWithoutInterchanges` (test/reference/README.md) and elimination on sets. */
import { describe, expect, it } from 'vitest';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { identityOrder } from '../../engine/matrix/permutation.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { luCounts } from '../../engine/symbolic/luCounts.ts';
import { randomOrder, randomPattern } from '../support/random.ts';
import { figures, generatedFigures, readableNames, readReference } from '../support/reference.ts';

function bruteForce(a: Pattern, order: ArrayLike<number>): { lower: number[]; upper: number[] } {
  const n = a.columns;
  const at = new Array<number>(n);
  for (let k = 0; k < n; k++) at[order[k]] = k;
  const has = Array.from({ length: n }, (_, i) => new Set<number>([i]));
  for (let j = 0; j < n; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) has[at[a.rowIndex[p]]].add(at[j]);
  }
  const lower = new Array<number>(n).fill(1);
  const upper = new Array<number>(n).fill(1);
  for (let k = 0; k < n; k++) {
    const right = [...has[k]].filter((l) => l > k);
    upper[k] += right.length;
    for (let i = k + 1; i < n; i++) {
      if (!has[i].has(k)) continue;
      lower[k]++;
      for (const l of right) has[i].add(l);
    }
  }
  return { lower, upper };
}

describe('luCounts', () => {
  for (let seed = 1; seed <= 40; seed++) {
    it(`equals elimination on sets (seed ${seed})`, () => {
      const n = 2 + (seed % 29);
      const a = randomPattern({ rows: n, columns: n, entries: Math.floor(n * (0.5 + (seed % 4) * 0.5)), seed });
      const order = randomOrder(n, seed + 3);
      const counts = luCounts(a, order, Number.POSITIVE_INFINITY);
      const expected = bruteForce(a, order);
      expect(Array.from(counts?.lower ?? [])).toEqual(expected.lower);
      expect(Array.from(counts?.upper ?? [])).toEqual(expected.upper);
    });
  }

  const cases = [
    ...readableNames().map((name) => ({ name, figure: figures[name], make: () => readReference(name) })),
    ...Object.entries(generatedFigures)
      .filter(([name]) => name.split('-')[0] in modelProblems)
      .map(([name, figure]) => ({
        name,
        figure,
        make: () => modelProblems[name.split('-')[0]](Number(name.split('-')[1])),
      })),
  ];
  for (const { name, figure, make } of cases) {
    const expected = figure.luWithoutInterchanges;
    if (expected === undefined) continue;
    it(`${name}: as counted outside`, () => {
      const a = make();
      const counts = luCounts(a, identityOrder(a.columns), Number.POSITIVE_INFINITY);
      expect({ lowerEntries: counts?.lowerEntries, upperEntries: counts?.upperEntries }).toEqual(expected);
    });
  }

  it('gives up beyond its work limit', () => {
    const a = modelProblems.grid2d5(20);
    expect(luCounts(a, identityOrder(400), 1000)).toBeNull();
  });
});
