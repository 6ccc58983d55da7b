/** The numbered awkward matrices whose response is a fact of the survey; each test carries its number. */
import { describe, expect, it } from 'vitest';
import { combine } from '../../engine/matrix/combine.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { asNewToOld } from '../../engine/matrix/permutation.ts';
import { measuredSymmetry } from '../../engine/survey/declared.ts';
import { survey } from '../../engine/survey/survey.ts';
import { TrialContext } from '../../engine/trial/context.ts';
import { runProof } from '../../engine/trial/proof.ts';
import { defaultChoice, whyNoProof } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';
import { load } from '../exchange/readSupport.ts';

const head = (field = 'real', symmetry = 'general') => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;
const read = async (text: string): Promise<SparseMatrix> => (await load(text)).matrix;
const contextOf = (matrix: SparseMatrix) =>
  new TrialContext({ matrix, coordinates: null, imported: null, heldLast: null });

describe('needs 33: general but symmetric', () => {
  const measured = async (text: string) => {
    const matrix = await read(text);
    return measuredSymmetry('general', survey(matrix).symmetry);
  };
  it('exactly, to rounding with figure and place, or not at all', async () => {
    expect(await measured(`${head()}2 2 2\n1 2 5\n2 1 5\n`)).toEqual({ words: 'symmetric exactly', nearly: null });
    const near = await measured(`${head()}2 2 3\n1 1 4\n1 2 5\n2 1 5.000000000000001\n`);
    expect(near.nearly).toMatch(
      /symmetric up to 1.78e-16 of the largest value \(largest difference in row 2, column 1\)/,
    );
    expect((await measured(`${head()}2 2 2\n1 2 5\n2 1 6\n`)).words).toBe('not symmetric, symmetric in pattern');
    expect((await measured(`${head()}2 2 1\n1 2 5\n`)).words).toBe('not symmetric');
    expect((await measured(`${head('complex')}2 2 2\n1 2 5 1\n2 1 5 -1\n`)).words).toBe('hermitian exactly');
    expect((await measured(`${head('pattern')}2 2 2\n1 2\n2 1\n`)).words).toBe('symmetric pattern, no values');
    expect((await measured(`${head()}1 2 1\n1 2 5\n`)).words).toMatch('square matrices only');
  });
});

describe('needs 44: nothing in it', () => {
  it('0 × 0, no entries, n = 1: every fact is defined or gives its reason; nnz(L) = n, structural rank 0', async () => {
    for (const [text, n, rank] of [
      [`${head()}0 0 0\n`, 0, 0],
      [`${head()}3 3 0\n`, 3, 0],
      [`${head()}1 1 1\n1 1 2\n`, 1, 1],
    ] as const) {
      const matrix = await read(text);
      const facts = survey(matrix);
      for (const f of Object.values(facts)) expect(f.value !== null || f.reason !== null).toBe(true);
      expect(facts.structuralRank.value?.structuralRank).toBe(rank);
      if (n === 0) continue;
      const trial = runTrial(contextOf(matrix), defaultChoice('cholesky', 'minimum-degree'));
      expect(trial.counts.factorEntries).toBe(n);
      expect(Array.from(trial.effective).sort()).toEqual(Array.from({ length: n }, (_, k) => k));
    }
  });
});

describe('needs 45: no factorization needed, or one for each part', () => {
  const names: readonly (readonly [string, string, string])[] = [
    ['diagonal', `${head()}2 2 2\n1 1 1\n2 2 1\n`, 'Diagonal: no factorization needed'],
    ['triangular', `${head()}3 3 4\n1 1 1\n2 1 5\n2 2 1\n3 3 1\n`, 'Lower triangular: no factorization needed'],
    ['permuted triangular', `${head()}3 3 5\n1 2 1\n2 2 5\n2 3 1\n3 1 1\n3 3 2\n`, 'Permuted triangular:'],
    ['tridiagonal', `${head('real', 'symmetric')}3 3 5\n1 1 2\n2 1 1\n2 2 2\n3 2 1\n3 3 2\n`, 'Tridiagonal:'],
    [
      'block diagonal',
      `${head('real', 'symmetric')}4 4 6\n1 1 2\n2 1 1\n2 2 2\n3 3 2\n4 3 1\n4 4 2\n`,
      'Block diagonal: 2 independent blocks.',
    ],
    [
      'disconnected, interleaved',
      `${head('real', 'symmetric')}4 4 6\n1 1 2\n3 1 1\n2 2 2\n3 3 2\n4 2 1\n4 4 2\n`,
      'Block diagonal after reordering: 2 independent parts',
    ],
  ];
  for (const [name, text, sentence] of names) {
    it(`${name} is the first fact told`, async () => {
      const facts = survey(await read(text));
      expect(Object.keys(facts)[0]).toBe('shapes');
      expect(facts.shapes.sentence).toMatch(sentence);
    });
  }
});

