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
import { heldFlags } from '../ordering/heldLast.ts';
import type { NodeCoordinates } from '../problems/examples/example.ts';
import type { Choice, FactorizationName, OrderingName } from '../trial/choice.ts';
import { TrialContext } from '../trial/context.ts';
import { bothDirections, leanerDirection } from '../trial/directions.ts';
import { advisedFactorization, defaultChoice } from '../trial/rules.ts';
import { pathFile } from './fileSource.ts';
import { orderedAs } from './forecastOptions.ts';
import type { Call } from './parse.ts';

/** Reads the matrix a call names (its file number `which`), with its `--read` words. */
export async function loadMatrix(call: Call, which = 0): Promise<Loaded> {
  return loadFile(call, call.files[which]);
}

/** Reads the matrix at a path, with the call's `--read` words. */
export async function loadFile(call: Call, path: string): Promise<Loaded> {
  let options: ReadOptions = defaultReadOptions;
  for (const word of call.texts('read')) options = applyRepair(options, word);
  return readMatrix(await plainSource(await pathFile(path), options.member), options, () => {});
}

/** The matrix with what the call gives beside it: a permutation, coordinates of mesh nodes, unknowns held last. */
export async function loadContext(call: Call): Promise<{ loaded: Loaded; context: TrialContext }> {
  return loadContextOf(call, 0);
}

/** The same for file number `which` of the call. */
export async function loadContextOf(call: Call, which: number): Promise<{ loaded: Loaded; context: TrialContext }> {
  const loaded = await loadMatrix(call, which);
  const imported = await loadPermutation(call, loaded.matrix.columns);
  if (imported?.direction === null) throw undirected(imported, loaded.matrix);
  return { loaded, context: await contextOf(call, loaded, imported?.orders[0] ?? null) };
}

/** The same, and a second context where a permutation can be read either way; the first reads it as new-to-old. */
export async function loadReadings(
  call: Call,
): Promise<{ loaded: Loaded; context: TrialContext; other: TrialContext | null }> {
  const loaded = await loadMatrix(call);
  const imported = await loadPermutation(call, loaded.matrix.columns);
  const [first = null, second = null] = imported?.orders ?? [];
  const context = await contextOf(call, loaded, first);
  const other = second === null ? null : new TrialContext({ ...context.input, imported: second });
  return { loaded, context, other };
}

async function contextOf(call: Call, loaded: Loaded, imported: NewToOld | null): Promise<TrialContext> {
  const heldLast = await loadHeld(call, loaded.matrix.columns);
  const coordinates = await loadNodes(call, loaded.matrix.columns);
  return new TrialContext({ matrix: loaded.matrix, coordinates, imported, heldLast });
}

async function loadNodes(call: Call, unknowns: number): Promise<NodeCoordinates | null> {
  const path = call.text('coordinates');
  if (path === null) return null;
  const nodes = await readNodes(await plainSource(await pathFile(path)), unknowns, () => {});
  const stated = call.number('unknowns-per-node');
  if (stated !== null && stated !== nodes.unknownsPerNode) {
    const count = nodes.values.length / nodes.dimensions;
    const text = `${path}: ${count} nodes with ${stated} unknowns each would be ${count * stated} unknowns; the matrix has ${unknowns}, ${nodes.unknownsPerNode} for each node.`;
    throw new Fault('input', 'unknowns-per-node', text, { file: path });
  }
  return nodes;
}

/** A permutation that was read: one order where its direction is known, both readings where it is not (and they differ). */
interface ReadOrder {
  readonly path: string;
  readonly values: Int32Array;
  readonly direction: Direction | null;
  readonly orders: readonly NewToOld[];
}

