/**
 * Cholesky of a few columns of a real front, four at a time: the sums over earlier columns of the block, the four by four
 * diagonal and the division of the rows below happen while the sixteen values are in registers.
 */

const near = new Float64Array(4 * 256);

/**
 * Factorizes columns k0 … k1 − 1 (at most 256) of rows k0 … m − 1, all earlier columns having been applied already.
 * Addressing: see `updateReal`. In place: afterwards the columns hold those of L.
 * @returns −1, or the first column whose pivot is not positive (its updated value is then in its diagonal place).
 */
export function choleskyReal(
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  k0: number,
  k1: number,
  m: number,
): number {
  let j = k0;
  for (; j + 4 <= k1; j += 4) {
    const bad = fourColumns(x, base, ld, shrink, k0, j, m);
    if (bad >= 0) return bad;
  }
  for (; j < k1; j++) {
    if (!oneColumn(x, base, ld, shrink, k0, j, m)) return j;
  }
  return -1;
}

function oneColumn(
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  k0: number,
  j: number,
  m: number,
): boolean {
  const cj = base + j * ld - ((shrink * j * (j + 1)) >> 1);
  let l = k0;
  let sl = base + k0 * ld - ((shrink * k0 * (k0 + 1)) >> 1);
  for (; l + 2 <= j; l += 2) {
    const sm = sl + ld - shrink * (l + 1);
    const f = x[sl + j];
    const g = x[sm + j];
    for (let i = j; i < m; i++) x[cj + i] -= x[sl + i] * f + x[sm + i] * g;
    sl = sm + ld - shrink * (l + 2);
  }
  if (l < j) {
    const f = x[sl + j];
    for (let i = j; i < m; i++) x[cj + i] -= x[sl + i] * f;
  }
  const pivot = x[cj + j];
  if (!(pivot > 0)) return false;
  const root = Math.sqrt(pivot);
  x[cj + j] = root;
  for (let i = j + 1; i < m; i++) x[cj + i] /= root;
  return true;
}

function fourColumns(
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  k0: number,
  j: number,
  m: number,
): number {
  const c0 = base + j * ld - ((shrink * j * (j + 1)) >> 1);
  const c1 = c0 + ld - shrink * (j + 1);
  const c2 = c1 + ld - shrink * (j + 2);
  const c3 = c2 + ld - shrink * (j + 3);
  const first = base + k0 * ld - ((shrink * k0 * (k0 + 1)) >> 1);
  // the four rows of the diagonal block in earlier columns of the block, and their effect on its lower triangle
  let s = first + j;
  let q = 0;
  let d00 = x[c0 + j];
  let d10 = x[c0 + j + 1];
  let d20 = x[c0 + j + 2];
  let d30 = x[c0 + j + 3];
  let d11 = x[c1 + j + 1];
  let d21 = x[c1 + j + 2];
  let d31 = x[c1 + j + 3];
  let d22 = x[c2 + j + 2];
  let d32 = x[c2 + j + 3];
  let d33 = x[c3 + j + 3];
  for (let l = k0; l < j; l++) {
    const a0 = x[s];
    const a1 = x[s + 1];
    const a2 = x[s + 2];
    const a3 = x[s + 3];
    near[q] = a0;
    near[q + 1] = a1;
    near[q + 2] = a2;
    near[q + 3] = a3;
    q += 4;
    s += ld - shrink * (l + 1);
    d00 -= a0 * a0;
    d10 -= a1 * a0;
    d20 -= a2 * a0;
    d30 -= a3 * a0;
    d11 -= a1 * a1;
    d21 -= a2 * a1;
    d31 -= a3 * a1;
    d22 -= a2 * a2;
    d32 -= a3 * a2;
    d33 -= a3 * a3;
  }
  x[c0 + j] = d00;
  if (!(d00 > 0)) return j;
  d00 = Math.sqrt(d00);
  const r0 = 1 / d00;
  d10 *= r0;
  d20 *= r0;
  d30 *= r0;
  d11 -= d10 * d10;
  x[c1 + j + 1] = d11;
  if (!(d11 > 0)) return j + 1;
  d11 = Math.sqrt(d11);
  const r1 = 1 / d11;
  d21 = (d21 - d20 * d10) * r1;
  d31 = (d31 - d30 * d10) * r1;
  d22 -= d20 * d20 + d21 * d21;
  x[c2 + j + 2] = d22;
  if (!(d22 > 0)) return j + 2;
  d22 = Math.sqrt(d22);
  const r2 = 1 / d22;
  d32 = (d32 - d30 * d20 - d31 * d21) * r2;
  d33 -= d30 * d30 + d31 * d31 + d32 * d32;
  x[c3 + j + 3] = d33;
  if (!(d33 > 0)) return j + 3;
  d33 = Math.sqrt(d33);
  const r3 = 1 / d33;
  x[c0 + j] = d00;
  x[c0 + j + 1] = d10;
  x[c0 + j + 2] = d20;
  x[c0 + j + 3] = d30;
  x[c1 + j + 1] = d11;
  x[c1 + j + 2] = d21;
  x[c1 + j + 3] = d31;
  x[c2 + j + 2] = d22;
  x[c2 + j + 3] = d32;
  x[c3 + j + 3] = d33;
  let i = j + 4;
  for (; i + 4 <= m; i += 4) rowsBelow(x, first + i, ld, shrink, k0, j, c0 + i, c1 + i, c2 + i, c3 + i);
  for (let e = i; e < m; e += 4) {
    const rows = m - e < 4 ? m - e : 4;
    for (let r = e; r < e + rows; r++) {
      let v0 = x[c0 + r];
      let v1 = x[c1 + r];
      let v2 = x[c2 + r];
      let v3 = x[c3 + r];
      let t = first + r;
      q = 0;
      for (let l = k0; l < j; l++) {
        const a = x[t];
        v0 -= a * near[q];
        v1 -= a * near[q + 1];
        v2 -= a * near[q + 2];
        v3 -= a * near[q + 3];
        q += 4;
        t += ld - shrink * (l + 1);
      }
      x[c0 + r] = v0;
      x[c1 + r] = v1;
      x[c2 + r] = v2;
      x[c3 + r] = v3;
    }
  }
  for (i = j + 4; i < m; i++) {
    const v0 = x[c0 + i] * r0;
    const v1 = (x[c1 + i] - v0 * d10) * r1;
    const v2 = (x[c2 + i] - v0 * d20 - v1 * d21) * r2;
    x[c0 + i] = v0;
    x[c1 + i] = v1;
    x[c2 + i] = v2;
    x[c3 + i] = (x[c3 + i] - v0 * d30 - v1 * d31 - v2 * d32) * r3;
  }
  return -1;
}

