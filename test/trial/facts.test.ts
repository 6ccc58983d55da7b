/** Facts against the outside figures (dense NumPy and SciPy; test/reference/README.md). */
import { describe, expect, it } from 'vitest';
import { factsOf } from '../../engine/trial/facts.ts';
import { advisedFactorization, defaultChoice, whyNoForecast, whyNoProof } from '../../engine/trial/rules.ts';
import { figures, readableNames, readReference } from '../support/reference.ts';

describe('factsOf', () => {
  for (const name of readableNames()) {
    it(`${name}: symmetry and diagonal`, () => {
      const a = readReference(name);
      const facts = factsOf(a);
      const figure = figures[name];
      if (figure.patternSymmetry !== undefined) expect(facts.patternSymmetric).toBe(figure.patternSymmetry === 1);
      if (figure.valueSymmetric !== undefined && a.values !== null) {
        expect(facts.valueSymmetric).toBe(figure.valueSymmetric);
      }
      if (a.values !== null && a.rows === a.columns)
        expect(facts.zeroDiagonals).toBe(Math.min(a.rows, a.columns) - figure.diagonalNonzero);
      const { factorization } = advisedFactorization(facts);
      expect(whyNoForecast(facts, defaultChoice(factorization, 'natural'))).toBeNull();
      // positive definite by its inertia: the advice must be Cholesky
      if (figure.inertia?.[0] === a.rows && facts.hermitian) expect(factorization).toBe('cholesky');
    });
  }

  it('a proof is refused with a reason where the factorization does not describe the matrix', () => {
    const facts = factsOf(readReference('utm300'));
    expect(whyNoProof(facts, defaultChoice('cholesky', 'natural'))).toContain('not symmetric');
    expect(whyNoProof(facts, defaultChoice('lu', 'natural'))).toBeNull();
    expect(whyNoForecast(factsOf(readReference('lsq')), defaultChoice('lu', 'natural'))).toContain('1850 × 712');
  });
});
