/** gzip, zip and tar by content (needs 41, 43). The packers are general-purpose libraries: zlib, fflate, modern-tar. */
import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { zipSync } from 'fflate';
import { packTar } from 'modern-tar';
import { describe, expect, it } from 'vitest';
import { blobFile, membersOf, packingOf, plainSource } from '../../app/unpack/open.ts';
import { readMatrix } from '../../engine/exchange/read.ts';
import { applyRepair, defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import type { Fault } from '../../engine/matrix/fault.ts';
import { referencePath } from '../support/reference.ts';

const file = (name: string) => new Uint8Array(readFileSync(referencePath(name)));
const raw = (name: string, bytes: Uint8Array) => blobFile(name, new Blob([bytes as Uint8Array<ArrayBuffer>]));
const tar = (files: Record<string, Uint8Array>) =>
  packTar(
    Object.entries(files).map(([name, body]) => ({ header: { name, size: body.length, type: 'file' as const }, body })),
  );

async function load(name: string, bytes: Uint8Array, member: string | null = null) {
  return readMatrix(await plainSource(raw(name, bytes), member), defaultReadOptions, () => {});
}

async function faultOf(work: Promise<unknown>): Promise<Fault> {
  try {
    await work;
  } catch (thrown) {
    return thrown as Fault;
  }
  throw new Error('nothing was refused');
}

const plain = file('bcsstk01.mtx');
const expected = (await load('bcsstk01.mtx', plain)).matrix;

describe('needs 41: packed files', () => {
  it('gzip whatever the name, also of several members one after the other', async () => {
    expect((await load('bcsstk01.mtx', gzipSync(plain))).matrix).toEqual(expected);
    const half = plain.length >> 1;
    const two = Buffer.concat([gzipSync(plain.subarray(0, half)), gzipSync(plain.subarray(half))]);
    expect((await load('x.bin', two)).matrix).toEqual(expected);
  });

  it('zip, deflated and stored; tar; tar in gzip; gzip in zip', async () => {
    const packed = [
      zipSync({ 'a/bcsstk01.mtx': plain }),
      zipSync({ 'bcsstk01.mtx': plain }, { level: 0 }),
      await tar({ 'a/bcsstk01.mtx': plain }),
      gzipSync(await tar({ 'bcsstk01.mtx': plain })),
      zipSync({ 'bcsstk01.mtx.gz': gzipSync(plain) }),
    ];
    for (const bytes of packed) {
      const loaded = await load('archive', bytes);
      expect(loaded.matrix).toEqual(expected);
      expect(loaded.name).toBe('bcsstk01.mtx');
    }
  });

  it('several members are listed, each as a choice', async () => {
    const files = { 'k.mtx': plain, 'm/lund_a.mtx': file('lund_a.mtx'), 'b.txt': new TextEncoder().encode('1\n2\n') };
    for (const bytes of [zipSync(files), await tar(files), gzipSync(await tar(files))]) {
      expect((await membersOf(raw('a', bytes)))?.map((m) => m.name)).toEqual(Object.keys(files));
      const fault = await faultOf(load('a', bytes));
      expect(fault.code).toBe('choose-member');
      expect(fault.repairs.map((r) => r.id)).toEqual(['member=k.mtx', 'member=m/lund_a.mtx', 'member=b.txt']);
      const { member } = applyRepair(defaultReadOptions, 'member=m/lund_a.mtx');
      expect((await load('a', bytes, member)).matrix.rows).toBe(147);
      expect((await load('a', bytes, 'k.mtx')).matrix).toEqual(expected);
      expect((await faultOf(load('a', bytes, 'none'))).code).toBe('no-member');
    }
    expect(await membersOf(raw('a', plain))).toBe(null);
  });

  it('progress of packed files is told in packed bytes, so that a share is known', async () => {
    for (const bytes of [gzipSync(plain), zipSync({ 'k.mtx': plain })]) {
      const told: [number, number | null][] = [];
      await readMatrix(await plainSource(raw('a', bytes)), defaultReadOptions, (done, total) =>
        told.push([done, total]),
      );
      expect(told.length).toBeGreaterThan(0);
      for (const [done, total] of told) expect([total, done <= bytes.length]).toEqual([bytes.length, true]);
      expect(told.at(-1)?.[0]).toBe(bytes.length);
    }
  });

  it('damaged and cut archives are refused with a byte or a member', async () => {
    const zip = zipSync({ 'k.mtx': plain });
    const tarred = await tar({ 'k.mtx': plain });
    const gz = gzipSync(plain);
    for (const bytes of [zip.subarray(0, 700), tarred.subarray(0, 2000), gz.subarray(0, 900), zip.subarray(0, 12)]) {
      expect(packingOf(bytes)).not.toBe('none');
      const fault = await faultOf(load('a', bytes));
      expect(fault.name).toBe('Fault');
      expect(fault.message).toMatch(/byte \d+|member /);
    }
    const wrong = gz.slice();
    for (let k = 300; k < 320; k++) wrong[k] ^= 255;
    expect((await faultOf(load('a', wrong))).message).toMatch(/byte \d+|line \d+/);
  });

  it('extreme expansion is stopped: 24 MiB of zeros packed twice into some hundred bytes, 4 MiB free', async () => {
    const zeros = gzipSync(new Uint8Array(3 << 23));
    const twice = gzipSync(zeros, { level: 9 });
    const source = await plainSource(raw('a.gz', twice), null, 2 ** 22);
    let bytes = 0;
    const drain = async () => {
      for await (const chunk of source.open()) bytes += chunk.length;
    };
    expect((await faultOf(drain())).code).toBe('expansion-too-large');
    expect(bytes).toBeLessThan(2 ** 23);
  });
});
