/** Trials of every ordering: the counts of each against elimination on sets, whatever shapes the order. */
import { describe, expect, it } from 'vitest';
import { connectedComponents } from '../../engine/graph/components.ts';
import { checkPermutation } from '../../engine/matrix/check.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { asNewToOld, positionOf } from '../../engine/matrix/permutation.ts';
import type { NodeCoordinates } from '../../engine/problems/examples/example.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { denseOperations } from '../../engine/symbolic/operations.ts';
import type { Choice } from '../../engine/trial/choice.ts';
import { measureNames } from '../../engine/trial/choice.ts';
import { plainInput, TrialContext } from '../../engine/trial/context.ts';
import { defaultChoice, suitableOrderings, whyNoForecast } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomMatrix, randomOrder } from '../support/random.ts';

const grid = modelProblems.grid2d5(9);
const coordinates: NodeCoordinates = {
  dimensions: 2,
  unknownsPerNode: 1,
  values: Float64Array.from({ length: 162 }, (_, k) => (k % 2 === 0 ? (k / 2) % 9 : Math.floor(k / 18))),
};
const rich = (matrix: SparseMatrix, heldLast: Int32Array | null = null): TrialContext =>
  new TrialContext({
    ...plainInput(matrix),
    coordinates: matrix.columns === 81 ? coordinates : null,
    imported: randomOrder(matrix.columns, 5),
    heldLast,
  });

describe('every ordering', () => {
  const context = rich(grid);
  const names = suitableOrderings(context.facts, 'cholesky');
  it('is among those that suit, except the portfolio and those for columns', () => {
    expect(names).toEqual([
      'natural',
      'reverse-cuthill-mckee',
      'sloan',
      'minimum-degree',
      'minimum-fill',
      'nested-dissection',
      'geometric-dissection',
      'imported',
    ]);
    expect(suitableOrderings(context.facts, 'column-lu')).toContain('column-minimum-degree');
  });
  for (const name of [...names, 'best-of'] as const) {
    for (const changes of [{}, { relabelling: 7 }, { blocks: true }] as Partial<Choice>[]) {
      it(`${name} ${JSON.stringify(changes)}: counts of its own order`, () => {
        const trial = runTrial(context, defaultChoice('cholesky', name, changes));
        for (const order of [trial.requested, trial.effective]) {
          checkPermutation(order, 81, 'order');
          const naive = naiveElimination(grid, order);
          expect(naive.factorEntries).toBe(trial.counts.factorEntries);
          expect(naive.operations).toBe(trial.counts.operations);
        }
      });
    }
    it(`${name}: unknowns held last stay last, in the order given, and their block is counted`, () => {
      const held = Int32Array.of(40, 3, 77);
      const trial = runTrial(rich(grid, held), defaultChoice('cholesky', name, { blocks: true }));
      expect([...trial.requested.slice(-3)]).toEqual([...held]);
      expect([...trial.effective.slice(-3)]).toEqual([...held]);
      const naive = naiveElimination(grid, trial.effective);
      const lengths = naive.columns.map((c) => c.length);
      expect(trial.heldBlock).toMatchObject({
        unknowns: 3,
        entries: lengths.slice(-3).reduce((a, b) => a + b),
        denseEntries: 6,
        denseBytes: 48,
        denseOperations: denseOperations('cholesky', 3, 3),
        operationsBefore: lengths.slice(0, -3).reduce((a, c) => a + c * c, 0),
      });
      expect(trial.notes.join()).toContain('Blocks left off');
    });
  }
  it('options of the methods reach them; those out of range are refused with a sentence', () => {
    const choice = (tuning: Partial<Choice['tuning']>): Choice => {
      const plain = defaultChoice('cholesky', 'nested-dissection');
      return { ...plain, tuning: { ...plain.tuning, ...tuning } };
    };
    const geometric = (leafSize: number | null) =>
      runTrial(context, { ...choice({ leafSize }), ordering: 'geometric-dissection' }).separators.length;
    expect(geometric(4)).toBeGreaterThan(geometric(null));
    expect(runTrial(context, choice({ denseThreshold: 3 })).notes.join()).toContain('dense rows set aside');
    for (const bad of [{ leafSize: 0 }, { balance: 0.95 }, { tries: 0 }, { denseThreshold: -1 }]) {
      expect(whyNoForecast(context.facts, choice(bad))).not.toBeNull();
    }
  });
});

