/**
 * Powers of ten as unevaluated sums of two doubles, 10^e = high[e + bias] + low[e + bias] with a relative error below 2⁻¹⁰⁵,
 * and the high parts split in two halves of 26 bits for exact products (Veltkamp 1968; Dekker 1971). Made once from integers of any size.
 */

/** e runs from −bias to bias */
export const bias = 300;

export const high = new Float64Array(2 * bias + 1);
export const low = new Float64Array(2 * bias + 1);
export const highUpper = new Float64Array(2 * bias + 1);
export const highLower = new Float64Array(2 * bias + 1);

const splitter = 134217729;

/** The double nearest to p / q for positive integers (ties do not occur for the numbers used here, see the caller). */
function nearest(p: bigint, q: bigint): number {
  const bits = (x: bigint): number => x.toString(2).length;
  // 64 significant bits of the quotient, then one rounding by Number(); the sticky bit keeps it a correct one
  const shift = 66 - (bits(p) - bits(q));
  const scaled = shift >= 0 ? (p << BigInt(shift)) / q : p / (q << BigInt(-shift));
  const exact = shift >= 0 ? scaled * q === p << BigInt(shift) : scaled * (q << BigInt(-shift)) === p;
  const value = Number(exact ? scaled : scaled | 1n);
  return shift > 1000 ? value * 2 ** -1000 * 2 ** (1000 - shift) : value * 2 ** -shift;
}

/** A double as a fraction of integers, exactly. */
function fraction(x: number): readonly [bigint, bigint] {
  let exponent = 0;
  let m = x;
  while (!Number.isInteger(m)) {
    m *= 2;
    exponent++;
  }
  return [BigInt(m), 1n << BigInt(exponent)];
}

for (let e = -bias; e <= bias; e++) {
  const k = e + bias;
  const p = e >= 0 ? 10n ** BigInt(e) : 1n;
  const q = e >= 0 ? 1n : 10n ** BigInt(-e);
  const h = Number(`1e${e}`);
  high[k] = h;
  const [hp, hq] = fraction(h);
  const difference = p * hq - hp * q;
  const size = difference < 0n ? -difference : difference;
  low[k] = difference === 0n ? 0 : Math.sign(Number(difference > 0n ? 1 : -1)) * nearest(size, q * hq);
  if (h < 1e292) {
    const t = splitter * h;
    highUpper[k] = t - (t - h);
  } else {
    const t = splitter * (h / 2 ** 28);
    highUpper[k] = (t - (t - h / 2 ** 28)) * 2 ** 28;
  }
  highLower[k] = h - highUpper[k];
}
