/**
 * Mutations of every kind of file the reader takes, seeded. Never a hang, a crash or a message without line, byte offset or member name;
 * what is accepted passes the invariant checker. 200,000 cases in all; FILLCAST_FUZZ sets another number.
 */
import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { zipSync } from 'fflate';
import { packTar } from 'modern-tar';
import { describe, expect, it } from 'vitest';
import { blobFile, plainSource } from '../../app/unpack/open.ts';
import { readMatrix } from '../../engine/exchange/read.ts';
import { readLabels } from '../../engine/exchange/readLabels.ts';
import { readNodes } from '../../engine/exchange/readNodes.ts';
import { applyRepair, defaultReadOptions, type ReadOptions, repairIds } from '../../engine/exchange/readOptions.ts';
import { readPermutation } from '../../engine/exchange/readPermutation.ts';
import { readRightHandSides } from '../../engine/exchange/readRightHandSides.ts';
import { type ByteSource, bytesSource } from '../../engine/exchange/source.ts';
import { checkMatrix, checkPermutation } from '../../engine/matrix/check.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import { Random } from '../../engine/matrix/random.ts';
import { referencePath } from '../support/reference.ts';

const all = Number(process.env.FILLCAST_FUZZ ?? 200_000);
const archives = Math.ceil(all / 40);
const beside = Math.ceil(all / 8);
const cases = Math.max(1, all - archives - beside);
/** A case that takes so long hangs, milliseconds. */
const hanging = 20_000;
const text = (t: string) => new TextEncoder().encode(t);
const head = (field: string, symmetry: string) => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;
const small = (name: string) => new Uint8Array(readFileSync(referencePath(name)));

const title = (key: string) => `${'t'.padEnd(72)}${key}\n`;
/** Harwell–Boeing and Rutherford–Boeing, all of the smallest kind: complex, pattern, skew, with a right-hand side, in other formats. */
const cards: readonly Uint8Array[] = [
  text(
    `${title('k')}             3             1             1             1\nrua                        2             2             2             0\n(3I4)           (2I4)           (2F8.2)\n   1   2   3\n   1   2\n    1.50    2.50\n`,
  ),
  text(
    `${title('c')}             3             1             1             1\ncsa                        2             2             2             0\n(3I3)           (4I3)           (1P,2E12.4)\n  1  2  3\n  1  2\n  1.5000E+00  2.5000E+00\n -1.0000D-01  0.0000E+00\n`,
  ),
  text(
    `${title('p')}             2             1             1             0\npza                        3             3             2             0\n(4I4)           (2I4)\n   1   2   3   3\n   2   3\n`,
  ),
  text(
    `${title('b')}             4             1             1             1             1\nRSA                        2             2             2             0\n(3I4)           (2I4)           (4F8.2)             (4F8.2)\nF                          1             0\n   1   2   3\n   1   2\n    1.50    2.50\n    7.00    8.00\n`,
  ),
];

const fixtures: readonly Uint8Array[] = [
  text(
    `${head('real', 'general')}% c\n5 5 6\n1 1 1.0\n2 2 10.5\n4 2 250.5\n3 3 1.5e-2\n1 4 6.0\n4 5 3.333333333333333e1\n`,
  ),
  text(`${head('real', 'symmetric')}4 4 5\n1 1 4\n2 1 -1\n2 2 4\n4 3 -1\n4 4 1e-300\n`),
  text(`${head('complex', 'hermitian')}3 3 3\n1 1 1 0\n3 1 2 -3\n3 3 4 0\n`),
  text(`${head('integer', 'skew-symmetric')}3 3 2\n2 1 5\n3 2 -7\n`),
  text(`${head('pattern', 'general')}3 4 3\n1 1\n3 4\n2 2\n`),
  text('%%MatrixMarket matrix array real general\n2 3\n1\n2\n3\n4.5\n5\n6\n'),
  text('%%MatrixMarket matrix array complex symmetric\n2 2\n1 0\n2 1\n3 -1\n'),
  text('0 0 1.5\n1 0 -2\n1 1 3\n2 2 9\n'),
  text('10,1,10,1,5.0\n10,1,3,2,-1.0\n3,2,3,2,4.0\n'),
  ...cards,
];
/** real files: larger, so taken less often */
const large: readonly Uint8Array[] = [
  small('bcsstk01.rsa').subarray(0, 6184),
  small('LFAT5.mtx'),
  small('bcsstk01.mtx').subarray(0, 4000),
];
const pick = (random: Random) =>
  random.below(20) === 0 ? large[random.below(large.length)] : fixtures[random.below(fixtures.length)];

