import type { TrialForecast } from '../forecast/forecast.ts';
import { Fault } from '../matrix/fault.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { TrialContext } from '../trial/context.ts';
import { forecastTrial } from '../trial/forecast.ts';
import type { TrialResult } from '../trial/result.ts';
import { whyNoForecast } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import {
  differencesOf,
  figuresOf,
  type Recipe,
  type RecipeDifference,
  type RecipeFigures,
  type RecipeTrial,
} from './recipe.ts';

/** A trial of a recipe, run again. */
export interface ReplayedTrial {
  readonly recorded: RecipeTrial;
  readonly result: TrialResult;
  readonly forecast: TrialForecast | null;
  readonly figures: RecipeFigures;
  /** what differs from the recorded numbers; empty when they are the same */
  readonly differences: readonly RecipeDifference[];
}

/**
 * Runs a trial of a recipe on a matrix: exactly what ran then, on the recipe's target.
 * @param context the matrix with its permutation and coordinates; unknowns held last are taken from the recipe
 * @param pageMemoryBytes what a run in this process may use
 * @throws Fault where the matrix at hand cannot take the trial
 */
export function replayTrial(
  context: TrialContext,
  recipe: Recipe,
  trial: RecipeTrial,
  pageMemoryBytes: number,
  progress: Progress = noProgress,
): ReplayedTrial {
  const n = context.facts.columns;
  const far = trial.heldLast.find((i) => i >= n);
  if (far !== undefined) {
    throw new Fault(
      'input',
      'held-last-range',
      `Trial ${trial.name} of the recipe keeps unknown ${far + 1} at the end; this matrix has ${n}.`,
    );
  }
  const held = trial.heldLast.length === 0 ? null : Int32Array.from(trial.heldLast);
  const own =
    held === null && context.input.heldLast === null ? context : new TrialContext({ ...context.input, heldLast: held });
  const why = whyNoForecast(own.facts, trial.ran);
  if (why !== null) throw new Fault('input', 'trial-impossible', `Trial ${trial.name} of the recipe: ${why}`);
  const result = runTrial(own, trial.ran, progress);
  const forecast = forecastTrial(own, result, recipe.target, pageMemoryBytes);
  const figures = figuresOf(result.counts, result.effective, forecast?.peak.bytes ?? null);
  return { recorded: trial, result, forecast, figures, differences: differencesOf(trial.figures, figures) };
}
