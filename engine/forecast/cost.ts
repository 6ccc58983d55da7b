import type { TrialForecast } from './forecast.ts';
import type { TrialCost } from './workload.ts';

/**
 * What a trial costs on the cores of the target, in the form in which workloads are compared. The factorization is divided by the speed-up
 * of the schedule for so many workers (the next smaller one of the table); substitutions, bound by memory, are not.
 */
export function trialCost(
  forecast: TrialForecast,
  cores: number,
  analysis: number,
  factorEntries: number,
  name: string,
): TrialCost {
  const { time, parallel } = forecast;
  const row = parallel?.rows.filter((r) => r.workers <= cores).at(-1);
  const speedup = row === undefined ? 1 : Math.max(row.splitSpeedup, row.speedup, 1);
  return {
    name,
    factorEntries,
    analysis,
    factorization: (time.factorization.value ?? 0) / speedup,
    solve: time.solve.value ?? 0,
    refinementStep: time.refinementStep.value ?? 0,
  };
}
