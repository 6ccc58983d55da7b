import { openRecipe, recipesAmong } from '../handover/openRecipe.ts';
import { ask } from '../state/questions.ts';
import {
  changeSheet,
  currentSheet,
  freshSheet,
  layOut,
  type SheetId,
  sheetById,
  sheetsStore,
} from '../state/sheets.ts';
import { follow, stopAll } from '../state/tasks.ts';
import { dropStock, newMatrixKey, pool } from '../state/vault.ts';
import { packingOf } from '../unpack/packing.ts';
import { attach, roleOf } from './attach.ts';
import { type Piece, piecesOf } from './pieces.ts';
import { settle } from './settle.ts';

/** Where the matrix of a sheet came from, so that it can be read again in another way. */
export interface Origin {
  readonly file: File;
  /** ways of reading that were chosen, in order */
  readonly repairs: readonly string[];
}

const origins = new Map<SheetId, Origin>();

/** Takes in files that were dropped or chosen together: matrices are laid out, recipes run on them, everything else is put beside. */
export async function receive(dropped: readonly File[]): Promise<void> {
  const { recipes, rest } = await recipesAmong(dropped);
  await takeIn(rest);
  for (const file of recipes) {
    const front = currentSheet(sheetsStore.getState());
    const there = front !== null && (await whenReady(front.id));
    await openRecipe(there ? front.id : null, file, there ? (originOf(front.id)?.file ?? null) : null);
  }
}

async function takeIn(files: readonly File[]): Promise<void> {
  if (files.length === 0) return;
  const host = currentReady();
  if (files.length === 1 && host === null && !(await isPacked(files[0]))) {
    layOutFile(files[0], null);
    return;
  }
  const pieces = await piecesOf(files);
  // a table without a banner beside a matrix may be a matrix, or places of nodes, or loads: the user says
  const hasMatrix = host !== null || pieces.some((p) => p.role === 'matrix' && p.certain);
  const matrices = pieces.filter(({ role, certain }) => role === 'matrix' && (certain || !hasMatrix));
  const companions = pieces.filter((piece) => !matrices.includes(piece));
  const laidOut = matrices.map(({ file, member }) => layOutFile(file, member));
  if (companions.length === 0) return;
  const hosts = laidOut.length > 0 ? laidOut : host === null ? [] : [host];
  if (hosts.length === 0) {
    // nothing to belong to: read as matrices, so that the reader says what they are
    for (const { file, member } of companions) layOutFile(file, member);
    return;
  }
  for (const piece of companions) {
    const id = await hostOf(piece, hosts);
    if (id === null || !(await whenReady(id))) continue;
    const use = await roleOf(piece, sheetById(id)?.name ?? 'the matrix');
    if (use === 'matrix') layOutFile(piece.file, piece.member);
    else if (use !== null) await attach(id, piece, use);
  }
}

/** gzip, zip or tar by the first bytes. */
async function isPacked(file: File): Promise<boolean> {
  return packingOf(new Uint8Array(await file.slice(0, 512).arrayBuffer())) !== 'none';
}

/** Name without folders and endings, in small letters. */
const stem = (name: string) => (name.split('/').at(-1) ?? name).toLowerCase().replace(/\..*$/, '');

/** The matrix a companion belongs to: the only one, the one whose name it carries, or what the user says. */
async function hostOf(piece: Piece, hosts: readonly SheetId[]): Promise<SheetId | null> {
  const there = hosts.flatMap((id) => sheetById(id) ?? []);
  if (there.length < 2) return there[0]?.id ?? null;
  const own = stem(piece.name);
  const named = there.filter((sheet) => own !== stem(sheet.name) && own.startsWith(stem(sheet.name)));
  const alike = named.length > 0 ? named : there.filter((sheet) => own === stem(sheet.name));
  if (alike.length === 1) return alike[0].id;
  const choices = there.map(({ id, name }) => ({ id, text: name }));
  return ask(`Which matrix does ${piece.name} belong to?`, 'Several matrices came with it.', choices);
}

/** The sheet in front if its matrix is there. */
function currentReady(): SheetId | null {
  const sheet = currentSheet(sheetsStore.getState());
  return sheet?.phase === 'ready' ? sheet.id : null;
}

/** Waits until a sheet has its matrix; false if it never gets one. */
function whenReady(id: SheetId): Promise<boolean> {
  return new Promise((resolve) => {
    const look = (): boolean => {
      const phase = sheetById(id)?.phase;
      if (phase === 'reading') return false;
      resolve(phase === 'ready');
      return true;
    };
    if (look()) return;
    const leave = sheetsStore.subscribe(() => {
      if (look()) leave();
    });
  });
}

function layOutFile(file: File, member: string | null): SheetId {
  const key = newMatrixKey();
  layOut(freshSheet(key, member?.split('/').at(-1) ?? file.name, 'opening', file.size));
  startReading(key, { file, repairs: member === null ? [] : [`member=${member}`] });
  return key;
}

/** Reads the file of a sheet again, with one more repair if one is given. */
export function readAgain(id: SheetId, repair?: string): void {
  const origin = origins.get(id);
  if (origin === undefined || sheetById(id) === null) return;
  const { file } = origin;
  stopAll(id);
  dropStock(id);
  changeSheet(id, ({ name }) => ({ ...freshSheet(id, name, 'opening', file.size) }));
  startReading(id, { file, repairs: repair === undefined ? origin.repairs : [...origin.repairs, repair] });
}

/** Whether the sheet came from a file that can be read again. */
export function canReadAgain(id: SheetId): boolean {
  return origins.has(id);
}

/** The file of a sheet and how it was read; null where it came from none. */
export function originOf(id: SheetId): Origin | null {
  return origins.get(id) ?? null;
}

/** Lets go of the file of a sheet. */
export function forgetOrigin(id: SheetId): void {
  origins.delete(id);
}

function startReading(key: SheetId, origin: Origin): void {
  origins.set(key, origin);
  const task = pool.run(
    'read',
    { key, file: origin.file, repairs: origin.repairs },
    {
      lane: 'long',
      priority: 10,
      makes: key,
      hear: ({ fraction, phase, early }) =>
        changeSheet(key, ({ reading }) =>
          reading === null ? {} : { reading: { ...reading, ...early, fraction, phase: phase || reading.phase } },
        ),
    },
  );
  follow(key, 'read', task);
  void task.reply.then((reply) => settle(key, reply));
}