const words = [
  '0',
  '-1',
  '1e5',
  'nan',
  '99999999999',
  '1.0',
  '%',
  '\n',
  '\r',
  ' ',
  '\t',
  ',',
  '(1,2)',
  '1D3',
  '1+5',
  '\0',
  'é',
  'RSA',
  '(9I9)',
  '1e999',
  '2147483647',
  '16777217',
];

/** One to four edits: bytes changed, removed, doubled, words put in, lines swapped, the end cut off. */
function mutate(from: Uint8Array, random: Random): Uint8Array {
  let bytes = Buffer.from(from);
  for (let edits = 1 + random.below(4); edits > 0; edits--) {
    const at = random.below(bytes.length + 1);
    const kind = random.below(7);
    const rest = bytes.subarray(at);
    if (kind === 0 && at < bytes.length) bytes[at] = random.below(256);
    else if (kind === 1) bytes = Buffer.concat([bytes.subarray(0, at), bytes.subarray(at + 1 + random.below(8))]);
    else if (kind === 2) bytes = Buffer.concat([bytes.subarray(0, at), rest.subarray(0, random.below(40)), rest]);
    else if (kind === 3)
      bytes = Buffer.concat([bytes.subarray(0, at), Buffer.from(words[random.below(words.length)]), rest]);
    else if (kind === 4) bytes = Buffer.from(bytes.subarray(0, at));
    else if (kind === 5 && at < bytes.length) bytes[at] = 48 + random.below(10);
    else {
      const lines = bytes.toString('latin1').split('\n');
      const a = random.below(lines.length);
      const b = random.below(lines.length);
      [lines[a], lines[b]] = [lines[b], lines[a]];
      bytes = Buffer.from(lines.join('\n'), 'latin1');
    }
  }
  return new Uint8Array(bytes);
}

function optionsFor(random: Random): ReadOptions {
  let options = defaultReadOptions;
  for (let k = random.below(4); k > 0; k--) options = applyRepair(options, repairIds[random.below(repairIds.length)]);
  return options;
}

/** What a failed case leaves: enough to repeat it. */
function complaint(thrown: unknown, k: number, bytes: Uint8Array, options: unknown): string | null {
  if (thrown instanceof Fault && /\bline \d+|\bbyte \d+|\bmember /.test(thrown.message)) return null;
  return `case ${k}: ${String(thrown)}\n${JSON.stringify(options)}\n${JSON.stringify(Buffer.from(bytes).toString('latin1')).slice(0, 1500)}`;
}

