import { describe, expect, test } from 'vitest';
import { assemble } from '../../engine/matrix/assemble.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { Cancelled } from '../../engine/matrix/progress.ts';
import { Random } from '../../engine/matrix/random.ts';
import { decade } from '../../engine/survey/decade.ts';
import { surveyJson } from '../../engine/survey/json.ts';
import { factNames, type Survey, survey } from '../../engine/survey/survey.ts';
import { counted, figure, lines, percent } from '../../engine/survey/wording.ts';
import { drawn } from '../support/picture.ts';
import { randomMatrix } from '../support/random.ts';

/** A real matrix from rows of numbers; null: not stored, 0: stored zero. */
function matrixOf(rows: readonly (readonly (number | null)[])[], columns = rows[0]?.length ?? 0): SparseMatrix {
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  rows.forEach((line, i) => {
    line.forEach((x, j) => {
      if (x === null) return;
      row.push(i);
      column.push(j);
      values.push(x);
    });
  });
  return assemble({
    rows: rows.length,
    columns,
    field: 'real',
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: Float64Array.from(values),
  }).matrix;
}

function patternOf(picture: string): SparseMatrix {
  return { ...drawn(picture), field: 'pattern', values: null };
}

/** Dense values [re, im] and whether stored, by rows. */
function dense(a: SparseMatrix): { re: number; im: number; stored: boolean }[][] {
  const out = Array.from({ length: a.rows }, () =>
    Array.from({ length: a.columns }, () => ({ re: 0, im: 0, stored: false })),
  );
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const v = a.values;
      const complex = a.field === 'complex';
      out[a.rowIndex[p]][j] = {
        re: v === null ? 1 : complex ? v[2 * p] : v[p],
        im: v !== null && complex ? v[2 * p + 1] : 0,
        stored: true,
      };
    }
  }
  return out;
}

function defined<V>(f: { value: V | null }): V {
  expect(f.value).not.toBeNull();
  return f.value as V;
}

