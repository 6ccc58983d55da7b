/**
 * A run of a trial against its forecast when no pivot is delayed: entries and operations without padding, and with it the stored entries, the
 * executed operations and the peak bytes, taken from the arrays and kernels of the run. Open data: test/reference/README.md.
 */
import { describe, expect, it } from 'vitest';
import { workOfFronts } from '../../engine/forecast/frontWork.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { noAmalgamation, usualAmalgamation } from '../../engine/symbolic/amalgamate.ts';
import { analyseGraph } from '../../engine/symbolic/analyse.ts';
import { assemblyTree } from '../../engine/symbolic/assemblyTree.ts';
import { plainInput, TrialContext } from '../../engine/trial/context.ts';
import { runProof } from '../../engine/trial/proof.ts';
import { defaultChoice } from '../../engine/trial/rules.ts';
import { arithmeticOf, runTrial } from '../../engine/trial/run.ts';
import { readReference } from '../support/reference.ts';

const cases = [
  { name: 'bcsstk01', make: () => readReference('bcsstk01') },
  { name: 'cg20', make: () => readReference('cg20') },
  { name: 'grid2d5 20', make: () => modelProblems.grid2d5(20) },
  { name: 'hermitian2d 12', make: () => modelProblems.hermitian2d(12) },
];

describe('no pivot delayed', () => {
  for (const { name, make } of cases) {
    for (const kind of ['cholesky', 'ldlt', 'lu'] as const) {
      for (const ordering of ['natural', 'minimum-degree', 'nested-dissection'] as const) {
        it(`${name}, ${kind}, ${ordering}: the run counts what was forecast, padding off and on`, () => {
          const context = new TrialContext(plainInput(make()));
          if (kind === 'cholesky' && !context.facts.hermitian) return;
          if (kind === 'ldlt' && !context.facts.hermitian && !context.facts.valueSymmetric) return;
          const trial = runTrial(context, defaultChoice(kind, ordering, { pivoting: 'none' }));
          const { graph, effective } = { graph: context.graph(), effective: trial.effective };
          const symbolic = analyseGraph(graph, effective, { postorder: false });
          for (const amalgamation of [noAmalgamation, usualAmalgamation]) {
            const { report, forecast } = runProof(context, trial, { amalgamation, refine: 0 });
            expect(report.counts.delayed).toBe(0);
            expect(report.factorEntries).toBe(trial.counts.factorEntries);
            const work = workOfFronts(kind, assemblyTree(symbolic, { amalgamation }), arithmeticOf(context, kind));
            expect(report.executedOperations).toBe(work.reduce((a, b) => a + b, 0));
            expect(report.storedFactorEntries).toBe(forecast.storedFactorEntries);
            expect(report.peakBytes).toBe(forecast.peakBytes);
            if (amalgamation === noAmalgamation) {
              expect(report.executedOperations).toBe(trial.counts.operations);
              expect(report.storedFactorEntries).toBe(trial.counts.factorEntries);
            }
          }
        });
      }
    }
  }
});

describe('delayed pivots stay inside the proven range', () => {
  const wild = [
    { name: 'kkt 200', kinds: ['ldlt', 'lu'] as const, make: () => modelProblems.kkt(200) },
    { name: 'pores_1', kinds: ['lu'] as const, make: () => readReference('pores_1') },
    { name: 'utm300', kinds: ['lu'] as const, make: () => readReference('utm300') },
    { name: 'arc130', kinds: ['lu'] as const, make: () => readReference('arc130') },
    { name: 'g20', kinds: ['ldlt', 'lu'] as const, make: () => readReference('g20') },
  ];
  for (const { name, kinds, make } of wild) {
    for (const kind of kinds) {
      for (const ordering of ['natural', 'minimum-degree', 'nested-dissection', 'sloan'] as const) {
        it(`${name}, ${kind}, ${ordering}: entries and operations`, () => {
          const context = new TrialContext(plainInput(make()));
          const trial = runTrial(context, defaultChoice(kind, ordering, { threshold: 0.5 }));
          const { report } = runProof(context, trial, { amalgamation: noAmalgamation, refine: 0 });
          const { range } = trial.counts;
          if (range === null) throw new Error('no range');
          const [least, most] = range.factorEntries;
          expect(report.factorEntries).toBeGreaterThanOrEqual(least);
          expect(report.factorEntries).toBeLessThanOrEqual(most);
          expect(report.executedOperations).toBeGreaterThanOrEqual(range.operations[0]);
          expect(report.executedOperations).toBeLessThanOrEqual(range.operations[1]);
        });
      }
    }
  }
});
