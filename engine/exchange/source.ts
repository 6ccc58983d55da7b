/**
 * Where bytes come from. Unpacking (gzip, zip, tar) happens before, with a library, in the app and in the command's entry.
 */
export interface ByteSource {
  /** file name as the user knows it */
  readonly name: string;
  /** unpacked size in bytes where known, else null */
  readonly size: number | null;
  /** bytes that have to be pulled in all, for progress by bytes (packed size for packed files); null if unknown */
  readonly packedSize: number | null;
  /** whether `open` may be called again and yields the same bytes (two passes: count, then place) */
  readonly rewindable: boolean;
  /** bytes out of `packedSize` pulled since `open`, where these are not the bytes handed over */
  pulled?(): number;
  /** a fresh stream of chunks; each chunk is only valid until the next is asked for */
  open(): AsyncIterable<Uint8Array>;
}

/** A source over bytes in memory, cut into chunks of `chunkSize` (tests shrink it to force every seam). */
export function bytesSource(name: string, bytes: Uint8Array, chunkSize = 1 << 20): ByteSource {
  return {
    name,
    size: bytes.length,
    packedSize: bytes.length,
    rewindable: true,
    async *open() {
      for (let at = 0; at < bytes.length; at += chunkSize) yield bytes.subarray(at, at + chunkSize);
    },
  };
}

/**
 * The first bytes of a source, at most `count`, and a source that still yields all of them: the same one where it can be opened again,
 * else one that hands over the chunks already pulled first.
 */
export async function firstBytes(source: ByteSource, count: number): Promise<{ head: Uint8Array; whole: ByteSource }> {
  const stream = source.open()[Symbol.asyncIterator]();
  const pulled: Uint8Array[] = [];
  let size = 0;
  let ended = false;
  while (size < count && !ended) {
    const next = await stream.next();
    if (next.done) ended = true;
    else {
      pulled.push(next.value.slice());
      size += next.value.length;
    }
  }
  const head = new Uint8Array(Math.min(size, count));
  let at = 0;
  for (const chunk of pulled) {
    head.set(chunk.subarray(0, Math.min(chunk.length, count - at)), at);
    at += Math.min(chunk.length, count - at);
  }
  if (source.rewindable) {
    if (!ended) await stream.return?.();
    return { head, whole: source };
  }
  return { head, whole: { ...source, open: () => continued(pulled, stream) } };
}

async function* continued(pulled: Uint8Array[], stream: AsyncIterator<Uint8Array>): AsyncGenerator<Uint8Array> {
  try {
    for (let chunk = pulled.shift(); chunk !== undefined; chunk = pulled.shift()) yield chunk;
    for (let next = await stream.next(); !next.done; next = await stream.next()) yield next.value;
  } finally {
    await stream.return?.();
  }
}
