/** A file as both sides can give it: a name, a size, and its bytes from the start as often as wanted. */
export interface RawFile {
  readonly name: string;
  /** bytes; null where only unpacking would tell */
  readonly size: number | null;
  /** a fresh stream of chunks */
  stream(): ReadableStream<Uint8Array<ArrayBuffer>>;
  /** the first bytes, at most `count` */
  head(count: number): Promise<Uint8Array>;
  /** its bytes unpacked as gzip by a quicker way than the standard one of the web; `seen` is told how many packed bytes were pulled so far */
  gunzipped?(seen: (packed: number) => void): AsyncIterable<Uint8Array<ArrayBuffer>>;
}

/** A file in an archive. */
export interface Member {
  /** with its folders, as the archive has it */
  readonly name: string;
  /** unpacked bytes where the archive says so */
  readonly size: number | null;
}

/** A raw file over a Blob. */
export function blobFile(name: string, blob: Blob): RawFile {
  return {
    name,
    size: blob.size,
    stream: () => blob.stream() as ReadableStream<Uint8Array<ArrayBuffer>>,
    head: async (count) => new Uint8Array(await blob.slice(0, count).arrayBuffer()),
  };
}

/** Chunks of a stream, the next one asked for while the last is worked on; leaving the loop early cancels it. */
export async function* chunksOf(
  stream: ReadableStream<Uint8Array<ArrayBuffer>>,
): AsyncGenerator<Uint8Array<ArrayBuffer>> {
  const reader = stream.getReader();
  let next = reader.read();
  try {
    for (;;) {
      const { done, value } = await next;
      if (done) return;
      next = reader.read();
      // a failure of the chunk ahead is met when its turn comes, and is nobody's business if the loop is left before
      next.catch(() => {});
      if (value.length > 0) yield value;
    }
  } finally {
    await reader.cancel().catch(() => {});
  }
}

/** The same file; `seen` is told the bytes pulled since the stream was opened. */
export function watched(file: RawFile, seen: (bytes: number) => void): RawFile {
  async function* chunks(): AsyncGenerator<Uint8Array<ArrayBuffer>> {
    let pulled = 0;
    for await (const chunk of chunksOf(file.stream())) {
      pulled += chunk.length;
      seen(pulled);
      yield chunk;
    }
  }
  const quick = file.gunzipped?.bind(file);
  return {
    ...file,
    stream: () => streamOf(chunks()),
    ...(quick === undefined ? {} : { gunzipped: () => quick(seen) }),
  };
}

/** The other way round. */
export function streamOf(chunks: AsyncGenerator<Uint8Array<ArrayBuffer>>): ReadableStream<Uint8Array<ArrayBuffer>> {
  return new ReadableStream({
    async pull(controller) {
      const next = await chunks.next();
      if (next.done) controller.close();
      else controller.enqueue(next.value);
    },
    async cancel() {
      await chunks.return(undefined);
    },
  });
}

/** The first bytes of a stream, at most `count`. */
export async function headOf(stream: ReadableStream<Uint8Array<ArrayBuffer>>, count: number): Promise<Uint8Array> {
  const head = new Uint8Array(count);
  let size = 0;
  for await (const chunk of chunksOf(stream)) {
    const part = chunk.subarray(0, count - size);
    head.set(part, size);
    size += part.length;
    if (size === count) break;
  }
  return head.subarray(0, size);
}
