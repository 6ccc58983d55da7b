/**
 * Real register-blocked update C := C − A·Bᵀ over packed groups of four rows (4×4 tiles, all sixteen sums in registers).
 *
 * Addressing used by every kernel of this folder: a block of columns is given by (base, ld, shrink); element (i, j) is at
 * base + j·ld − shrink·j(j+1)/2 + i. shrink 0: rectangle; shrink 1: lower trapezoid packed column by column, rows i ≥ j only.
 * Offsets and counts are in scalars.
 */

/** Rows of a packed group. */
export const realGroup = 4;

/**
 * Packs rows i0 … i1 − 1 of columns k0 … k1 − 1: group after group of four rows, inside a group column after column; the last
 * group is filled up with zeros. Takes 4 · ⌈(i1 − i0)/4⌉ · (k1 − k0) doubles of `to` from `at` on.
 */
export function packReal(
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
): void {
  const first = base + k0 * ld - ((shrink * k0 * (k0 + 1)) >> 1);
  let q = at;
  let i = i0;
  for (; i + 4 <= i1; i += 4) {
    let s = first + i;
    for (let k = k0; k < k1; k++) {
      to[q] = x[s];
      to[q + 1] = x[s + 1];
      to[q + 2] = x[s + 2];
      to[q + 3] = x[s + 3];
      q += 4;
      s += ld - shrink * (k + 1);
    }
  }
  if (i === i1) return;
  const left = i1 - i;
  let s = first + i;
  for (let k = k0; k < k1; k++) {
    to[q] = x[s];
    to[q + 1] = left > 1 ? x[s + 1] : 0;
    to[q + 2] = left > 2 ? x[s + 2] : 0;
    to[q + 3] = 0;
    q += 4;
    s += ld - shrink * (k + 1);
  }
}

/** Packs the transpose: "rows" are columns j0 … j1 − 1 of the rectangle, "columns" its rows l0 … l1 − 1. Layout as `packReal`. */
export function packTransposedReal(
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
  let q = at;
  for (let j = j0; j < j1; j += 4) {
    const left = j1 - j;
    const s0 = base + j * ld;
    const s1 = left > 1 ? s0 + ld : s0;
    const s2 = left > 2 ? s1 + ld : s0;
    const s3 = left > 3 ? s2 + ld : s0;
    for (let l = l0; l < l1; l++) {
      to[q] = x[s0 + l];
      to[q + 1] = x[s1 + l];
      to[q + 2] = x[s2 + l];
      to[q + 3] = x[s3 + l];
      q += 4;
    }
  }
}

/**
 * C(i, j) := C(i, j) − Σ_k A(i, k)·B(j, k) for i0 ≤ i < i1, j0 ≤ j < j1; with `lower` only where i ≥ j (then i0 − j0 is a multiple of 4).
 * A and B are packed groups of depth k, A from row i0 on at a[aAt], B from row j0 on at b[bAt].
 */
export function updateReal(
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
  let bq = bAt;
  const last = lower && i1 < j1 ? i1 : j1;
  for (let j = j0; j < last; j += 4, bq += step) {
    const c0 = base + j * ld - ((shrink * j * (j + 1)) >> 1);
    const c1 = c0 + ld - shrink * (j + 1);
    const c2 = c1 + ld - shrink * (j + 2);
    const c3 = c2 + ld - shrink * (j + 3);
    let i = lower && j > i0 ? j : i0;
    let aq = aAt + (i - i0) * depth;
    if (j + 4 > j1) {
      for (; i < i1; i += 4, aq += step) edgeTile(c, c0, c1, c2, c3, i, i1, j, j1, lower, a, aq, b, bq, depth);
      continue;
    }
    if (lower && i === j) {
      edgeTile(c, c0, c1, c2, c3, i, i1, j, j1, true, a, aq, b, bq, depth);
      i += 4;
      aq += step;
    }
    for (; i + 4 <= i1; i += 4, aq += step) tile(c, c0 + i, c1 + i, c2 + i, c3 + i, a, aq, b, bq, depth);
    if (i < i1) edgeTile(c, c0, c1, c2, c3, i, i1, j, j1, lower, a, aq, b, bq, depth);
  }
}

function tile(
  c: Float64Array,
  c0: number,
  c1: number,
  c2: number,
  c3: number,
  a: Float64Array,
  aAt: number,
  b: Float64Array,
  bAt: number,
  depth: number,
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
  const end = aAt + 4 * depth;
  for (; aAt < end; aAt += 4, bAt += 4) {
    const a0 = a[aAt];
    const a1 = a[aAt + 1];
    const a2 = a[aAt + 2];
    const a3 = a[aAt + 3];
    let y = b[bAt];
    s00 += a0 * y;
    s10 += a1 * y;
    s20 += a2 * y;
    s30 += a3 * y;
    y = b[bAt + 1];
    s01 += a0 * y;
    s11 += a1 * y;
    s21 += a2 * y;
    s31 += a3 * y;
    y = b[bAt + 2];
    s02 += a0 * y;
    s12 += a1 * y;
    s22 += a2 * y;
    s32 += a3 * y;
    y = b[bAt + 3];
    s03 += a0 * y;
    s13 += a1 * y;
    s23 += a2 * y;
    s33 += a3 * y;
  }
  c[c0] -= s00;
  c[c0 + 1] -= s10;
  c[c0 + 2] -= s20;
  c[c0 + 3] -= s30;
  c[c1] -= s01;
  c[c1 + 1] -= s11;
  c[c1 + 2] -= s21;
  c[c1 + 3] -= s31;
  c[c2] -= s02;
  c[c2 + 1] -= s12;
  c[c2 + 2] -= s22;
  c[c2 + 3] -= s32;
  c[c3] -= s03;
  c[c3 + 1] -= s13;
  c[c3 + 2] -= s23;
  c[c3 + 3] -= s33;
}

const scratch = new Float64Array(16);

/** A tile that sticks out below, to the right or above the diagonal: summed in full, written only where it belongs. */
function edgeTile(
  c: Float64Array,
  c0: number,
  c1: number,
  c2: number,
  c3: number,
  i: number,
  i1: number,
  j: number,
  j1: number,
  lower: boolean,
  a: Float64Array,
  aAt: number,
  b: Float64Array,
  bAt: number,
  depth: number,
): void {
  const s = scratch;
  for (let q = 0; q < 16; q++) s[q] = 0;
  tile(s, 0, 4, 8, 12, a, aAt, b, bAt, depth);
  const rows = i1 - i < 4 ? i1 - i : 4;
  const columns = j1 - j < 4 ? j1 - j : 4;
  for (let y = 0; y < columns; y++) {
    const start = (y === 0 ? c0 : y === 1 ? c1 : y === 2 ? c2 : c3) + i;
    for (let x = lower && j + y > i ? j + y - i : 0; x < rows; x++) c[start + x] += s[4 * y + x];
  }
}
