/**
 * `npm run bench -- exchange COMPILED FILE.mtx [FILE.mtx …]`: reading Matrix Market text against a compiled reader in the same run.
 * COMPILED is a program that reads a file and prints a JSON line {"figure":"read","parseSeconds":…,"totalSeconds":…}; parsing is from memory to
 * triplets, total with compressed columns. Runs alternate; the best of each counts. `parse` is our parsing to triplets, `total` with
 * compressed columns, `two passes` the same for large files, `gzip` unpacking and reading against unpacking alone.
 */
import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { gzipSync } from 'node:zlib';
import { blobFile, plainSource } from '../../../app/unpack/open.ts';
import { readCoordinateLines } from '../../../engine/exchange/coordinateLines.ts';
import { doubtful } from '../../../engine/exchange/decimal.ts';
import { readMatrixMarket } from '../../../engine/exchange/matrixMarket.ts';
import { defaultReadOptions } from '../../../engine/exchange/readOptions.ts';
import { bytesSource } from '../../../engine/exchange/source.ts';
import { TripletStore } from '../../../engine/exchange/triplets.ts';

const rounds = 5;
const never = { plain: Number.POSITIVE_INFINITY, packed: Number.POSITIVE_INFINITY };
const always = { plain: 0, packed: 0 };

async function seconds(work: () => Promise<unknown> | unknown): Promise<number> {
  const start = performance.now();
  await work();
  return (performance.now() - start) / 1e3;
}

/** The first line of the compiled reader; it is ended then, since it goes on with other work. */
function compiledRead(program: string, file: string): Promise<{ parseSeconds: number; totalSeconds: number }> {
  return new Promise((resolve, reject) => {
    const child = spawn('stdbuf', ['-oL', program, file], { stdio: ['ignore', 'pipe', 'inherit'] });
    let text = '';
    let found: string | undefined;
    child.stdout.on('data', (data) => {
      text += String(data);
      found = text.split('\n').find((l) => l.includes('parseSeconds') && l.endsWith('}'));
      if (found !== undefined) child.kill();
    });
    child.once('error', reject);
    child.once('close', () => {
      if (found === undefined) reject(new Error(`${program} printed no figures`));
      else resolve(JSON.parse(found));
    });
  });
}

/** Head of the file: offset behind the size line, its numbers, doubles an entry. */
function headOf(bytes: Uint8Array): { at: number; size: number[]; width: 0 | 1 | 2 } {
  const text = Buffer.from(bytes.subarray(0, 65_536)).toString('latin1');
  const size = /\n[^%\n]*\n/.exec(text);
  if (size === null) throw new Error('no size line in the first 64 KiB');
  const width = /pattern/.test(text.slice(0, 120)) ? 0 : /complex/.test(text.slice(0, 120)) ? 2 : 1;
  return { at: size.index + size[0].length, size: size[0].trim().split(/\s+/).map(Number), width };
}

function parse(bytes: Uint8Array): void {
  const { at, size, width } = headOf(bytes);
  const store = new TripletStore(width, size[2]);
  const strange = (): void => {};
  const target = {
    store,
    rows: size[0],
    columns: size[1],
    base: 1 as const,
    line: 0,
    limit: size[2],
    strictDiagonal: false,
    strange,
  };
  readCoordinateLines(bytes, at, bytes.length, target);
  if (store.count !== size[2]) throw new Error(`${store.count} of ${size[2]} entries`);
}

async function drain(bytes: Uint8Array<ArrayBuffer>): Promise<void> {
  const source = await plainSource(blobFile('f.gz', new Blob([bytes])));
  for await (const chunk of source.open()) if (chunk.length === 0) throw new Error('empty chunk');
}

const [compiled, ...files] = process.argv.slice(2);
if (compiled === undefined || files.length === 0) {
  console.error('usage: npm run bench -- exchange COMPILED FILE.mtx [FILE.mtx …]');
  process.exitCode = 2;
}
for (const file of files) {
  const bytes = new Uint8Array(readFileSync(file));
  const packed = new Uint8Array(gzipSync(bytes, { level: 4 })) as Uint8Array<ArrayBuffer>;
  const best = { theirs: 9e9, theirTotal: 9e9, parse: 9e9, total: 9e9, passes: 9e9, unpack: 9e9, gzip: 9e9 };
  const before = doubtful;
  const nothing = (): void => {};
  for (let round = 0; round < rounds; round++) {
    const theirs = await compiledRead(compiled, file);
    best.theirs = Math.min(best.theirs, theirs.parseSeconds);
    best.theirTotal = Math.min(best.theirTotal, theirs.totalSeconds);
    best.parse = Math.min(best.parse, await seconds(() => parse(bytes)));
    const read = (thresholds: typeof never) =>
      seconds(() => readMatrixMarket(bytesSource('f', bytes), defaultReadOptions, nothing, thresholds));
    best.total = Math.min(best.total, await read(never));
    best.passes = Math.min(best.passes, await read(always));
    if (round >= 2) continue;
    best.unpack = Math.min(best.unpack, await seconds(() => drain(packed)));
    best.gzip = Math.min(
      best.gzip,
      await seconds(async () =>
        readMatrixMarket(await plainSource(blobFile('f.gz', new Blob([packed]))), defaultReadOptions, nothing, never),
      ),
    );
  }
  const rate = (s: number) => `${(bytes.length / 1e6 / s).toFixed(0)} MB/s`;
  console.log(
    `${basename(file)}, ${(bytes.length / 1e6).toFixed(1)} MB: compiled parse ${rate(best.theirs)}, total ${rate(best.theirTotal)}; ` +
      `parse ${rate(best.parse)} (${(best.theirs / best.parse).toFixed(2)} ×), total ${rate(best.total)} (${(best.theirTotal / best.total).toFixed(2)} × total, ` +
      `${(best.theirs / best.total).toFixed(2)} × parse), two passes ${rate(best.passes)}; unpacking alone ${rate(best.unpack)}, gzip ${(best.gzip / best.unpack).toFixed(2)} × that; ` +
      `Number() asked ${doubtful - before} times`,
  );
}