describe('facts against the dense, obvious computation (seeds 1 to 200)', () => {
  const cases = Array.from({ length: 200 }, (_, k) => {
    const seed = k + 1;
    const random = new Random(seed);
    const n = 1 + random.below(9);
    const options = { rows: n, columns: n, entries: random.below(3 * n + 1), seed, complex: seed % 2 === 0 };
    const a = randomMatrix(
      seed % 3 === 0 ? { ...options, symmetric: true } : seed % 5 === 0 ? { ...options, diagonal: 2 } : options,
    );
    return { seed, n, a, d: dense(a), s: survey(a) };
  });
  const size = (x: { re: number; im: number }): number => Math.hypot(x.re, x.im);

  test('symmetry', () => {
    for (const { seed, n, d, s } of cases) {
      let plain = 0;
      let conjugate = 0;
      let unmatched = 0;
      let off = 0;
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          const [x, y] = [d[i][j], d[j][i]];
          plain = Math.max(plain, Math.hypot(x.re - y.re, x.im - y.im));
          conjugate = Math.max(conjugate, Math.hypot(x.re - y.re, x.im + y.im));
          if (i === j || !x.stored) continue;
          off++;
          if (!y.stored) unmatched++;
        }
      }
      const v = defined(s.symmetry);
      expect(v.unmatched, `seed ${seed}`).toBe(unmatched);
      expect(v.patternSymmetry).toBe(off === 0 ? 1 : (off - unmatched) / off);
      expect(v.difference?.largest).toBeCloseTo(plain, 14);
      expect(v.hermitianDifference?.largest).toBeCloseTo(conjugate, 14);
      expect(v.valueSymmetric).toBe(plain === 0);
      expect(v.hermitian).toBe(conjugate === 0);
      const at = v.difference?.at ?? [-1, -1];
      if (plain > 0) {
        const [x, y] = [d[at[0]][at[1]], d[at[1]][at[0]]];
        expect(Math.hypot(x.re - y.re, x.im - y.im)).toBeCloseTo(plain, 14);
      }
    }
  });

  test('envelope, wavefront, degrees', () => {
    for (const { n, d, s } of cases) {
      const joined = (i: number, j: number): boolean => i === j || d[i][j].stored || d[j][i].stored;
      const first = d.map((_, i) => d.findIndex((__, j) => joined(i, j)));
      const envelope = first.reduce((sum, f, i) => sum + i - f, 0);
      const fronts = first.map((_, k) => first.filter((f, i) => f <= k && i >= k).length);
      expect(defined(s.envelope).envelope).toBe(envelope);
      expect(defined(s.wavefront).largest).toBe(Math.max(...fronts));
      expect(defined(s.wavefront).rootMeanSquare).toBeCloseTo(Math.sqrt(fronts.reduce((x, f) => x + f * f, 0) / n), 12);
      expect(fronts.reduce((x, f) => x + f, 0)).toBe(envelope + n);
      const neighbours = d.map((_, i) => d.filter((__, j) => j !== i && joined(i, j)).length);
      const v = defined(s.neighbours);
      expect([v.smallest, v.largest]).toEqual([Math.min(...neighbours), Math.max(...neighbours)]);
      for (const bin of v.histogram) {
        expect(neighbours.filter((x) => x >= bin.from && x <= bin.to).length).toBe(bin.lines);
      }
      expect(v.histogram.reduce((x, bin) => x + bin.lines, 0)).toBe(n);
    }
  });

  test('diagonal, dominance, norms, Gershgorin', () => {
    for (const { n, d, s } of cases) {
      const diagonal = d.map((row, i) => row[i]);
      const v = defined(s.diagonal);
      expect(v.stored).toBe(diagonal.filter((x) => x.stored).length);
      expect(v.nonzero).toBe(diagonal.filter((x) => size(x) > 0).length);
      expect(v.absent).toBe(n - v.stored);
      expect((v.positive ?? 0) + (v.negative ?? 0) + (v.notReal ?? 0)).toBe(v.nonzero);
      expect(v.positive).toBe(diagonal.filter((x) => x.im === 0 && x.re > 0).length);
      const off = d.map((row, i) => row.reduce((sum, x, j) => (i === j ? sum : sum + size(x)), 0));
      const tied = off.some((r, i) => r > 0 && Math.abs(r - size(d[i][i])) < 1e-12);
      if (!tied) expect(defined(s.dominance).rows).toBe(off.filter((r, i) => size(d[i][i]) >= r).length);
      const g = defined(s.gershgorin);
      expect(g.real[0]).toBeCloseTo(Math.min(...off.map((r, i) => d[i][i].re - r)), 12);
      expect(g.real[1]).toBeCloseTo(Math.max(...off.map((r, i) => d[i][i].re + r)), 12);
      if (!g.realSpectrum) expect(g.imaginary[1]).toBeCloseTo(Math.max(...off.map((r, i) => d[i][i].im + r)), 12);
      if (s.norms.value === null) continue;
      const rowNorms = d.map((row) => Math.max(...row.map(size)));
      const columnNorms = d.map((_, j) => Math.max(...d.map((row) => size(row[j]))));
      const nonzero = rowNorms.filter((x) => x > 0);
      expect(s.norms.value.rows.smallest).toBeCloseTo(Math.min(...nonzero), 14);
      expect(s.norms.value.infinity).toBeCloseTo(Math.max(...off.map((r, i) => r + size(d[i][i]))), 12);
      const scaled = d.map((row, i) =>
        Math.max(...row.map((x, j) => (size(x) === 0 ? 0 : size(x) / Math.sqrt(rowNorms[i] * columnNorms[j])))),
      );
      expect(s.norms.value.equilibratedRows.smallest).toBeCloseTo(Math.min(...scaled.filter((x) => x > 0)), 12);
      expect(s.norms.value.equilibratedRows.largest).toBeCloseTo(Math.max(...scaled), 12);
    }
  });

  test('constrained unknowns, and what removing them leaves', () => {
    for (const { seed, n, d, s } of cases) {
      const lone = (cells: { re: number; im: number }[], i: number): boolean =>
        size(cells[i]) > 0 && cells.every((x, j) => j === i || size(x) === 0);
      const rows = d.filter(lone).length;
      const columns = d.map((_, j) => d.map((row) => row[j]));
      const v = defined(s.constrained);
      expect([v.rows, v.columns], `seed ${seed}`).toEqual([rows, columns.filter(lone).length]);
      const kept = d.map((_, i) => i).filter((i) => !lone(d[i], i) && !lone(columns[i], i));
      expect(v.unknowns).toBe(n - kept.length);
      if (v.remaining === null) continue;
      expect(v.remaining.order).toBe(kept.length);
      const every = (test: (x: { re: number; im: number; stored: boolean }, y: typeof x) => boolean): boolean =>
        kept.every((i) => kept.every((j) => test(d[i][j], d[j][i])));
      expect(v.remaining.patternSymmetric).toBe(every((x, y) => x.stored === y.stored));
      expect(v.remaining.valueSymmetric).toBe(every((x, y) => x.re === y.re && x.im === y.im));
      expect(v.remaining.hermitian).toBe(every((x, y) => x.re === y.re && x.im === -y.im));
    }
  });

  test('zero block: zero diagonals, no two joined; a saddle point only where all of them are in it', () => {
    for (const { d, s } of cases) {
      const v = defined(s.saddlePoint);
      const zero = d.map((_, i) => i).filter((i) => size(d[i][i]) === 0);
      expect(v.zeroDiagonal).toBe(zero.length);
      const block = s.saddlePoint.marks.length === 0 ? [] : [...s.saddlePoint.marks[0].indices];
      expect(block.length).toBe(v.zeroBlock);
      for (const i of block) for (const j of block) expect(size(d[i][j])).toBe(0);
      if (v.saddlePoint) expect(v.zeroBlock).toBe(zero.length);
      if (zero.length > 0) expect(v.zeroBlock).toBeGreaterThan(0);
    }
  });
});

