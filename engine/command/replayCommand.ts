import { besideMark, missingBeside, type RecipeDifference, samenessOf, samenessWords } from '../handover/recipe.ts';
import { type ReplayedTrial, replayTrial } from '../handover/replay.ts';
import { Fault } from '../matrix/fault.ts';
import { matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output, shortBytes, shortNumber, tableText } from './output.ts';
import { usualPageMemory } from './pageMemory.ts';
import type { Call } from './parse.ts';
import { loadRecipe } from './recipeFile.ts';
import { comparedJson } from './trialJson.ts';

/** `replay FILE --recipe R`: 0 when every number is the recorded one, 4 when one is not; another matrix is refused. */
export async function replayCommand(call: Call, out: Output): Promise<number> {
  const { recipe, loaded, context, mark } = await loadRecipe(call);
  const sameness = samenessOf(recipe, loaded.matrix, mark);
  const words = samenessWords(recipe, loaded.name, sameness);
  if (sameness === 'other') {
    const text = `${words} A replay needs the matrix of the recipe; "gate" runs its choice on another one.`;
    throw new Fault('input', 'other-matrix', text, { file: loaded.name });
  }
  const missing = missingBeside(recipe, besideMark(context.input.imported, context.input.coordinates));
  if (missing.length > 0)
    throw new Fault('input', 'recipe-beside', `${missing.join(' ')} Options: --permutation, --coordinates.`);
  const trials = recipe.trials.map((trial) => replayTrial(context, recipe, trial, usualPageMemory));
  const same = trials.every((t) => t.differences.length === 0);
  if (call.flag('json')) {
    out.line(
      jsonText({
        matrix: matrixJson(loaded),
        recipe: { version: recipe.version, matrix: recipe.matrix, chosen: recipe.chosen },
        matches: sameness,
        same,
        target: recipe.target,
        workload: recipe.workload,
        trials: trials.map((t) => ({
          name: t.recorded.name,
          same: t.differences.length === 0,
          differences: t.differences,
          asked: t.recorded.choice,
          orderSha256: t.figures.orderSha256,
          ...comparedJson(
            { name: t.recorded.name, direction: null, result: t.result, forecast: t.forecast, spread: null },
            recipe.target,
            recipe.workload,
          ),
        })),
      }),
    );
    return same ? 0 : 4;
  }
  out.line(matrixLine(loaded));
  out.line(`  ${words} Written by version ${recipe.version}.`);
  out.line('');
  out.line(
    tableText([['trial', 'factor entries', 'operations', 'factor bytes', 'peak', 'replayed'], ...trials.map(row)]),
  );
  for (const t of trials) for (const d of t.differences) out.line(`${t.recorded.name}, ${differenceWords(d)}`);
  out.line(same ? 'Every number is the recorded one.' : 'Not every number is the recorded one.');
  return same ? 0 : 4;
}

function row({ recorded, figures, differences }: ReplayedTrial): string[] {
  return [
    recorded.name,
    shortNumber(figures.factorEntries),
    shortNumber(figures.operations),
    shortBytes(figures.factorBytes),
    shortBytes(figures.peakBytes),
    differences.length === 0 ? 'the same' : 'differs',
  ];
}

function differenceWords({ figure, recorded, found }: RecipeDifference): string {
  return `${figure}: recorded ${String(recorded)}, found ${String(found)}`;
}
