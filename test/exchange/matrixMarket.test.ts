/** Matrix Market text against an independent small reader, in chunks of every awkward size. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readMatrix } from '../../engine/exchange/read.ts';
import { defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { checkMatrix } from '../../engine/matrix/check.ts';
import { figures, parseMatrixMarket, referencePath } from '../support/reference.ts';

const read = (text: string | Uint8Array, chunk = 1 << 20) =>
  readMatrix(
    bytesSource('m.mtx', typeof text === 'string' ? new TextEncoder().encode(text) : text, chunk),
    defaultReadOptions,
    () => {},
  );

describe('open matrices', () => {
  for (const name of [
    'bcsstk01',
    'lund_a',
    'pores_1',
    'utm300',
    'arc130',
    'g20',
    'cg20',
    'LFAT5',
    'virginia_queen',
    'lsq',
  ]) {
    it(`${name}: as the independent reader reads it, in chunks of 1 MiB, 4096 and 61 bytes`, async () => {
      const bytes = new Uint8Array(readFileSync(referencePath(`${name}.mtx`)));
      const expected = parseMatrixMarket(readFileSync(referencePath(`${name}.mtx`), 'latin1'));
      for (const chunk of [1 << 20, 4096, 61]) {
        const loaded = await read(bytes, chunk);
        checkMatrix(loaded.matrix);
        expect(loaded.matrix.columnPointer).toEqual(expected.columnPointer);
        expect(loaded.matrix.rowIndex).toEqual(expected.rowIndex);
        expect(loaded.matrix.values).toEqual(expected.values);
        expect(loaded.storedEntries).toBe(figures[name].storedEntries);
        expect(loaded.matrix.rowIndex.length).toBe(figures[name].entries);
      }
    });
  }
});

describe("the report's own example (Boisvert, Pozo & Remington, NISTIR 5935, 1996; from memory)", () => {
  const example = `%%MatrixMarket matrix coordinate real general
% A 5x5 sparse matrix with 8 nonzeros
5 5 8
 1 1 1.0
 2 2 10.5
 4 2 250.5
 3 3 1.5e-2
 1 4 6.0
 4 4 -2.8e2
 4 5 33.32
 5 5 12.0
`;
  it('is read entry by entry, with CR LF and CR line ends too', async () => {
    for (const ends of ['\n', '\r\n', '\r']) {
      for (const chunk of [1 << 20, 1, 7]) {
        const { matrix } = await read(example.replaceAll('\n', ends), chunk);
        expect(Array.from(matrix.columnPointer)).toEqual([0, 1, 3, 4, 6, 8]);
        expect(Array.from(matrix.rowIndex)).toEqual([0, 1, 3, 2, 0, 3, 3, 4]);
        expect(Array.from(matrix.values ?? [])).toEqual([1, 10.5, 250.5, 0.015, 6, -280, 33.32, 12]);
      }
    }
  });
});

describe('refusals name the line', () => {
  const cases: [string, string, string][] = [
    ['0-based', '%%MatrixMarket matrix coordinate real general\n2 2 2\n0 0 1\n1 1 2\n', 'looks 0-based'],
    ['too few', '%%MatrixMarket matrix coordinate real general\n2 2 2\n1 1 1.00000\n', '2 entries declared, 1 found'],
    ['too many', '%%MatrixMarket matrix coordinate real general\n2 2 1\n1 1 1\n2 2 1\n', 'line 4'],
    ['out of range', '%%MatrixMarket matrix coordinate real general\n2 2 2\n1 1 1\n3 1 1\n', 'line 4: field 1'],
    ['comma', '%%MatrixMarket matrix coordinate real general\n2 2 2\n1 1 1,5\n2 2 1\n', 'decimal comma'],
    ['conflict', '%%MatrixMarket matrix coordinate real symmetric\n2 2 2\n2 1 1\n1 2 3\n', 'do not mirror'],
    ['empty', '', 'is empty'],
  ];
  for (const [name, text, message] of cases) {
    it(name, async () => {
      await expect(read(text)).rejects.toThrow(message);
      await expect(read(text, 3)).rejects.toThrow(message);
    });
  }
});
