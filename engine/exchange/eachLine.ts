import { lineBlocks } from './lineBlocks.ts';
import type { ReadProgress } from './loaded.ts';
import type { ByteSource } from './source.ts';

/**
 * Hands over the lines of a source one by one, their line ends left out. For formats whose lines are not the hot loop.
 * @param take gets the line in bytes[from … to) and its number, 1-based; false ends the reading
 * @returns how many lines were handed over
 */
export async function eachLine(
  source: ByteSource,
  progress: ReadProgress,
  take: (bytes: Uint8Array, from: number, to: number, line: number) => boolean,
): Promise<number> {
  let line = 0;
  for await (const block of lineBlocks(source, (bytes) => progress(bytes, source.packedSize, 'reading'))) {
    const { bytes, end } = block;
    let p = block.start;
    while (p < end) {
      let q = p;
      while (q < end && bytes[q] !== 10 && bytes[q] !== 13) q++;
      if (!take(bytes, p, q, ++line)) return line;
      p = q;
      if (p + 1 < end && bytes[p] === 13 && bytes[p + 1] === 10) p++;
      p++;
    }
  }
  return line;
}

/** A line as text, at most 4096 characters of it, one character a byte. */
export function lineText(bytes: Uint8Array, from: number, to: number): string {
  let text = '';
  for (let p = from; p < Math.min(to, from + 4096); p++) text += String.fromCharCode(bytes[p]);
  return text;
}
