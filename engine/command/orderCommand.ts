import { type Direction, permutationFormula, writePermutation } from '../exchange/writePermutation.ts';
import { defaultTarget, defaultWorkload } from '../forecast/target.ts';
import { Fault } from '../matrix/fault.ts';
import { forecastTrial } from '../trial/forecast.ts';
import { runTrial } from '../trial/run.ts';
import { choiceOf, loadContext, orderingOf } from './load.ts';
import type { Output } from './output.ts';
import { usualPageMemory } from './pageMemory.ts';
import type { Call } from './parse.ts';
import { recipeOfTrials, writeRecipe } from './recipeFile.ts';

/** `order FILE --ordering NAME --out FILE`: writes a permutation. */
export async function orderCommand(call: Call, out: Output): Promise<number> {
  const path = call.text('out');
  if (path === null)
    throw new Fault('input', 'usage', '"order" needs --out FILE, the file to write the permutation to.');
  if (orderingOf(call, 'natural') === 'natural' && call.text('ordering') === null) {
    throw new Fault('input', 'usage', '"order" needs --ordering NAME, --best-of MEASURE or --permutation FILE.');
  }
  const { loaded, context } = await loadContext(call);
  const trial = runTrial(context, choiceOf(call, context, orderingOf(call, 'natural')));
  const which = call.text('which') ?? 'effective';
  const direction = (call.text('direction') ?? 'new-to-old') as Direction;
  const base = call.text('base') === '0' ? 0 : 1;
  const { ordering } = trial.choice;
  const name =
    ordering === 'best-of' ? `best of several by ${trial.choice.portfolio.measure}: ${trial.ran.ordering}` : ordering;
  const title = `${loaded.name}, ${name} for ${trial.choice.factorization}, ${which} order`;
  const format = (call.text('format') ?? 'plain') as 'plain' | 'matrix-market-array';
  await out.file(
    path,
    writePermutation(which === 'requested' ? trial.requested : trial.effective, { direction, base, format, title }),
  );
  const recipe = call.text('recipe-out');
  if (recipe !== null) {
    const peakBytes = forecastTrial(context, trial, defaultTarget, usualPageMemory)?.peak.bytes ?? null;
    const named = { name: ordering, context, result: trial, peakBytes };
    await writeRecipe(
      recipe,
      await recipeOfTrials(call, loaded, [named], ordering, defaultTarget, defaultWorkload),
      out,
    );
    out.line(`${recipe}: recipe of this order.`);
  }
  out.line(`${path}: ${title}`);
  out.line(permutationFormula(direction, base));
  for (const note of trial.notes) out.line(note);
  return 0;
}
