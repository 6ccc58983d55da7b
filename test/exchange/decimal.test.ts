/** Correct rounding, bit for bit against `Number()` (ECMA-262: the nearest double, ties to even). */
import { describe, expect, it } from 'vitest';
import { decimalEnd, doubtful, parseDecimal } from '../../engine/exchange/decimal.ts';
import { Random } from '../../engine/matrix/random.ts';

const encoder = new TextEncoder();

function parse(text: string): number {
  const bytes = encoder.encode(`${text} `);
  const value = parseDecimal(bytes, 0, bytes.length);
  if (decimalEnd !== text.length) throw new Error(`"${text}" ended at ${decimalEnd}`);
  return value;
}

function sameBits(a: number, b: number): boolean {
  return Object.is(a, b);
}

describe('parseDecimal', () => {
  it('a million random numbers: 17 digits from random bits, short ones, fixed ones (seed 7)', () => {
    const random = new Random(7);
    const view = new DataView(new ArrayBuffer(8));
    const wrong: string[] = [];
    const before = doubtful;
    let seventeen = 0;
    for (let k = 0; k < 1_000_000; k++) {
      let text: string;
      if (k % 4 === 0) {
        view.setUint32(0, random.integer() ^ (random.integer() << 8));
        view.setUint32(4, random.integer() * 2);
        const x = view.getFloat64(0);
        if (!Number.isFinite(x)) continue;
        text = x.toExponential(16);
      } else if (k % 4 === 1) text = ((random.next() - 0.5) * 10 ** (random.below(12) - 6)).toExponential(16);
      else if (k % 4 === 2) text = String((random.next() - 0.5) * 10 ** random.below(8));
      else text = (random.next() * 1000).toFixed(random.below(12));
      if (k % 4 < 2) seventeen++;
      if (!sameBits(parse(text), Number(text))) wrong.push(text);
    }
    expect(wrong.slice(0, 5)).toEqual([]);
    // random bits reach exponents near the ends of the range, where Number() is always asked
    expect((doubtful - before) / seventeen).toBeLessThan(0.1);
  });

  it('ordinary 17-digit values: Number() decides less than one in a hundred (seed 3)', () => {
    const random = new Random(3);
    const before = doubtful;
    for (let k = 0; k < 100_000; k++) {
      const text = ((random.next() - 0.5) * 10 ** (random.below(20) - 10)).toExponential(16);
      expect(sameBits(parse(text), Number(text))).toBe(true);
    }
    expect(doubtful - before).toBeLessThan(1000);
  });

  it('hard cases: halfway points and their neighbours, ends of the range, long digits', () => {
    const hard = [
      '9007199254740993',
      '9007199254740992.99999999999',
      '9007199254740993.00000000001',
      '1.7976931348623157e308',
      '1.7976931348623158e308',
      '1.7976931348623159e308',
      '4.9406564584124654e-324',
      '2.4703282292062327e-324',
      '2.4703282292062328e-324',
      '2.2250738585072011e-308',
      '2.2250738585072014e-308',
      '0.1',
      '0.30000000000000004',
      '1e23',
      '8.5e22',
      '9.5367431640625e-7',
      '123456789012345678901234567890',
      '0.000000000000000000000000000000000000000123456789012345678',
      '1e-400',
      '1e400',
      '-0',
      '-0.0e5',
      '00000000000000000000012.5',
      '.5',
      '5.',
      '1E5',
      '179769313486231580793728971405301e276',
    ];
    for (const text of hard) {
      expect(sameBits(parse(text), Number(text)), text).toBe(true);
      expect(sameBits(parse(`-${text}`.replace('--', '')), Number(`-${text}`.replace('--', ''))), `-${text}`).toBe(
        true,
      );
    }
    expect(parse('1.5D+03')).toBe(1500);
    expect(parse('+2d-1')).toBe(0.2);
  });

  it('midpoints between neighbouring doubles, exact and nudged (seed 11)', () => {
    const random = new Random(11);
    for (let k = 0; k < 20_000; k++) {
      const m = BigInt(2 ** 52) + BigInt(random.below(2 ** 51));
      const halfway = 2n * m + 1n;
      const shift = BigInt(random.below(8));
      for (const nudge of [0n, 1n, -1n]) {
        const text = `${(halfway << shift) * 1000n + nudge}e-3`;
        expect(sameBits(parse(text), Number(text)), text).toBe(true);
      }
    }
  });

  it('no number where there is none', () => {
    for (const text of ['', 'x', '+', '-', '.', 'e5', '1e', '1e+', 'nan', '-inf']) {
      const bytes = encoder.encode(text);
      parseDecimal(bytes, 0, bytes.length);
      expect(decimalEnd, text).toBe(-1);
    }
  });
});
