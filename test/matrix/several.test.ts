import { describe, expect, test } from 'vitest';
import { checkMatrix } from '../../engine/matrix/check.ts';
import { combine, type Term } from '../../engine/matrix/combine.ts';
import { difference, samePattern } from '../../engine/matrix/difference.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import { type SparseMatrix, valueWidth } from '../../engine/matrix/pattern.ts';
import { Random } from '../../engine/matrix/random.ts';
import { drawn } from '../support/picture.ts';
import { randomMatrix } from '../support/random.ts';

/** Dense [re, im] by rows, null where there is no entry. */
function dense(a: SparseMatrix): ([number, number] | null)[][] {
  const out = Array.from({ length: a.rows }, () => new Array<[number, number] | null>(a.columns).fill(null));
  const width = valueWidth(a);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const im = width === 2 && a.values !== null ? a.values[2 * p + 1] : 0;
      out[a.rowIndex[p]][j] = [a.values === null ? 1 : a.values[width * p], im];
    }
  }
  return out;
}

function patternOf(picture: string): SparseMatrix {
  return { ...drawn(picture), field: 'pattern', values: null };
}

/** Values 1, 2, 3, … column by column. */
function numbered(picture: string): SparseMatrix {
  const a = drawn(picture);
  return { ...a, field: 'real', values: Float64Array.from(a.rowIndex, (_, p) => p + 1) };
}

describe('difference', () => {
  test('added and missing positions, column by column', () => {
    const d = difference(patternOf('xx.\nx..\n..x'), patternOf('x.x\nxx.\n..x'));
    expect(d.samePattern).toBe(false);
    expect(d.sameShape).toBe(true);
    expect([d.added.count, ...d.added.first]).toEqual([2, 1, 1, 0, 2]);
    expect([d.missing.count, ...d.missing.first]).toEqual([1, 0, 1]);
    expect(d.common).toBe(3);
    expect(d.values).toBeNull();
  });

  test('against dense comparison on 200 random pairs (seeds 1 to 200), real against complex too', () => {
    for (let seed = 1; seed <= 200; seed++) {
      const random = new Random(seed);
      const size = { rows: 1 + random.below(6), columns: 1 + random.below(6) };
      const a = randomMatrix({ ...size, entries: random.below(20), seed, complex: seed % 3 === 0 });
      const b = randomMatrix({ ...size, entries: random.below(20), seed: seed + 1000, complex: seed % 2 === 0 });
      const [x, y] = [dense(a), dense(b)];
      let added = 0;
      let missing = 0;
      let changed = 0;
      let largest = 0;
      for (let i = 0; i < size.rows; i++) {
        for (let j = 0; j < size.columns; j++) {
          const [u, v] = [x[i][j], y[i][j]];
          if (u === null && v !== null) added++;
          if (u !== null && v === null) missing++;
          const gap = Math.hypot((v?.[0] ?? 0) - (u?.[0] ?? 0), (v?.[1] ?? 0) - (u?.[1] ?? 0));
          if (gap > 0) changed++;
          largest = Math.max(largest, gap);
        }
      }
      const d = difference(a, b);
      expect([d.added.count, d.missing.count, d.values?.changed]).toEqual([added, missing, changed]);
      expect(d.values?.largest).toBeCloseTo(largest, 14);
      expect(d.samePattern).toBe(samePattern(a, b));
      expect(difference(b, a).added).toEqual(d.missing);
      if (d.values !== null && d.values.at !== null) {
        const [i, j] = d.values.at;
        const gap = Math.hypot((y[i][j]?.[0] ?? 0) - (x[i][j]?.[0] ?? 0), (y[i][j]?.[1] ?? 0) - (x[i][j]?.[1] ?? 0));
        expect(gap).toBeCloseTo(largest, 14);
      }
    }
  });

  test('a matrix and itself', () => {
    const a = randomMatrix({ rows: 5, columns: 5, entries: 12, seed: 3 });
    const d = difference(a, a);
    expect(d.samePattern).toBe(true);
    expect(d.values).toEqual({ largest: 0, at: null, relative: 0, changed: 0 });
  });

  test('lists only the first ten, counts all', () => {
    const d = difference(patternOf('....\n....\n....\n....'), patternOf('xxxx\nxxxx\nxxxx\nxxxx'));
    expect(d.added.count).toBe(16);
    expect(d.added.first.length).toBe(20);
  });

  test('different shapes are compared over all positions of either', () => {
    const d = difference(patternOf('xx\n.x'), patternOf('xxx'));
    expect(d.sameShape).toBe(false);
    expect(d.samePattern).toBe(false);
    expect([...d.added.first]).toEqual([0, 2]);
    expect([...d.missing.first]).toEqual([1, 1]);
    // equal positions in a larger frame are still another shape
    expect(difference(patternOf('x.'), patternOf('x')).samePattern).toBe(false);
    expect(samePattern(patternOf('x.'), patternOf('x'))).toBe(false);
  });

  test('values that are not finite: NaN differs from itself, an infinite difference is not the largest', () => {
    const a = { ...numbered('xxx'), values: Float64Array.of(Number.NaN, 1, 1) };
    const b = { ...numbered('xxx'), values: Float64Array.of(Number.NaN, Number.POSITIVE_INFINITY, 3) };
    expect(difference(a, b).values).toEqual({ largest: 2, at: [0, 2], relative: 2, changed: 3 });
  });
});

