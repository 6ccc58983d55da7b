import { readLabels } from '../../engine/exchange/readLabels.ts';
import { readNodes } from '../../engine/exchange/readNodes.ts';
import { orderFrom, readPermutation } from '../../engine/exchange/readPermutation.ts';
import { readRightHandSides } from '../../engine/exchange/readRightHandSides.ts';
import { recognise } from '../../engine/exchange/recognise.ts';
import { type ByteSource, firstBytes } from '../../engine/exchange/source.ts';
import type { Direction } from '../../engine/exchange/writePermutation.ts';
import type { Progress } from '../../engine/matrix/progress.ts';
import { bothDirections, leanerDirection } from '../../engine/trial/directions.ts';
import { factsOf } from '../../engine/trial/facts.ts';
import { blobFile, membersOf, plainSource, type RawFile } from '../unpack/open.ts';
import type { Job } from './jobs.ts';
import type { Attached, CompanionRole, Inspected } from './operations.ts';
import type { Stock } from './stock.ts';

/** Bytes enough to tell what a file is. */
const enough = 1 << 14;
/** Members looked into, and packed bytes up to which an archive is streamed once for each of them. */
const mostMembers = 24;
const mostStreamed = 2 ** 26;

export const inspect: Job<'inspect'> = async ({ file, member }, { progress }) => {
  const raw = blobFile(file.name, file);
  progress(0, 'looking at the file');
  const members = member === null ? await membersOf(raw) : null;
  if (members === null || members.length < 2) return { ...(await look(raw, member)), members: null };
  const deep = members.length <= mostMembers && file.size <= mostStreamed;
  const told: NonNullable<Inspected['members']>[number][] = [];
  for (const { name, size } of members) {
    progress(told.length / members.length, 'looking into the archive');
    // what cannot be looked at is listed all the same; reading it will say what is wrong
    const seen = deep ? await look(raw, name).catch(() => null) : null;
    told.push({ name, size, kind: seen?.kind ?? null, role: seen?.role ?? 'unknown', what: seen?.what ?? '' });
  }
  return { kind: 'zip', what: 'an archive', role: 'archive', members: told };
};

async function look(raw: RawFile, member: string | null) {
  const source = await plainSource(raw, member);
  const { head } = await firstBytes(source, enough);
  return recognise(head, source.name);
}

export const attach: Job<'attach'> = async ({ key, file, member, role, direction, vector }, { shelf, progress }) => {
  const stock = shelf.get(key);
  const source = await plainSource(blobFile(file.name, file), member);
  const answer = await byRole[role]({ stock, source, direction, vector, progress });
  if (answer.kind === 'attached') shelf.put(key, { ...stock, ...answer.change });
  return answer;
};

interface Beside {
  readonly stock: Stock;
  readonly source: ByteSource;
  readonly direction: Direction | null;
  readonly vector: 1 | 2 | null;
  readonly progress: Progress;
}

const inBytes = (progress: Progress) => (done: number, all: number | null, phase: string) =>
  progress(all === null || all === 0 ? 0 : Math.min(1, done / all), phase);

const byRole: Readonly<Record<CompanionRole, (beside: Beside) => Promise<Attached>>> = {
  permutation: async ({ stock, source, direction: asked, vector, progress }) => {
    const { matrix } = stock.loaded;
    const file = await readPermutation(source, matrix.columns, { base: 'detect', vector });
    const direction = file.direction ?? asked;
    if (direction === null) {
      const factorEntries = bothDirections(matrix, file.values, progress);
      return { kind: 'which-direction', factorEntries, leaner: leanerDirection(factorEntries) };
    }
    const notes = file.notes.length === 0 ? '' : ` ${file.notes.join(' ')}`;
    const says = `${source.name}: a permutation of ${file.values.length}, ${file.base}-based, read as ${direction}.${notes}`;
    return attached(stock, { imported: orderFrom(file, direction) }, says);
  },
  labels: async ({ stock, source }) => {
    const { rows } = stock.loaded.matrix;
    const labels = await readLabels(source, rows);
    const says = `${source.name}: a label for each of ${rows} rows.`;
    return attached(stock, { loaded: { ...stock.loaded, labels } }, says);
  },
  'right-hand side': async ({ stock, source, progress }) => {
    const { columns, values, says } = await readRightHandSides(source, stock.loaded.matrix.rows, inBytes(progress));
    return attached(stock, { loaded: { ...stock.loaded, rightHandSides: { columns, values } } }, says);
  },
  coordinates: async ({ stock, source, progress }) => {
    const { dimensions, unknownsPerNode, values, says } = await readNodes(
      source,
      stock.loaded.matrix.columns,
      inBytes(progress),
    );
    return attached(stock, { coordinates: { dimensions, unknownsPerNode, values } }, says);
  },
};

function attached(stock: Stock, change: Partial<Stock>, says: string): Attached {
  const { loaded, coordinates, imported } = { ...stock, ...change };
  const facts = factsOf(loaded.matrix, coordinates !== null, imported !== null);
  return { kind: 'attached', change, facts, says };
}
