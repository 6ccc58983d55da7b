/** Which factorizations are possible and advised, on matrices whose facts were found outside (test/reference/README.md). */
import { describe, expect, it } from 'vitest';
import { defaultTarget, defaultWorkload } from '../../engine/forecast/target.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { adviceFor, doubtsOf, possibleFactorizations } from '../../engine/trial/advice.ts';
import type { OrderingName } from '../../engine/trial/choice.ts';
import { plainInput, TrialContext } from '../../engine/trial/context.ts';
import { factsOf } from '../../engine/trial/facts.ts';
import { forecastTrial } from '../../engine/trial/forecast.ts';
import { advisedFactorization, defaultChoice } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';
import { readReference } from '../support/reference.ts';

describe('possible factorizations', () => {
  it('symmetric with positive diagonal: all of them', () => {
    expect(possibleFactorizations(factsOf(readReference('bcsstk01')))).toEqual([
      'A run could factorize it by Cholesky, LDLᵀ, LU or column LU.',
    ]);
  });
  it('unsymmetric: LU, and why not the others', () => {
    const [could, ...not] = possibleFactorizations(factsOf(readReference('utm300')));
    expect(could).toBe('A run could factorize it by LU or column LU.');
    expect(not.join(' ')).toMatch(/Cholesky needs A = Aᵀ.*LDLᵀ needs A = Aᵀ/);
  });
  it('rectangular, or a pattern: none, with the reason once', () => {
    expect(possibleFactorizations(factsOf(readReference('lsq'))).join(' ')).toContain('1850 × 712');
    const { values: _values, ...pattern } = readReference('bcsstk01');
    const said = possibleFactorizations(factsOf({ ...pattern, field: 'pattern', values: null }));
    expect(said).toHaveLength(1);
    expect(said[0]).toContain('no values');
  });
});

describe('advice over trials', () => {
  const advise = (
    matrix: ReturnType<typeof readReference>,
    orderings: readonly OrderingName[],
    memoryBytes: number,
  ) => {
    const context = new TrialContext(plainInput(matrix));
    const { factorization } = advisedFactorization(context.facts);
    const target = { ...defaultTarget, memoryBytes };
    const trials = orderings.map((ordering) => {
      const result = runTrial(context, defaultChoice(factorization, ordering));
      return { ...result, name: ordering, forecast: forecastTrial(context, result, target, 2 ** 32) };
    });
    return adviceFor(context.facts, factorization, trials, target, { ...defaultWorkload, factorizations: 1000 });
  };

  it('a grid for 1000 factorizations: not the natural order', () => {
    const { best, sentence, reasons } = advise(modelProblems.grid2d5(60), ['natural', 'nested-dissection'], 2 ** 34);
    expect(best).toBe('nested-dissection');
    expect(sentence).toContain('Use Cholesky with nested-dissection');
    expect(reasons.join(' ')).toContain('Cholesky is advised because the matrix is symmetric with a positive diagonal');
  });
  it('too little memory: none, and what would help', () => {
    const { best, change } = advise(modelProblems.grid2d5(60), ['natural', 'minimum-degree'], 2 ** 17);
    expect(best).toBeNull();
    expect(change).toContain('minimum-degree');
  });
  it('a saddle point: LDLᵀ, its zero diagonals and its pivots are cautioned of', () => {
    const { sentence, cautions } = advise(modelProblems.kkt(120), ['minimum-degree'], 2 ** 34);
    expect(sentence).toContain('LDLᵀ');
    expect(cautions.join(' ')).toMatch(/zero or absent: 2×2 pivots will come.*only a run shows it/);
  });
  it('definiteness is a doubt until a run has proved it', () => {
    expect(doubtsOf(factsOf(readReference('bcsstk01')), 'cholesky').join(' ')).toContain('a run proves it');
  });
});