describe('needs 46 to 50: rectangular, empty lines, identity rows, diagonal, singular, dense', () => {
  it('needs 46: rectangular: structure is there, square facts give the reason, no LU', async () => {
    const matrix = await read(`${head()}3 2 3\n1 1 1\n2 2 1\n3 2 1\n`);
    const facts = survey(matrix);
    expect(facts.structuralRank.value).toMatchObject({ structuralRank: 2, overdetermined: { rows: 2, columns: 1 } });
    expect(facts.symmetry.sentence).toMatch(/square matrices only; this one has 3 rows and 2 columns/);
    expect(whyNoProof(contextOf(matrix).facts, defaultChoice('lu', 'natural'))).not.toBe(null);
  });
  it('needs 47: empty lines are listed; removing identity rows is offered with what it gives', async () => {
    const facts = survey(await read(`${head()}4 4 6\n1 1 1\n2 1 -3\n2 2 4\n3 2 2\n2 3 2\n3 3 5\n`));
    expect(facts.emptyLines.sentence).toMatch(
      /1 rows without entries \(row 4\); 1 columns without entries \(column 4\)/,
    );
    const fixed = survey(await read(`${head()}3 3 6\n1 1 1\n2 1 -3\n2 2 4\n3 2 2\n2 3 2\n3 3 5\n`));
    expect(fixed.constrained.sentence).toMatch(/Removing it leaves 2 unknowns, and makes the matrix symmetric\.$/);
    expect([...(fixed.constrained.marks[0]?.indices ?? [])]).toEqual([0]);
  });
  it('needs 48: zeros on the diagonal: stored and absent apart, with advice and a word on targets', async () => {
    const { diagonal } = survey(await read(`${head('real', 'symmetric')}3 3 4\n1 1 2\n2 2 0\n2 1 1\n3 1 1\n`));
    expect(diagonal.value).toMatchObject({ zero: 1, absent: 1 });
    expect(diagonal.sentence).toMatch(/1 absent and 1 stored as zero/);
    expect(diagonal.sentence).toMatch(/matching of large entries to the diagonal, or LDLᵀ with 2×2 pivots/);
    expect(diagonal.sentence).toMatch(/Some solvers want every diagonal position stored/);
  });
  it('needs 49: structurally full, numerically singular (free-floating chain): refused with the row', async () => {
    // a chain of springs without a support: rows sum to zero (closed form: null vector of ones)
    const n = 12;
    const lines: string[] = [];
    for (let i = 1; i <= n; i++) {
      lines.push(`${i} ${i} ${i === 1 || i === n ? 1 : 2}`);
      if (i < n) lines.push(`${i + 1} ${i} -1`);
    }
    const matrix = await read(`${head('real', 'symmetric')}${n} ${n} ${lines.length}\n${lines.join('\n')}\n`);
    expect(survey(matrix).structuralRank.value?.deficiency).toBe(0);
    const context = contextOf(matrix);
    const trial = runTrial(context, defaultChoice('lu', 'natural'));
    expect(() => runProof(context, trial, {})).toThrow(
      /singular to working precision: one pivot is zero.*original rows 11/,
    );
  });
  it('needs 50: dense rows, and a dense matrix with its full size', async () => {
    const full = Array.from({ length: 16 }, (_, k) => `${(k & 3) + 1} ${(k >> 2) + 1} 1`).join('\n');
    expect(survey(await read(`${head()}4 4 16\n${full}\n`)).shapes.sentence).toMatch(/Dense: 100 %.*128 bytes/);
    const n = 400;
    const arrow = [
      ...Array.from({ length: n }, (_, k) => `${k + 1} ${k + 1} 2`),
      ...Array.from({ length: n - 1 }, (_, k) => `${n} ${k + 1} 1`),
    ];
    const lone = survey(await read(`${head()}${n} ${n} ${arrow.length}\n${arrow.join('\n')}\n`));
    expect(lone.denseLines.sentence).toMatch(/1 dense row with more than 200 entries: row 400/);
  });
  it('needs 51: values over 20 and more decades: histogram, rows that hold the extremes, what scaling does', async () => {
    const facts = survey(await read(`${head()}3 3 4\n1 1 1e30\n2 2 1\n3 3 1e-9\n3 2 1\n`));
    expect(facts.magnitudes.value?.histogram.map((b) => [b.decade, b.entries])).toEqual([
      [-9, 1],
      [0, 2],
      [30, 1],
    ]);
    const mark = (label: string) => [...(facts.magnitudes.marks.find((m) => m.label === label)?.indices ?? [])];
    expect(mark('rows with an entry in the top decade')).toEqual([0]);
    expect(mark('rows with an entry in the bottom decade')).toEqual([2]);
    expect(facts.norms.sentence).toMatch(/One step of equilibration would make them/);
    expect(facts.norms.value?.equilibratedRows.largest).toBeLessThan(10);
  });
});

describe('needs 52 and 53: an order that is no inverse of itself; a sum on the union', () => {
  it('needs 52: read the wrong way round, an order costs another fill', async () => {
    const star = await read(`${head('real', 'symmetric')}4 4 7\n1 1 4\n2 1 1\n3 1 1\n4 1 1\n2 2 4\n3 3 4\n4 4 4\n`);
    const fill = (order: number[]) => {
      const imported = asNewToOld(Int32Array.from(order));
      const context = new TrialContext({ matrix: star, coordinates: null, imported, heldLast: null });
      return runTrial(context, defaultChoice('cholesky', 'imported')).counts.factorEntries;
    };
    // hub last: 2 + 2 + 2 + 1 entries; its inverse puts the hub second: 2 + 3 + 2 + 1 (by hand)
    expect([fill([1, 2, 3, 0]), fill([3, 0, 1, 2])]).toEqual([7, 8]);
  });
  it('needs 53: a combination has the union of the positions', async () => {
    const a = await read(`${head()}2 2 1\n1 1 1\n`);
    const b = await read(`${head()}2 2 1\n2 1 1\n`);
    expect(
      combine([
        { coefficient: [1, 0], matrix: a },
        { coefficient: [0, 1], matrix: b },
      ]).rowIndex.length,
    ).toBe(2);
  });
});
