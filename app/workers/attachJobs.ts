import type { Loaded } from '../../engine/exchange/loaded.ts';
import { readMatrix } from '../../engine/exchange/read.ts';
import { defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { orderFrom, type PermutationFile, readPermutation } from '../../engine/exchange/readPermutation.ts';
import { recognise } from '../../engine/exchange/recognise.ts';
import { type ByteSource, firstBytes } from '../../engine/exchange/source.ts';
import type { Direction } from '../../engine/exchange/writePermutation.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import { TrialContext } from '../../engine/trial/context.ts';
import { factsOf } from '../../engine/trial/facts.ts';
import { defaultChoice } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';
import { blobFile, membersOf, plainSource } from '../unpack/open.ts';
import type { Job } from './jobs.ts';
import type { Attached, CompanionRole } from './operations.ts';
import type { Stock } from './stock.ts';

export const inspect: Job<'inspect'> = async ({ file }) => {
  const raw = blobFile(file.name, file);
  const members = await membersOf(raw);
  if (members !== null && members.length > 1) return { kind: 'zip', what: 'an archive', role: 'archive' };
  const source = await plainSource(raw);
  const { head } = await firstBytes(source, 1 << 14);
  return recognise(head, source.name);
};

export const attach: Job<'attach'> = async ({ key, file, role, direction }, { shelf, progress }) => {
  const stock = shelf.get(key);
  const source = await plainSource(blobFile(file.name, file));
  const answer = await byRole[role](stock, source, direction, () => progress(0, 'reading'));
  if (answer.kind === 'attached') shelf.put(key, { ...stock, ...answer.change });
  return answer;
};

type Attach = (stock: Stock, source: ByteSource, direction: Direction | null, tick: () => void) => Promise<Attached>;

const byRole: Readonly<Record<CompanionRole, Attach>> = {
  permutation: async (stock, source, asked) => {
    const file = await readPermutation(source, stock.loaded.matrix.columns);
    const direction = file.direction ?? asked;
    if (direction === null) return { kind: 'which-direction', factorEntries: bothWays(stock, file) };
    const says = `${source.name}: a permutation of ${file.values.length}, ${file.base}-based, read as ${direction}.`;
    return attached(stock, { imported: orderFrom(file, direction) }, says);
  },
  labels: async (stock, source, _direction, tick) => {
    const { rows } = stock.loaded.matrix;
    const labels = (await textOf(source, tick)).split(/\r\n|\n|\r/);
    if (labels.at(-1) === '') labels.pop();
    if (labels.length !== rows) throw wrongLength(source.name, labels.length, 'lines of labels', rows, 'rows');
    return attached(
      stock,
      { loaded: { ...stock.loaded, labels } },
      `${source.name}: a label for each of ${rows} rows.`,
    );
  },
  'right-hand side': async (stock, source, _direction, tick) => {
    const { rows } = stock.loaded.matrix;
    const { head, whole } = await firstBytes(source, 1 << 14);
    const rightHandSides =
      recognise(head, source.name).kind === 'matrix-market'
        ? await fromMatrix(whole, rows)
        : fromTable(await tableOf(whole, tick), rows, source.name);
    const says = `${source.name}: ${rightHandSides.columns} right-hand side${rightHandSides.columns === 1 ? '' : 's'}.`;
    return attached(stock, { loaded: { ...stock.loaded, rightHandSides } }, says);
  },
  coordinates: async (stock, source, _direction, tick) => {
    const { columns } = stock.loaded.matrix;
    const { width, values } = await tableOf(source, tick);
    const nodes = values.length / width;
    if (width > 3)
      throw new Fault(
        'input',
        'coordinates-width',
        `${source.name}: ${width} numbers a line; coordinates have 1 to 3.`,
      );
    if (nodes === 0 || columns % nodes !== 0) throw wrongLength(source.name, nodes, 'nodes', columns, 'unknowns');
    const unknownsPerNode = columns / nodes;
    const coordinates = { dimensions: width, unknownsPerNode, values: Float64Array.from(values) };
    const says = `${source.name}: coordinates of ${nodes} nodes in ${width} dimensions, ${unknownsPerNode} unknowns each.`;
    return attached(stock, { coordinates }, says);
  },
};

function attached(stock: Stock, change: Partial<Stock>, says: string): Attached {
  const { loaded, coordinates, imported } = { ...stock, ...change };
  const facts = factsOf(loaded.matrix, coordinates !== null, imported !== null);
  return { kind: 'attached', change, facts, says };
}

/** Factor entries of the order read in either direction, so that the user can tell which one is meant. */
function bothWays(stock: Stock, file: PermutationFile): Readonly<Record<Direction, number | null>> {
  const { matrix } = stock.loaded;
  const square = matrix.rows === matrix.columns;
  const entries = (direction: Direction): number | null => {
    if (!square) return null;
    const imported = orderFrom(file, direction);
    const context = new TrialContext({ matrix, coordinates: null, imported, heldLast: null });
    return runTrial(context, defaultChoice('cholesky', 'imported')).counts.factorEntries;
  };
  return { 'new-to-old': entries('new-to-old'), 'old-to-new': entries('old-to-new') };
}

function wrongLength(name: string, found: number, what: string, expected: number, of: string): Fault {
  return new Fault('input', 'wrong-length', `${name} holds ${found} ${what}; the matrix has ${expected} ${of}.`, {
    file: name,
  });
}

async function textOf(source: ByteSource, tick: () => void): Promise<string> {
  const decoder = new TextDecoder();
  let text = '';
  for await (const chunk of source.open()) {
    tick();
    text += decoder.decode(chunk, { stream: true });
  }
  return text + decoder.decode();
}

/** Numbers in lines of equal width; lines of words and comments before the first number are left out. */
async function tableOf(source: ByteSource, tick: () => void): Promise<{ width: number; values: number[] }> {
  const lines = (await textOf(source, tick)).split(/\r\n|\n|\r/);
  const values: number[] = [];
  let width = 0;
  for (let k = 0; k < lines.length; k++) {
    const line = lines[k].trim();
    if (line === '' || /^[%#]/.test(line)) continue;
    const numbers = line.split(/\s*[,;]\s*|\s+/).map(Number);
    const wrong = numbers.findIndex((x) => Number.isNaN(x));
    if (wrong >= 0 && values.length === 0) continue;
    const place = { file: source.name, line: k + 1, field: wrong + 1 };
    if (wrong >= 0)
      throw new Fault(
        'input',
        'not-a-number',
        `${source.name}, line ${k + 1}: field ${wrong + 1} is not a number.`,
        place,
      );
    if (width === 0) width = numbers.length;
    if (numbers.length !== width) {
      const text = `${source.name}, line ${k + 1}: ${numbers.length} numbers where the lines before hold ${width}.`;
      throw new Fault('input', 'ragged-table', text, { file: source.name, line: k + 1 });
    }
    for (const x of numbers) values.push(x);
  }
  return { width, values };
}

type RightHandSides = NonNullable<Loaded['rightHandSides']>;

function fromTable({ width, values }: { width: number; values: number[] }, rows: number, name: string): RightHandSides {
  const length = width === 0 ? 0 : values.length / width;
  if (length !== rows) throw wrongLength(name, length, 'lines', rows, 'rows');
  const out = new Float64Array(values.length);
  for (let i = 0; i < rows; i++) for (let c = 0; c < width; c++) out[c * rows + i] = values[i * width + c];
  return { columns: width, values: out };
}

async function fromMatrix(source: ByteSource, rows: number): Promise<RightHandSides> {
  const { matrix: b } = await readMatrix(source, defaultReadOptions, () => {});
  if (b.rows !== rows) throw wrongLength(source.name, b.rows, 'rows', rows, 'rows');
  const width = b.field === 'complex' ? 2 : 1;
  const values = new Float64Array(rows * b.columns * width);
  for (let c = 0; c < b.columns; c++) {
    for (let p = b.columnPointer[c]; p < b.columnPointer[c + 1]; p++) {
      for (let w = 0; w < width; w++) values[(c * rows + b.rowIndex[p]) * width + w] = b.values?.[p * width + w] ?? 1;
    }
  }
  return { columns: b.columns, values };
}
