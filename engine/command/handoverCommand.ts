import { mkdir } from 'node:fs/promises';
import { join } from 'node:path';
import { type HandoverFile, handoverFiles } from '../handover/files.ts';
import { reportPictures } from '../handover/picture.ts';
import { configurationSheet } from '../handover/sheet.ts';
import { tableFigures, tableRow } from '../handover/tableRow.ts';
import { Fault } from '../matrix/fault.ts';
import { noProgress } from '../matrix/progress.ts';
import { adviceFor } from '../trial/advice.ts';
import type { Choice, OrderingName } from '../trial/choice.ts';
import { forecastTrial } from '../trial/forecast.ts';
import { runProof } from '../trial/proof.ts';
import { suitableOrderings, whyNoForecast } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import { targetOf, workloadOf } from './forecastOptions.ts';
import { choiceOf, loadContext, matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output, shortBytes, tableText } from './output.ts';
import { usualPageMemory } from './pageMemory.ts';
import type { Call } from './parse.ts';
import { recipeOfTrials } from './recipeFile.ts';

/** What taking the factors out may use, where a call does not say. */
const usualFactorLimit = 2 ** 30;

/** `handover FILE --ordering NAME --out FOLDER`: every file of a chosen trial, and one line about each. */
export async function handoverCommand(call: Call, out: Output): Promise<number> {
  const folder = call.text('out');
  if (folder === null)
    throw new Fault('input', 'no-out', '--out FOLDER is missing; expected a folder to write the files to.');
  const { loaded, context } = await loadContext(call);
  const target = targetOf(call);
  const workload = workloadOf(call);
  const base = choiceOf(call, context, 'natural');
  const held = context.input.heldLast?.length ?? 0;
  const trials = orderingsFor(call, base, suitableOrderings(context.facts, base.factorization)).map((ordering) => {
    const choice = { ...base, ordering };
    const why = whyNoForecast(context.facts, choice);
    if (why !== null) throw new Fault('input', 'trial-impossible', `${loaded.name}: ${why}`, { file: loaded.name });
    const result = runTrial(context, choice);
    return { name: ordering, context, result, forecast: forecastTrial(context, result, target, usualPageMemory) };
  });
  const advised = trials.map(({ name, result, forecast }) => ({ ...result, name, forecast }));
  const advice = adviceFor(context.facts, base.factorization, advised, target, workload);
  const wanted = chosenName(call) ?? advice.best ?? trials[0].name;
  const chosen = trials.find((t) => t.name === wanted) ?? trials[0];
  const memoryLimit = call.number('memory-limit') ?? usualPageMemory;
  const proof = call.flag('prove') ? runProof(context, chosen.result, { memoryLimit }) : null;
  const named = trials.map((t) => ({ ...t, peakBytes: t.forecast?.peak.bytes ?? null }));
  const files = handoverFiles({
    name: loaded.name,
    trialName: chosen.name,
    context,
    trial: chosen.result,
    sheet: configurationSheet({
      name: loaded.name,
      context,
      trial: chosen.result,
      forecast: chosen.forecast,
      target,
      workload,
      proof,
    }),
    table: {
      rows: trials.map((t) => tableRow(t.name, held, t.result, t.forecast, target, workload)),
      figures: tableFigures,
    },
    recipe: await recipeOfTrials(call, loaded, named, chosen.name, target, workload),
    prefix: '',
    advice: trials.length < 2 ? [] : [advice.sentence, ...advice.reasons],
    survey: [],
    pictures: reportPictures(context, chosen.result),
    factorLimit: call.number('factor-limit') ?? usualFactorLimit,
    memoryLimit,
  });
  await mkdir(folder, { recursive: true });
  const written: { file: HandoverFile; bytes: number | null; refused: string | null }[] = [];
  for (const file of files) {
    const made = file.refused === null ? await tryWrite(out, join(folder, file.name), file) : file.refused;
    written.push(
      typeof made === 'number' ? { file, bytes: made, refused: null } : { file, bytes: null, refused: made },
    );
  }
  if (call.flag('json')) {
    const list = written.map(({ file, bytes, refused }) => ({
      id: file.id,
      file: bytes === null ? null : file.name,
      bytes,
      what: file.what,
      convention: file.convention,
      refused,
    }));
    out.line(
      jsonText({ matrix: matrixJson(loaded), folder, trial: chosen.name, choice: chosen.result.choice, files: list }),
    );
    return 0;
  }
  out.line(matrixLine(loaded));
  out.line(`  Trial handed over: ${chosen.name}, ${chosen.result.choice.factorization}. Folder: ${folder}`);
  out.line('');
  const rows = written.map(({ file, bytes }) => [file.name, bytes === null ? 'refused' : shortBytes(bytes)]);
  const lines = tableText(rows).split('\n');
  written.forEach(({ file, refused }, k) => {
    out.line(`${lines[k]}  ${refused ?? file.what}`);
  });
  return 0;
}

/** The ordering a call asks to hand over; null leaves it to the advice. */
function chosenName(call: Call): OrderingName | null {
  const named = call.text('ordering') as OrderingName | null;
  if (named !== null) return named;
  if (call.text('best-of') !== null) return 'best-of';
  return call.text('permutation') === null ? null : 'imported';
}

/** What is compared: a list that is given, else the ordering asked for beside the numbering as it came, else all that suit. */
function orderingsFor(call: Call, base: Choice, suitable: readonly OrderingName[]): readonly OrderingName[] {
  const chosen = chosenName(call);
  const list = call.list('orderings') as readonly OrderingName[] | null;
  const usual: readonly OrderingName[] = chosen === null ? suitable : [base.ordering];
  return [...new Set([...(list ?? usual), ...(chosen === null ? [] : [chosen])])];
}

/** Bytes written, or why a file cannot be made: a numeric run that ends badly takes no other file with it. */
async function tryWrite(out: Output, path: string, file: HandoverFile): Promise<number | string> {
  try {
    return await write(out, path, file);
  } catch (error) {
    if (error instanceof Fault) return error.message;
    throw error;
  }
}

async function write(out: Output, path: string, file: HandoverFile): Promise<number> {
  let bytes = 0;
  function* counted(): Generator<Uint8Array> {
    for (const chunk of file.chunks(noProgress)) {
      bytes += chunk.length;
      yield chunk;
    }
  }
  await out.file(path, counted());
  return bytes;
}
