/** Files beside a matrix: right-hand sides (needs 54), labels, coordinates of mesh nodes. */
import { describe, expect, it } from 'vitest';
import { readLabels } from '../../engine/exchange/readLabels.ts';
import { readNodes } from '../../engine/exchange/readNodes.ts';
import { readRightHandSides } from '../../engine/exchange/readRightHandSides.ts';
import { bytesSource } from '../../engine/exchange/source.ts';

const source = (text: string) => bytesSource('x.txt', new TextEncoder().encode(text), 7);
const nothing = (): void => {};

describe('right-hand sides (needs 54)', () => {
  const read = (text: string, rows: number) => readRightHandSides(source(text), rows, nothing);
  it('wrong length: both lengths are stated', async () => {
    await expect(read('1\n2\n', 3)).rejects.toThrow(
      'x.txt, line 1: the right-hand side has 2 rows and 1 columns, the matrix has 3 rows',
    );
  });
  it('all zero, one zero column, not finite: said', async () => {
    expect((await read('0\n0\n', 2)).says).toMatch('all zero, so the solution is zero');
    expect((await read('1 0\n2 0\n', 2)).says).toMatch(/2 right-hand sides.*1 of them all zero/);
    expect((await read('1\nnan\n', 2)).says).toMatch('1 numbers are NaN or infinite');
  });
  it('a line of names before it; one row is taken as a column', async () => {
    expect((await read('load_x;load_y\n1;2\n3;4\n', 2)).values).toEqual(Float64Array.of(1, 3, 2, 4));
    const row = await read('5 6 7\n', 3);
    expect([row.columns, row.values]).toEqual([1, Float64Array.of(5, 6, 7)]);
    expect(row.says).toMatch('given as one row');
  });
  it('too many columns for memory are refused by arithmetic', async () => {
    await expect(
      read('%%MatrixMarket matrix coordinate real general\n100000 100000 1\n1 1 1\n', 100_000),
    ).rejects.toThrow(/line 1: dense columns of 10000000000 numbers would need 80000000000 bytes/);
  });
  it('complex ones', async () => {
    const b = await read('%%MatrixMarket matrix array complex general\n2 1\n1 2\n3 4\n', 2);
    expect([b.complex, b.values]).toEqual([true, Float64Array.of(1, 2, 3, 4)]);
  });
});

describe('labels', () => {
  it('one a line, counted', async () => {
    expect(await readLabels(source('ux 1\nuy 1\n'), 2)).toEqual(['ux 1', 'uy 1']);
    await expect(readLabels(source('a\nb\nc\n'), 2)).rejects.toThrow('line 3: the file holds 3 labels');
  });
});

describe('coordinates of nodes', () => {
  const read = (text: string, unknowns: number) => readNodes(source(text), unknowns, nothing);
  it('one node a line; unknowns of a node follow from the counts', async () => {
    expect(await read('0 0\n1 0.5\n', 6)).toMatchObject({
      dimensions: 2,
      unknownsPerNode: 3,
      values: Float64Array.of(0, 0, 1, 0.5),
    });
  });
  it('node numbers in the first column put the nodes in order; column names are skipped', async () => {
    const nodes = await read('node,x,y\n3,9,8\n1,1,2\n2,5,6\n', 3);
    expect(nodes.values).toEqual(Float64Array.of(1, 2, 5, 6, 9, 8));
    expect(nodes.says).toMatch('the first column was taken as node numbers');
  });
  it('what does not fit is refused with both counts', async () => {
    await expect(read('0 0\n1 0\n', 3)).rejects.toThrow('line 1: 2 nodes do not divide the 3 unknowns');
    await expect(read('1 2 3 4 5\n', 1)).rejects.toThrow('line 1: 5 numbers a node');
    await expect(read('1 2\nnan 3\n', 2)).rejects.toThrow('coordinate 1 of node 2 is NaN');
    await expect(read('1 2\n3\n', 2)).rejects.toThrow('line 2: expected 2 numbers');
  });
});