test('duplicate rows against all pairs, repeated rows planted (seeds 1 to 100), real and complex', () => {
  for (let seed = 1; seed <= 100; seed++) {
    const random = new Random(seed);
    const complex = seed % 2 === 0;
    const lines = Array.from({ length: 2 + random.below(5) }, () =>
      Array.from({ length: 4 }, () =>
        random.below(2) === 0 ? null : [random.below(3) - 1, complex ? random.below(2) : 0],
      ),
    );
    const rows = Array.from({ length: 2 + random.below(9) }, () => lines[random.below(lines.length)]);
    const row: number[] = [];
    const column: number[] = [];
    const values: number[] = [];
    rows.forEach((line, i) => {
      line.forEach((x, j) => {
        if (x === null) return;
        row.push(i);
        column.push(j);
        values.push(...(complex ? x : x.slice(0, 1)));
      });
    });
    const { matrix } = assemble({
      rows: rows.length,
      columns: 4,
      field: complex ? 'complex' : 'real',
      row: Int32Array.from(row),
      column: Int32Array.from(column),
      values: Float64Array.from(values),
    });
    const text = rows.map((line) => JSON.stringify(complex ? line : line.map((x) => (x === null ? null : x[0]))));
    const earlier = text.map((t) => text.indexOf(t));
    const empty = rows.map((line) => line.every((x) => x === null));
    const expected = earlier.map((r, i) => [i, r]).filter(([i, r]) => r < i && !empty[i]);
    const v = defined(survey(matrix).duplicateRows);
    expect(v.rows, `seed ${seed}`).toBe(expected.length);
    expect(v.first).toEqual(expected.slice(0, 10));
    expect(v.groups).toBe(new Set(expected.map(([, r]) => r)).size);
  }
});

