/** Advice: which trial, for what reasons; what it says when nothing fits. Checked by direct evaluation of the totals. */
import { describe, expect, it } from 'vitest';
import { type AdviceQuestion, type AdviceTrial, adviseOn } from '../../engine/forecast/advice.ts';
import { limitLines } from '../../engine/forecast/limits.ts';
import { defaultTarget } from '../../engine/forecast/target.ts';

const gib = 2 ** 30;
const trial = (name: string, bytes: number, seconds: number, more: Partial<AdviceTrial> = {}): AdviceTrial => ({
  name,
  cost: { name, factorEntries: bytes / 12, analysis: 1, factorization: seconds, solve: 0, refinementStep: 0 },
  peak: { bytes, inSingle: bytes / 2, writtenOut: bytes / 8, delayed: null },
  countsFit: true,
  pivoted: false,
  valueDependent: false,
  ...more,
});
const question = (trials: readonly AdviceTrial[], memoryBytes = 16 * gib): AdviceQuestion => ({
  factorization: 'Cholesky',
  reason: 'Cholesky is advised because the matrix is symmetric with a positive diagonal.',
  doubts: ['Definiteness is not proven yet.'],
  trials,
  target: { ...defaultTarget, memoryBytes },
  workload: { factorizations: 10, rightHandSides: 1, refinementSteps: 0 },
});

describe('advice', () => {
  it('the fastest of those that fit, with the reason, its rival and what could go wrong', () => {
    const advice = adviseOn(question([trial('A', 4 * gib, 3), trial('B', 6 * gib, 2), trial('C', 20 * gib, 1)]));
    expect(advice.best).toBe('B');
    expect(advice.sentence).toContain('Use Cholesky with B');
    expect(advice.sentence).toContain('6.00 GiB');
    const words = advice.reasons.join(' ');
    expect(words).toContain('positive diagonal');
    expect(words).toContain('The next, A, takes 1.5 times as long');
    expect(words).toContain('Least fill is not least time');
    expect(words).toContain('1 trial would not fit');
    expect(advice.cautions.join(' ')).toContain('not proven');
    expect(advice.change).toBeNull();
  });
  it('within 5 % there is no difference', () => {
    const { reasons } = adviseOn(question([trial('A', gib, 1), trial('B', gib, 1.02)]));
    expect(reasons.join(' ')).toContain('no difference');
  });
  it('nothing fits: the nearest change that would, single precision before writing out before a larger machine', () => {
    const trials = [trial('A', 20 * gib, 3), trial('B', 30 * gib, 2)];
    const single = adviseOn(question(trials, 12 * gib));
    expect([single.best, single.change]).toEqual([null, expect.stringContaining('single precision')]);
    expect(single.sentence).toContain('Nothing fits 12.0 GiB: the smallest, A, needs 20.0 GiB');
    expect(adviseOn(question(trials, 3 * gib)).change).toContain('written out');
    expect(adviseOn(question(trials, gib)).change).toContain('would fit a machine with 20.0 GiB');
  });
  it('cautions: counts beyond 2³¹ − 1, pivots chosen by size, values', () => {
    const peak = { bytes: gib, inSingle: null, writtenOut: null, delayed: 40 * gib };
    const wild = trial('A', gib, 1, { countsFit: false, pivoted: true, valueDependent: true, peak });
    const words = adviseOn(question([wild])).cautions.join(' ');
    for (const part of ['64-bit', 'only a run shows it', 'fifth of the pivots', 'rest on these values']) {
      expect(words).toContain(part);
    }
  });
  it('without trials: the factorization and its reason', () => {
    const advice = adviseOn(question([]));
    expect([advice.best, advice.sentence]).toEqual([null, question([]).reason]);
  });
});

describe('limits', () => {
  const question = {
    largestCount: 2 ** 31 - 1,
    highestCount: null,
    peakBytes: gib,
    memoryBytes: gib,
    delayedBytes: null,
    pagePeakBytes: gib,
    pageMemoryBytes: gib,
  };
  it('are passed at the limit and not beyond it', () => {
    expect(limitLines(question).map((l) => l.passed)).toEqual([true, true, true]);
    const beyond = { ...question, largestCount: 2 ** 31, peakBytes: gib + 1, pagePeakBytes: gib + 1 };
    expect(limitLines(beyond).map((l) => l.passed)).toEqual([false, false, false]);
  });
  it('say what pivoting could still do', () => {
    const [counts, fits] = limitLines({ ...question, highestCount: 1e12, delayedBytes: 2 * gib });
    expect(counts.sentence).toContain('1,000,000,000,000');
    expect(fits.sentence).toContain('fifth of the pivots');
  });
});