async function loadPermutation(call: Call, columns: number): Promise<ReadOrder | null> {
  const path = call.text('permutation');
  if (path === null) return null;
  const base = call.text('permutation-base');
  const vector = call.text('permutation-vector');
  const file = await readPermutation(await plainSource(await pathFile(path)), columns, {
    base: base === null ? 'detect' : base === '0' ? 0 : 1,
    vector: vector === null ? null : vector === '1' ? 1 : 2,
  });
  const direction = (call.text('permutation-direction') as Direction | null) ?? file.direction;
  const both = [orderFrom(file, 'new-to-old'), orderFrom(file, 'old-to-new')];
  // a permutation that is its own inverse reads the same both ways
  const same = both[0].every((i, k) => i === both[1][k]);
  const known = direction ?? (same ? 'new-to-old' : null);
  const orders = known === null ? both : [orderFrom(file, known)];
  return { path, values: file.values, direction: known, orders };
}

/** The refusal of a permutation whose direction is not known, with what each reading would cost. */
function undirected({ path, values }: ReadOrder, matrix: SparseMatrix): Fault {
  const forecast = bothDirections(matrix, values);
  const leaner = leanerDirection(forecast);
  const figure = (d: Direction) => {
    const entries = forecast[d];
    return entries === null ? '' : `; ${entries} factor entries${leaner === d ? ', the fewer' : ''}`;
  };
  return new Fault(
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
  const given = call.text('held-last');
  if (given === null) return null;
  if (/^\d+(-\d+)?(\s*,\s*\d+(-\d+)?)*$/.test(given.trim())) return heldFrom([given], n, '--held-last', false);
  const source = await plainSource(await pathFile(given));
  let text = '';
  const decoder = new TextDecoder('latin1');
  for await (const chunk of source.open()) text += decoder.decode(chunk);
  return heldFrom(text.split(/\r\n|\n|\r/), n, given, true);
}

/** Unknowns from lines of 1-based integers and ranges like 20-31. */
function heldFrom(lines: readonly string[], n: number, name: string, isFile: boolean): Int32Array {
  const out: number[] = [];
  lines.forEach((line, at) => {
    if (/^\s*[%#]/.test(line)) return;
    for (const word of line.split(/[\s,;]+/).filter((w) => w !== '')) {
      const ends = /^(\d+)(?:-(\d+))?$/.exec(word);
      const from = Number(ends?.[1] ?? 0);
      const to = ends?.[2] === undefined ? from : Number(ends[2]);
      if (!(from >= 1 && to >= from && to <= n)) {
        const place = isFile ? { file: name, line: at + 1 } : {};
        const where = isFile ? `${name}, line ${at + 1}` : name;
        const text = `${where}: "${word}" is no unknown; expected integers from 1 to ${n}, or ranges like 20-31.`;
        throw new Fault('input', 'held-last-range', text, place);
      }
      for (let i = from; i <= to; i++) out.push(i - 1);
    }
  });
  if (out.length >= n && n > 0) {
    throw new Fault('input', 'held-last-all', `${name}: all ${n} unknowns are held last; nothing would be eliminated.`);
  }
  heldFlags(n, Int32Array.from(out));
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
  const pairing = call.text('pairing');
  if (pairing !== null) {
    if (factorization !== 'ldlt') {
      throw new Fault('input', 'pairing-ldlt', '--pairing is for LDLᵀ: add --factorization ldlt, or use --matching.');
    }
    if (matching !== null)
      throw new Fault('input', 'usage', '--pairing and --matching say the same for LDLᵀ: give one.');
    changes.matching = pairing === 'structure' ? 'structural' : pairing === 'magnitude' ? 'large-entry' : 'none';
  }
  if (call.flag('blocks')) changes.blocks = true;
  if (call.flag('no-blocks')) changes.blocks = false;
  const seed = call.number('seed');
  if (seed !== null) changes.seed = seed;
  return orderedAs(call, defaultChoice(factorization, ordering, changes));
}

/** The ordering a call names: `--ordering`, "best-of" with a measure, "imported" when only a permutation is given, or `fallback`. */
export function orderingOf(call: Call, fallback: OrderingName): OrderingName {
  const named = call.text('ordering') as OrderingName | null;
  if (named === null && call.text('best-of') !== null) return 'best-of';
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
