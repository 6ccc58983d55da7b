import { reconcile as explain } from '../../engine/forecast/reconcile.ts';
import { ownCountsOf } from '../../engine/trial/ownCounts.ts';
import type { Job } from './jobs.ts';
import { contextOf } from './trialJobs.ts';

export const reconcile: Job<'reconcile'> = ({ key, trials, target, reported }, { shelf, progress }) => {
  const own = trials.map(({ name, result, heldLast }, k) => {
    progress(k / trials.length, name);
    return { ...ownCountsOf(contextOf(shelf, key, heldLast), result, target), name };
  });
  return reported.map(({ what, value }) => ({ what, value, explanations: explain(what, value, own).slice(0, 8) }));
};
