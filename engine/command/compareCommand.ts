import type { Direction } from '../exchange/writePermutation.ts';
import { trialCost } from '../forecast/cost.ts';
import type { Target } from '../forecast/target.ts';
import { compareWorkload } from '../forecast/workload.ts';
import { Fault } from '../matrix/fault.ts';
import { adviceFor } from '../trial/advice.ts';
import type { Choice, OrderingName } from '../trial/choice.ts';
import type { TrialContext } from '../trial/context.ts';
import { forecastTrial } from '../trial/forecast.ts';
import { advisedFactorization, isSymmetric, suitableOrderings, whyNoForecast } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import { noDifferences, spreadOf } from '../trial/spread.ts';
import { compareText } from './compareText.ts';
import { targetOf, workloadOf } from './forecastOptions.ts';
import { choiceOf, loadReadings, matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output } from './output.ts';
import { usualPageMemory } from './pageMemory.ts';
import type { Call } from './parse.ts';
import { recipeOfTrials, writeRecipe } from './recipeFile.ts';
import { type ComparedTrial, comparedJson } from './trialJson.ts';

/** `compare FILE`: one trial for each ordering, forecast only. */
export async function compareCommand(call: Call, out: Output): Promise<number> {
  const { loaded, context, other } = await loadReadings(call);
  const base = choiceOf(call, context, 'natural');
  const names = orderingsOf(call, context, base);
  const choices = names.map((ordering) => ({ ...base, ordering }));
  for (const choice of choices) {
    const why = whyNoForecast(context.facts, choice);
    if (why !== null) throw new Fault('input', 'trial-impossible', `${loaded.name}: ${why}`, { file: loaded.name });
  }
  const notes = [...loaded.notes.map((note) => note.text), ...notesOn(call, context, base)];
  const target = targetOf(call);
  const workload = workloadOf(call);
  const runs = call.number('spread');
  const page = call.number('page-memory') ?? usualPageMemory;
  const question = { target, page, runs };
  const bare = choices.flatMap((choice) => {
    if (choice.ordering !== 'imported' || other === null) return [compared(null, context, choice, question)];
    return [compared('new-to-old', context, choice, question), compared('old-to-new', other, choice, question)];
  });
  if (other !== null && names.includes('imported')) notes.push(directionNote(bare));
  const trials = withDifferences(bare);
  const costs = trials.flatMap(({ name, result, forecast }) => {
    if (forecast === null) return [];
    const analysis = result.seconds.ordering + result.seconds.symbolic;
    return [trialCost(forecast, target.cores, analysis, result.counts.factorEntries ?? 0, name)];
  });
  const totals = costs.length === 0 ? { lines: [], breakEvens: [], remark: null } : compareWorkload(costs, workload);
  const advised = trials.map(({ name, result, forecast }) => ({ ...result, name, forecast }));
  const advice = adviceFor(context.facts, base.factorization, advised, target, workload);
  const recipe = call.text('recipe-out');
  if (recipe !== null) {
    const named = trials.map(({ name, direction, result, forecast }) => ({
      name,
      context: direction === 'old-to-new' && other !== null ? other : context,
      result,
      peakBytes: forecast?.peak.bytes ?? null,
    }));
    if (other !== null && names.includes('imported')) throw undecidedForRecipe();
    const made = await recipeOfTrials(call, loaded, named, advice.best ?? named[0].name, target, workload);
    await writeRecipe(recipe, made, out);
    notes.push(`${recipe}: recipe of ${named.length} trials, ${made.chosen} chosen.`);
  }
  if (call.flag('json')) {
    out.line(
      jsonText({
        matrix: matrixJson(loaded),
        trials: trials.map((t) => comparedJson(t, target, workload)),
        target,
        workload: { ...workload, ...totals },
        advice,
        notes,
      }),
    );
    return 0;
  }
  out.line(matrixLine(loaded));
  for (const note of notes) out.line(`  ${note}`);
  out.line('');
  out.line(compareText(trials, target, workload, totals.breakEvens, advice));
  return 0;
}

function orderingsOf(call: Call, context: TrialContext, base: Choice): readonly OrderingName[] {
  const wanted = call.list('orderings') as readonly OrderingName[] | null;
  const names = [...new Set(wanted ?? suitableOrderings(context.facts, base.factorization))];
  // a permutation or a measure that is given wants its line
  if (call.text('permutation') !== null && !names.includes('imported')) names.push('imported');
  if (call.text('best-of') !== null && !names.includes('best-of')) names.push('best-of');
  return names;
}

function notesOn(call: Call, context: TrialContext, base: Choice): string[] {
  const advice = advisedFactorization(context.facts);
  if (call.text('factorization') === null) return [`Advised: ${advice.factorization}, because ${advice.reason}.`];
  if (base.factorization === 'lu' || base.factorization === 'column-lu' || isSymmetric(context.facts)) return [];
  return [`The matrix is not symmetric: ${base.factorization} is forecast on the pattern of A + Aᵀ.`];
}

function compared(
  direction: Direction | null,
  context: TrialContext,
  choice: Choice,
  { target, page, runs }: { readonly target: Target; readonly page: number; readonly runs: number | null },
): ComparedTrial {
  const result = runTrial(context, choice);
  const spread = runs === null ? null : spreadOf(context, choice, result, runs);
  return {
    name: direction === null ? choice.ordering : `${choice.ordering}, read ${direction}`,
    direction,
    result,
    forecast: forecastTrial(context, result, target, page),
    spread: spread === null ? null : { ...spread, noDifference: { factorEntries: false, operations: false } },
  };
}

function withDifferences(trials: readonly ComparedTrial[]): readonly ComparedTrial[] {
  const entries = noDifferences(trials.map((t) => t.spread?.factorEntries ?? null));
  const operations = noDifferences(trials.map((t) => t.spread?.operations ?? null));
  return trials.map((t, k) => ({
    ...t,
    spread:
      t.spread === null
        ? null
        : { ...t.spread, noDifference: { factorEntries: entries[k], operations: operations[k] } },
  }));
}

function directionNote(trials: readonly ComparedTrial[]): string {
  const [a, b] = trials.filter((t) => t.result.choice.ordering === 'imported');
  const [x, y] = [a.result.counts.factorEntries, b.result.counts.factorEntries];
  const hint =
    x === null || y === null || x === y ? '' : ` The lower fill of "${x < y ? a.name : b.name}" is only a hint.`;
  return `The permutation does not say its direction, so both readings are forecast: say --permutation-direction to confirm one.${hint}`;
}

function undecidedForRecipe(): Fault {
  return new Fault(
    'input',
    'permutation-direction',
    'A recipe needs one reading of the permutation: say --permutation-direction new-to-old or old-to-new.',
  );
}
