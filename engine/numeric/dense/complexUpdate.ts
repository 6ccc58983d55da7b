/**
 * Complex register-blocked update C := C − A·Bᵀ over packed groups of two rows (2×2 tiles: eight real sums in registers, the same
 * sixteen multiplications a step as the real 4×4 tile). Contracts in `DenseKernels`; offsets are in complex scalars.
 */

/** Rows of a packed group. */
export const complexGroup = 2;

export function packComplex(
  to: Float64Array,
  at: number,
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  k0: number,
  k1: number,
  i0: number,
  i1: number,
  conjugate: boolean,
): void {
  const first = base + k0 * ld - ((shrink * k0 * (k0 + 1)) >> 1);
  const sign = conjugate ? -1 : 1;
  let q = 2 * at;
  let i = i0;
  for (; i + 2 <= i1; i += 2) {
    let s = first + i;
    for (let k = k0; k < k1; k++) {
      const t = 2 * s;
      to[q] = x[t];
      to[q + 1] = sign * x[t + 1];
      to[q + 2] = x[t + 2];
      to[q + 3] = sign * x[t + 3];
      q += 4;
      s += ld - shrink * (k + 1);
    }
  }
  if (i === i1) return;
  let s = first + i;
  for (let k = k0; k < k1; k++) {
    to[q] = x[2 * s];
    to[q + 1] = sign * x[2 * s + 1];
    to[q + 2] = 0;
    to[q + 3] = 0;
    q += 4;
    s += ld - shrink * (k + 1);
  }
}

export function packTransposedComplex(
  to: Float64Array,
  at: number,
  x: Float64Array,
  base: number,
  ld: number,
  j0: number,
  j1: number,
  l0: number,
  l1: number,
): void {
  let q = 2 * at;
  for (let j = j0; j < j1; j += 2) {
    const s0 = 2 * (base + j * ld);
    const s1 = j + 1 < j1 ? s0 + 2 * ld : s0;
    for (let l = 2 * l0; l < 2 * l1; l += 2) {
      to[q] = x[s0 + l];
      to[q + 1] = x[s0 + l + 1];
      to[q + 2] = x[s1 + l];
      to[q + 3] = x[s1 + l + 1];
      q += 4;
    }
  }
}

export function updateComplex(
  c: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  i0: number,
  i1: number,
  j0: number,
  j1: number,
  lower: boolean,
  a: Float64Array,
  aAt: number,
  b: Float64Array,
  bAt: number,
  depth: number,
): void {
  const step = 4 * depth;
  let bq = 2 * bAt;
  const last = lower && i1 < j1 ? i1 : j1;
  for (let j = j0; j < last; j += 2, bq += step) {
    const s0 = base + j * ld - ((shrink * j * (j + 1)) >> 1);
    const c0 = 2 * s0;
    const c1 = 2 * (s0 + ld - shrink * (j + 1));
    let i = lower && j > i0 ? j : i0;
    let aq = 2 * (aAt + (i - i0) * depth);
    const narrow = j + 2 > j1;
    if (lower && i === j) {
      edgeTile(c, c0, c1, i, i1, narrow, true, a, aq, b, bq, depth);
      i += 2;
      aq += step;
    }
    if (!narrow) for (; i + 2 <= i1; i += 2, aq += step) tile(c, c0 + 2 * i, c1 + 2 * i, a, aq, b, bq, depth);
    for (; i < i1; i += 2, aq += step) edgeTile(c, c0, c1, i, i1, narrow, false, a, aq, b, bq, depth);
  }
}

function tile(
  c: Float64Array,
  c0: number,
  c1: number,
  a: Float64Array,
  aAt: number,
  b: Float64Array,
  bAt: number,
  depth: number,
): void {
  let r00 = 0;
  let i00 = 0;
  let r10 = 0;
  let i10 = 0;
  let r01 = 0;
  let i01 = 0;
  let r11 = 0;
  let i11 = 0;
  const end = aAt + 4 * depth;
  for (; aAt < end; aAt += 4, bAt += 4) {
    const pr = a[aAt];
    const pi = a[aAt + 1];
    const qr = a[aAt + 2];
    const qi = a[aAt + 3];
    let x = b[bAt];
    let y = b[bAt + 1];
    r00 += pr * x - pi * y;
    i00 += pr * y + pi * x;
    r10 += qr * x - qi * y;
    i10 += qr * y + qi * x;
    x = b[bAt + 2];
    y = b[bAt + 3];
    r01 += pr * x - pi * y;
    i01 += pr * y + pi * x;
    r11 += qr * x - qi * y;
    i11 += qr * y + qi * x;
  }
  c[c0] -= r00;
  c[c0 + 1] -= i00;
  c[c0 + 2] -= r10;
  c[c0 + 3] -= i10;
  c[c1] -= r01;
  c[c1 + 1] -= i01;
  c[c1 + 2] -= r11;
  c[c1 + 3] -= i11;
}

const scratch = new Float64Array(8);

/** A tile that sticks out below, to the right or above the diagonal: summed in full, written only where it belongs. */
function edgeTile(
  c: Float64Array,
  c0: number,
  c1: number,
  i: number,
  i1: number,
  narrow: boolean,
  diagonal: boolean,
  a: Float64Array,
  aAt: number,
  b: Float64Array,
  bAt: number,
  depth: number,
): void {
  const s = scratch;
  for (let q = 0; q < 8; q++) s[q] = 0;
  tile(s, 0, 4, a, aAt, b, bAt, depth);
  const two = i + 1 < i1;
  const p = c0 + 2 * i;
  c[p] += s[0];
  c[p + 1] += s[1];
  if (two) {
    c[p + 2] += s[2];
    c[p + 3] += s[3];
  }
  if (narrow) return;
  const q = c1 + 2 * i;
  if (!diagonal) {
    c[q] += s[4];
    c[q + 1] += s[5];
  }
  if (two) {
    c[q + 2] += s[6];
    c[q + 3] += s[7];
  }
}
