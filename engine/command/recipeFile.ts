import { plainSource } from '../../app/unpack/open.ts';
import type { Loaded } from '../exchange/loaded.ts';
import type { Target, Workload } from '../forecast/target.ts';
import { parseRecipe } from '../handover/parseRecipe.ts';
import {
  besideMark,
  type FileMark,
  makeRecipe,
  matrixMark,
  type Recipe,
  recipeText,
  recipeTrial,
} from '../handover/recipe.ts';
import { Sha256 } from '../handover/sha256.ts';
import { Fault } from '../matrix/fault.ts';
import type { TrialContext } from '../trial/context.ts';
import type { TrialResult } from '../trial/result.ts';
import { pathFile } from './fileSource.ts';
import { loadContext } from './load.ts';
import type { Output } from './output.ts';
import type { Call, OptionRule } from './parse.ts';

/** Shared by the commands that write a recipe. */
export const recipeOut: OptionRule = {
  kind: 'text',
  value: 'FILE',
  help: 'writes a recipe too: input by name, size and hash, all options, seeds and numbers, for replay, gate and the page',
};
/** Shared by the commands that run one. */
export const recipeIn: OptionRule = {
  kind: 'text',
  value: 'FILE',
  help: 'recipe to run, as --recipe-out or the page wrote it',
};

/** Name, size and hash of a file as it lies on the disk. */
export async function markOf(path: string): Promise<FileMark> {
  const file = await pathFile(path);
  const hash = new Sha256();
  for await (const chunk of file.stream() as unknown as AsyncIterable<Uint8Array>) hash.update(chunk);
  return { name: file.name, bytes: file.size ?? 0, sha256: hash.hex() };
}

/** A finished trial under the name it has in tables. */
export interface NamedTrial {
  readonly name: string;
  readonly context: TrialContext;
  readonly result: TrialResult;
  readonly peakBytes: number | null;
}

/** The recipe of trials of one matrix. Their contexts differ at most in the reading of a permutation. */
export async function recipeOfTrials(
  call: Call,
  loaded: Loaded,
  trials: readonly NamedTrial[],
  chosen: string,
  target: Target,
  workload: Workload,
): Promise<Recipe> {
  const { imported, coordinates } = trials[0].context.input;
  return makeRecipe({
    matrix: matrixMark(loaded.name, loaded.matrix, await markOf(call.files[0]), call.texts('read')),
    beside: besideMark(imported, coordinates),
    target,
    workload,
    chosen,
    trials: trials.map(({ name, context, result, peakBytes }) =>
      recipeTrial(name, result, [...(context.input.heldLast ?? [])], peakBytes),
    ),
  });
}

/** Writes a recipe as a file. */
export async function writeRecipe(path: string, recipe: Recipe, out: Output): Promise<void> {
  await out.file(path, [new TextEncoder().encode(recipeText(recipe))]);
}

/** The recipe a call names, and the matrix with what the call gives beside it, read as the recipe says. */
export async function loadRecipe(
  call: Call,
): Promise<{ recipe: Recipe; loaded: Loaded; context: TrialContext; mark: FileMark }> {
  const path = call.text('recipe');
  if (path === null) {
    throw new Fault(
      'input',
      'usage',
      `"${call.command.name}" needs --recipe FILE, as "compare --recipe-out FILE" writes it.`,
    );
  }
  const source = await plainSource(await pathFile(path));
  const decoder = new TextDecoder();
  let content = '';
  for await (const chunk of source.open()) content += decoder.decode(chunk, { stream: true });
  const recipe = parseRecipe(content + decoder.decode(), path);
  const reading: Call = {
    ...call,
    texts: (name) => (name === 'read' ? [...recipe.matrix.read, ...call.texts('read')] : call.texts(name)),
  };
  const { loaded, context } = await loadContext(reading);
  return { recipe, loaded, context, mark: await markOf(call.files[0]) };
}
