import { describe, expect, test } from 'vitest';
import { assemble, type Triplets } from '../../engine/matrix/assemble.ts';
import { checkMatrix, checkPattern, checkPermutation } from '../../engine/matrix/check.ts';
import { entryCount, type Pattern, type SparseMatrix, valueWidth } from '../../engine/matrix/pattern.ts';
import { asNewToOld, composeOrders, identityOrder, orderOf, positionOf } from '../../engine/matrix/permutation.ts';
import { permute, permutePattern } from '../../engine/matrix/permute.ts';
import { Random } from '../../engine/matrix/random.ts';
import { symmetrize } from '../../engine/matrix/symmetrize.ts';
import { transpose, transposePattern } from '../../engine/matrix/transpose.ts';
import { drawn } from '../support/picture.ts';
import { randomMatrix, randomOrder } from '../support/random.ts';

/** "i,j" -> [re, im]: the slow, obvious form. */
type Cells = Map<string, [number, number]>;

function cells(a: SparseMatrix): Cells {
  const out: Cells = new Map();
  const width = valueWidth(a);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const re = a.values === null ? 1 : a.values[width * p];
      out.set(`${a.rowIndex[p]},${j}`, [re, width === 2 && a.values !== null ? a.values[2 * p + 1] : 0]);
    }
  }
  return out;
}

function moved(from: Cells, place: (i: number, j: number) => [number, number]): Cells {
  return new Map(
    [...from].map(([key, value]) => [place(...(key.split(',').map(Number) as [number, number])).join(), value]),
  );
}

/** A copy to compare with afterwards. */
function snapshot(a: SparseMatrix): SparseMatrix {
  return {
    ...a,
    columnPointer: a.columnPointer.slice(),
    rowIndex: a.rowIndex.slice(),
    values: a.values?.slice() ?? null,
  };
}

const samples = Array.from({ length: 60 }, (_, k) => {
  const random = new Random(40 + k);
  return randomMatrix({
    rows: 1 + random.below(12),
    columns: 1 + random.below(12),
    entries: random.below(50),
    seed: 40 + k,
    complex: k % 2 === 1,
  });
});

describe('assemble', () => {
  test('sorted columns, duplicates summed in input order, a sum of zero stays (60 random sets, seeds 1 to 60)', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const random = new Random(seed);
      const rows = 1 + random.below(8);
      const columns = 1 + random.below(8);
      const count = random.below(60);
      const width = seed % 3;
      const t: Triplets = {
        rows,
        columns,
        field: width === 0 ? 'pattern' : width === 1 ? 'integer' : 'complex',
        row: Int32Array.from({ length: count }, () => random.below(rows)),
        column: Int32Array.from({ length: count }, () => random.below(columns)),
        values: width === 0 ? null : Float64Array.from({ length: width * count }, () => random.below(5) - 2),
      };
      const before = structuredClone(t);
      const { matrix, duplicates } = assemble(t);
      expect(t).toEqual(before);
      checkMatrix(matrix);
      const expected: Cells = new Map();
      for (let e = 0; e < count; e++) {
        const key = `${t.row[e]},${t.column[e]}`;
        const old = expected.get(key) ?? [0, 0];
        const re = t.values === null ? 1 : old[0] + t.values[width * e];
        expected.set(key, [re, width === 2 && t.values !== null ? old[1] + t.values[2 * e + 1] : 0]);
      }
      expect(cells(matrix)).toEqual(expected);
      expect(duplicates).toBe(count - expected.size);
    }
  });

  test('summing order is that of the input: 1 + 1e16 − 1e16', () => {
    const sum = (values: number[]): number => {
      const zero = new Int32Array(values.length);
      const { matrix } = assemble({
        rows: 1,
        columns: 1,
        field: 'real',
        row: zero,
        column: zero,
        values: Float64Array.from(values),
      });
      return (matrix.values as Float64Array)[0];
    };
    expect(sum([1, 1e16, -1e16])).toBe(0);
    expect(sum([1e16, -1e16, 1])).toBe(1);
  });

  test('nothing: no rows, no columns, no entries', () => {
    for (const [rows, columns] of [
      [0, 0],
      [3, 0],
      [0, 3],
      [2, 2],
    ]) {
      const none = new Int32Array(0);
      const { matrix } = assemble({
        rows,
        columns,
        field: 'real',
        row: none,
        column: none,
        values: new Float64Array(0),
      });
      checkMatrix(matrix);
      expect(entryCount(matrix)).toBe(0);
    }
  });
});

