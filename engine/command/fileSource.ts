import { createReadStream } from 'node:fs';
import { open, stat } from 'node:fs/promises';
import { basename } from 'node:path';
import { pipeline, Readable } from 'node:stream';
import { createGunzip } from 'node:zlib';
import type { RawFile } from '../../app/unpack/open.ts';
import { Fault } from '../matrix/fault.ts';

/** larger steps than usual, some of them ahead: unpacking goes on while a step is read */
const gunzipOptions = { chunkSize: 1 << 18, readableHighWaterMark: 1 << 20 };

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
    gunzipped: (seen) => {
      const packed = createReadStream(path, { highWaterMark: 1 << 18 });
      const plain = createGunzip(gunzipOptions);
      packed.on('data', () => seen(packed.bytesRead));
      return pipeline(packed, plain, () => {}) as unknown as AsyncIterable<Uint8Array<ArrayBuffer>>;
    },
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