describe('recognised shapes', () => {
  const names = (a: SparseMatrix): readonly string[] => defined(survey(a).shapes).names;

  test.each<[string, string, readonly string[]]>([
    [
      'diagonal',
      'x.........\n.x........\n..x.......\n...x......\n....x.....\n.....x....\n......x...\n.......x..\n........x.\n.........x',
      ['diagonal'],
    ],
    ['upper triangular', 'xx....\n.x....\n..xx..\n...x..\n....x.\n.....x', ['upper-triangular', 'dense']],
    ['lower triangular', 'x.....\nxx....\n..x...\n..xx..\n....x.\n.....x', ['lower-triangular', 'dense']],
    ['permuted triangular', '.x....\n..xx..\n...x..\nx.....\n....x.\n....xx', ['permuted-triangular', 'dense']],
    ['no entries', '...\n...\n...', ['empty']],
    ['two blocks', 'xxx...\nxxx...\nxxx...\n...xxx\n...xxx\n...xxx', ['block-diagonal', 'dense']],
    ['two interleaved parts', 'x.x.\n.x.x\nx.x.\n.x.x', ['permuted-block-diagonal', 'dense']],
    ['arrow, hub first', 'xxxxx\nxx...\nx.x..\nx..x.\nx...x', ['arrow', 'dense']],
    ['full', 'xxx\nxxx\nxxx', ['dense']],
  ])('%s', (_, picture, expected) => {
    expect(names(patternOf(picture))).toEqual(expected);
  });

  /** Entries where `stored` says so, as a pattern of order n. */
  function where(n: number, stored: (i: number, j: number) => boolean): SparseMatrix {
    return matrixOf(
      Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => (stored(i, j) ? 1 : null))),
      n,
    );
  }

  test('tridiagonal, banded, bordered band; a wide sparse band is none', () => {
    expect(names(where(40, (i, j) => Math.abs(i - j) <= 1))).toEqual(['tridiagonal']);
    expect(names(where(40, (i, j) => Math.abs(i - j) <= 3))).toEqual(['banded']);
    expect(names(where(40, (i, j) => i === 39 || j === 39 || Math.abs(i - j) <= 1))).toEqual(['bordered-band']);
    expect(names(where(100, (i, j) => i === j || Math.abs(i - j) === 10))).not.toContain('banded');
  });

  test('an arrow tells which end its border stands at', () => {
    const hub = (at: number): SparseMatrix => where(20, (i, j) => i === j || i === at || j === at);
    expect(survey(hub(19)).shapes.sentence).toContain('it stands last');
    expect(survey(hub(0)).shapes.sentence).toContain('keep it last');
    expect([...survey(hub(0)).shapes.marks[0].indices]).toEqual([0]);
  });
});

