import { Fault } from '../matrix/fault.ts';
import type { ByteSource } from './source.ts';

/** A run of whole lines. */
export interface LineBlock {
  /** valid until the next block is asked for */
  readonly bytes: Uint8Array;
  /** first byte of the first line */
  readonly start: number;
  /** behind the last byte; the byte before is an LF or CR, except in the last block of a file that does not end with one */
  readonly end: number;
  /** offset of `start` in the file */
  readonly offset: number;
}

/** A line longer than this is no text of ours. */
const longestLine = 1 << 24;

/**
 * Cuts a stream into blocks of whole lines, whatever the seams of its chunks. LF, CR LF and lone CR end a line.
 * A byte-order mark at the start is skipped.
 * @param onBytes told the bytes pulled so far (packed ones of a packed file), before each block; may throw to stop
 */
export async function* lineBlocks(source: ByteSource, onBytes: (bytes: number) => void): AsyncGenerator<LineBlock> {
  let carry = new Uint8Array(0);
  let carried = 0;
  let pulled = 0;
  let offset = 0;
  for await (const chunk of source.open()) {
    pulled += chunk.length;
    onBytes(source.pulled?.() ?? pulled);
    let start = 0;
    const cut = lastLineEnd(chunk, start);
    if (cut <= start) {
      carry = append(carry, carried, chunk.subarray(start));
      carried += chunk.length - start;
      if (carried > longestLine) throw tooLong(source.name, offset);
      continue;
    }
    if (carried > 0) {
      // the line that was cut is finished in the carry, so that the chunk itself need not be copied
      const lineEnd = firstLineEnd(chunk, start);
      carry = append(carry, carried, chunk.subarray(start, lineEnd));
      const size = carried + lineEnd - start;
      carried = 0;
      yield withoutMark({ bytes: carry, start: 0, end: size, offset });
      offset += size;
      start = lineEnd;
    }
    if (cut > start) {
      yield withoutMark({ bytes: chunk, start, end: cut, offset });
      offset += cut - start;
    }
    if (cut < chunk.length) {
      carry = append(carry, 0, chunk.subarray(cut));
      carried = chunk.length - cut;
    }
  }
  if (carried > 0) yield withoutMark({ bytes: carry, start: 0, end: carried, offset });
}

/** The first block of a file without its byte-order mark. */
function withoutMark(block: LineBlock): LineBlock {
  const { bytes, start, end, offset } = block;
  if (offset > 0 || end - start < 3) return block;
  if (bytes[start] !== 0xef || bytes[start + 1] !== 0xbb || bytes[start + 2] !== 0xbf) return block;
  return { bytes, start: start + 3, end, offset: 3 };
}

/** Behind the last line end that is complete: a CR at the very end may be half of a CR LF, so it does not count. */
function lastLineEnd(chunk: Uint8Array, from: number): number {
  for (let p = chunk.length - 1; p >= from; p--) {
    if (chunk[p] === 10) return p + 1;
    if (chunk[p] === 13 && p + 1 < chunk.length) return p + 1;
  }
  return from;
}

function firstLineEnd(chunk: Uint8Array, from: number): number {
  let p = from;
  while (p < chunk.length && chunk[p] !== 10 && chunk[p] !== 13) p++;
  if (p < chunk.length && chunk[p] === 13 && chunk[p + 1] === 10) p++;
  return Math.min(p + 1, chunk.length);
}

function append(carry: Uint8Array<ArrayBuffer>, size: number, more: Uint8Array): Uint8Array<ArrayBuffer> {
  const need = size + more.length;
  let out = carry;
  if (need > carry.length) {
    out = new Uint8Array(Math.max(need, 2 * carry.length, 256));
    out.set(carry.subarray(0, size));
  }
  out.set(more, size);
  return out;
}

function tooLong(file: string, byteOffset: number): Fault {
  return new Fault(
    'input',
    'line-too-long',
    `${file}, byte ${byteOffset}: a line of more than ${longestLine} bytes; expected lines of text. Is this a text file?`,
    { file, byteOffset },
  );
}
