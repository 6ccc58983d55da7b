/** Densities of the implicit factor against elimination on sets, and against exact counts on large grids. */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { identityOrder, positionOf } from '../../engine/matrix/permutation.ts';
import { factorDensity } from '../../engine/picture/factorDensity.ts';
import { cellStart, wholeWindow } from '../../engine/picture/window.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { RowIntervals } from '../../engine/symbolic/rowIntervals.ts';
import type { SymbolicFactor } from '../../engine/symbolic/types.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomOrder, randomPattern } from '../support/random.ts';

function pictureOf(a: Pattern, s: SymbolicFactor, half: 'lower' | 'both') {
  return {
    matrix: a,
    order: s.order,
    position: positionOf(s.order),
    rows: new RowIntervals(graphOf(a), s.order, s.parent),
    half,
  };
}

const sum = (v: Float64Array): number => v.reduce((x, y) => x + y, 0);

describe('factorDensity', () => {
  for (const half of ['lower', 'both'] as const) {
    for (let seed = 1; seed <= 12; seed++) {
      it(`equals elimination on sets in a window (${half}, seed ${seed})`, () => {
        const n = 40;
        const a = randomPattern({ rows: n, columns: n, entries: 70, seed, symmetric: true, diagonal: 1 });
        const s = analyse(a, randomOrder(n, seed), { postorder: seed % 2 === 0 });
        const { columns } = naiveElimination(a, s.order);
        const position = positionOf(s.order);
        const window = { rowStart: seed, rowEnd: 33, columnStart: 4, columnEnd: 4 + 2 * seed };
        const map = factorDensity(pictureOf(a, s, half), window, 7, 5);
        const total = new Float64Array(35);
        const original = new Float64Array(35);
        const inA = new Set<number>();
        for (let j = 0; j < n; j++) {
          for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++)
            inA.add(position[a.rowIndex[p]] * n + position[j]);
        }
        for (let r = 0; r < 7; r++) {
          for (let c = 0; c < 5; c++) {
            for (let k = seed + cellStart(r, 33 - seed, 7); k < seed + cellStart(r + 1, 33 - seed, 7); k++) {
              for (let l = 4 + cellStart(c, 2 * seed, 5); l < 4 + cellStart(c + 1, 2 * seed, 5); l++) {
                if (half === 'lower' && k < l) continue;
                if (columns[Math.min(k, l)].includes(Math.max(k, l))) total[r * 5 + c]++;
                if (inA.has(k * n + l)) original[r * 5 + c]++;
              }
            }
          }
        }
        expect(map.kind).toBe('exact');
        expect(map.original).toEqual(original);
        expect(map.fill).toEqual(total.map((t, c) => t - original[c]));
      });
    }
  }

  it('natural order of a 200×200 grid: cells add up to nnz(L) without listing it', () => {
    const k = 200;
    const a = modelProblems.grid2d5(k);
    const s = analyse(a, identityOrder(k * k), { postorder: false });
    const map = factorDensity(pictureOf(a, s, 'lower'), wholeWindow(k * k, k * k), 300, 300);
    expect(map.kind).toBe('exact');
    expect(sum(map.original) + sum(map.fill)).toBe(k ** 3 + k - 1);
  });

  it('a randomly relabelled grid beyond the work limit is sampled, says so, and comes within 2 % (seed 4)', () => {
    const k = 60;
    const a = modelProblems.grid2d5(k);
    const s = analyse(a, randomOrder(k * k, 4), { postorder: false });
    const map = factorDensity(pictureOf(a, s, 'lower'), wholeWindow(k * k, k * k), 50, 50, 20_000);
    expect(map.kind).toBe('sampled');
    const share = (sum(map.original) + sum(map.fill)) / s.factorEntries;
    expect(share).toBeGreaterThan(0.97);
    expect(share).toBeLessThan(1.03);
  });
});
