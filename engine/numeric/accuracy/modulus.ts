/** Modulus of a complex number, without harmful overflow or underflow. A slow library call is avoided on purpose: hot loops use this. */
export function modulus(re: number, im: number): number {
  const square = re * re + im * im;
  // between these limits neither the squares nor their sum lost anything that matters
  if (square > 1e-280 && square < 1e280) return Math.sqrt(square);
  const a = Math.abs(re);
  const b = Math.abs(im);
  const big = a > b ? a : b;
  if (big === 0 || big === Infinity) return big;
  const small = (a > b ? b : a) / big;
  return big * Math.sqrt(1 + small * small);
}

/** Largest modulus among the numbers of a vector (interleaved when `complex`); NaN if any is NaN, 0 for an empty vector. */
export function largestModulus(x: Float64Array, complex: boolean): number {
  let largest = 0;
  const width = complex ? 2 : 1;
  for (let p = 0; p < x.length; p += width) {
    const m = complex ? modulus(x[p], x[p + 1]) : Math.abs(x[p]);
    // negated, so that NaN passes and stays
    if (!(m <= largest)) largest = m;
    if (Number.isNaN(largest)) return largest;
  }
  return largest;
}