describe('blocks', () => {
  const tangle = randomMatrix({ rows: 60, columns: 60, entries: 95, seed: 4, diagonal: 1 });
  it('symmetric factorizations: connected components one after the other', () => {
    const trial = runTrial(
      new TrialContext(plainInput(tangle)),
      defaultChoice('ldlt', 'minimum-degree', { blocks: true }),
    );
    const { of } = connectedComponents(tangle);
    const seen = [...trial.effective].map((i) => of[i]);
    expect(seen).toEqual([...seen].sort((x, y) => x - y));
  });
  for (const name of ['minimum-degree', 'natural', 'nested-dissection', 'imported', 'best-of'] as const) {
    it(`LU on fronts, ${name}: block triangular, and only the diagonal blocks are counted`, () => {
      const trial = runTrial(rich(tangle), defaultChoice('lu', name, { blocks: true }));
      const { plannedRow, blockStart } = trial.plan;
      if (plannedRow === null || blockStart === null) throw new Error('no blocks');
      const position = positionOf(trial.effective);
      const blockAt = new Int32Array(60);
      for (let b = 0; b + 1 < blockStart.length; b++) blockAt.fill(b, blockStart[b], blockStart[b + 1]);
      const columnOf = new Int32Array(60);
      for (let j = 0; j < 60; j++) columnOf[plannedRow[j]] = j;
      let outside = 0;
      for (let j = 0; j < 60; j++) {
        for (let p = tangle.columnPointer[j]; p < tangle.columnPointer[j + 1]; p++) {
          const row = blockAt[position[columnOf[tangle.rowIndex[p]]]];
          expect(row).toBeLessThanOrEqual(blockAt[position[j]]);
          if (row !== blockAt[position[j]]) outside++;
        }
      }
      expect(trial.counts.offDiagonalBlockEntries).toBe(outside);
      const whole = runTrial(rich(tangle), defaultChoice('lu', name));
      expect(trial.counts.factorEntries).toBeLessThan(whole.counts.factorEntries ?? 0);
    });
  }
});

describe('pairs for 2×2 pivots (Duff & Pralet 2005)', () => {
  const kkt = modelProblems.kkt(150);
  for (const matching of ['structural', 'large-entry'] as const) {
    for (const name of ['minimum-degree', 'nested-dissection', 'sloan', 'best-of'] as const) {
      it(`${matching}, ${name}: the two of a pair stay next to each other; ${matching === 'structural' ? 'known from the pattern' : 'value-dependent'}`, () => {
        const context = new TrialContext(plainInput(kkt));
        const trial = runTrial(context, defaultChoice('ldlt', name, { matching }));
        const partner = trial.plan.partner ?? new Int32Array(0);
        const position = positionOf(trial.effective);
        let pairs = 0;
        for (let i = 0; i < partner.length; i++) {
          if (partner[i] === i) continue;
          pairs++;
          expect(Math.abs(position[i] - position[partner[i]])).toBe(1);
        }
        expect(pairs).toBeGreaterThan(0);
        expect(trial.valueDependent).toBe(matching === 'large-entry');
        expect(naiveElimination(kkt, trial.effective).factorEntries).toBe(trial.counts.factorEntries);
      });
    }
  }
  it('unknowns held last are in no pair and stay last', () => {
    const held = Int32Array.of(4, kkt.columns - 1);
    const context = new TrialContext({ ...plainInput(kkt), heldLast: held });
    for (const name of ['minimum-degree', 'nested-dissection', 'sloan', 'natural'] as const) {
      const trial = runTrial(context, defaultChoice('ldlt', name, { matching: 'structural', blocks: true }));
      const { partner } = trial.plan;
      expect([...trial.effective.slice(-2)]).toEqual([...held]);
      expect([...held].map((i) => partner?.[i])).toEqual([...held]);
      expect(naiveElimination(kkt, trial.effective).factorEntries).toBe(trial.counts.factorEntries);
    }
  });
  it('a stored zero on the diagonal is known from values: labelled so', () => {
    const values = Float64Array.of(0, 1, 1, 2);
    const a = {
      rows: 2,
      columns: 2,
      field: 'real' as const,
      columnPointer: Int32Array.of(0, 2, 4),
      rowIndex: Int32Array.of(0, 1, 0, 1),
      values,
    };
    const trial = runTrial(
      new TrialContext(plainInput(a)),
      defaultChoice('ldlt', 'natural', { matching: 'structural' }),
    );
    expect(trial.valueDependent).toBe(true);
    expect([...(trial.plan.partner ?? [])]).toEqual([1, 0]);
  });
});

