import { describe, expect, test } from 'vitest';
import { blockTriangularForm } from '../../engine/graph/blockTriangular.ts';
import { coarseDecomposition } from '../../engine/graph/coarse.ts';
import { type Matching, maximumTransversal } from '../../engine/graph/transversal.ts';
import { checkPattern, checkPermutation } from '../../engine/matrix/check.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { permutePattern } from '../../engine/matrix/permute.ts';
import { Random } from '../../engine/matrix/random.ts';
import { drawn } from '../support/picture.ts';
import { randomOrder, randomPattern } from '../support/random.ts';
import { figures, readableNames, readReference } from '../support/reference.ts';

/** Every pair is an entry, both halves agree, the size is right. */
function checkMatching(a: Pattern, m: Matching): void {
  let size = 0;
  for (let j = 0; j < a.columns; j++) {
    const i = m.rowOf[j];
    if (i < 0) continue;
    size++;
    expect(m.columnOf[i]).toBe(j);
    expect(hasEntry(a, i, j)).toBe(true);
  }
  let rows = 0;
  for (let i = 0; i < a.rows; i++) if (m.columnOf[i] >= 0) rows++;
  expect(size).toBe(m.size);
  expect(rows).toBe(m.size);
}

function hasEntry(a: Pattern, i: number, j: number): boolean {
  return a.rowIndex.subarray(a.columnPointer[j], a.columnPointer[j + 1]).includes(i);
}

/** Largest matching over all subsets of rows, column after column: exponential in rows, so at most 10 of them. */
function exhaustiveRank(a: Pattern): number {
  let reachable = new Map<number, number>([[0, 0]]);
  for (let j = 0; j < a.columns; j++) {
    const further = new Map(reachable);
    for (const [used, size] of reachable) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
        const bit = 1 << a.rowIndex[p];
        if ((used & bit) === 0) further.set(used | bit, Math.max(further.get(used | bit) ?? 0, size + 1));
      }
    }
    reachable = further;
  }
  return Math.max(...reachable.values());
}

const shapes = Array.from({ length: 400 }, (_, k) => {
  const random = new Random(900 + k);
  return { rows: 1 + random.below(9), columns: 1 + random.below(9), entries: random.below(26), seed: 900 + k };
});

describe('maximum transversal', () => {
  test('equals the exhaustive search on 400 random patterns of at most 9 rows (seeds 900 to 1299)', () => {
    for (const shape of shapes) {
      const a = randomPattern(shape);
      const m = maximumTransversal(a);
      checkMatching(a, m);
      expect(m.size, `seed ${shape.seed}`).toBe(exhaustiveRank(a));
    }
  });

  test('structural ranks of the reference matrices, also relabelled (SciPy)', () => {
    for (const name of readableNames()) {
      const a = readReference(name);
      const m = maximumTransversal(a);
      checkMatching(a, m);
      expect(m.size, name).toBe(figures[name].structuralRank);
      const b = permutePattern(a, randomOrder(a.rows, 5), randomOrder(a.columns, 6));
      expect(maximumTransversal(b).size, name).toBe(figures[name].structuralRank);
    }
  });

  test('an augmenting path through a hundred thousand columns', () => {
    // columns j hold rows j and j + 1; the last column holds only row 0, which the diagonal pass gives to column 0
    const n = 100_000;
    const columnPointer = new Int32Array(n + 1);
    const rowIndex = new Int32Array(2 * n - 1);
    for (let j = 0; j < n - 1; j++) {
      rowIndex[2 * j] = j;
      rowIndex[2 * j + 1] = j + 1;
      columnPointer[j + 1] = 2 * j + 2;
    }
    rowIndex[2 * n - 2] = 0;
    columnPointer[n] = 2 * n - 1;
    const a = { rows: n, columns: n, columnPointer, rowIndex };
    expect(maximumTransversal(a).size).toBe(n);
    // the only perfect matching, so the matrix is a permuted triangular one
    expect(blockTriangularForm(a).blocks).toBe(n);
  });
});

