import { forecastTrial } from '../../engine/trial/forecast.ts';
import type { Job } from './jobs.ts';
import { contextOf } from './trialJobs.ts';

export const forecast: Job<'forecast'> = ({ key, result, heldLast, target, pageMemoryBytes }, { shelf, progress }) => {
  progress(0, 'forecast on your target');
  return forecastTrial(contextOf(shelf, key, heldLast), result, target, pageMemoryBytes);
};
