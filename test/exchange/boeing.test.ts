/** Harwell–Boeing originals beside their Matrix Market conversions (sources: test/reference/README.md); Fortran fields (ISO/IEC 1539). */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { parseFortranFormat, readFortranField } from '../../engine/exchange/fortranFormat.ts';
import { readMatrix } from '../../engine/exchange/read.ts';
import { defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { checkMatrix } from '../../engine/matrix/check.ts';
import { referencePath } from '../support/reference.ts';

const load = (file: string, chunk = 1 << 20) =>
  readMatrix(bytesSource(file, new Uint8Array(readFileSync(referencePath(file))), chunk), defaultReadOptions, () => {});

describe('the same matrix in both formats', () => {
  for (const file of ['bcsstk01.rsa', 'lund_a.rsa', 'arc130.rua', 'g20.rua', 'utm300.rua', 'cg20.cua', 'lsq.rra']) {
    it(file, async () => {
      const original = await load(file, 4096);
      const converted = await load(file.replace(/\.\w+$/, '.mtx'));
      checkMatrix(original.matrix);
      expect(original.format).toBe('Harwell–Boeing');
      expect(original.matrix.columnPointer).toEqual(converted.matrix.columnPointer);
      expect(original.matrix.rowIndex).toEqual(converted.matrix.rowIndex);
      expect(original.matrix.field).toBe(converted.matrix.field);
      expect(original.symmetry).toBe(converted.symmetry);
      expect(original.matrix.values).toEqual(converted.matrix.values);
    });
  }

  it('right-hand sides in the file: one of 300 in utm300, one of 1850 in lsq', async () => {
    const utm = (await load('utm300.rua')).rightHandSides;
    expect([utm?.columns, utm?.values.length]).toEqual([1, 300]);
    expect(utm?.values.some((v) => v !== 0)).toBe(true);
    const lsq = (await load('lsq.rra')).rightHandSides;
    expect([lsq?.columns, lsq?.values.length]).toEqual([1, 1850]);
  });
});

describe('Fortran formats', () => {
  const field = (format: string, text: string, k = 0) => {
    const bytes = new TextEncoder().encode(text);
    return readFortranField(bytes, 0, bytes.length, parseFortranFormat(format)?.[k] as never);
  };
  it('repeat counts, groups, X and P', () => {
    expect(parseFortranFormat('(1P,5D16.9)')?.length).toBe(5);
    expect(parseFortranFormat('(1P3D24.15)')?.map((f) => f.at)).toEqual([0, 24, 48]);
    expect(parseFortranFormat('(2(1X,I4),I3)')?.map((f) => [f.at, f.width])).toEqual([
      [1, 4],
      [6, 4],
      [10, 3],
    ]);
    for (const wrong of ['', '16I5', '(16Z5)', '(0I5)', '(99999I5)', '((((((I5))))))'])
      expect(parseFortranFormat(wrong)).toBe(null);
  });
  it('fields as the standard reads them: implied point, scale factor, blanks, exponents without letter (needs 19)', () => {
    expect(field('(F8.3)', '   12345')).toBe(12.345);
    expect(field('(2P,F8.3)', '   12345')).toBe(0.12345);
    expect(field('(1P,E12.4)', '  1.5000E+02')).toBe(150);
    expect(field('(E12.4)', '  1.0000+300')).toBe(1e300);
    expect(field('(D10.2)', ' -1.25D-03')).toBe(-0.00125);
    expect(field('(2I4)', '  12 -34', 1)).toBe(-34);
    expect(field('(2I4)', '1234', 1)).toBe(undefined);
    expect(field('(F8.3)', '1.2.3')).toBe(undefined);
  });
});
