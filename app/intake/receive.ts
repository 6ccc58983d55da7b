import {
  changeSheet,
  currentSheet,
  freshSheet,
  layOut,
  type SheetId,
  sheetById,
  sheetsStore,
} from '../state/sheets.ts';
import { follow } from '../state/tasks.ts';
import { newMatrixKey, pool } from '../state/vault.ts';
import { attach, roleOf } from './attach.ts';
import { settle } from './settle.ts';

/** Where the matrix of a sheet came from, so that it can be read again in another way. */
interface Origin {
  readonly file: File;
  /** ways of reading that were chosen, in order */
  readonly repairs: readonly string[];
}

const origins = new Map<SheetId, Origin>();

/** Takes in files that were dropped or chosen together: matrices are laid out, everything else is put beside its matrix. */
export async function receive(files: readonly File[]): Promise<void> {
  if (files.length === 1 && currentReady() === null) {
    layOutFile(files[0]);
    return;
  }
  const seen = await Promise.all(
    files.map(async (file) => {
      const reply = await pool.run('inspect', { file }, { lane: 'quick' }).reply;
      return { file, role: reply.ok ? reply.value.role : 'unknown' };
    }),
  );
  const matrices = seen.filter(({ role }) => role === 'matrix' || role === 'archive');
  const companions = seen.filter((s) => !matrices.includes(s));
  const laidOut = matrices.map(({ file }) => layOutFile(file));
  const host = laidOut.length === 0 ? currentReady() : laidOut[0];
  if (host === null) {
    // nothing to belong to: read as matrices, so that the reader says what they are
    for (const { file } of companions) layOutFile(file);
    return;
  }
  if (!(await whenReady(host))) return;
  for (const { file, role } of companions) {
    const use = await roleOf(file, role, sheetById(host)?.name ?? 'the matrix');
    if (use !== null) await attach(host, file, use);
  }
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

function layOutFile(file: File): SheetId {
  const key = newMatrixKey();
  layOut(freshSheet(key, file.name, 'opening', file.size));
  startReading(key, { file, repairs: [] });
  return key;
}

/** Reads the file of a sheet again, with one more repair if one is given. */
export function readAgain(id: SheetId, repair?: string): void {
  const origin = origins.get(id);
  if (origin === undefined || sheetById(id) === null) return;
  const { file } = origin;
  changeSheet(id, () => ({ ...freshSheet(id, file.name, 'opening', file.size) }));
  startReading(id, { file, repairs: repair === undefined ? origin.repairs : [...origin.repairs, repair] });
}

/** Whether the sheet came from a file that can be read again. */
export function canReadAgain(id: SheetId): boolean {
  return origins.has(id);
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
