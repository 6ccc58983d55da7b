/** The numbered bad and awkward inputs: files of other kinds, and files beside a matrix. */
import { describe, expect, it } from 'vitest';
import { readDense } from '../../engine/exchange/readDense.ts';
import { readPermutation } from '../../engine/exchange/readPermutation.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { difference } from '../../engine/matrix/difference.ts';
import { dense, faultOf, load } from './readSupport.ts';

const head = (field = 'real', symmetry = 'general') => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;
const two = '2 2 2\n1 1 1.5\n2 1 -2\n';

describe('other files', () => {
  it('needs 39: Harwell–Boeing content under any name (all originals: boeing.test.ts); faults name line and field', async () => {
    const card = (a: string) => a.padEnd(72);
    const hb = `${card('t')}\n             3             1             1             1\nrua                        2             2             2             0\n(3I4)           (2I4)           (2F8.2)\n   1   2   3\n   1   2\n    1.50    2.50\n`;
    const loaded = await load(hb);
    expect([loaded.format, dense(loaded.matrix)]).toEqual([
      'Rutherford–Boeing',
      [
        [1.5, 0],
        [0, 2.5],
      ],
    ]);
    expect((await faultOf(hb.replace('   1   2\n', '   1   7\n'))).message).toMatch(
      /line 6: a row index is 7; expected 1 to 2/,
    );
    expect((await faultOf(hb.replace('   1   2   3', '   1   4   3'))).message).toMatch(
      /line 5: the pointer of column 2 is 4/,
    );
    expect((await faultOf(hb.slice(0, -20))).message).toMatch(/line \d+/);
    expect((await faultOf(hb.replace('rua', 'rse'))).message).toMatch(/line 3:.*elemental/);
  });
  it('needs 40: node, dof, node, dof, value', async () => {
    const text = '10,1,10,1,5.0\n10,1,3,2,-1.0\n3,2,3,2,4.0\n';
    const fault = await faultOf(text);
    expect(fault.repairs.map((r) => r.id)).toEqual(['read-as-node-table']);
    const loaded = await load(text, ['read-as-node-table']);
    expect(loaded.labels).toEqual(['node 3 dof 2', 'node 10 dof 1']);
    expect(dense(loaded.matrix)).toEqual([
      [4, 0],
      [-1, 5],
    ]);
  });
  it('needs 42: other formats are named from their first bytes, with a line that writes text', async () => {
    const seen: [string, string][] = [
      ['<!DOCTYPE html><html><body>404</body></html>', 'an HTML page'],
      ['\x89HDF\r\n\x1a\n\0\0', 'an HDF5 container'],
      ['%PDF-1.4', 'a PDF document'],
      ['{"a": 1}', 'a JSON file'],
      ['\0\x01\x02', 'a binary file'],
    ];
    for (const [text, what] of seen) {
      const fault = await faultOf(Uint8Array.from(text, (c) => c.charCodeAt(0)));
      expect(fault.message).toMatch(`byte 0: this looks like ${what}`);
      expect(fault.message).toMatch('mmwrite');
    }
    expect((await faultOf('time;force\nnoon;much\n')).message).toMatch(/line 1/);
  });
  it('needs 43: a file is never one string: chunks of 1 byte give the same matrix (packed files: unpack.test.ts)', async () => {
    expect((await load(head() + two, [], 1)).matrix).toEqual((await load(head() + two)).matrix);
  });
  it('needs 52: permutation files name the first fault (more: permutation.test.ts)', async () => {
    const read = (text: string) => readPermutation(bytesSource('p', new TextEncoder().encode(text)), 3);
    await expect(read('1\n3\n3\n')).rejects.toThrow('line 3');
    expect(await read('1\n3\n2\n')).toMatchObject({ direction: null, base: 1 });
  });
  it('needs 53: a second matrix of another pattern: added and missing positions', async () => {
    const a = (await load(`${head()}2 2 2\n1 1 1\n2 1 1\n`)).matrix;
    const b = (await load(`${head()}2 2 2\n1 1 1\n2 2 1\n`)).matrix;
    const d = difference(a, b);
    expect([d.samePattern, d.added.count, d.missing.count, d.common]).toEqual([false, 1, 1, 1]);
  });
  it('needs 54: right-hand sides as array, coordinate and plain text', async () => {
    const read = (text: string) => readDense(bytesSource('b.txt', new TextEncoder().encode(text), 4));
    expect(await read('1.5\n2\n3\n')).toEqual({
      rows: 3,
      columns: 1,
      field: 'real',
      values: Float64Array.of(1.5, 2, 3),
    });
    expect(await read('1.5 2\n3 4\n')).toEqual({
      rows: 2,
      columns: 2,
      field: 'real',
      values: Float64Array.of(1.5, 3, 2, 4),
    });
    expect((await read('%%MatrixMarket matrix array real general\n2 1\n1\n2\n')).values).toEqual(Float64Array.of(1, 2));
    expect((await read(`${head()}3 1 1\n2 1 7\n`)).values).toEqual(Float64Array.of(0, 7, 0));
    await expect(read('1.5 2\n3\n')).rejects.toThrow('line 2: expected 2 numbers');
  });
});
