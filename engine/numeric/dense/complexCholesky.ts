/**
 * LLᴴ of a few columns of a complex front, two at a time; contract in `DenseKernels`. The diagonal of a Hermitian matrix is taken
 * as real: imaginary parts there are rounding, and are dropped.
 */
export function choleskyComplex(
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  k0: number,
  k1: number,
  m: number,
): number {
  const first = base + k0 * ld - ((shrink * k0 * (k0 + 1)) >> 1);
  let j = k0;
  for (; j + 2 <= k1; j += 2) {
    const c0 = base + j * ld - ((shrink * j * (j + 1)) >> 1);
    const c1 = c0 + ld - shrink * (j + 1);
    subtractTwo(x, first, ld, shrink, k0, j, c0, c1, m);
    if (!finishColumn(x, c0, j, m)) return j;
    // column j + 1 still lacks the effect of column j
    const at = 2 * (c0 + j + 1);
    subtractOne(x, c1, c0, x[at], -x[at + 1], j + 1, m);
    if (!finishColumn(x, c1, j + 1, m)) return j + 1;
  }
  if (j === k1) return -1;
  const cj = base + j * ld - ((shrink * j * (j + 1)) >> 1);
  let s = first;
  for (let l = k0; l < j; l++) {
    subtractOne(x, cj, s, x[2 * (s + j)], -x[2 * (s + j) + 1], j, m);
    s += ld - shrink * (l + 1);
  }
  return finishColumn(x, cj, j, m) ? -1 : j;
}

/** Root of the pivot and division of the rows below. @returns false where the pivot is not positive. */
function finishColumn(x: Float64Array, start: number, j: number, m: number): boolean {
  const d = 2 * (start + j);
  x[d + 1] = 0;
  if (!(x[d] > 0)) return false;
  const root = Math.sqrt(x[d]);
  const inverse = 1 / root;
  x[d] = root;
  const end = 2 * (start + m);
  for (let q = d + 2; q < end; q++) x[q] *= inverse;
  return true;
}

/** Column at `to` minus (re + i·im) times column at `from`, rows i0 … m − 1. */
function subtractOne(x: Float64Array, to: number, from: number, re: number, im: number, i0: number, m: number): void {
  let p = 2 * (to + i0);
  let q = 2 * (from + i0);
  const end = 2 * (to + m);
  for (; p < end; p += 2, q += 2) {
    const a = x[q];
    const b = x[q + 1];
    x[p] -= a * re - b * im;
    x[p + 1] -= a * im + b * re;
  }
}

/** Columns j and j + 1 minus their sums over columns k0 … j − 1, two rows at a time where they lie. */
function subtractTwo(
  x: Float64Array,
  first: number,
  ld: number,
  shrink: number,
  k0: number,
  j: number,
  c0: number,
  c1: number,
  m: number,
): void {
  if (j === k0) return;
  // place (j, j + 1) lies above the diagonal: row j is done for column j alone
  rowOfOne(x, first, ld, shrink, k0, j, c0);
  let i = j + 1;
  for (; i + 2 <= m; i += 2) rowsOfTwo(x, first, ld, shrink, k0, j, c0 + i, c1 + i, i);
  if (i < m) {
    rowsOfTwoSingle(x, first, ld, shrink, k0, j, c0 + i, c1 + i, i);
  }
}

function rowOfOne(x: Float64Array, first: number, ld: number, shrink: number, k0: number, j: number, c0: number): void {
  let sum = 0;
  let s = first + j;
  for (let l = k0; l < j; l++) {
    sum += x[2 * s] * x[2 * s] + x[2 * s + 1] * x[2 * s + 1];
    s += ld - shrink * (l + 1);
  }
  x[2 * (c0 + j)] -= sum;
}

function rowsOfTwo(
  x: Float64Array,
  first: number,
  ld: number,
  shrink: number,
  k0: number,
  j: number,
  p0: number,
  p1: number,
  i: number,
): void {
  let r00 = 0;
  let i00 = 0;
  let r10 = 0;
  let i10 = 0;
  let r01 = 0;
  let i01 = 0;
  let r11 = 0;
  let i11 = 0;
  let s = 2 * (first + i);
  let t = 2 * (first + j);
  for (let l = k0; l < j; l++) {
    const pr = x[s];
    const pi = x[s + 1];
    const qr = x[s + 2];
    const qi = x[s + 3];
    let u = x[t];
    let v = x[t + 1];
    r00 += pr * u + pi * v;
    i00 += pi * u - pr * v;
    r10 += qr * u + qi * v;
    i10 += qi * u - qr * v;
    u = x[t + 2];
    v = x[t + 3];
    r01 += pr * u + pi * v;
    i01 += pi * u - pr * v;
    r11 += qr * u + qi * v;
    i11 += qi * u - qr * v;
    const step = 2 * (ld - shrink * (l + 1));
    s += step;
    t += step;
  }
  x[2 * p0] -= r00;
  x[2 * p0 + 1] -= i00;
  x[2 * p0 + 2] -= r10;
  x[2 * p0 + 3] -= i10;
  x[2 * p1] -= r01;
  x[2 * p1 + 1] -= i01;
  x[2 * p1 + 2] -= r11;
  x[2 * p1 + 3] -= i11;
}

function rowsOfTwoSingle(
  x: Float64Array,
  first: number,
  ld: number,
  shrink: number,
  k0: number,
  j: number,
  p0: number,
  p1: number,
  i: number,
): void {
  let r0 = 0;
  let i0 = 0;
  let r1 = 0;
  let i1 = 0;
  let s = 2 * (first + i);
  let t = 2 * (first + j);
  for (let l = k0; l < j; l++) {
    const pr = x[s];
    const pi = x[s + 1];
    r0 += pr * x[t] + pi * x[t + 1];
    i0 += pi * x[t] - pr * x[t + 1];
    r1 += pr * x[t + 2] + pi * x[t + 3];
    i1 += pi * x[t + 2] - pr * x[t + 3];
    const step = 2 * (ld - shrink * (l + 1));
    s += step;
    t += step;
  }
  x[2 * p0] -= r0;
  x[2 * p0 + 1] -= i0;
  x[2 * p1] -= r1;
  x[2 * p1 + 1] -= i1;
}
