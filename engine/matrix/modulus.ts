/** Modulus of re + im·i without overflow or underflow on the way, from + × ÷ √ only, so the same everywhere. */
export function modulus(re: number, im: number): number {
  const square = re * re + im * im;
  // between these limits neither the squares nor their sum lost anything that matters
  if (square > 1e-280 && square < 1e280) return Math.sqrt(square);
  const x = Math.abs(re);
  const y = Math.abs(im);
  if (y === 0) return x;
  if (x === 0) return y;
  const big = x > y ? x : y;
  if (big === Number.POSITIVE_INFINITY) return big;
  const ratio = (x > y ? y : x) / big;
  return big * Math.sqrt(1 + ratio * ratio);
}

/** |value| of entry p; `width` 1 (real) or 2 (complex, interleaved). */
export function magnitudeAt(values: Float64Array, width: 1 | 2, p: number): number {
  return width === 1 ? Math.abs(values[p]) : modulus(values[2 * p], values[2 * p + 1]);
}
