import { plainSource } from '../../app/unpack/open.ts';
import type { Loaded } from '../exchange/loaded.ts';
import { readMatrix } from '../exchange/read.ts';
import { readNodes } from '../exchange/readNodes.ts';
import { applyRepair, defaultReadOptions, type ReadOptions } from '../exchange/readOptions.ts';
import { orderFrom, readPermutation } from '../exchange/readPermutation.ts';
import type { Direction } from '../exchange/writePermutation.ts';
import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import type { NodeCoordinates } from '../problems/examples/example.ts';
import type { Choice, FactorizationName, OrderingName } from '../trial/choice.ts';
import { TrialContext } from '../trial/context.ts';
import { bothDirections, leanerDirection } from '../trial/directions.ts';
import { advisedFactorization, defaultChoice } from '../trial/rules.ts';
import { pathFile } from './fileSource.ts';
import type { Call } from './parse.ts';

/** Reads the matrix a call names (its file number `which`), with its `--read` words. */
export async function loadMatrix(call: Call, which = 0): Promise<Loaded> {
  let options: ReadOptions = defaultReadOptions;
  for (const word of call.texts('read')) options = applyRepair(options, word);
  return readMatrix(await plainSource(await pathFile(call.files[which]), options.member), options, () => {});
}

/** The matrix with what the call gives beside it: a permutation, coordinates of mesh nodes, unknowns held last. */
export async function loadContext(call: Call): Promise<{ loaded: Loaded; context: TrialContext }> {
  const loaded = await loadMatrix(call);
  const imported = await loadPermutation(call, loaded.matrix);
  const heldLast = await loadHeld(call, loaded.matrix.columns);
  const coordinates = await loadNodes(call, loaded.matrix.columns);
  const context = new TrialContext({ matrix: loaded.matrix, coordinates, imported, heldLast });
  return { loaded, context };
}

async function loadNodes(call: Call, unknowns: number): Promise<NodeCoordinates | null> {
  const path = call.text('coordinates');
  return path === null ? null : readNodes(await plainSource(await pathFile(path)), unknowns, () => {});
}

async function loadPermutation(call: Call, matrix: SparseMatrix): Promise<NewToOld | null> {
  const path = call.text('permutation');
  if (path === null) return null;
  const base = call.text('permutation-base');
  const vector = call.text('permutation-vector');
  const file = await readPermutation(await plainSource(await pathFile(path)), matrix.columns, {
    base: base === null ? 'detect' : base === '0' ? 0 : 1,
    vector: vector === null ? null : vector === '1' ? 1 : 2,
  });
  const direction = (call.text('permutation-direction') as Direction | null) ?? file.direction;
  if (direction !== null) return orderFrom(file, direction);
  const forecast = bothDirections(matrix, file.values);
  const leaner = leanerDirection(forecast);
  const figure = (d: Direction) => {
    const entries = forecast[d];
    return entries === null ? '' : `; ${entries} factor entries${leaner === d ? ', the fewer' : ''}`;
  };
  throw new Fault(
    'input',
    'permutation-direction',
    `${path}, line 1: the file does not say its direction, and every permutation is valid both ways. Say which one is meant.`,
    { file: path, line: 1 },
    [
      {
        id: 'permutation-direction=new-to-old',
        text: `line k holds the unknown at position k${figure('new-to-old')}`,
      },
      {
        id: 'permutation-direction=old-to-new',
        text: `line i holds the position of unknown i${figure('old-to-new')}`,
      },
    ],
  );
}

async function loadHeld(call: Call, n: number): Promise<Int32Array | null> {
  const path = call.text('held-last');
  if (path === null) return null;
  const source = await plainSource(await pathFile(path));
  let text = '';
  const decoder = new TextDecoder('latin1');
  for await (const chunk of source.open()) text += decoder.decode(chunk);
  const lines = text.split(/\r\n|\n|\r/);
  const out: number[] = [];
  lines.forEach((line, at) => {
    if (/^\s*[%#]/.test(line)) return;
    for (const word of line.split(/[\s,]+/).filter((w) => w !== '')) {
      const value = Number(word);
      if (!(Number.isInteger(value) && value >= 1 && value <= n)) {
        throw new Fault(
          'input',
          'held-last-range',
          `${path}, line ${at + 1}: "${word}" is not an unknown; expected integers from 1 to ${n}.`,
          { file: path, line: at + 1 },
        );
      }
      out.push(value - 1);
    }
  });
  return Int32Array.from(out);
}

/** The choice a call describes for one ordering; what it leaves open is the default of the factorization. */
export function choiceOf(call: Call, context: TrialContext, ordering: OrderingName): Choice {
  const named = call.text('factorization') as FactorizationName | null;
  const factorization = named ?? advisedFactorization(context.facts).factorization;
  const changes: { -readonly [K in keyof Choice]?: Choice[K] } = {};
  const pivoting = call.text('pivoting');
  if (pivoting !== null) changes.pivoting = pivoting as Choice['pivoting'];
  const threshold = call.number('threshold');
  if (threshold !== null) changes.threshold = threshold;
  const scaling = call.text('scaling');
  if (scaling !== null) changes.scaling = scaling as Choice['scaling'];
  const matching = call.text('matching');
  if (matching !== null) changes.matching = matching as Choice['matching'];
  if (changes.scaling === 'matching' && matching === null) changes.matching = 'large-entry';
  if (call.flag('blocks')) changes.blocks = true;
  const seed = call.number('seed');
  if (seed !== null) changes.seed = seed;
  return defaultChoice(factorization, ordering, changes);
}

/** The ordering a call names: `--ordering`, or "imported" when only a permutation is given, or `fallback`. */
export function orderingOf(call: Call, fallback: OrderingName): OrderingName {
  const named = call.text('ordering') as OrderingName | null;
  return named ?? (call.text('permutation') === null ? fallback : 'imported');
}

/** The `matrix` object of the JSON outputs. */
export function matrixJson(loaded: Loaded): Record<string, unknown> {
  return {
    name: loaded.name,
    rows: loaded.matrix.rows,
    columns: loaded.matrix.columns,
    storedEntries: loaded.storedEntries,
    entries: loaded.matrix.rowIndex.length,
    field: loaded.matrix.field,
    symmetry: loaded.symmetry,
  };
}

/** One line about the matrix. */
export function matrixLine(loaded: Loaded): string {
  const { rows, columns, rowIndex, field } = loaded.matrix;
  return `${loaded.name}: ${rows} × ${columns}, ${rowIndex.length} entries (${loaded.storedEntries} stored), ${field}, ${loaded.symmetry}`;
}
