import type { Trial } from '../state/trial.ts';
import { costOf } from '../workers/trialFigures.ts';
import type { TrialCost } from '../workers/workload.ts';

/** What the finished trials cost on the cores of the target, by stamp; without those that have no forecast. */
export function costsOf(trials: readonly Trial[], cores: number): readonly TrialCost[] {
  return trials.flatMap(({ letter, outcome, forecast }) => {
    if (outcome === null || forecast === null) return [];
    const { ordering, symbolic } = outcome.seconds;
    return [costOf(forecast, cores, ordering + symbolic, outcome.counts.factorEntries ?? 0, letter)];
  });
}
