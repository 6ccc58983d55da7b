/** Written, then read: the same matrix bit for bit. And two passes over a file give what one pass gives. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readMatrixMarket } from '../../engine/exchange/matrixMarket.ts';
import { readDense } from '../../engine/exchange/readDense.ts';
import { defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { writeDense } from '../../engine/exchange/writeDense.ts';
import { writeMatrixMarket } from '../../engine/exchange/writeMatrixMarket.ts';
import { writeRutherfordBoeing } from '../../engine/exchange/writeRutherfordBoeing.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { randomMatrix } from '../support/random.ts';
import { figures, referencePath } from '../support/reference.ts';
import { load } from './readSupport.ts';

function bytesOf(chunks: Iterable<Uint8Array>): Uint8Array {
  return new Uint8Array(Buffer.concat([...chunks]));
}

/** Bit for bit: the arrays as bytes. */
function same(a: SparseMatrix, b: SparseMatrix): void {
  expect([b.rows, b.columns, b.field]).toEqual([a.rows, a.columns, a.field]);
  expect(b.columnPointer).toEqual(a.columnPointer);
  expect(b.rowIndex).toEqual(a.rowIndex);
  const bits = (m: SparseMatrix) =>
    m.values === null ? null : Buffer.from(m.values.buffer, m.values.byteOffset, m.values.byteLength).toString('hex');
  expect(bits(b)).toBe(bits(a));
}

const names = ['bcsstk01', 'lund_a', 'pores_1', 'utm300', 'arc130', 'cg20', 'LFAT5', 'virginia_queen', 'lsq'];

describe('write then read', () => {
  for (const name of names) {
    it(`${name}: Matrix Market and Rutherford–Boeing, full and half`, async () => {
      const { matrix, symmetry } = await load(new Uint8Array(readFileSync(referencePath(`${name}.mtx`))));
      const market = bytesOf(writeMatrixMarket(matrix, { symmetry, storage: 'full', comments: ['tab\tand ü'] }));
      same(matrix, (await load(market, [], 999)).matrix);
      same(matrix, (await load(bytesOf(writeRutherfordBoeing(matrix, { symmetry: 'general', title: name })))).matrix);
      if (symmetry === 'general') return;
      const half = await load(bytesOf(writeMatrixMarket(matrix, { symmetry, storage: 'half' })));
      same(matrix, half.matrix);
      expect(half.storedEntries).toBeLessThan(matrix.rowIndex.length);
      const boeing = await load(bytesOf(writeRutherfordBoeing(matrix, { symmetry, key: 'K' })));
      same(matrix, boeing.matrix);
      expect([boeing.symmetry, boeing.format]).toEqual([symmetry, 'Rutherford–Boeing']);
    });
  }

  it('awkward values: −0, denormals, the largest, NaN, infinities, 2^53', async () => {
    const list = [
      -0,
      5e-324,
      -1.7976931348623157e308,
      Number.NaN,
      Number.NEGATIVE_INFINITY,
      9007199254740992,
      0.1,
      1e23,
    ];
    const matrix: SparseMatrix = {
      rows: 8,
      columns: 1,
      columnPointer: Int32Array.of(0, 8),
      rowIndex: Int32Array.from(list.keys()),
      field: 'real',
      values: Float64Array.from(list),
    };
    same(matrix, (await load(bytesOf(writeMatrixMarket(matrix, { symmetry: 'general', storage: 'full' })))).matrix);
    same(matrix, (await load(bytesOf(writeRutherfordBoeing(matrix, { symmetry: 'general' })))).matrix);
    const dense = { rows: 8, columns: 1, field: 'real' as const, values: Float64Array.from(list) };
    expect(await readDense(bytesSource('d', bytesOf(writeDense(dense, ['x'])), 7))).toEqual(dense);
  });

  it('integer and complex, empty and rectangular (seed 3)', async () => {
    const complex = randomMatrix({ rows: 30, columns: 20, entries: 200, seed: 3, complex: true });
    const integer: SparseMatrix = {
      ...randomMatrix({ rows: 20, columns: 30, entries: 99, seed: 3 }),
      field: 'integer',
    };
    for (let k = 0; k < (integer.values as Float64Array).length; k++)
      (integer.values as Float64Array)[k] = ((k * 7919) % 1000) - 500;
    const empty: SparseMatrix = {
      rows: 3,
      columns: 2,
      columnPointer: new Int32Array(3),
      rowIndex: new Int32Array(0),
      field: 'real',
      values: new Float64Array(0),
    };
    for (const matrix of [complex, integer, empty]) {
      same(matrix, (await load(bytesOf(writeMatrixMarket(matrix, { symmetry: 'general', storage: 'full' })))).matrix);
      same(matrix, (await load(bytesOf(writeRutherfordBoeing(matrix, { symmetry: 'general' })))).matrix);
    }
  });

  it('half storage of a matrix that is not that symmetric is refused', async () => {
    const matrix = randomMatrix({ rows: 9, columns: 9, entries: 30, seed: 1 });
    expect(() => writeMatrixMarket(matrix, { symmetry: 'symmetric', storage: 'half' })).toThrow(
      'not exactly symmetric',
    );
    expect(() => writeRutherfordBoeing(matrix, { symmetry: 'skew-symmetric' })).toThrow('not exactly skew-symmetric');
  });
});

describe('two passes', () => {
  const always = { plain: 0, packed: 0 };
  const never = { plain: Number.POSITIVE_INFINITY, packed: Number.POSITIVE_INFINITY };
  const phases = async (bytes: Uint8Array, thresholds: typeof always, chunk: number) => {
    const seen = new Set<string>();
    const loaded = await readMatrixMarket(
      bytesSource('m', bytes, chunk),
      defaultReadOptions,
      (_b, _t, phase) => void seen.add(phase),
      thresholds,
    );
    return { loaded, seen };
  };
  for (const name of [...names, 'g20']) {
    it(`${name}: as one pass`, async () => {
      const bytes = new Uint8Array(readFileSync(referencePath(`${name}.mtx`)));
      const one = (await phases(bytes, never, 4096)).loaded;
      for (const chunk of [1 << 20, 333]) {
        const { loaded, seen } = await phases(bytes, always, chunk);
        expect(seen.has('placing')).toBe(true);
        same(one.matrix, loaded.matrix);
        expect(loaded.storedEntries).toBe(figures[name].storedEntries);
        expect({ ...loaded, matrix: null }).toEqual({ ...one, matrix: null });
      }
    });
  }
  it('duplicates, unsorted, upper, skew and Hermitian entries, comments, both triangles: the same matrix and notes', async () => {
    const head = (field: string, symmetry: string) => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;
    for (const text of [
      `${head('real', 'general')}3 3 5\n3 1 1\n1 1 2\n% c\n3 1 4\n2 3 1\n3 1 8\n`,
      `${head('real', 'symmetric')}3 3 5\n3 1 1\n1 1 2\n3 1 4\n3 2 1\n1 1 8\n`,
      `${head('complex', 'hermitian')}3 3 3\n1 3 1 2\n1 1 2 0\n2 3 4 5\n`,
      `${head('complex', 'skew-symmetric')}3 3 2\n3 1 1 2\n3 2 4 5\n`,
      `${head('pattern', 'symmetric')}3 3 3\n3 1\n1 3\n2 2\n`,
    ]) {
      const bytes = new TextEncoder().encode(text);
      const one = (await phases(bytes, never, 1 << 20)).loaded;
      const { loaded } = await phases(bytes, always, 10);
      same(one.matrix, loaded.matrix);
      expect({ ...loaded, matrix: null }).toEqual({ ...one, matrix: null });
    }
  });
});
