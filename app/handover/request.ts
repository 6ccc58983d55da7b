import type { Recipe } from '../../engine/handover/recipe.ts';
import type { ReportPicture } from '../../engine/handover/report.ts';
import { originOf } from '../intake/receive.ts';
import { mapPictures } from '../maps/picture.ts';
import type { Settings } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { pageMemory, pool, resultOf } from '../state/vault.ts';
import { factGroups } from '../survey/facts.ts';
import { adviceOn } from '../trials/advice.ts';
import { columns } from '../trials/columns.ts';
import type { Figures } from '../trials/order.ts';
import type { HandoverAsk } from '../workers/handoverOperations.ts';
import type { Reply } from '../workers/protocol.ts';
import { prefixOf } from './names.ts';

/** Share of the page's memory that taking factors out may use. */
const factorShare = 1 / 8;

/** What the files of a trial are made from; null while the trial has no result. */
export function handoverAsk(
  sheet: Sheet,
  trial: Trial,
  figures: Figures,
  { target, workload }: Pick<Settings, 'target' | 'workload'>,
): HandoverAsk | null {
  const result = resultOf(trial.id);
  if (result === null || sheet.facts === null) return null;
  const done = sheet.trials.filter((t) => figures.has(t.id));
  const { sentences, reasons } = adviceOn(sheet.facts, sheet.trials, { target, workload });
  return {
    key: sheet.matrix,
    name: sheet.name,
    trialName: trial.letter,
    result,
    heldLast: Int32Array.from(trial.heldLast),
    forecast: trial.forecast,
    target,
    workload,
    proof: trial.proof.proof,
    table: {
      rows: done.map((t) => ({
        name: t.letter,
        choice: t.choice,
        heldLast: t.heldLast.length,
        figures: figures.get(t.id) ?? {},
      })),
      figures: columns.map((c) => c.name),
    },
    recipe: null,
    advice: done.length < 2 ? [] : [...sentences, ...reasons],
    survey: surveyLines(sheet),
    pictures: [],
    prefix: prefixOf(sheet, trial),
    factorLimit: factorShare * pageMemory(),
    memoryLimit: pageMemory(),
  };
}

function surveyLines({ survey }: Sheet): readonly (readonly [string, string])[] {
  return factGroups.flatMap(({ facts }) =>
    facts.flatMap(([name, head]) => {
      const fact = survey.facts[name];
      return fact === undefined || fact.value === null ? [] : [[head, fact.sentence] as const];
    }),
  );
}

/** The maps on the sheet as pictures of a report; empty while another view lies there. */
export function reportPicturesOfPage(): readonly ReportPicture[] {
  return mapPictures().map(({ title, words, png }) => ({ title, words, content: { dataUrl: png } }));
}

/** The recipe of all finished trials of a sheet, with one of them chosen. The file of the matrix is hashed in a worker. */
export function recipeOf(
  sheet: Sheet,
  chosen: Trial,
  { target, workload }: Pick<Settings, 'target' | 'workload'>,
): Promise<Reply<Recipe>> {
  const origin = originOf(sheet.id);
  const trials = sheet.trials.flatMap(({ id, letter, heldLast, forecast, state }) => {
    const result = state === 'done' ? resultOf(id) : null;
    if (result === null) return [];
    const { choice, ran, counts, effective } = result;
    const peakBytes = forecast?.peak.bytes ?? null;
    return [{ name: letter, result: { choice, ran, counts, effective }, heldLast, peakBytes }];
  });
  const ask = {
    key: sheet.matrix,
    name: sheet.name,
    file: origin?.file ?? null,
    read: origin?.repairs ?? [],
    trials,
    chosen: chosen.letter,
    target,
    workload,
  };
  return pool.run('makeRecipe', ask, { lane: 'long', priority: 6, matrices: [sheet.matrix] }).reply;
}
