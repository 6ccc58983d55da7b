import type { Recipe, RecipeTrial } from '../../engine/handover/recipe.ts';
import { notify } from '../state/notices.ts';
import { ask } from '../state/questions.ts';
import { setSettings } from '../state/settings.ts';
import { type SheetId, sheetById, sheetsStore } from '../state/sheets.ts';
import { choiceKey, type Trial } from '../state/trial.ts';
import { addTrials, chooseTrial, startTrial } from '../state/trials.ts';
import { pool, resultOf } from '../state/vault.ts';
import { looksLikeRecipe, parseRecipe } from '../workers/recipes.ts';

/** Recipes are small; what is larger is no recipe, whatever its first bytes. */
const mostBytes = 1 << 26;

/** Tells recipes from everything else that came in. */
export async function recipesAmong(files: readonly File[]): Promise<{ recipes: File[]; rest: File[] }> {
  const recipes: File[] = [];
  const rest: File[] = [];
  for (const file of files) {
    const head = file.size <= mostBytes ? new Uint8Array(await file.slice(0, 400).arrayBuffer()) : new Uint8Array(0);
    (looksLikeRecipe(head) ? recipes : rest).push(file);
  }
  return { recipes, rest };
}

/**
 * Runs the trials of a recipe on the matrix of a sheet, and says whether every number is the recorded one.
 * @param origin the file the matrix came from; null where it came from none
 */
export async function openRecipe(id: SheetId | null, file: File, origin: File | null): Promise<void> {
  const sheet = id === null ? null : sheetById(id);
  if (id === null || sheet === null) {
    notify(`${file.name} is a recipe. Drop it together with its matrix, or while the matrix is open.`, true);
    return;
  }
  let recipe: Recipe;
  try {
    recipe = parseRecipe(await file.text(), file.name);
  } catch (thrown) {
    notify(thrown instanceof Error ? thrown.message : String(thrown), true);
    return;
  }
  const matched = await pool.run(
    'matchRecipe',
    { key: sheet.matrix, name: sheet.name, recipe, file: origin },
    { lane: 'long', priority: 9, matrices: [sheet.matrix] },
  ).reply;
  if (!matched.ok) {
    if (matched.failure.kind !== 'stopped') notify(matched.failure.message, true);
    return;
  }
  const { sameness, words, missing } = matched.value;
  if (missing.length > 0) {
    notify(`${missing.join(' ')} Drop it on the page, then the recipe again.`, true);
    return;
  }
  if (sameness === 'other') {
    const choices = [{ id: 'run', text: 'Run its trials on this matrix; the numbers will be others' }];
    if ((await ask(`Is ${file.name} for this matrix?`, words, choices)) !== 'run') return;
  }
  await run(id, file.name, recipe, sameness === 'other' ? null : words);
}

async function run(id: SheetId, name: string, recipe: Recipe, words: string | null): Promise<void> {
  setSettings({ target: recipe.target, workload: recipe.workload });
  const plans = recipe.trials.map((t) => ({ choice: t.ran, heldLast: t.heldLast }));
  addTrials(id, plans);
  for (const { ran, heldLast } of recipe.trials) {
    const there = trialOf(id, ran, heldLast);
    if (there?.state === 'stopped' || there?.state === 'failed') startTrial(id, there.id);
  }
  notify(`${name}: ${recipe.trials.length} trials, target and workload as recorded. ${words ?? ''}`);
  const differences: string[] = [];
  for (const recorded of recipe.trials) {
    const trial = await finished(id, recorded);
    if (trial === null) {
      differences.push(`trial ${recorded.name} did not finish`);
      continue;
    }
    if (recorded.name === recipe.chosen) chooseTrial(id, trial.id);
    if (words !== null) differences.push(...(await differencesOf(trial, recorded)));
  }
  if (words === null) return;
  if (differences.length === 0) notify(`${name}: replayed, every number is the recorded one.`);
  else notify(`${name}: not every number is the recorded one: ${differences.slice(0, 4).join('; ')}.`, true);
}

function trialOf(id: SheetId, choice: RecipeTrial['ran'], heldLast: readonly number[]): Trial | undefined {
  const key = choiceKey(choice, heldLast);
  return sheetById(id)?.trials.find((t) => choiceKey(t.choice, t.heldLast) === key);
}

/** The trial of the ledger that a recipe's trial has become, once it is finished and forecast; null if it never is. */
function finished(id: SheetId, { ran, heldLast, figures }: RecipeTrial): Promise<Trial | null> {
  return new Promise((resolve) => {
    const look = (): boolean => {
      const trial = trialOf(id, ran, heldLast);
      const over = trial === undefined || trial.state === 'failed' || trial.state === 'stopped';
      if (over) resolve(null);
      else if (trial.state === 'done' && (trial.forecast !== null || figures.peakBytes === null)) resolve(trial);
      else return false;
      return true;
    };
    if (look()) return;
    const leave = sheetsStore.subscribe(() => {
      if (look()) leave();
    });
  });
}

async function differencesOf(trial: Trial, recorded: RecipeTrial): Promise<readonly string[]> {
  const result = resultOf(trial.id);
  if (result === null) return [`trial ${recorded.name} is gone`];
  const { choice, ran, counts, effective } = result;
  const found = {
    name: trial.letter,
    result: { choice, ran, counts, effective },
    heldLast: trial.heldLast,
    peakBytes: trial.forecast?.peak.bytes ?? null,
  };
  const reply = await pool.run('heldAgainst', { recorded, found }, { lane: 'quick' }).reply;
  return reply.ok ? reply.value : [reply.failure.message];
}
