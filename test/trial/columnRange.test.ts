/**
 * Column LU with partial pivoting stays inside the range of its forecast: entries, operations and bytes, on every unsymmetric open matrix
 * (test/reference/README.md) in every ordering, in block triangular form and without; low ≤ expected ≤ high throughout.
 */
import { describe, expect, it } from 'vitest';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { factorizeColumns } from '../../engine/numeric/column/columnFactor.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import type { Choice } from '../../engine/trial/choice.ts';
import { plainInput, TrialContext } from '../../engine/trial/context.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import { defaultChoice, suitableOrderings } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';
import { randomMatrix, randomOrder } from '../support/random.ts';
import { fetchedFolder, figures, readableNames, readReference } from '../support/reference.ts';

const where = fetchedFolder === null ? 'committed matrices only; the further ones are skipped' : 'all open matrices';
const unsymmetric = readableNames().filter((name) => {
  const f = figures[name];
  return f.rows === f.columns && f.field !== 'pattern' && f.symmetry === 'general' && f.structuralRank === f.rows;
});

function within(trial: TrialResult, a: SparseMatrix, choice: Choice, name: string): void {
  const { range, expected } = trial.counts;
  if (range === null || expected === null) throw new Error('no range');
  const { plan } = trial;
  const factor = factorizeColumns(a, trial.effective, {
    pivoting: choice.pivoting,
    threshold: choice.threshold,
    ...(plan.plannedRow === null ? {} : { plannedRow: plan.plannedRow }),
    ...(plan.blockStart === null ? {} : { blockStart: plan.blockStart }),
  });
  const { report } = factor;
  const words = `${name}, ${choice.ordering}`;
  const n = a.columns;
  const bytes = 12 * report.factorEntries + 16 * (n + 1);
  const actual = { factorEntries: report.factorEntries, operations: report.executedOperations, bytes };
  for (const key of ['factorEntries', 'operations', 'bytes'] as const) {
    expect(actual[key], `${words}: ${key} low`).toBeGreaterThanOrEqual(range[key][0]);
    expect(actual[key], `${words}: ${key} high`).toBeLessThanOrEqual(range[key][1]);
    expect(expected[key], `${words}: ${key} expected`).toBeGreaterThanOrEqual(range[key][0]);
    expect(expected[key], `${words}: ${key} expected`).toBeLessThanOrEqual(range[key][1]);
  }
}

describe(`partial pivoting, ${where}`, () => {
  for (const name of unsymmetric) {
    it(`${name}: inside the range in every ordering`, () => {
      const a = readReference(name);
      const context = new TrialContext({ ...plainInput(a), imported: randomOrder(a.columns, 11) });
      for (const ordering of suitableOrderings(context.facts, 'column-lu')) {
        for (const blocks of a.columns > 700 && ordering === 'imported' ? [true] : [true, false]) {
          const choice = defaultChoice('column-lu', ordering, { blocks });
          within(runTrial(context, choice), a, choice, name);
        }
      }
    });
  }
});

describe('random matrices', () => {
  for (let seed = 1; seed <= 30; seed++) {
    it(`seed ${seed}: inside the range, blocks or not`, () => {
      const n = 3 + 2 * seed;
      const a = randomMatrix({ rows: n, columns: n, entries: Math.floor(n * (1 + (seed % 3))), seed, diagonal: 1e-3 });
      const context = new TrialContext(plainInput(a));
      for (const blocks of [true, false]) {
        const choice = defaultChoice('column-lu', 'column-minimum-degree', { blocks });
        within(runTrial(context, choice), a, choice, `random ${seed}`);
      }
    });
  }
});

describe('what the range says', () => {
  it('without interchanges it is one value, the exact count', () => {
    const a = modelProblems.convdiff2d(8);
    const trial = runTrial(
      new TrialContext(plainInput(a)),
      defaultChoice('column-lu', 'natural', { pivoting: 'none' }),
    );
    const { range, factorEntries } = trial.counts;
    expect(range?.factorEntries).toEqual([factorEntries, factorEntries]);
  });
  it('a dense row makes the bound uninformative, and the trial says so', () => {
    const n = 60;
    const a = randomMatrix({ rows: n, columns: n, entries: 80, seed: 1, diagonal: 2 });
    const row = [...a.rowIndex];
    const pointer = [0];
    const rowIndex: number[] = [];
    const values: number[] = [];
    for (let j = 0; j < n; j++) {
      const rows = new Set(row.slice(a.columnPointer[j], a.columnPointer[j + 1])).add(0);
      for (const i of [...rows].sort((x, y) => x - y)) {
        rowIndex.push(i);
        values.push(i === j ? 4 : 1);
      }
      pointer.push(rowIndex.length);
    }
    const dense = {
      ...a,
      columnPointer: Int32Array.from(pointer),
      rowIndex: Int32Array.from(rowIndex),
      values: Float64Array.from(values),
    };
    const trial = runTrial(
      new TrialContext(plainInput(dense)),
      defaultChoice('column-lu', 'natural', { blocks: false }),
    );
    expect(trial.counts.reasons.range).toContain('dense row');
  });
});
