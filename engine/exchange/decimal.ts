import { bias, high, highLower, highUpper, low } from './powers.ts';

/**
 * Decimal text to the nearest double, from bytes. Short numbers are exact integers times or over exact powers of ten (Clinger
 * 1990). Longer ones are a product of two sums of two doubles with an error bound; `Number()` decides only where the rounding is in doubt.
 */

/**
 * Where the last number ended: the index after it, or −1 if there was none. One result of `parseDecimal` beside its value; safe
 * as a module variable because it is read right after the call, on the same thread.
 */
export let decimalEnd = 0;

/** How often `Number()` had to decide since the module was loaded; for benchmarks and tests. */
export let doubtful = 0;

/** How many numbers fell to zero, and rose to infinity, since the module was loaded; readers take differences. */
export let underflows = 0;
export let overflows = 0;

const exactPower = Float64Array.from({ length: 23 }, (_, e) => 10 ** e);
const intPower = Float64Array.from({ length: 10 }, (_, e) => 10 ** e);
/** relative bound on the error of the product below, with room to spare: a few 2⁻¹⁰⁴ */
const doubt = 2 ** -98;

/**
 * The number that starts at `from` (no leading blanks): sign, digits with at most one point, exponent after e, E, d or D.
 * Sets `decimalEnd`. Words (nan, inf) are not numbers here.
 * @param bytes ASCII
 * @param to end of the text (exclusive)
 */
export function parseDecimal(bytes: Uint8Array, from: number, to: number): number {
  let p = from;
  let c = p < to ? bytes[p] : 0;
  const negative = c === 45;
  if (negative || c === 43) c = ++p < to ? bytes[p] : 0;
  let first = 0;
  let second = 0;
  // significant digits seen; leading zeros are not
  let digits = 0;
  let scale = 0;
  const wholeStart = p;
  let d = c ^ 48;
  while (d <= 9 && p < to) {
    if (digits < 9) {
      first = (first * 10 + d) | 0;
      if (first !== 0) digits++;
    } else {
      if (digits < 18) second = (second * 10 + d) | 0;
      digits++;
    }
    d = ++p < to ? bytes[p] ^ 48 : 99;
  }
  let any = p > wholeStart;
  if (p < to && bytes[p] === 46) {
    const pointAt = p;
    d = ++p < to ? bytes[p] ^ 48 : 99;
    while (d <= 9) {
      if (digits < 9) {
        first = (first * 10 + d) | 0;
        if (first !== 0) digits++;
      } else {
        if (digits < 18) second = (second * 10 + d) | 0;
        digits++;
      }
      d = ++p < to ? bytes[p] ^ 48 : 99;
    }
    scale = pointAt + 1 - p;
    if (scale < 0) any = true;
  }
  if (!any) {
    decimalEnd = -1;
    return 0;
  }
  let exponentLetter = -1;
  if (p < to) {
    const letter = bytes[p] | 32;
    if (letter === 101 || letter === 100) {
      let q = p + 1;
      let sign = q < to ? bytes[q] : 0;
      const down = sign === 45;
      if (down || sign === 43) sign = ++q < to ? bytes[q] : 0;
      let x = sign ^ 48;
      if (x > 9 || q >= to) {
        decimalEnd = -1;
        return 0;
      }
      let exponent = 0;
      while (x <= 9) {
        if (exponent < 100000) exponent = exponent * 10 + x;
        x = ++q < to ? bytes[q] ^ 48 : 99;
      }
      scale += down ? -exponent : exponent;
      exponentLetter = p;
      p = q;
    }
  }
  decimalEnd = p;
  if (digits === 0) return negative ? -0 : 0;
  let value: number;
  if (digits <= 15 && scale >= -22 && scale <= 22) {
    const whole = digits <= 9 ? first : first * intPower[digits - 9] + second;
    value = scale < 0 ? whole / exactPower[-scale] : whole * exactPower[scale];
  } else if (digits <= 18 && scale >= -bias && scale <= bias - 20) {
    value = product(first, second, digits > 9 ? digits - 9 : 0, scale + bias);
    if (Number.isNaN(value)) value = slow(bytes, from, p, exponentLetter, negative);
  } else value = slow(bytes, from, p, exponentLetter, negative);
  return negative ? -value : value;
}

/** (first · 10^shift + second) · 10^(k − bias), correctly rounded, or NaN where the bound leaves it open. */
function product(first: number, second: number, shift: number, k: number): number {
  const power = intPower[shift];
  const upper = (first >> 15) * 32768 * power;
  const rest = (first & 32767) * power + second;
  const s = upper + rest;
  const e = rest - (s - upper);
  const h = high[k];
  const p = s * h;
  if (!(p > 1e-270 && p < 1e290)) return Number.NaN;
  const t = 134217729 * s;
  const su = t - (t - s);
  const sl = s - su;
  const hu = highUpper[k];
  const hl = highLower[k];
  const error = su * hu - p + su * hl + sl * hu + sl * hl + (s * low[k] + e * h);
  const slack = p * doubt;
  const a = p + (error - slack);
  return a === p + (error + slack) ? a : Number.NaN;
}

/** `Number()` on the text, magnitude only; a D exponent is written as E. */
function slow(bytes: Uint8Array, from: number, to: number, exponentLetter: number, negative: boolean): number {
  doubtful++;
  let text = '';
  for (let p = from; p < to; p++) text += p === exponentLetter ? 'e' : String.fromCharCode(bytes[p]);
  const value = Number(text);
  if (value === 0) underflows++;
  else if (value - value !== 0) overflows++;
  return negative ? -value : value;
}
