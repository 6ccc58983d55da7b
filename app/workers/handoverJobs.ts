import { Zip, ZipDeflate } from 'fflate';
import { permutationExample, permutationFormula, writePermutation } from '../../engine/exchange/writePermutation.ts';
import { type HandoverFile, handoverFiles } from '../../engine/handover/files.ts';
import { reportPictures } from '../../engine/handover/picture.ts';
import {
  besideMark,
  differencesOf,
  type FileMark,
  figuresOf,
  matrixMark,
  missingBeside,
  makeRecipe as recipeFrom,
  recipeTrial,
  samenessOf,
  samenessWords,
} from '../../engine/handover/recipe.ts';
import { Sha256 } from '../../engine/handover/sha256.ts';
import { configurationSheet } from '../../engine/handover/sheet.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import { positionOf } from '../../engine/matrix/permutation.ts';
import type { Progress } from '../../engine/matrix/progress.ts';
import type { HandoverAsk } from './handoverOperations.ts';
import type { Job } from './jobs.ts';
import type { Shelf } from './shelf.ts';
import { contextOf } from './trialJobs.ts';

export const permutation: Job<'permutation'> = ({ order, format }) => {
  const chunks = [...writePermutation(order, format)];
  const bytes = new Uint8Array(chunks.reduce((sum, c) => sum + c.length, 0));
  let at = 0;
  for (const chunk of chunks) {
    bytes.set(chunk, at);
    at += chunk.length;
  }
  return bytes;
};

export const convention: Job<'convention'> = ({ order, direction, base }) => {
  const values = direction === 'new-to-old' ? order : positionOf(order);
  return {
    formula: permutationFormula(direction, base),
    example: permutationExample(values, direction, base),
    selfInverse: positionOf(order).every((position, i) => position === order[i]),
  };
};

function filesOf(ask: HandoverAsk, shelf: Shelf, drawing: boolean): readonly HandoverFile[] {
  const { name, result, forecast, target, workload, proof } = ask;
  const context = contextOf(shelf, ask.key, ask.heldLast);
  const sheet = configurationSheet({ name, context, trial: result, forecast, target, workload, proof });
  const pictures = ask.pictures.length > 0 || !drawing ? ask.pictures : reportPictures(context, result);
  return handoverFiles({ ...ask, context, trial: result, sheet, pictures });
}

function fileOf(ask: HandoverAsk & { readonly id: string }, shelf: Shelf): HandoverFile {
  const found = filesOf(ask, shelf, ask.id === 'report').find((f) => f.id === ask.id);
  if (found === undefined) throw new Error(`no file "${ask.id}" in this handover`);
  if (found.refused !== null) throw new Fault('input', 'file-refused', `${found.name}: ${found.refused}`);
  return found;
}

export const handoverList: Job<'handoverList'> = (ask, { shelf }) =>
  filesOf(ask, shelf, false).map(({ chunks: _chunks, ...listed }) => listed);

export const handoverFile: Job<'handoverFile'> = (ask, { shelf, progress }) => {
  const found = fileOf(ask, shelf);
  progress(0, 'writing');
  return new Blob([...found.chunks(progress)] as Uint8Array<ArrayBuffer>[], { type: found.type });
};

export const handoverPreview: Job<'handoverPreview'> = (ask, { shelf, progress }) => {
  const decoder = new TextDecoder();
  let text = '';
  for (const chunk of fileOf(ask, shelf).chunks(progress)) {
    text += decoder.decode(chunk, { stream: true });
    if (text.length > ask.most) return { text: text.slice(0, ask.most), more: true };
  }
  return { text, more: false };
};

export const handoverZip: Job<'handoverZip'> = (ask, { shelf, progress }) => {
  const parts: Uint8Array<ArrayBuffer>[] = [];
  const left: string[] = [];
  const zip = new Zip((error, data) => {
    if (error !== null) throw error;
    parts.push(data as Uint8Array<ArrayBuffer>);
  });
  const files = filesOf(ask, shelf, true);
  for (const [k, file] of files.entries()) {
    progress(k / files.length, `packing ${file.name}`);
    if (file.refused !== null) {
      left.push(`${file.name}: ${file.refused}`);
      continue;
    }
    const made = tryMake(file, left, progress);
    if (made === null) continue;
    const member = new ZipDeflate(`${ask.folder}/${file.name}`, { level: 6 });
    // the same bytes for the same files: no clock inside (the earliest date a zip can hold)
    member.mtime = new Date(1980, 0, 1);
    zip.add(member);
    for (const chunk of made) member.push(chunk);
    member.push(new Uint8Array(0), true);
  }
  zip.end();
  return { zip: new Blob(parts, { type: 'application/zip' }), left };
};

/** The bytes of a file, or null where the run behind it ends badly: the others are packed all the same. */
function tryMake(file: HandoverFile, left: string[], progress: Progress): Iterable<Uint8Array> | null {
  try {
    return file.chunks(progress);
  } catch (thrown) {
    if (!(thrown instanceof Fault)) throw thrown;
    left.push(`${file.name}: ${thrown.message}`);
    return null;
  }
}

/** Name, size and hash of a file of the user. */
async function markOf(file: File, progress: Progress): Promise<FileMark> {
  const hash = new Sha256();
  const reader = file.stream().getReader();
  let done = 0;
  for (let step = await reader.read(); !step.done; step = await reader.read()) {
    hash.update(step.value);
    done += step.value.length;
    progress(file.size === 0 ? 1 : done / file.size, 'hashing the file');
  }
  return { name: file.name, bytes: file.size, sha256: hash.hex() };
}

export const makeRecipe: Job<'makeRecipe'> = async (ask, { shelf, progress }) => {
  const { loaded, coordinates, imported } = shelf.get(ask.key);
  const mark = ask.file === null ? null : await markOf(ask.file, progress);
  return recipeFrom({
    matrix: matrixMark(ask.name, loaded.matrix, mark, ask.read),
    beside: besideMark(imported, coordinates),
    target: ask.target,
    workload: ask.workload,
    chosen: ask.chosen,
    trials: ask.trials.map((t) => recipeTrial(t.name, t.result, t.heldLast, t.peakBytes)),
  });
};

export const matchRecipe: Job<'matchRecipe'> = async ({ key, name, recipe, file }, { shelf, progress }) => {
  const { loaded, coordinates, imported } = shelf.get(key);
  const sameness = samenessOf(recipe, loaded.matrix, file === null ? null : await markOf(file, progress));
  return {
    sameness,
    words: samenessWords(recipe, name, sameness),
    missing: missingBeside(recipe, besideMark(imported, coordinates)),
  };
};

export const heldAgainst: Job<'heldAgainst'> = ({ recorded, found }) => {
  const figures = figuresOf(found.result.counts, found.result.effective, found.peakBytes);
  return differencesOf(recorded.figures, figures).map(
    (d) => `trial ${recorded.name}, ${d.figure}: recorded ${String(d.recorded)}, found ${String(d.found)}`,
  );
};
