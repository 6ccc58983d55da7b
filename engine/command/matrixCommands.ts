import type { Loaded } from '../exchange/loaded.ts';
import { writeMatrixMarket } from '../exchange/writeMatrixMarket.ts';
import { writeRutherfordBoeing } from '../exchange/writeRutherfordBoeing.ts';
import { combine } from '../matrix/combine.ts';
import { difference, type Positions } from '../matrix/difference.ts';
import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import { mirrorSymmetry } from '../survey/symmetry.ts';
import { loadMatrix, matrixJson } from './load.ts';
import { jsonText, type Output } from './output.ts';
import type { Call } from './parse.ts';

/** `convert FILE --out FILE`: the matrix as read, sorted and summed, in the other format or storage. */
export async function convertCommand(call: Call, out: Output): Promise<number> {
  const loaded = await loadMatrix(call);
  await write(call, out, loaded.matrix, `from ${loaded.name}`, loaded.symmetry);
  for (const note of loaded.notes) out.line(`  ${note.text}`);
  return 0;
}

/** `combine FILE … --coefficients a,b,… --out FILE`: a sum on the union of the patterns. */
export async function combineCommand(call: Call, out: Output): Promise<number> {
  const words = call.list('coefficients') ?? [];
  if (words.length !== call.files.length) {
    const text = `--coefficients: ${words.length} given for ${call.files.length} files; expected one for each, like 1,-0.5,0+2i.`;
    throw new Fault('input', 'coefficient-count', text);
  }
  const coefficients = words.map(complexNumber);
  const loaded: Loaded[] = [];
  for (let k = 0; k < call.files.length; k++) loaded.push(await loadMatrix(call, k));
  const sum = combine(loaded.map(({ matrix }, k) => ({ coefficient: coefficients[k], matrix })));
  await write(call, out, sum, `sum of ${loaded.map(({ name }, k) => `(${words[k]}) ${name}`).join(' + ')}`, null);
  return 0;
}

/** `difference FILE FILE`: 0 also where they differ; what differs is told. */
export async function differenceCommand(call: Call, out: Output): Promise<number> {
  const a = await loadMatrix(call, 0);
  const b = await loadMatrix(call, 1);
  const d = difference(a.matrix, b.matrix);
  const places = ({ count, first }: Positions) => ({ count, first: pairs(first) });
  if (call.flag('json')) {
    const { added, missing, ...rest } = d;
    const said = { ...rest, indexBase: 0, added: places(added), missing: places(missing) };
    out.line(jsonText({ first: matrixJson(a), second: matrixJson(b), difference: said }));
    return 0;
  }
  out.line(
    d.samePattern
      ? `Same pattern: ${d.common} entries. An analysis of ${a.name} holds for ${b.name}.`
      : `Not the same pattern: ${d.common} positions in both, ${d.added.count} new, ${d.missing.count} gone. ${b.name} needs a fresh analysis.`,
  );
  if (!d.sameShape)
    out.line(`Sizes: ${a.matrix.rows} × ${a.matrix.columns} and ${b.matrix.rows} × ${b.matrix.columns}.`);
  for (const [word, list] of [
    ['new', d.added],
    ['gone', d.missing],
  ] as const) {
    if (list.count > 0)
      out.line(
        `First ${word} (row, column): ${pairs(list.first)
          .map(([i, j]) => `(${i + 1}, ${j + 1})`)
          .join(' ')}`,
      );
  }
  const v = d.values;
  if (v !== null) {
    const at = v.at === null ? '' : ` at (${v.at[0] + 1}, ${v.at[1] + 1})`;
    out.line(v.changed === 0 ? 'All values are equal.' : `${v.changed} values differ, by up to ${v.largest}${at}.`);
  }
  return 0;
}

function pairs(flat: Int32Array): [number, number][] {
  return Array.from({ length: flat.length / 2 }, (_, k) => [flat[2 * k], flat[2 * k + 1]]);
}

/** "1.5", "-2i", "0.5-2i" as [real part, imaginary part]. */
function complexNumber(word: string): readonly [number, number] {
  const number = '[+-]?(?:\\d+\\.?\\d*|\\.\\d+)(?:e[+-]?\\d+)?';
  const found = new RegExp(`^(${number})?(?:(${number})i)?$`, 'i').exec(word.replaceAll(' ', ''));
  const alone = new RegExp(`^(${number})i$`, 'i').exec(word.replaceAll(' ', ''));
  if (alone !== null) return [0, Number(alone[1])];
  if (found === null || found[1] === undefined || (found[2] !== undefined && !/^[+-]/.test(found[2]))) {
    throw new Fault(
      'input',
      'bad-number',
      `--coefficients: "${word}" is no number; expected one like 1.5, -2i or 0.5-2i.`,
    );
  }
  return [Number(found[1]), Number(found[2] ?? 0)];
}

/** Half storage uses the symmetry the values really have; `fallback`: the declared one, for a pattern that cannot tell. */
async function write(
  call: Call,
  out: Output,
  matrix: SparseMatrix,
  from: string,
  fallback: Symmetry | null,
): Promise<void> {
  const path = call.text('out');
  if (path === null) throw new Fault('input', 'no-out', `--out FILE is missing; expected a file to write.`);
  const half = call.text('storage') === 'half';
  const symmetry = half ? (mirrorSymmetry(matrix) ?? fallback ?? 'general') : 'general';
  if (half && symmetry === 'general') {
    const text = `${from.replace(/^from /, '')} is not symmetric exactly, so half of it does not tell the rest. Use --storage full, or --read symmetrise where it is symmetric but for rounding.`;
    throw new Fault('input', 'not-that-symmetric', text);
  }
  const boeing = call.text('format') === 'rutherford-boeing';
  const chunks = boeing
    ? writeRutherfordBoeing(matrix, { symmetry, title: from })
    : writeMatrixMarket(matrix, { symmetry, storage: half ? 'half' : 'full', comments: [from] });
  await out.file(path, chunks);
  out.line(
    `${path}: ${matrix.rows} × ${matrix.columns}, ${matrix.rowIndex.length} entries, ${matrix.field}, written as ${symmetry}.`,
  );
}
