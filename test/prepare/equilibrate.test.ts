import { expect, test } from 'vitest';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { Random } from '../../engine/matrix/random.ts';
import { effectOf } from '../../engine/prepare/effect.ts';
import { equilibrate } from '../../engine/prepare/equilibrate.ts';
import { prepare } from '../../engine/prepare/prepare.ts';
import { applyScaling } from '../../engine/prepare/scaling.ts';
import { randomMatrix } from '../support/random.ts';
import { readReference } from '../support/reference.ts';

function tops(a: SparseMatrix): { rows: number[]; columns: number[] } {
  const w = a.field === 'complex' ? 2 : 1;
  const rows = new Array<number>(a.rows).fill(0);
  const columns = new Array<number>(a.columns).fill(0);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const v = a.values ?? new Float64Array(0);
      const m = w === 2 ? Math.hypot(v[2 * p], v[2 * p + 1]) : Math.abs(v[p]);
      rows[a.rowIndex[p]] = Math.max(rows[a.rowIndex[p]], m);
      columns[j] = Math.max(columns[j], m);
    }
  }
  return { rows, columns };
}

/** Rows and columns multiplied by powers of ten. */
function spoiled(a: SparseMatrix, seed: number, symmetric: boolean): SparseMatrix {
  const random = new Random(seed);
  const rowScaling = new Float64Array(a.rows).map(() => 10 ** (random.below(17) - 8));
  const columnScaling = symmetric ? rowScaling : new Float64Array(a.columns).map(() => 10 ** (random.below(17) - 8));
  return applyScaling(a, { rowScaling, columnScaling });
}

for (const complex of [false, true]) {
  test(`largest moduli of rows and columns come to 1 (Ruiz 2001), ${complex ? 'complex' : 'real'}, seeds 500…509`, () => {
    for (let seed = 500; seed < 510; seed++) {
      const a = spoiled(randomMatrix({ rows: 30, columns: 20, entries: 200, seed, complex, diagonal: 1 }), seed, false);
      const e = equilibrate(a, { powersOfTwo: false, tolerance: 1e-6, sweeps: 60 });
      const { rows, columns } = tops(applyScaling(a, e));
      for (const t of [...rows, ...columns]) if (t > 0) expect(Math.abs(t - 1)).toBeLessThanOrEqual(1e-6);
      const rounded = equilibrate(a);
      const after = tops(applyScaling(a, rounded));
      for (const t of [...after.rows, ...after.columns]) {
        if (t === 0) continue;
        expect(t).toBeGreaterThanOrEqual(0.49);
        expect(t).toBeLessThanOrEqual(2.03);
      }
      for (const s of [...rounded.rowScaling, ...rounded.columnScaling])
        expect(Number.isInteger(Math.log2(s))).toBe(true);
    }
  });
}

test('the symmetric variant keeps symmetry to the bit, seed 511', () => {
  const a = spoiled(
    randomMatrix({ rows: 25, columns: 25, entries: 80, seed: 511, symmetric: true, diagonal: 2 }),
    511,
    true,
  );
  const e = equilibrate(a, { symmetric: true });
  expect(e.rowScaling).toEqual(e.columnScaling);
  const { rows } = tops(applyScaling(a, e));
  for (const t of rows) {
    expect(t).toBeGreaterThanOrEqual(0.49);
    expect(t).toBeLessThanOrEqual(2.03);
  }
});

test('rows and columns of zeros keep the factor 1; the input is left alone', () => {
  const a: SparseMatrix = {
    rows: 3,
    columns: 3,
    columnPointer: Int32Array.of(0, 2, 2, 3),
    rowIndex: Int32Array.of(0, 1, 1),
    field: 'real',
    values: Float64Array.of(100, 0, 4),
  };
  const e = equilibrate(a);
  expect(e.rowScaling[2]).toBe(1);
  expect(e.columnScaling[1]).toBe(1);
  expect(Array.from(a.values ?? [])).toEqual([100, 0, 4]);
});

test('the effect before and after, by hand', () => {
  const a: SparseMatrix = {
    rows: 2,
    columns: 2,
    columnPointer: Int32Array.of(0, 2, 3),
    rowIndex: Int32Array.of(0, 1, 0),
    field: 'real',
    values: Float64Array.of(1, -8, 2),
  };
  const scaling = { rowScaling: Float64Array.of(0.5, 1), columnScaling: Float64Array.of(0.125, 1) };
  const { before, after } = effectOf(a, scaling, Int32Array.of(1, 0));
  expect(before).toEqual({
    entries: { smallest: 1, largest: 8 },
    rowNorms: { smallest: 2, largest: 8 },
    columnNorms: { smallest: 2, largest: 8 },
    diagonal: { smallest: 1, largest: 1 },
    diagonalZeros: 1,
    diagonalDominant: 0,
  });
  expect(after).toEqual({
    entries: { smallest: 0.0625, largest: 1 },
    rowNorms: { smallest: 1, largest: 1 },
    columnNorms: { smallest: 1, largest: 1 },
    diagonal: { smallest: 1, largest: 1 },
    diagonalZeros: 0,
    diagonalDominant: 2,
  });
});

test('prepare: nothing is on by itself, what rests on values says so', () => {
  const a = readReference('arc130');
  const off = prepare(a, { scaling: 'none', matching: 'none', symmetric: false });
  expect(off).toMatchObject({ plannedRow: null, partner: null, rowScaling: null, valueDependent: false, notes: [] });
  const structural = prepare(a, { scaling: 'none', matching: 'structural', symmetric: false });
  expect(structural.valueDependent).toBe(false);
  expect(structural.plannedRow).not.toBeNull();
  const full = prepare(a, { scaling: 'matching', matching: 'large-entry', symmetric: false });
  expect(full.valueDependent).toBe(true);
  // arc130 spans 30 orders of magnitude; scaled, its planned diagonal is all ones
  expect(full.effect?.before.diagonal?.largest).toBeGreaterThan(0);
  expect(full.effect?.after.diagonal?.smallest).toBeCloseTo(1, 10);
  expect(full.effect?.after.diagonal?.largest).toBeCloseTo(1, 10);
  expect(full.effect?.after.entries?.largest).toBeLessThanOrEqual(1 + 1e-10);
  const even = prepare(a, { scaling: 'equilibrate', matching: 'none', symmetric: false });
  expect(even.plannedRow).toBeNull();
  expect(even.effect?.after.rowNorms?.smallest).toBeGreaterThan(0.4);
  expect(() =>
    prepare(readReference('virginia_queen'), { scaling: 'none', matching: 'structural', symmetric: false }),
  ).toThrow(/131 of 136/);
  expect(JSON.parse(JSON.stringify(full.effect))).toEqual(full.effect);
});
