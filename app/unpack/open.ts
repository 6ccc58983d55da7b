import type { ByteSource } from '../../engine/exchange/source.ts';
import { Fault } from '../../engine/matrix/fault.ts';

/** A file as both sides can give it: a name, a size, and its bytes from the start as often as wanted. */
export interface RawFile {
  readonly name: string;
  readonly size: number;
  /** a fresh stream of chunks */
  stream(): ReadableStream<Uint8Array<ArrayBuffer>>;
  /** the first bytes, at most `count` */
  head(count: number): Promise<Uint8Array>;
}

/** An archive may unpack to at most so many times its size, once it passes `harmless` bytes: more is taken for an attack. */
export const mostExpansion = 1100;
const harmless = 1 << 30;

/** A raw file over a Blob. */
export function blobFile(name: string, blob: Blob): RawFile {
  return {
    name,
    size: blob.size,
    stream: () => blob.stream() as ReadableStream<Uint8Array<ArrayBuffer>>,
    head: async (count) => new Uint8Array(await blob.slice(0, count).arrayBuffer()),
  };
}

/** How a file is packed, by its first bytes (RFC 1952; PKWARE APPNOTE; POSIX ustar). */
export function packingOf(head: Uint8Array): 'gzip' | 'zip' | 'tar' | 'none' {
  if (head[0] === 0x1f && head[1] === 0x8b) return 'gzip';
  if (head[0] === 0x50 && head[1] === 0x4b && (head[2] === 3 || head[2] === 5)) return 'zip';
  const ustar = [0x75, 0x73, 0x74, 0x61, 0x72];
  if (head.length >= 262 && ustar.every((byte, k) => head[257 + k] === byte)) return 'tar';
  return 'none';
}

/** Chunks of a stream. */
export async function* chunksOf(stream: ReadableStream<Uint8Array>): AsyncGenerator<Uint8Array> {
  const reader = stream.getReader();
  try {
    for (;;) {
      const { done, value } = await reader.read();
      if (done) return;
      if (value.length > 0) yield value;
    }
  } finally {
    await reader.cancel().catch(() => {});
  }
}

/** The stream of a gzip file, unpacked, with a guard against extreme expansion. */
export async function* gunzipped(name: string, packed: RawFile): AsyncGenerator<Uint8Array> {
  let out = 0;
  try {
    for await (const chunk of chunksOf(packed.stream().pipeThrough(new DecompressionStream('gzip')))) {
      out += chunk.length;
      if (out > harmless && out > mostExpansion * packed.size) throw tooLarge(name);
      yield chunk;
    }
  } catch (error) {
    if (error instanceof Fault) throw error;
    throw new Fault(
      'input',
      'gzip-broken',
      `${name}, byte ${out} after unpacking: the gzip data are damaged or cut off; expected a complete gzip file. Fetch the file again.`,
      { file: name, byteOffset: out },
    );
  }
}

export function tooLarge(name: string): Fault {
  return new Fault(
    'input',
    'expansion-too-large',
    `${name}: it unpacks to more than ${mostExpansion} times its size, which no matrix does; expected an ordinary archive.`,
    { file: name },
  );
}

/** The single content of an unpacked or gzip file. */
export async function plainSource(file: RawFile): Promise<ByteSource> {
  const packed = packingOf(await file.head(512)) === 'gzip';
  const name = packed ? file.name.replace(/\.gz$/i, '') : file.name;
  return {
    name,
    size: packed ? null : file.size,
    packedSize: packed ? null : file.size,
    rewindable: true,
    open: () => (packed ? gunzipped(name, file) : chunksOf(file.stream())),
  };
}
