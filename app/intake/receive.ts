import { changeSheet, freshSheet, layOut, type SheetId, sheetById } from '../state/sheets.ts';
import { follow } from '../state/tasks.ts';
import { newMatrixKey, pool } from '../state/vault.ts';
import { settle } from './settle.ts';

/** Where the matrix of a sheet came from, so that it can be read again in another way. */
interface Origin {
  readonly file: File;
  /** ways of reading that were chosen, in order */
  readonly repairs: readonly string[];
}

const origins = new Map<SheetId, Origin>();

/** Takes in files that were dropped or chosen together. */
export function receive(files: readonly File[]): void {
  for (const file of files) {
    const key = newMatrixKey();
    layOut(freshSheet(key, file.name, 'opening', file.size));
    startReading(key, { file, repairs: [] });
  }
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
