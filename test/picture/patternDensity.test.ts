import { describe, expect, it } from 'vitest';
import { asNewToOld, positionOf } from '../../engine/matrix/permutation.ts';
import { patternDensity } from '../../engine/picture/patternDensity.ts';
import { cellCount, cellStart, cellTable, wholeWindow } from '../../engine/picture/window.ts';
import { randomOrder, randomPattern } from '../support/random.ts';

describe('cells', () => {
  it('every position lies in exactly the cell whose range holds it', () => {
    for (const [positions, cells] of [
      [1, 1],
      [7, 3],
      [10, 10],
      [1000, 17],
    ]) {
      const table = cellTable(positions, cells);
      for (let i = 0; i < positions; i++) {
        expect(cellStart(table[i], positions, cells)).toBeLessThanOrEqual(i);
        expect(cellStart(table[i] + 1, positions, cells)).toBeGreaterThan(i);
      }
    }
    expect(cellCount(5, 100)).toBe(5);
    expect(cellCount(500, 100)).toBe(100);
  });
});

describe('patternDensity', () => {
  for (const seed of [1, 2, 3]) {
    it(`counts what a plain double loop counts, in any window and order (seed ${seed})`, () => {
      const a = randomPattern({ rows: 37, columns: 29, entries: 200, seed });
      const rowOrder = randomOrder(37, seed + 10);
      const columnOrder = randomOrder(29, seed + 20);
      const position = positionOf(rowOrder);
      const window = { rowStart: 5, rowEnd: 30, columnStart: 3, columnEnd: 28 };
      const map = patternDensity(a, position, columnOrder, window, 7, 6);
      const expected = new Float64Array(42);
      for (let r = 0; r < 7; r++) {
        for (let c = 0; c < 6; c++) {
          for (let k = 5 + cellStart(r, 25, 7); k < 5 + cellStart(r + 1, 25, 7); k++) {
            for (let l = 3 + cellStart(c, 25, 6); l < 3 + cellStart(c + 1, 25, 6); l++) {
              const j = columnOrder[l];
              const rows = a.rowIndex.subarray(a.columnPointer[j], a.columnPointer[j + 1]);
              if (rows.includes(rowOrder[k])) expected[r * 6 + c]++;
            }
          }
        }
      }
      expect(map.original).toEqual(expected);
      expect(map.fill.every((v) => v === 0)).toBe(true);
    });
  }

  it('one lone entry among a million rows is counted in its cell', () => {
    const n = 1_000_000;
    const columnPointer = new Int32Array(n + 1).fill(1, 700_001);
    const a = { rows: n, columns: n, columnPointer, rowIndex: Int32Array.of(123_456) };
    const map = patternDensity(a, null, null, wholeWindow(n, n), 500, 500);
    expect(map.original.reduce((sum, v) => sum + v, 0)).toBe(1);
    expect(map.original[61 * 500 + 350]).toBe(1);
    const close = { rowStart: 123_450, rowEnd: 123_460, columnStart: 699_995, columnEnd: 700_005 };
    expect(
      patternDensity(a, null, asNewToOld(Int32Array.from({ length: n }, (_, i) => i)), close, 10, 10).original[65],
    ).toBe(1);
  });
});
