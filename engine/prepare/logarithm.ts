/**
 * Natural logarithm and exponential from + − × ÷ only. The built-in ones may differ in the last place between browsers, and a tie
 * that breaks another way gives another matching; these give the same bits everywhere.
 */

const halves = new Float64Array(1);
const words = new Uint32Array(halves.buffer);
/** where the word with the exponent lies in this machine's byte order */
const highWord = new Uint8Array(new Uint16Array([1]).buffer)[0] === 1 ? 1 : 0;
const ln2 = Math.LN2;

/** ln x for finite x > 0, to about 1e-16·max(1, |ln x|). */
export function naturalLogarithm(x: number): number {
  let exponent = 0;
  let m = x;
  // denormals are brought into range first
  if (m < 2.2250738585072014e-308) {
    m *= 18014398509481984;
    exponent = -54;
  }
  halves[0] = m;
  exponent += ((words[highWord] >>> 20) & 0x7ff) - 1022;
  words[highWord] = (words[highWord] & 0x800fffff) | 0x3fe00000;
  m = halves[0];
  // m in [½, 1): to [√½, √2), where the series converges fast
  if (m < Math.SQRT1_2) {
    m *= 2;
    exponent--;
  }
  const s = (m - 1) / (m + 1);
  const s2 = s * s;
  // 2·artanh s = ln m; |s| ≤ 0.172, so eleven terms leave less than 1e-17
  let sum = 0;
  for (let k = 21; k >= 1; k -= 2) sum = sum * s2 + 1 / k;
  return exponent * ln2 + 2 * s * sum;
}

/** eˣ, to about 1e-16 relative times max(1, |x|); 0 or infinite where it leaves the range of a double. */
export function exponential(x: number): number {
  if (x > 710) return Infinity;
  if (x < -746) return 0;
  const k = Math.round(x / ln2);
  const r = x - k * ln2;
  // |r| ≤ 0.347: eighteen terms of the series leave less than 1e-17
  let sum = 1;
  for (let t = 18; t >= 1; t--) sum = 1 + (sum * r) / t;
  // two steps, since one power alone could overflow or underflow
  const half = Math.trunc(k / 2);
  return sum * powerOfTwo(half) * powerOfTwo(k - half);
}

/** 2ᵏ for |k| ≤ 1022, exact. */
export function powerOfTwo(k: number): number {
  words[1 - highWord] = 0;
  words[highWord] = (k + 1023) << 20;
  return halves[0];
}

/** The power of two nearest to x on a logarithmic scale; x finite > 0. Exact, so multiplying by it makes no rounding error. */
export function nearestPowerOfTwo(x: number): number {
  const k = Math.round(naturalLogarithm(x) / ln2);
  return powerOfTwo(Math.max(-1022, Math.min(1022, k)));
}
