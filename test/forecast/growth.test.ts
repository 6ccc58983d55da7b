/**
 * Growth of nested dissection on grids against the theory (George 1973; Lipton, Rose & Tarjan 1979): n·log n entries and n^(3/2) operations in
 * two dimensions, n^(4/3) and n² in three.
 */
import { describe, expect, it } from 'vitest';
import { type FamilyMember, grownFigures, studyGrowth } from '../../engine/forecast/growthStudy.ts';
import { defaultTarget } from '../../engine/forecast/target.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import type { OrderingName } from '../../engine/trial/choice.ts';
import { plainInput, TrialContext } from '../../engine/trial/context.ts';
import { forecastTrial } from '../../engine/trial/forecast.ts';
import { defaultChoice } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';

function family(kind: string, sizes: readonly number[], ordering: OrderingName = 'nested-dissection'): FamilyMember[] {
  return sizes.map((size) => {
    const context = new TrialContext(plainInput(modelProblems[kind](size)));
    const trial = runTrial(context, defaultChoice('cholesky', ordering));
    const forecast = forecastTrial(context, trial, defaultTarget, 2 ** 32);
    return {
      name: `${kind} ${size}`,
      n: context.facts.columns,
      factorEntries: trial.counts.factorEntries ?? 0,
      operations: trial.counts.operations ?? 0,
      memory: forecast?.peak.bytes ?? 0,
      time: forecast?.time.factorization.value ?? 0,
    };
  });
}

const limits = { memory: 64 * 2 ** 30, time: 3600 };

describe.each([
  { kind: 'grid2d5', dimension: 2, sizes: [16, 32, 64, 128], entries: 'n log n', operations: 'n^(3/2)' },
  { kind: 'grid3d7', dimension: 3, sizes: [8, 12, 17, 24], entries: 'n^(4/3)', operations: 'n^2' },
] as const)('$kind by nested dissection', ({ kind, dimension, sizes, entries, operations }) => {
  const members = family(kind, sizes);
  const study = studyGrowth(members, true, dimension, limits);

  it('leaving out the largest size predicts it within 10 %: entries, operations, memory, time', () => {
    for (const g of study.growth) {
      expect(g.leftOut, g.figure).not.toBeNull();
      expect(g.leftOut as number, g.figure).toBeLessThan(0.1);
      expect(g.fit.confident).toBe(true);
    }
  });

  it('the laws of the theory fit entries and operations', () => {
    expect(study.growth[0].fit.law).toBe(entries);
    expect(study.growth[1].fit.law).toBe(operations);
  });

  it('local exponents fall towards the theory', () => {
    const theory = { factorEntries: dimension === 2 ? 1 : 4 / 3, operations: dimension === 2 ? 3 / 2 : 2 };
    for (const figure of ['factorEntries', 'operations'] as const) {
      const { fit } = study.growth.find((g) => g.figure === figure) ?? study.growth[0];
      const first = fit.exponents[0].exponent;
      const last = fit.exponents[fit.exponents.length - 1].exponent;
      expect(last).toBeLessThan(first);
      expect(Math.abs(last - theory[figure])).toBeLessThan(Math.abs(first - theory[figure]));
    }
  });

  it('says how large n can be, and how far that is', () => {
    const largest = members[members.length - 1].n;
    for (const r of study.reach) {
      expect(r.n).toBeGreaterThan(largest);
      expect(r.distance).toBeCloseTo(r.n / largest, 6);
      expect(r.sentence).toContain('times the largest size counted');
    }
  });
});

describe('a family', () => {
  it('of fewer than four sizes earns no confidence; other orderings get free exponents', () => {
    const study = studyGrowth(family('grid2d5', [10, 20], 'natural'), false, null, limits);
    expect(study.growth.map((g) => g.fit.law)).toEqual(grownFigures.map(() => 'free exponent'));
    expect(study.notes.join(' ')).toContain('2 sizes');
    expect(study.growth[0].leftOut).toBeNull();
    // natural order of a k×k grid: k³ + k − 1 entries, so the exponent is 3/2 and a little
    expect(study.growth[0].fit.b).toBeCloseTo(1.5, 2);
  });
  it('of one size is refused', () => {
    expect(() => studyGrowth(family('grid2d5', [10]), true, 2, limits)).toThrow(RangeError);
  });
});