describe('combine', () => {
  test('Σ coefficient · matrix on the union pattern, against dense sums (seeds 1 to 150)', () => {
    for (let seed = 1; seed <= 150; seed++) {
      const random = new Random(seed);
      const size = { rows: 1 + random.below(6), columns: 1 + random.below(6) };
      const complex = seed % 3 === 0;
      const terms: Term[] = Array.from({ length: 1 + random.below(4) }, (_, k) => ({
        coefficient: [random.below(7) - 3, seed % 2 === 0 ? random.below(5) - 2 : 0],
        matrix: randomMatrix({
          ...size,
          entries: random.below(14),
          seed: seed * 10 + k,
          complex: complex && k % 2 === 0,
        }),
      }));
      const before = structuredClone(terms);
      const sum = combine(terms);
      expect(terms).toEqual(before);
      checkMatrix(sum);
      const got = dense(sum);
      const parts = terms.map((t) => dense(t.matrix));
      for (let i = 0; i < size.rows; i++) {
        for (let j = 0; j < size.columns; j++) {
          let there = false;
          let re = 0;
          let im = 0;
          parts.forEach((part, k) => {
            const x = part[i][j];
            if (x === null) return;
            there = true;
            const [cr, ci] = terms[k].coefficient;
            re += cr * x[0] - ci * x[1];
            im += cr * x[1] + ci * x[0];
          });
          const cell = got[i][j];
          expect(cell !== null).toBe(there);
          if (cell === null) continue;
          expect(cell[0]).toBeCloseTo(re, 13);
          expect(cell[1]).toBeCloseTo(im, 13);
        }
      }
      expect(sum.field).toBe(
        terms.some((t) => t.coefficient[1] !== 0 || t.matrix.field === 'complex') ? 'complex' : 'real',
      );
    }
  });

  test('K − ω²M + iωC of one spring, mass and damper', () => {
    const one = (x: number): SparseMatrix => ({ ...numbered('x'), values: Float64Array.of(x) });
    const sum = combine([
      { coefficient: [1, 0], matrix: one(100) },
      { coefficient: [-9, 0], matrix: one(2) },
      { coefficient: [0, 3], matrix: one(0.5) },
    ]);
    expect([...(sum.values ?? [])]).toEqual([82, 1.5]);
  });

  test('a sum of zero and a coefficient of zero leave stored zeros; zero times infinity is zero', () => {
    const a = numbered('xx\n.x');
    const gone = combine([
      { coefficient: [1, 0], matrix: a },
      { coefficient: [-1, 0], matrix: a },
    ]);
    expect(samePattern(gone, a)).toBe(true);
    expect([...(gone.values ?? [])]).toEqual([0, 0, 0]);
    const b = { ...a, values: Float64Array.of(Number.POSITIVE_INFINITY, 1, 1) };
    expect([...(combine([{ coefficient: [0, 0], matrix: b }]).values ?? [])]).toEqual([0, 0, 0]);
    expect([...(combine([{ coefficient: [0, 1], matrix: b }]).values ?? [])]).toEqual([
      0,
      Number.POSITIVE_INFINITY,
      0,
      1,
      0,
      1,
    ]);
  });

  test('the result owns its arrays', () => {
    const a = numbered('xx\n.x');
    const c = combine([{ coefficient: [1, 0], matrix: a }]);
    expect(c).toEqual(a);
    expect(c.rowIndex).not.toBe(a.rowIndex);
    expect(c.columnPointer).not.toBe(a.columnPointer);
  });

  test.each<[string, Term[], string]>([
    ['no-terms', [], 'at least one matrix'],
    [
      'different-shapes',
      [
        { coefficient: [1, 0], matrix: numbered('xx\n.x') },
        { coefficient: [1, 0], matrix: numbered('xx') },
      ],
      'Matrix 2 of the combination has 1 rows and 2 columns; the first has 2 rows and 2 columns.',
    ],
    ['no-values', [{ coefficient: [1, 0], matrix: patternOf('x') }], 'Matrix 1 of the combination is a pattern'],
    ['coefficient-not-finite', [{ coefficient: [Number.NaN, 0], matrix: numbered('x') }], 'must be finite'],
  ])('refuses: %s', (code, terms, message) => {
    const refusal = ((): unknown => {
      try {
        return combine(terms);
      } catch (error) {
        return error;
      }
    })();
    expect(refusal).toBeInstanceOf(Fault);
    expect((refusal as Fault).code).toBe(code);
    expect((refusal as Fault).message).toContain(message);
  });
});
