import { describe, expect, it } from 'vitest';
import { asText, bytes, count, plainNumber, seconds, threeDigits } from '../../app/figures/format.ts';

describe('figures are written with three significant digits and a unit', () => {
  it.each([
    [1.234567, '1.23'],
    [12.34567, '12.3'],
    [123.4567, '123'],
    [999.4, '999'],
    [0.0123456, '0.0123'],
    [-5.5555, '-5.56'],
    [0, '0'],
  ])('%d as %s', (x, text) => expect(threeDigits(x)).toBe(text));

  it.each([
    [0, '0'],
    [9999, '9,999'],
    [10_000, '10.0 k'],
    [999_499, '999 k'],
    [999_500, '1.00 M'],
    [31_234_567, '31.2 M'],
    [1.6e10, '16.0 G'],
  ])('a count of %d as %s', (x, text) => expect(asText(count(x))).toBe(text));

  it('keeps the exact integer beside the rounded one', () => expect(count(31_234_567).exact).toBe('31,234,567'));

  it.each([
    [999, '999 B'],
    [1023, '0.999 KiB'],
    [2 ** 30, '1.00 GiB'],
    [0.61 * 2 ** 30, '625 MiB'],
    [16 * 2 ** 30, '16.0 GiB'],
  ])('%d bytes in powers of 1024: %s', (x, text) => expect(asText(bytes(x))).toBe(text));

  it.each([
    [0.0451, '45.1 ms'],
    [1, '1.00 s'],
    [119, '119 s'],
    [180, '3.00 min'],
    [7200, '2.00 h'],
  ])('%d seconds: %s', (x, text) => expect(asText(seconds(x))).toBe(text));

  it('writes small numbers with a power of ten', () => expect(asText(plainNumber(9.87e-17))).toBe('9.87e-17'));
});
