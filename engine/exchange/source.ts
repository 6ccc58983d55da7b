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