describe('best of several', () => {
  for (const measure of measureNames) {
    it(`by ${measure}: none of its trials is better, and what it kept can be run again alone`, () => {
      const context = rich(modelProblems.grid2d9(15));
      const plain = defaultChoice('cholesky', 'best-of');
      const choice = { ...plain, portfolio: { ...plain.portfolio, measure, rounds: 3 } };
      const trial = runTrial(context, choice);
      expect(trial.portfolio?.value).toBe(Math.min(...(trial.portfolio?.trials.map((t) => t.value) ?? [])));
      expect(trial.portfolio?.trials.length).toBe(3 * suitableOrderings(context.facts, 'cholesky').length);
      expect(trial.ran.ordering).not.toBe('best-of');
      expect(runTrial(context, trial.ran).requested).toEqual(trial.requested);
      if (measure === 'entries') expect(trial.portfolio?.value).toBe(trial.counts.factorEntries);
      if (measure === 'operations') expect(trial.portfolio?.value).toBe(trial.counts.operations);
    });
  }
  it('column LU: by entries, operations and memory, not by a critical path', () => {
    const context = new TrialContext(plainInput(modelProblems.convdiff2d(12)));
    const plain = defaultChoice('column-lu', 'best-of');
    const by = (measure: Choice['portfolio']['measure']): Choice => ({
      ...plain,
      portfolio: { ...plain.portfolio, measure },
    });
    expect(whyNoForecast(context.facts, by('critical-path'))).toContain('no critical path');
    const trial = runTrial(context, by('operations'));
    expect(trial.portfolio?.value).toBe(trial.counts.operations);
    expect(runTrial(context, trial.ran).effective).toEqual(trial.effective);
  });
  it('a cancel passes through', () => {
    const context = rich(grid);
    const stop = (): never => {
      throw new Error('cancelled');
    };
    expect(() => runTrial(context, defaultChoice('cholesky', 'best-of'), stop)).toThrow('cancelled');
  });
});

describe('rectangular matrices', () => {
  it('a column order and its structure, also as a portfolio', () => {
    const a = randomMatrix({ rows: 70, columns: 30, entries: 200, seed: 2 });
    const context = new TrialContext({ ...plainInput(a), imported: asNewToOld(randomOrder(30, 3)) });
    for (const name of ['natural', 'column-minimum-degree', 'imported', 'best-of'] as const) {
      const trial = runTrial(context, defaultChoice('column-lu', name));
      checkPermutation(trial.effective, 30, 'order');
      expect(trial.counts.factorEntries).toBeNull();
      expect(trial.counts.reasons.factorEntries).toContain('not square');
      expect(trial.counts.upperEntries).toBeGreaterThan(0);
    }
  });
});
