import { calibrateHere } from '../../engine/trial/calibration.ts';
import { noDifferences, spreadOf } from '../../engine/trial/spread.ts';
import type { Job } from './jobs.ts';
import { contextOf } from './trialJobs.ts';

export const calibrate: Job<'calibrate'> = ({ target }, { progress }) => calibrateHere(target, progress);

export const spread: Job<'spread'> = ({ key, trials, runs }, { shelf, progress }) => {
  const spreads = trials.map(({ result, heldLast }, k) =>
    spreadOf(contextOf(shelf, key, heldLast), result.choice, result, runs, (fraction, phase) =>
      progress((k + fraction) / trials.length, phase),
    ),
  );
  const same = noDifferences(spreads.map((s) => s.factorEntries));
  return spreads.map((s, k) => ({ ...s, noDifference: same[k] }));
};