describe('block triangular form', () => {
  function checkForm(a: Pattern): void {
    const form = blockTriangularForm(a);
    checkPermutation(form.rowOrder, a.columns);
    checkPermutation(form.columnOrder, a.columns);
    expect(form.blockStart.length).toBe(form.blocks + 1);
    expect(form.blockStart[form.blocks]).toBe(a.columns);
    const b = permutePattern(a, form.rowOrder, form.columnOrder);
    checkPattern(b);
    const blockOf = new Int32Array(a.columns);
    for (let s = 0; s < form.blocks; s++) blockOf.fill(s, form.blockStart[s], form.blockStart[s + 1]);
    for (let l = 0; l < b.columns; l++) {
      let diagonal = false;
      for (let p = b.columnPointer[l]; p < b.columnPointer[l + 1]; p++) {
        expect(blockOf[b.rowIndex[p]]).toBeLessThanOrEqual(blockOf[l]);
        if (b.rowIndex[p] === l) diagonal = true;
      }
      if (form.zeroFreeDiagonal) expect(diagonal).toBe(true);
    }
    // every diagonal block is irreducible
    for (let s = 0; s < form.blocks; s++) {
      expect(reachesAll(b, form.blockStart[s], form.blockStart[s + 1])).toBe(true);
    }
  }

  /** From position `from`, forwards and backwards along entries inside the block, everything is reached. */
  function reachesAll(b: Pattern, from: number, to: number): boolean {
    for (const forwards of [true, false]) {
      const seen = new Set([from]);
      for (let grown = true; grown; ) {
        grown = false;
        for (let l = from; l < to; l++) {
          for (let p = b.columnPointer[l]; p < b.columnPointer[l + 1]; p++) {
            const k = b.rowIndex[p];
            if (k < from || k >= to) continue;
            const [x, y] = forwards ? [l, k] : [k, l];
            if (seen.has(x) && !seen.has(y)) {
              seen.add(y);
              grown = true;
            }
          }
        }
      }
      if (seen.size !== to - from) return false;
    }
    return true;
  }

  test('upper block triangular, irreducible blocks, zero-free diagonal on 300 random patterns (seeds 1 to 300)', () => {
    for (let seed = 1; seed <= 300; seed++) {
      const n = 1 + (seed % 14);
      checkForm(randomPattern({ rows: n, columns: n, entries: Math.floor(n * (0.5 + (seed % 5) * 0.5)), seed }));
    }
  });

  test('numbers of blocks, largest block and blocks of one of the reference matrices (SciPy)', () => {
    let compared = 0;
    for (const name of readableNames()) {
      const expected = figures[name].blockTriangular;
      if (expected === undefined) continue;
      const form = blockTriangularForm(readReference(name));
      const size = Array.from({ length: form.blocks }, (_, s) => form.blockStart[s + 1] - form.blockStart[s]);
      expect(form.blocks, name).toBe(expected.blocks);
      expect(Math.max(...size), name).toBe(expected.largest);
      expect(size.filter((x) => x === 1).length, name).toBe(expected.singletons);
      expect(form.zeroFreeDiagonal).toBe(true);
      compared++;
    }
    expect(compared).toBeGreaterThan(5);
  });

  test('a structurally singular matrix says so', () => {
    const form = blockTriangularForm(drawn('xx.\n...\n..x'));
    expect(form.structuralRank).toBe(2);
    expect(form.zeroFreeDiagonal).toBe(false);
    checkForm(drawn('xx.\n...\n..x'));
  });

  test('refuses a rectangular matrix', () => {
    expect(() => blockTriangularForm(drawn('xx.\n..x'))).toThrow(
      /needs a square matrix; this one has 2 rows and 3 columns/,
    );
  });

  test('empty and one by one', () => {
    const none: Pattern = { rows: 0, columns: 0, columnPointer: new Int32Array(1), rowIndex: new Int32Array(0) };
    expect(blockTriangularForm(none).blocks).toBe(0);
    expect(blockTriangularForm(drawn('x')).blocks).toBe(1);
    expect(blockTriangularForm(drawn('.')).structuralRank).toBe(0);
  });
});

describe('Dulmage–Mendelsohn coarse decomposition', () => {
  test('sizes of the parts of the reference matrices', () => {
    let compared = 0;
    for (const name of readableNames()) {
      const expected = figures[name].coarseBlocks;
      if (expected === undefined) continue;
      const c = coarseDecomposition(readReference(name));
      expect(
        {
          horizontal_rows: c.underdetermined.rows.length,
          horizontal_cols: c.underdetermined.columns.length,
          vertical_rows: c.overdetermined.rows.length,
          vertical_cols: c.overdetermined.columns.length,
          square: c.wellDetermined.rows.length,
        },
        name,
      ).toEqual(expected);
      expect(c.wellDetermined.columns.length).toBe(c.wellDetermined.rows.length);
      compared++;
    }
    expect(compared).toBeGreaterThan(1);
  });

  test('parts on 400 random patterns: a column or row is outside them exactly when it is in every maximum matching', () => {
    // A column belongs to the underdetermined part's free choice exactly when leaving it out does not lower the rank.
    for (const shape of shapes) {
      const a = randomPattern(shape);
      const c = coarseDecomposition(a);
      expect(c.underdetermined.rows.length + c.wellDetermined.rows.length + c.overdetermined.rows.length).toBe(a.rows);
      const rank = c.structuralRank;
      for (let j = 0; j < a.columns; j++) {
        const spare = exhaustiveRank(withoutColumn(a, j)) === rank;
        expect(c.underdetermined.columns.includes(j), `seed ${shape.seed} column ${j}`).toBe(spare);
      }
    }
  });

  function withoutColumn(a: Pattern, left: number): Pattern {
    const keep = Array.from({ length: a.columns }, (_, j) => j).filter((j) => j !== left);
    const rowIndex: number[] = [];
    const columnPointer = new Int32Array(a.columns);
    keep.forEach((j, k) => {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) rowIndex.push(a.rowIndex[p]);
      columnPointer[k + 1] = rowIndex.length;
    });
    return { rows: a.rows, columns: a.columns - 1, columnPointer, rowIndex: Int32Array.from(rowIndex) };
  }

  test('no entry below the block diagonal under-, well-, overdetermined', () => {
    for (const shape of shapes) {
      const a = randomPattern(shape);
      const c = coarseDecomposition(a);
      const rowRank = rank(a.rows, c.wellDetermined.rows, c.overdetermined.rows);
      const columnRank = rank(a.columns, c.wellDetermined.columns, c.overdetermined.columns);
      for (let j = 0; j < a.columns; j++) {
        for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
          expect(rowRank[a.rowIndex[p]]).toBeLessThanOrEqual(columnRank[j]);
        }
      }
    }
  });

  function rank(n: number, well: Int32Array, over: Int32Array): Uint8Array {
    const out = new Uint8Array(n);
    for (const i of well) out[i] = 1;
    for (const i of over) out[i] = 2;
    return out;
  }
});
