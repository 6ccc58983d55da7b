import { describe, expect, it } from 'vitest';
import { graphOf } from '../../../engine/graph/graph.ts';
import { entryCount } from '../../../engine/matrix/pattern.ts';
import { noProgress } from '../../../engine/matrix/progress.ts';
import { factorsOf } from '../../../engine/numeric/fronts/factors.ts';
import { factorizeFronts } from '../../../engine/numeric/fronts/frontFactor.ts';
import { settleOptions } from '../../../engine/numeric/fronts/options.ts';
import { planFronts, predictPeakBytes } from '../../../engine/numeric/fronts/plan.ts';
import { reportOf } from '../../../engine/numeric/fronts/report.ts';
import { FrontRun } from '../../../engine/numeric/fronts/run.ts';
import { walkFronts } from '../../../engine/numeric/fronts/walk.ts';
import { noAmalgamation } from '../../../engine/symbolic/amalgamate.ts';
import { analyse } from '../../../engine/symbolic/analyse.ts';
import { assemblyTree } from '../../../engine/symbolic/assemblyTree.ts';
import { frontRows } from '../../../engine/symbolic/frontRows.ts';
import { factorOperations } from '../../../engine/symbolic/operations.ts';
import { plainTree } from '../../support/plainTree.ts';
import { randomOrder } from '../../support/random.ts';
import { type Count, countingKernels } from '../dense/countingKernels.ts';
import { backwardError, randomVector, shaped } from './support.ts';

const kinds = ['cholesky', 'ldlt', 'lu'] as const;

describe.each([false, true])('figures of a run against figures from the pattern, complex: %s', (complex) => {
  it.each(kinds)('%s: entries and operations equal the symbolic count, padding off', (kind) => {
    for (const seed of [1, 2, 3]) {
      const n = 60 + 20 * seed;
      const a = shaped('definite', n, complex, seed);
      const symbolic = analyse(a, randomOrder(n, seed), { postorder: true });
      const tree = assemblyTree(symbolic, { amalgamation: noAmalgamation });
      const rows = frontRows(tree, graphOf(a));
      const { report } = factorizeFronts(a, tree, rows, { kind, pivoting: 'threshold', hermitian: true });
      const lu = kind === 'lu';
      const arithmetic = !complex ? 'real' : lu ? 'complex' : 'hermitian';
      expect(report.executedOperations).toBe(factorOperations(kind, symbolic.columnCount, arithmetic));
      expect(report.factorEntries).toBe(lu ? 2 * symbolic.factorEntries - n : symbolic.factorEntries);
      expect(report.storedFactorEntries).toBe(report.factorEntries);
    }
  });

  it.each(kinds)('%s: counting kernels, scalar by scalar, find the operations stated, and the same factors', (kind) => {
    const n = 90;
    const a = shaped('definite', n, complex, 7, 3);
    const { tree, rows } = plainTree(a, randomOrder(n, 5), 0.4);
    const count: Count = { multiplyAdds: 0, divisions: 0, roots: 0 };
    const options = settleOptions({ kind, pivoting: 'threshold', hermitian: true }, n, complex);
    const run = new FrontRun(a, tree, rows, options, countingKernels(complex ? 2 : 1, count), noProgress);
    walkFronts(run);
    const factors = factorsOf(run);
    const factor = factorizeFronts(a, tree, rows, { kind, pivoting: 'threshold', hermitian: true });
    const report = factor.report;
    const perProduct = complex ? 8 : 2;
    const perDivision = !complex ? 1 : kind === 'lu' ? 11 : 2;
    expect(perProduct * count.multiplyAdds + perDivision * count.divisions + count.roots).toBe(
      report.executedOperations,
    );
    expect(reportOf(run, factors).executedOperations).toBe(report.executedOperations);
    factors.chunks.forEach((chunk, c) => {
      const blocked = factor.factors.chunks[c];
      expect(blocked.length).toBe(chunk.length);
      let worst = 0;
      for (let q = 0; q < chunk.length; q++) worst = Math.max(worst, Math.abs(chunk[q] - blocked[q]));
      expect(worst).toBeLessThan(1e-13);
    });
  });

  it.each(kinds)('%s: peak bytes and stack equal their prediction', (kind) => {
    for (const padding of [0, 0.3]) {
      for (const schur of [0, 9]) {
        const n = 120;
        const a = shaped('definite', n, complex, 9, 3);
        const { tree, rows } = plainTree(a, randomOrder(n, 5), padding);
        const paired = kind === 'lu' && padding === 0;
        const rowPermutation = Int32Array.from({ length: n }, (_, i) => i);
        const options = {
          kind,
          pivoting: 'threshold',
          hermitian: true,
          schur,
          ...(paired ? { rowPermutation } : {}),
        } as const;
        const { report } = factorizeFronts(a, tree, rows, options);
        const question = { kind, complex, entries: entryCount(a), schur, paired };
        expect(report.peakBytes).toBe(predictPeakBytes(tree, question).total);
        const settled = settleOptions(options, n, complex);
        const run = new FrontRun(
          a,
          tree,
          rows,
          settled,
          countingKernels(complex ? 2 : 1, { multiplyAdds: 0, divisions: 0, roots: 0 }),
          noProgress,
        );
        walkFronts(run);
        expect(run.stack.highest).toBe(planFronts(tree, kind !== 'lu', schur).stack);
        expect(run.stack.array.length).toBe((complex ? 2 : 1) * run.stack.highest);
      }
    }
  });
});

describe('delayed pivots need more than predicted', () => {
  it('arrays grow, the peak says so, the solution is right', () => {
    const n = 150;
    for (const kind of ['ldlt', 'lu'] as const) {
      const a = shaped('saddle', n, false, 3);
      const { tree, rows } = plainTree(a, randomOrder(n, 2));
      const factor = factorizeFronts(a, tree, rows, { kind, pivoting: 'threshold' });
      const predicted = predictPeakBytes(tree, { kind, complex: false, entries: entryCount(a) }).total;
      expect(factor.report.peakBytes).toBeGreaterThan(predicted);
      expect(factor.report.notes.join()).toContain('delayed');
      const b = randomVector(n, 1);
      const x = b.slice();
      factor.solveInPlace(x, 1);
      expect(backwardError(a, x, b)).toBeLessThan(1e-13);
    }
  });
});