describe('transpose, permute, symmetrize', () => {
  test('transpose mirrors every entry, twice gives the same arrays, input unchanged', () => {
    for (const a of samples) {
      const before = snapshot(a);
      const t = transpose(a);
      checkMatrix(t);
      expect(cells(t)).toEqual(moved(cells(a), (i, j) => [j, i]));
      expect(transpose(t)).toEqual(a);
      const { rows, columns, columnPointer, rowIndex } = t;
      expect(transposePattern(a)).toEqual({ rows, columns, columnPointer, rowIndex });
      expect(a).toEqual(before);
    }
  });

  test('permute: entry (k,l) of the result is A(rowOrder[k], columnOrder[l]), input unchanged', () => {
    samples.forEach((a, k) => {
      const before = snapshot(a);
      const rowOrder = randomOrder(a.rows, 7 + k);
      const columnOrder = randomOrder(a.columns, 8 + k);
      const rowsBefore = rowOrder.slice();
      const b = permute(a, rowOrder, columnOrder);
      checkMatrix(b);
      const rowPosition = positionOf(rowOrder);
      const columnPosition = positionOf(columnOrder);
      expect(cells(b)).toEqual(moved(cells(a), (i, j) => [rowPosition[i], columnPosition[j]]));
      const { rows, columns, columnPointer, rowIndex } = b;
      expect(permutePattern(a, rowOrder, columnOrder)).toEqual({ rows, columns, columnPointer, rowIndex });
      expect(permute(a, identityOrder(a.rows), identityOrder(a.columns))).toEqual(a);
      expect(a).toEqual(before);
      expect(rowOrder).toEqual(rowsBefore);
    });
  });

  test('permuting twice is permuting by the composition, for orders that are not their own inverse', () => {
    const a = randomMatrix({ rows: 9, columns: 9, entries: 30, seed: 3 });
    const p = asNewToOld(Int32Array.from([1, 2, 0, 4, 5, 6, 7, 8, 3]));
    const q = randomOrder(9, 11);
    expect(positionOf(p)).not.toEqual(p);
    expect(permute(permute(a, p, p), q, q)).toEqual(permute(a, composeOrders(p, q), composeOrders(p, q)));
    expect(permute(permute(a, p, p), q, q)).not.toEqual(permute(a, composeOrders(q, p), composeOrders(q, p)));
  });

  test('symmetrize: the union of A and Aᵀ, with the diagonal as asked, input unchanged', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const n = 1 + (seed % 11);
      const a = randomMatrix({ rows: n, columns: n, entries: 2 * n, seed });
      const before = snapshot(a);
      for (const diagonal of ['as-stored', 'full', 'none'] as const) {
        const s = symmetrize(a, diagonal);
        checkPattern(s);
        const expected = new Set<string>();
        for (const key of cells(a).keys()) {
          const [i, j] = key.split(',');
          expected.add(`${i},${j}`).add(`${j},${i}`);
        }
        for (let i = 0; i < n; i++) {
          if (diagonal === 'full') expected.add(`${i},${i}`);
          if (diagonal === 'none') expected.delete(`${i},${i}`);
        }
        expect(new Set(cells({ ...s, field: 'pattern', values: null }).keys())).toEqual(expected);
      }
      expect(a).toEqual(before);
    }
  });

  test('symmetrize: empty, one by one', () => {
    const none: Pattern = { rows: 0, columns: 0, columnPointer: new Int32Array(1), rowIndex: new Int32Array(0) };
    expect(symmetrize(none, 'full').rowIndex.length).toBe(0);
    expect([...symmetrize(drawn('.'), 'full').rowIndex]).toEqual([0]);
    expect(symmetrize(drawn('x'), 'none').rowIndex.length).toBe(0);
  });
});

describe('permutations', () => {
  test('position is the inverse of order, both ways', () => {
    const order = randomOrder(50, 5);
    const position = positionOf(order);
    order.forEach((i, k) => {
      expect(position[i]).toBe(k);
    });
    expect(orderOf(position)).toEqual(order);
    expect(composeOrders(order, asNewToOld(position))).toEqual(identityOrder(50));
  });

  test('composition: result[k] = first[second[k]]', () => {
    const first = asNewToOld(Int32Array.from([2, 0, 1]));
    const second = asNewToOld(Int32Array.from([1, 0, 2]));
    expect([...composeOrders(first, second)]).toEqual([0, 2, 1]);
  });
});

