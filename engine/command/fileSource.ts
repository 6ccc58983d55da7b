import { createReadStream } from 'node:fs';
import { open, stat } from 'node:fs/promises';
import { basename } from 'node:path';
import { Readable } from 'node:stream';
import type { RawFile } from '../../app/unpack/open.ts';
import { Fault } from '../matrix/fault.ts';

/** A file of this machine by its path. @throws Fault "no-file" where it cannot be read. */
export async function pathFile(path: string): Promise<RawFile> {
  let size: number;
  try {
    const facts = await stat(path);
    if (!facts.isFile()) throw new Error('it is not a file');
    size = facts.size;
    await (await open(path, 'r')).close();
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    throw new Fault('input', 'no-file', `${path} cannot be read: ${why}. Check the path.`, { file: path });
  }
  return {
    name: basename(path),
    size,
    stream: () =>
      Readable.toWeb(createReadStream(path, { highWaterMark: 1 << 20 })) as unknown as ReadableStream<
        Uint8Array<ArrayBuffer>
      >,
    head: async (count) => {
      const handle = await open(path, 'r');
      try {
        const bytes = new Uint8Array(Math.min(count, size));
        const { bytesRead } = await handle.read(bytes, 0, bytes.length, 0);
        return bytes.subarray(0, bytesRead);
      } finally {
        await handle.close();
      }
    },
  };
}
