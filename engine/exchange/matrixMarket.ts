import { Fault } from '../matrix/fault.ts';
import { ColumnCount } from './coordinateCount.ts';
import { DirectPlace } from './directPlace.ts';
import { lineText } from './eachLine.ts';
import { type LineBlock, lineBlocks } from './lineBlocks.ts';
import type { Loaded, ReadProgress } from './loaded.ts';
import { baseOf, MarketBody, symmetryRead } from './marketBody.ts';
import { HeaderReader, type MarketHeader } from './marketHeader.ts';
import type { ReadOptions } from './readOptions.ts';
import type { ByteSource } from './source.ts';

/** Entries from which a file that can be opened again is read twice: counted, then placed in the final arrays. */
export interface Thresholds {
  readonly plain: number;
  /** unpacking twice costs more */
  readonly packed: number;
}
const usual: Thresholds = { plain: 8_000_000, packed: 30_000_000 };

/** Reads Matrix Market text (Boisvert, Pozo & Remington, NISTIR 5935, 1996). @throws Fault of kind "input" or "memory". */
export async function readMatrixMarket(
  source: ByteSource,
  options: ReadOptions,
  progress: ReadProgress,
  thresholds: Thresholds = usual,
): Promise<Loaded> {
  const count = await countFirst(source, options, progress, thresholds);
  const passed = count === null ? 0 : (source.packedSize ?? 0);
  const total = source.packedSize === null ? null : source.packedSize + passed;
  const pass = (bytes: number) => progress(passed + bytes, total, count === null ? 'reading' : 'placing');
  const head = new HeaderReader(source.name);
  let body: MarketBody | null = null;
  let line = 0;
  for await (const block of lineBlocks(source, pass)) {
    let at = block.start;
    while (body === null && at < block.end) {
      const end = lineEnd(block, at);
      const header = head.take(lineText(block.bytes, at, end), ++line);
      at = afterLineEnd(block, end);
      if (header === null) continue;
      const direct = count === null ? null : directOf(count, header, options);
      body = new MarketBody(source, header, options, line, direct);
    }
    if (body !== null && at < block.end) body.take(block.bytes, at, block.end);
  }
  if (body === null) throw noSizeLine(source.name, line);
  progress(total ?? 0, total, 'placing entries');
  return body.finish(count);
}

function directOf(count: ColumnCount, header: MarketHeader, options: ReadOptions): DirectPlace {
  const field = options.field === 'declared' ? header.field : options.field;
  const width = field === 'pattern' ? 0 : field === 'complex' ? 2 : 1;
  return new DirectPlace(count, width, symmetryRead(header, options));
}

/** The first of two passes; null where one pass will do, or where the careful reader has to look at every line. */
async function countFirst(
  source: ByteSource,
  options: ReadOptions,
  progress: ReadProgress,
  thresholds: Thresholds,
): Promise<ColumnCount | null> {
  if (!source.rewindable) return null;
  const least = source.size === null ? thresholds.packed : thresholds.plain;
  if (source.size !== null && source.size < 4 * least) return null;
  const total = source.packedSize === null ? null : 2 * source.packedSize;
  const head = new HeaderReader(source.name);
  let count: ColumnCount | null = null;
  let declared = 0;
  let line = 0;
  const pass = (bytes: number) =>
    count === null ? progress(0, source.packedSize, 'reading') : progress(bytes, total, 'counting');
  for await (const block of lineBlocks(source, pass)) {
    let at = block.start;
    while (count === null && at < block.end) {
      const end = lineEnd(block, at);
      const header = head.take(lineText(block.bytes, at, end), ++line);
      at = afterLineEnd(block, end);
      if (header === null) continue;
      declared = header.entries;
      const impossible = source.size !== null && 4 * declared > source.size;
      const mirrored = symmetryRead(header, options) !== 'general';
      const expanded = mirrored ? 2 * declared : declared;
      if (header.layout !== 'coordinate' || declared < least || impossible || expanded > 2 ** 31 - 1) return null;
      count = new ColumnCount(header.rows, header.columns, baseOf(options), mirrored);
    }
    if (count !== null && at < block.end) count.take(block.bytes, at, block.end);
    if (count?.plain === false) return null;
  }
  if (count === null || count.entries !== declared || (count.above > 0 && count.below > 0)) return null;
  return count;
}

function noSizeLine(file: string, line: number): Fault {
  return new Fault(
    'input',
    line === 0 ? 'empty-file' : 'no-size-line',
    line === 0
      ? `${file}, byte 0: the file is empty; expected a Matrix Market file.`
      : `${file}, line ${line}: the file ends before its size line; expected "rows columns entries".`,
    { file, line },
  );
}

function lineEnd(block: LineBlock, from: number): number {
  let p = from;
  while (p < block.end && block.bytes[p] !== 10 && block.bytes[p] !== 13) p++;
  return p;
}

function afterLineEnd(block: LineBlock, end: number): number {
  const crLf = block.bytes[end] === 13 && end + 1 < block.end && block.bytes[end + 1] === 10;
  return Math.min(block.end, end + (crLf ? 2 : 1));
}