const nothing = (): void => {};
/** Files beside a matrix of four unknowns, with what reads and checks them. */
const companions: readonly (readonly [readonly Uint8Array[], (source: ByteSource) => Promise<unknown>])[] = [
  [
    [
      text('3\n1\n2\n4\n'),
      text('% new-to-old, 0-based: x\n2\n0 1\n3\n'),
      text('%%MatrixMarket matrix array integer general\n4 1\n3\n1\n2\n4\n'),
      text('1 3\n2 1\n3 2\n4 4\n'),
    ],
    async (source) => checkPermutation((await readPermutation(source, 4)).values, 4),
  ],
  [
    [
      text('1.5\n-2\n0\n4e-3\n'),
      text('a;b\n1;2\n3;4\n5;6\n7;8\n'),
      text('%%MatrixMarket matrix array complex general\n4 1\n1 0\n2 1\n3 0\n4 0\n'),
    ],
    async (source) => {
      const b = await readRightHandSides(source, 4, nothing);
      if (b.values.length !== 4 * b.columns * (b.complex ? 2 : 1)) throw new Error('wrong length');
    },
  ],
  [
    [text('x y\n0 0\n1 0.5\n'), text('1 0 0\n2 1 0\n4 1 1\n3 0 1\n'), text('0\n1\n2\n3\n')],
    async (source) => {
      const nodes = await readNodes(source, 4, nothing);
      if (nodes.values.some((x) => x - x !== 0)) throw new Error('not finite');
      if ((nodes.values.length / nodes.dimensions) * nodes.unknownsPerNode !== 4) throw new Error('wrong length');
    },
  ],
  [[text('ux 1\nuy 1\nux 2\nuy 2\n')], (source) => readLabels(source, 4)],
];

describe('mutations', () => {
  it(`of matrix files: ${cases} cases (seed 41)`, async () => {
    const random = new Random(41);
    const bad: string[] = [];
    let accepted = 0;
    for (let k = 0; k < cases && bad.length < 3; k++) {
      const bytes = mutate(pick(random), random);
      const options = random.below(2) === 0 ? defaultReadOptions : optionsFor(random);
      const chunk = random.below(3) === 0 ? 1 + random.below(40) : 1 << 16;
      const source = bytesSource('f', bytes, chunk);
      const start = performance.now();
      try {
        checkMatrix(
          (await readMatrix(random.below(5) === 0 ? { ...source, rewindable: false } : source, options, () => {}))
            .matrix,
        );
        accepted++;
      } catch (thrown) {
        const text = complaint(thrown, k, bytes, options);
        if (text !== null) bad.push(text);
      }
      if (performance.now() - start > hanging) bad.push(complaint('took too long', k, bytes, options) ?? '');
    }
    expect(bad).toEqual([]);
    // the mutations are mild enough that both outcomes are common
    expect(accepted).toBeGreaterThan(cases / 50);
    expect(accepted).toBeLessThan(cases * 0.9);
  }, 600_000);

  it(`of archives: ${archives} cases (seed 43)`, async () => {
    const random = new Random(43);
    const body = fixtures[0];
    const packed = [
      new Uint8Array(gzipSync(body)),
      zipSync({ 'a.mtx': body }),
      zipSync({ 'a.mtx': body, 'b.txt': text('1\n') }),
      await packTar([{ header: { name: 'a.mtx', size: body.length, type: 'file' }, body }]),
    ];
    const bad: string[] = [];
    for (let k = 0; k < archives && bad.length < 3; k++) {
      const bytes = mutate(packed[random.below(packed.length)], random);
      try {
        const source = await plainSource(blobFile('f', new Blob([bytes as Uint8Array<ArrayBuffer>])));
        checkMatrix((await readMatrix(source, defaultReadOptions, () => {})).matrix);
      } catch (thrown) {
        const text = complaint(thrown, k, bytes, null);
        if (text !== null) bad.push(text);
      }
    }
    expect(bad).toEqual([]);
  }, 600_000);

  it(`of files beside a matrix: ${beside} cases (seed 47)`, async () => {
    const random = new Random(47);
    const bad: string[] = [];
    for (let k = 0; k < beside && bad.length < 3; k++) {
      const [kind, read] = companions[random.below(companions.length)];
      const bytes = mutate(kind[random.below(kind.length)], random);
      try {
        await read(bytesSource('p', bytes, 1 + random.below(9)));
      } catch (thrown) {
        const text = complaint(thrown, k, bytes, null);
        if (text !== null) bad.push(text);
      }
    }
    expect(bad).toEqual([]);
  }, 600_000);
});
