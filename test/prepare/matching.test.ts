import { expect, test } from 'vitest';
import { maximumTransversal } from '../../engine/graph/transversal.ts';
import { checkPermutation } from '../../engine/matrix/check.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { Random } from '../../engine/matrix/random.ts';
import { largeEntryMatching } from '../../engine/prepare/largeEntryMatching.ts';
import { exponential, naturalLogarithm, nearestPowerOfTwo } from '../../engine/prepare/logarithm.ts';
import { RowHeap } from '../../engine/prepare/rowHeap.ts';
import { applyScaling } from '../../engine/prepare/scaling.ts';
import { randomMatrix, randomOrder } from '../support/random.ts';
import { figures, readableNames, readReference } from '../support/reference.ts';

function moduli(a: SparseMatrix): { i: number; j: number; m: number }[] {
  const w = a.field === 'complex' ? 2 : 1;
  const v = a.values ?? new Float64Array(0);
  const out: { i: number; j: number; m: number }[] = [];
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      out.push({ i: a.rowIndex[p], j, m: w === 2 ? Math.hypot(v[2 * p], v[2 * p + 1]) : Math.abs(v[p]) });
    }
  }
  return out;
}

/** Largest size, and among those the largest Σ ln m, over all partial matchings, by trying everything. */
function bruteForce(a: SparseMatrix): { size: number; logProduct: number } {
  const byColumn: { i: number; m: number }[][] = Array.from({ length: a.columns }, () => []);
  for (const { i, j, m } of moduli(a)) if (m > 0) byColumn[j].push({ i, m });
  let best = { size: 0, logProduct: 0 };
  const used = new Array<boolean>(a.rows).fill(false);
  const go = (j: number, size: number, logProduct: number): void => {
    if (j === a.columns) {
      if (size > best.size || (size === best.size && logProduct > best.logProduct)) best = { size, logProduct };
      return;
    }
    go(j + 1, size, logProduct);
    for (const { i, m } of byColumn[j]) {
      if (used[i]) continue;
      used[i] = true;
      go(j + 1, size + 1, logProduct + Math.log(m));
      used[i] = false;
    }
  };
  go(0, 0, 0);
  return best;
}

/** Values spread over many orders of magnitude. */
function wild(a: SparseMatrix, seed: number): SparseMatrix {
  const random = new Random(seed);
  return { ...a, values: Float64Array.from(a.values ?? [], (v) => v * 10 ** (random.below(41) - 20)) };
}

function expectScaled(a: SparseMatrix): void {
  const m = largeEntryMatching(a);
  let largest = 0;
  let farthest = 0;
  let matched = 0;
  for (const { i, j, m: size } of moduli(applyScaling(a, m))) {
    largest = Math.max(largest, size);
    if (m.rowOf[j] !== i) continue;
    if (m.columnOf[i] === j) matched++;
    farthest = Math.max(farthest, Math.abs(size - 1));
  }
  expect(matched).toBe(m.size);
  expect(largest).toBeLessThanOrEqual(1 + 1e-12);
  expect(farthest).toBeLessThan(1e-12);
}

for (const complex of [false, true]) {
  test(`largest product against brute force, ${complex ? 'complex' : 'real'}, seeds 300…399`, () => {
    let deficient = 0;
    for (let seed = 300; seed < 400; seed++) {
      const n = 3 + (seed % 5);
      const plain = randomMatrix({ rows: n, columns: n, entries: Math.floor(n * (1 + (seed % 3))), seed, complex });
      const a = seed % 2 === 0 ? plain : wild(plain, seed);
      const found = largeEntryMatching(a);
      const best = bruteForce(a);
      expect(found.size, `seed ${seed}`).toBe(best.size);
      if (best.size === n) expect(found.logProduct).toBeCloseTo(best.logProduct, 9);
      else deficient++;
      expectScaled(a);
    }
    expect(deficient).toBeGreaterThan(10);
    expect(deficient).toBeLessThan(90);
  });
}

test('optimal on larger random matrices by duality: scaled entries are at most 1, matched ones are 1; seeds 400…409', () => {
  for (let seed = 400; seed < 410; seed++) {
    const n = 200;
    expectScaled(wild(randomMatrix({ rows: n, columns: n, entries: 1200, seed, diagonal: 0.01 }), seed));
  }
});

test('a hidden large diagonal is found again, seed 410', () => {
  const n = 50;
  const order = randomOrder(n, 410);
  const noise = randomMatrix({ rows: n, columns: n, entries: 400, seed: 411 });
  const rows = new Set(moduli(noise).map(({ i, j }) => `${i},${j}`));
  const values = Float64Array.from(noise.values ?? []);
  let planted = 0;
  for (let j = 0; j < n; j++) {
    for (let p = noise.columnPointer[j]; p < noise.columnPointer[j + 1]; p++) {
      if (noise.rowIndex[p] === order[j]) {
        values[p] = 1e3;
        planted++;
      }
    }
  }
  expect(rows.size).toBeGreaterThan(planted);
  const m = largeEntryMatching({ ...noise, values });
  let kept = 0;
  for (let j = 0; j < n; j++) if (m.rowOf[j] === order[j]) kept++;
  // 1000 beats every combination of entries below 1 unless the rest cannot be matched otherwise
  expect(kept).toBeGreaterThanOrEqual(planted - 1);
});