/** Four rows of four columns minus their sums over columns k0 … j − 1, read where they lie. */
function rowsBelow(
  x: Float64Array,
  start: number,
  ld: number,
  shrink: number,
  k0: number,
  j: number,
  c0: number,
  c1: number,
  c2: number,
  c3: number,
): void {
  let s00 = 0;
  let s10 = 0;
  let s20 = 0;
  let s30 = 0;
  let s01 = 0;
  let s11 = 0;
  let s21 = 0;
  let s31 = 0;
  let s02 = 0;
  let s12 = 0;
  let s22 = 0;
  let s32 = 0;
  let s03 = 0;
  let s13 = 0;
  let s23 = 0;
  let s33 = 0;
  let s = start;
  let q = 0;
  for (let l = k0; l < j; l++) {
    const a0 = x[s];
    const a1 = x[s + 1];
    const a2 = x[s + 2];
    const a3 = x[s + 3];
    let y = near[q];
    s00 += a0 * y;
    s10 += a1 * y;
    s20 += a2 * y;
    s30 += a3 * y;
    y = near[q + 1];
    s01 += a0 * y;
    s11 += a1 * y;
    s21 += a2 * y;
    s31 += a3 * y;
    y = near[q + 2];
    s02 += a0 * y;
    s12 += a1 * y;
    s22 += a2 * y;
    s32 += a3 * y;
    y = near[q + 3];
    s03 += a0 * y;
    s13 += a1 * y;
    s23 += a2 * y;
    s33 += a3 * y;
    q += 4;
    s += ld - shrink * (l + 1);
  }
  x[c0] -= s00;
  x[c0 + 1] -= s10;
  x[c0 + 2] -= s20;
  x[c0 + 3] -= s30;
  x[c1] -= s01;
  x[c1 + 1] -= s11;
  x[c1 + 2] -= s21;
  x[c1 + 3] -= s31;
  x[c2] -= s02;
  x[c2 + 1] -= s12;
  x[c2 + 2] -= s22;
  x[c2 + 3] -= s32;
  x[c3] -= s03;
  x[c3 + 1] -= s13;
  x[c3 + 2] -= s23;
  x[c3 + 3] -= s33;
}