describe('the invariant checkers fail where they must', () => {
  const good: SparseMatrix = {
    rows: 3,
    columns: 3,
    columnPointer: Int32Array.from([0, 2, 3, 4]),
    rowIndex: Int32Array.from([0, 2, 1, 2]),
    field: 'real',
    values: Float64Array.from([1, 2, 3, 4]),
  };
  const pointer = (...p: number[]): Partial<SparseMatrix> => ({ columnPointer: Int32Array.from(p) });
  const index = (...i: number[]): Partial<SparseMatrix> => ({ rowIndex: Int32Array.from(i) });

  test('a good one passes', () => {
    expect(() => checkMatrix(good)).not.toThrow();
    expect(() => checkMatrix({ ...good, field: 'pattern', values: null })).not.toThrow();
  });

  test.each<[string, Partial<SparseMatrix>, string]>([
    ['negative size', { rows: -1 }, 'matrix.rows = -1'],
    ['fractional size', { columns: 2.5 }, 'matrix.columns = 2.5'],
    ['NaN size', { rows: Number.NaN }, 'matrix.rows = NaN'],
    ['short pointer', pointer(0, 2, 4), 'matrix.columnPointer has length 3, expected 4'],
    ['pointer not from zero', pointer(1, 2, 3, 4), 'matrix.columnPointer[0] = 1'],
    ['pointer ends early', pointer(0, 2, 3, 3), 'matrix.columnPointer[3] = 3, expected 4'],
    ['pointer falls', pointer(0, 2, 1, 4), 'matrix.columnPointer[2] = 1, expected at least 2'],
    ['row too large', index(0, 3, 1, 2), 'matrix.rowIndex[1] = 3, expected 0 … 2'],
    ['row negative', index(-1, 2, 1, 2), 'matrix.rowIndex[0] = -1'],
    ['rows unsorted', index(2, 0, 1, 2), 'matrix.rowIndex[1] = 0 in column 0, expected more than 2'],
    ['row twice', index(2, 2, 1, 2), 'matrix.rowIndex[1] = 2 in column 0'],
    ['values missing', { values: null }, 'matrix.values is null for field "real"'],
    ['values of a pattern', { field: 'pattern' }, 'matrix.values is present for field "pattern"'],
    ['too few values', { values: new Float64Array(3) }, 'matrix.values has length 3, expected 4'],
    ['too few values for complex', { field: 'complex' }, 'matrix.values has length 4, expected 8'],
  ])('%s', (_, change, message) => {
    expect(() => checkMatrix({ ...good, ...change })).toThrow(message);
  });

  test.each<[string, number[], string]>([
    ['too short', [0, 1], 'permutation has length 2, expected 3'],
    ['too long', [0, 1, 2, 3], 'permutation has length 4, expected 3'],
    ['repeated', [0, 1, 1], 'permutation[2] = 1, which appears twice'],
    ['out of range', [0, 3, 1], 'permutation[1] = 3, expected 0 … 2'],
    ['negative', [0, -1, 1], 'permutation[1] = -1'],
  ])('permutation: %s', (_, p, message) => {
    expect(() => checkPermutation(Int32Array.from(p), 3)).toThrow(message);
  });

  test('a permutation passes in both directions', () => {
    const order = randomOrder(20, 2);
    expect(() => checkPermutation(order, 20)).not.toThrow();
    expect(() => checkPermutation(positionOf(order), 20)).not.toThrow();
    expect(() => checkPermutation(new Int32Array(0), 0)).not.toThrow();
  });
});

describe('random numbers', () => {
  test('the ten thousandth number from seed 1 is 399268537', () => {
    // multiplier 48271, modulus 2³¹ − 1: the check value of the C++ standard for minstd_rand ([rand.predef], from memory)
    const random = new Random(1);
    let x = 0;
    for (let k = 0; k < 10_000; k++) x = random.integer();
    expect(x).toBe(399268537);
  });

  test('any seed gives a live generator; equal seeds agree, others differ', () => {
    for (const seed of [0, -1, 2147483647, 2147483646, 1e15, -3.7]) {
      const a = new Random(seed);
      const b = new Random(seed);
      for (let k = 0; k < 20; k++) {
        const x = a.integer();
        expect(x).toBeGreaterThan(0);
        expect(x).toBeLessThan(2147483647);
        expect(b.integer()).toBe(x);
      }
    }
    expect(new Random(1).integer()).not.toBe(new Random(2).integer());
  });

  test('below stays in range and reaches both ends; next stays inside (0, 1)', () => {
    const random = new Random(9);
    const seen = new Set<number>();
    for (let k = 0; k < 1000; k++) {
      seen.add(random.below(7));
      const x = random.next();
      expect(x > 0 && x < 1).toBe(true);
    }
    expect([...seen].sort()).toEqual([0, 1, 2, 3, 4, 5, 6]);
  });

  test('shuffling keeps every element', () => {
    const a = new Random(4).shuffleInPlace(Int32Array.from({ length: 100 }, (_, i) => i));
    checkPermutation(a, 100);
    expect(a).not.toEqual(identityOrder(100));
  });
});