test('zeros stored are no entries, and the diagonal wins ties', () => {
  const a: SparseMatrix = {
    rows: 2,
    columns: 2,
    columnPointer: Int32Array.of(0, 2, 4),
    rowIndex: Int32Array.of(0, 1, 0, 1),
    field: 'real',
    values: Float64Array.of(3, 3, 3, 3),
  };
  expect(Array.from(largeEntryMatching(a).rowOf)).toEqual([0, 1]);
  const zeros = { ...a, values: Float64Array.of(0, 1, 1, 0) };
  expect(Array.from(largeEntryMatching(zeros).rowOf)).toEqual([1, 0]);
  const half = { ...a, values: Float64Array.of(0, 1, 0, 1) };
  expect(largeEntryMatching(half).size).toBe(1);
});

test('open matrices: a full matching exactly where the structural rank is full; scalings do what they promise', () => {
  for (const name of readableNames()) {
    const f = figures[name];
    if (f.rows !== f.columns || f.field === 'pattern') continue;
    const a = readReference(name);
    const m = largeEntryMatching(a);
    const withoutZeros = moduli(a).every((e) => e.m > 0);
    if (withoutZeros) expect(m.size, name).toBe(f.structuralRank);
    expect(m.size).toBeLessThanOrEqual(f.structuralRank);
    if (m.size === a.columns) checkPermutation(m.rowOf, a.columns);
    expectScaled(a);
  }
});

test('no smaller than any other full matching: the product of the structural one never beats it, seeds 420…429', () => {
  for (let seed = 420; seed < 430; seed++) {
    const a = wild(randomMatrix({ rows: 60, columns: 60, entries: 240, seed, diagonal: 0.1 }), seed);
    const other = maximumTransversal(a);
    let logProduct = 0;
    for (const { i, j, m } of moduli(a)) if (other.rowOf[j] === i) logProduct += Math.log(m);
    expect(largeEntryMatching(a).logProduct).toBeGreaterThanOrEqual(logProduct - 1e-9);
  }
});

test('refusals: not square, no values, NaN', () => {
  const a = randomMatrix({ rows: 4, columns: 4, entries: 8, seed: 431 });
  const codeOf = (m: SparseMatrix): string => {
    try {
      largeEntryMatching(m);
    } catch (error) {
      if (error instanceof Fault) return error.code;
    }
    return 'none';
  };
  expect(codeOf({ ...a, rows: 5 })).toBe('not-square');
  expect(codeOf({ ...a, field: 'pattern', values: null })).toBe('values-missing');
  expect(codeOf({ ...a, values: Float64Array.from(a.values ?? [], () => Number.NaN) })).toBe('not-finite');
  expect(codeOf(a)).toBe('none');
});

test('logarithm and exponential agree with the built-in ones over the whole range', () => {
  const random = new Random(432);
  for (let k = 0; k < 3000; k++) {
    const x = (0.5 + random.next()) * 2 ** (random.below(2040) - 1020);
    const expected = Math.log(x);
    expect(Math.abs(naturalLogarithm(x) - expected)).toBeLessThanOrEqual(4e-16 * Math.max(1, Math.abs(expected)));
    const y = 1400 * (random.next() - 0.5);
    expect(Math.abs(exponential(y) / Math.exp(y) - 1)).toBeLessThanOrEqual(3e-16 * Math.max(1, Math.abs(y)));
  }
  expect(naturalLogarithm(1)).toBe(0);
  expect(naturalLogarithm(5e-324)).toBeCloseTo(Math.log(5e-324), 10);
  expect(naturalLogarithm(Number.MAX_VALUE)).toBeCloseTo(Math.log(Number.MAX_VALUE), 10);
  expect(exponential(0)).toBe(1);
  expect(exponential(-800)).toBe(0);
  expect(exponential(800)).toBe(Infinity);
  expect(nearestPowerOfTwo(1000)).toBe(1024);
  expect(nearestPowerOfTwo(0.3)).toBe(0.25);
  expect(nearestPowerOfTwo(1)).toBe(1);
});

test('the heap pops rows by distance, then by number, also after distances fell; seed 433', () => {
  const random = new Random(433);
  const n = 200;
  const distance = new Float64Array(n).fill(Infinity);
  const heap = new RowHeap(n, distance);
  for (let k = 0; k < 1000; k++) {
    const i = random.below(n);
    const d = random.below(30);
    if (d < distance[i]) heap.lower(i, d);
  }
  const expected = Array.from({ length: n }, (_, i) => i)
    .filter((i) => distance[i] < Infinity)
    .sort((a, b) => distance[a] - distance[b] || a - b);
  const popped: number[] = [];
  while (!heap.isEmpty) popped.push(heap.pop());
  expect(popped).toEqual(expected);
});
