import { type GateLimits, type GateLine, gateLines } from '../handover/gate.ts';
import { besideMark, missingBeside, samenessOf, samenessWords } from '../handover/recipe.ts';
import { type ReplayedTrial, replayTrial } from '../handover/replay.ts';
import { Fault } from '../matrix/fault.ts';
import { matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output, shortBytes, shortNumber } from './output.ts';
import { usualPageMemory } from './pageMemory.ts';
import type { Call } from './parse.ts';
import { loadRecipe } from './recipeFile.ts';

const said: Readonly<Record<keyof GateLimits, { option: string; what: string; unit: string }>> = {
  factorBytes: { option: '--max-factor-bytes', what: 'factor bytes', unit: 'bytes' },
  peakBytes: { option: '--max-peak-bytes', what: 'peak bytes', unit: 'bytes' },
  operations: { option: '--max-operations', what: 'operations', unit: 'operations' },
};

/** `gate FILE --recipe R --max-… N`: 0 when the recipe's choice stays within every limit on this matrix, 5 when it passes one. */
export async function gateCommand(call: Call, out: Output): Promise<number> {
  const limits: GateLimits = {
    factorBytes: call.number('max-factor-bytes'),
    peakBytes: call.number('max-peak-bytes'),
    operations: call.number('max-operations'),
  };
  if (Object.values(limits).every((l) => l === null)) {
    throw new Fault(
      'input',
      'usage',
      '"gate" needs a limit: --max-factor-bytes 2GiB, --max-peak-bytes 4GiB or --max-operations 1e12, or several.',
    );
  }
  const { recipe, loaded, context, mark } = await loadRecipe(call);
  const missing = missingBeside(recipe, besideMark(context.input.imported, context.input.coordinates));
  const wanted = call.text('trial') ?? recipe.chosen;
  const watched = wanted === 'all' ? recipe.trials : recipe.trials.filter((t) => t.name === wanted);
  if (watched.length === 0) {
    const names = recipe.trials.map((t) => t.name).join(', ');
    throw new Fault(
      'input',
      'no-trial',
      `--trial ${wanted}: the recipe has no such trial; expected all, or one of ${names}.`,
    );
  }
  // a simulation code's own matrices change: the gate is there for just that, and takes other companions too, as long as they are there
  const needs = (word: string) => watched.some((t) => t.ran.ordering === word);
  const absent =
    (needs('imported') && context.input.imported === null) ||
    (needs('geometric-dissection') && context.input.coordinates === null);
  if (absent) throw new Fault('input', 'recipe-beside', `${missing.join(' ')} Options: --permutation, --coordinates.`);
  const sameness = samenessOf(recipe, loaded.matrix, mark);
  const words = samenessWords(recipe, loaded.name, sameness);
  const gates = watched.map((trial) => {
    const replayed = replayTrial(context, recipe, trial, usualPageMemory);
    return { replayed, lines: gateLines(replayed, limits) };
  });
  const holds = gates.every(({ lines }) => lines.every((l) => l.holds));
  if (call.flag('json')) {
    const trials = gates.map(({ replayed, lines }) => ({
      name: replayed.recorded.name,
      choice: replayed.recorded.ran,
      holds: lines.every((l) => l.holds),
      recorded: replayed.recorded.figures,
      found: replayed.figures,
      lines,
    }));
    out.line(jsonText({ matrix: matrixJson(loaded), matches: sameness, limits, holds, trials }));
    return holds ? 0 : 5;
  }
  out.line(matrixLine(loaded));
  out.line(`  ${words}`);
  for (const { replayed, lines } of gates) for (const line of lines) out.line(sentence(replayed, line));
  out.line(holds ? 'The gate holds.' : 'The gate does not hold.');
  return holds ? 0 : 5;
}

function sentence({ recorded }: ReplayedTrial, { limit, most, found, over, holds, worst }: GateLine): string {
  const { option, what, unit } = said[limit];
  const short = (x: number) => (unit === 'bytes' ? shortBytes(x) : shortNumber(x));
  if (found === null) return `${recorded.name}, ${what}: not defined for this matrix, so ${option} cannot hold.`;
  const figures = `${recorded.name}, ${what}: ${short(found)} (${found}), limit ${short(most)} (${most})`;
  const possible =
    holds && worst !== null && worst > most
      ? `; the proven worst case of pivoting, ${short(worst)}, would pass it`
      : '';
  if (holds) return `${figures}: within it by ${short(most - found)}${possible}.`;
  const share = most > 0 ? `, ${(((over ?? 0) / most) * 100).toPrecision(3)} %` : '';
  return `${figures}: passed by ${short(over ?? 0)} (${over} ${unit}${share}).`;
}