describe('single findings', () => {
  test('symmetric up to rounding, one pair', () => {
    const a = matrixOf([
      [4, 1, null],
      [1 + 2 ** -52, 4, 2],
      [null, 2, 4],
    ]);
    const s = survey(a);
    expect(defined(s.symmetry).valueSymmetric).toBe(false);
    expect(s.symmetry.sentence).toContain(
      'symmetric up to 5.55e-17 of the largest value (1 pair differs, largest in row 2, column 1)',
    );
  });

  test('removing a constrained unknown makes the matrix symmetric', () => {
    const a = matrixOf([
      [1, null, null],
      [-3, 4, 2],
      [null, 2, 4],
    ]);
    expect(survey(a).constrained.sentence).toBe(
      '1 row has nothing but the diagonal entry, equal to 1 (row 1): constrained unknowns; so have 0 columns. ' +
        'Removing it leaves 2 unknowns, and makes the matrix symmetric.',
    );
  });

  test('an empty row, a repeated row and a structurally deficient part, each with its place', () => {
    const s = survey(
      matrixOf([
        [1, 2, null, null],
        [1, 2, null, null],
        [null, null, null, null],
        [null, null, 5, 6],
      ]),
    );
    expect([...(s.emptyLines.marks[0]?.indices ?? [])]).toEqual([2]);
    expect(defined(s.duplicateRows).first).toEqual([[1, 0]]);
    expect(defined(s.structuralRank).structuralRank).toBe(3);
    expect(s.blocks.value).toBeNull();
    expect(s.blocks.reason).toContain('structural rank is 3 of 4');
  });

  test('magnitudes: decades, extremes and their rows', () => {
    const s = survey(
      matrixOf([
        [1e-20, 1, 0],
        [10, 99.9, null],
        [null, 1e30, 0.1],
      ]),
    );
    const v = defined(s.magnitudes);
    expect(v.histogram).toEqual([
      { decade: -20, entries: 1 },
      { decade: -1, entries: 1 },
      { decade: 0, entries: 1 },
      { decade: 1, entries: 2 },
      { decade: 30, entries: 1 },
    ]);
    expect([v.zeros, v.largest, v.largestAt, v.smallest, v.smallestAt]).toEqual([1, 1e30, [2, 1], 1e-20, [0, 0]]);
    const rows = (label: string): number[] => [
      ...(s.magnitudes.marks.find((m) => m.label.includes(label))?.indices ?? []),
    ];
    expect(rows('rows with an entry in the top decade')).toEqual([2]);
    expect(rows('rows with an entry in the bottom decade')).toEqual([0]);
  });

  test('values that are not finite: counted, sums withheld with a reason, nothing throws', () => {
    const s = survey(
      matrixOf([
        [Number.NaN, 1],
        [1, Number.POSITIVE_INFINITY],
      ]),
    );
    expect(defined(s.sizes).notFinite).toBe(2);
    expect(s.norms.reason).toContain('2 values are not finite');
    expect(JSON.stringify(surveyJson(s))).not.toMatch(/NaN|Infinity/);
  });

  test('dense lines are listed with their threshold', () => {
    const n = 400;
    const a = matrixOf(
      Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => (i === j || i === 7 ? 1 : null))),
    );
    const s = survey(a);
    expect(defined(s.denseLines)).toEqual({ rowThreshold: 200, columnThreshold: 200, rows: 1, columns: 0 });
    expect(s.denseLines.sentence).toContain('more than 200 entries: row 8');
  });
});

describe('any shape', () => {
  const none = new Int32Array(0);
  const empty = (rows: number, columns: number): SparseMatrix =>
    assemble({ rows, columns, field: 'real', row: none, column: none, values: new Float64Array(0) }).matrix;

  test.each<[string, SparseMatrix]>([
    ['0×0', empty(0, 0)],
    ['0×3', empty(0, 3)],
    ['3×0', empty(3, 0)],
    ['n×n without entries', empty(4, 4)],
    ['1×1', matrixOf([[2]])],
    ['1×1 stored zero', matrixOf([[0]])],
    ['one row', matrixOf([[1, null, 3]])],
    ['one column', matrixOf([[1], [null], [3]])],
    ['pattern', patternOf('x.x\n.x.\nx..')],
    ['rectangular pattern', patternOf('x.x\n.x.')],
  ])('%s: every fact has a sentence; what is null has a reason; the JSON is plain', (_, a) => {
    const before = structuredClone(a);
    const told: string[] = [];
    const s = survey(a, undefined, (name) => told.push(name));
    expect(a).toEqual(before);
    expect([...told].sort()).toEqual([...factNames].sort());
    expect(Object.keys(s)).toEqual([...factNames]);
    for (const name of factNames) {
      const f: Survey[typeof name] = s[name];
      expect(f.sentence.endsWith('.'), `${name}: ${f.sentence}`).toBe(true);
      expect(f.sentence).not.toMatch(/undefined|NaN|Infinity|null/);
      expect(f.value === null).toBe(f.reason !== null);
    }
    const json = surveyJson(s);
    expect(JSON.parse(JSON.stringify(json))).toEqual(json);
    const reasons = json.reasons as Record<string, string>;
    for (const [name, value] of Object.entries(json)) {
      if (value === null) expect(reasons[name], name).toMatch(/\.$/);
      else expect(reasons[name]).toBeUndefined();
    }
  });

  test('rank and blocks of the empty ones', () => {
    expect(defined(survey(empty(0, 0)).blocks).blocks).toBe(0);
    expect(defined(survey(empty(4, 4)).structuralRank).structuralRank).toBe(0);
    expect(defined(survey(empty(0, 3)).structuralRank).structuralRank).toBe(0);
  });

  test('a star and a path of 200,000', () => {
    const n = 200_000;
    const build = (parent: (v: number) => number): SparseMatrix => {
      const row = new Int32Array(3 * n - 2);
      const column = new Int32Array(3 * n - 2);
      for (let v = 0; v < n; v++) row[v] = column[v] = v;
      for (let v = 1; v < n; v++) {
        row[n + 2 * v - 2] = column[n + 2 * v - 1] = v;
        column[n + 2 * v - 2] = row[n + 2 * v - 1] = parent(v);
      }
      return assemble({ rows: n, columns: n, field: 'pattern', row, column, values: null }).matrix;
    };
    const star = survey(build(() => 0));
    expect(defined(star.shapes).names).toEqual(['arrow']);
    expect(defined(star.envelope).envelope).toBe((n * (n - 1)) / 2);
    const path = survey(build((v) => v - 1));
    expect(defined(path.shapes).names).toEqual(['tridiagonal']);
    expect(defined(path.components).count).toBe(1);
  });
});

