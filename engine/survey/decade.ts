/** Decades the doubles reach: 10⁻³²⁴ … 10³⁰⁸. */
const lowest = -324;
const powers = Float64Array.from({ length: 633 }, (_, k) => Number(`1e${k + lowest}`));
const double = new Float64Array(1);
const word = new Uint32Array(double.buffer);
const highWord = new Uint8Array(Uint32Array.of(1).buffer)[0] === 1 ? 1 : 0;

/** ⌊log₁₀ x⌋ of a positive finite double, exact: a guess from the binary exponent, settled against the powers of ten. */
export function decade(x: number): number {
  double[0] = x;
  const exponent = ((word[highWord] >>> 20) & 0x7ff) - 1023;
  // log₁₀ 2 = 0.30103; subnormal numbers have no usable exponent and start from the bottom
  let k = exponent === -1023 ? 0 : Math.max(0, Math.floor(exponent * 0.30102999566398114) - lowest);
  while (k + 1 < powers.length && powers[k + 1] <= x) k++;
  while (k > 0 && powers[k] > x) k--;
  return k + lowest;
}
