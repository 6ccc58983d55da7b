/** Permutation files: out and in again in every convention, with a permutation that is not its own inverse. */
import { describe, expect, it } from 'vitest';
import { orderFrom, readPermutation } from '../../engine/exchange/readPermutation.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { writePermutation } from '../../engine/exchange/writePermutation.ts';
import { asNewToOld } from '../../engine/matrix/permutation.ts';
import { randomOrder } from '../support/random.ts';

function bytesOf(chunks: Iterable<Uint8Array>): Uint8Array {
  const list = [...chunks];
  const out = new Uint8Array(list.reduce((sum, c) => sum + c.length, 0));
  let at = 0;
  for (const c of list) {
    out.set(c, at);
    at += c.length;
  }
  return out;
}

const read = (text: string, n: number) => readPermutation(bytesSource('p.txt', new TextEncoder().encode(text), 5), n);

describe('permutation files', () => {
  for (const direction of ['new-to-old', 'old-to-new'] as const) {
    for (const base of [0, 1] as const) {
      for (const format of ['plain', 'matrix-market-array'] as const) {
        it(`${direction}, ${base}-based, ${format}: comes back as it went`, async () => {
          const order = randomOrder(300, 5);
          const bytes = bytesOf(writePermutation(order, { direction, base, format, title: 'test' }));
          const file = await readPermutation(bytesSource('p.txt', bytes, 17), 300);
          expect(file.direction).toBe(direction);
          expect(file.base).toBe(base);
          expect(orderFrom(file, direction)).toEqual(order);
          const other = direction === 'new-to-old' ? 'old-to-new' : 'new-to-old';
          expect(orderFrom(file, other)).not.toEqual(order);
        });
      }
    }
  }

  it('the worked example in the header is the file (by hand, order 3 1 2)', () => {
    const order = asNewToOld(Int32Array.of(2, 0, 1));
    const text = (direction: 'new-to-old' | 'old-to-new') =>
      new TextDecoder().decode(bytesOf(writePermutation(order, { direction, base: 1, format: 'plain' })));
    expect(text('new-to-old')).toContain('p[1] = 3: position 1 holds unknown 3');
    expect(text('new-to-old')).toMatch(/\n3\n1\n2\n$/);
    expect(text('old-to-new')).toContain('q[1] = 2: unknown 1 goes to position 2');
    expect(text('old-to-new')).toMatch(/\n2\n3\n1\n$/);
  });

  it('names the first fault with its line (needs 52)', async () => {
    await expect(read('1\n2\n2\n', 3)).rejects.toThrow(
      'line 3: the value 2 appears a second time (first in line 2); 3 is missing',
    );
    await expect(read('1\n2\n4\n', 3)).rejects.toThrow('line 3: the value 4 is outside 1 … 3');
    await expect(read('1\n2\n', 3)).rejects.toThrow('ends after 2 numbers');
    await expect(read('1\n2\n3\n1\n', 3)).rejects.toThrow('line 4: more than 3');
    await expect(read('1\nx\n3\n', 3)).rejects.toThrow('line 2: "x" is not an integer');
  });

  it('without a header the direction is open and the base detected', async () => {
    expect(await read('2 0 1', 3)).toMatchObject({ direction: null, base: 0 });
    expect(await read('# mine\n3,1,2', 3)).toMatchObject({ direction: null, base: 1 });
  });

  it('two vectors in one file: one that counts the lines is left out, else the user says which (needs 52)', async () => {
    expect(await read('1 2\n2 3\n3 1\n', 3)).toMatchObject({
      values: Int32Array.of(1, 2, 0),
      notes: ['The first column only counts the lines and was left out.'],
    });
    const choose = (text: string, vector: 1 | 2) =>
      readPermutation(bytesSource('p.txt', new TextEncoder().encode(text)), 3, { base: 'detect', vector });
    for (const text of [
      '2 3\n3 1\n1 2\n',
      '2\n3\n1\n3\n1\n2\n',
      '%%MatrixMarket matrix array integer general\n3 2\n2\n3\n1\n3\n1\n2\n',
    ]) {
      const refused = await read(text, 3).catch((fault) => fault);
      expect(refused.message).toMatch(/line \d+: the file holds 6 numbers, two vectors of 3/);
      expect(refused.repairs.map((r: { id: string }) => r.id)).toEqual([
        'permutation-vector=1',
        'permutation-vector=2',
      ]);
      expect((await choose(text, 1)).values).toEqual(Int32Array.of(1, 2, 0));
      expect((await choose(text, 2)).values).toEqual(Int32Array.of(2, 0, 1));
    }
    await expect(read('1\n2\n3\n1\n2\n3\n1\n', 3)).rejects.toThrow('line 7: more than 3');
  });
});