test('progress never falls inside a phase, and a cancel stops the survey', () => {
  const a = randomMatrix({ rows: 3000, columns: 3000, entries: 20_000, seed: 8 });
  let last = { fraction: 0, phase: '' };
  let calls = 0;
  survey(a, (fraction, phase) => {
    calls++;
    if (phase === last.phase) expect(fraction).toBeGreaterThanOrEqual(last.fraction);
    expect(fraction >= 0 && fraction <= 1).toBe(true);
    last = { fraction, phase };
  });
  expect(last).toEqual({ fraction: 1, phase: 'surveyed' });
  for (let at = 1; at <= calls; at++) {
    let k = 0;
    expect(() =>
      survey(a, () => {
        if (++k === at) throw new Cancelled();
      }),
    ).toThrow(Cancelled);
  }
});

describe('words and numbers', () => {
  test('decades are exact at powers of ten and at the ends of the doubles', () => {
    for (let d = -323; d <= 308; d++) {
      const power = Number(`1e${d}`);
      expect(decade(power), `1e${d}`).toBe(d);
      if (d > -300) expect(decade(power * (1 - 2 ** -52))).toBe(d - 1);
    }
    expect(decade(Number.MIN_VALUE)).toBe(-324);
    expect(decade(Number.MAX_VALUE)).toBe(308);
    expect(decade(9.999999999999998)).toBe(0);
  });

  test('counts, figures, shares, lists', () => {
    expect([counted(0), counted(999), counted(1000), counted(-1234567)]).toEqual(['0', '999', '1,000', '-1,234,567']);
    expect([figure(0), figure(0.125), figure(-3.2e-12), figure(1e6), figure(123456)]).toEqual([
      '0',
      '0.125',
      '-3.2e-12',
      '1e6',
      '123000',
    ]);
    expect([percent(0), percent(1), percent(0.99999), percent(0.125), percent(5e-6), percent(5e-8)]).toEqual([
      '0 %',
      '100 %',
      'more than 99.9 %',
      '12.5 %',
      '0.0005 %',
      '5.0e-6 %',
    ]);
    expect(lines('row', [4], 1)).toBe('row 5');
    expect(lines('row', [4, 6, 8], 3)).toBe('rows 5, 7 and 9');
    expect(lines('row', [4, 6, 8, 9], 40)).toBe('rows 5, 7, 9 and 37 more');
  });
});
