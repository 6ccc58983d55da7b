/** Column primitives for real scalars; contracts in `DenseKernels`. */

export function modulusReal(w: Float64Array, at: number): number {
  return Math.abs(w[at]);
}

export function largestReal(w: Float64Array, at: number, i0: number, i1: number): number {
  let best = -1;
  let most = -1;
  for (let i = i0; i < i1; i++) {
    const v = Math.abs(w[at + i]);
    // a NaN must win, so that it is seen
    if (v > most || Number.isNaN(v)) {
      most = v;
      best = i;
      if (Number.isNaN(v)) break;
    }
  }
  return best;
}

export function applyReal(
  w: Float64Array,
  wAt: number,
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  l0: number,
  l1: number,
  i0: number,
  i1: number,
  f: Float64Array,
  fAt: number,
): void {
  let s = base + l0 * ld - ((shrink * l0 * (l0 + 1)) >> 1);
  let q = fAt;
  let l = l0;
  for (; l + 4 <= l1; l += 4) {
    const s1 = s + ld - shrink * (l + 1);
    const s2 = s1 + ld - shrink * (l + 2);
    const s3 = s2 + ld - shrink * (l + 3);
    const f0 = f[q];
    const f1 = f[q + 1];
    const f2 = f[q + 2];
    const f3 = f[q + 3];
    for (let i = i0; i < i1; i++) w[wAt + i] -= x[s + i] * f0 + x[s1 + i] * f1 + x[s2 + i] * f2 + x[s3 + i] * f3;
    s = s3 + ld - shrink * (l + 4);
    q += 4;
  }
  for (; l < l1; l++) {
    const f0 = f[q++];
    for (let i = i0; i < i1; i++) w[wAt + i] -= x[s + i] * f0;
    s += ld - shrink * (l + 1);
  }
}

export function applyTransposedReal(
  f: Float64Array,
  fAt: number,
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  l0: number,
  l1: number,
  i0: number,
  i1: number,
  w: Float64Array,
  wAt: number,
): void {
  let s = base + l0 * ld - ((shrink * l0 * (l0 + 1)) >> 1);
  let q = fAt;
  let l = l0;
  for (; l + 4 <= l1; l += 4) {
    const s1 = s + ld - shrink * (l + 1);
    const s2 = s1 + ld - shrink * (l + 2);
    const s3 = s2 + ld - shrink * (l + 3);
    let a0 = 0;
    let a1 = 0;
    let a2 = 0;
    let a3 = 0;
    for (let i = i0; i < i1; i++) {
      const v = w[wAt + i];
      a0 += x[s + i] * v;
      a1 += x[s1 + i] * v;
      a2 += x[s2 + i] * v;
      a3 += x[s3 + i] * v;
    }
    f[q] -= a0;
    f[q + 1] -= a1;
    f[q + 2] -= a2;
    f[q + 3] -= a3;
    s = s3 + ld - shrink * (l + 4);
    q += 4;
  }
  for (; l < l1; l++) {
    let a0 = 0;
    for (let i = i0; i < i1; i++) a0 += x[s + i] * w[wAt + i];
    f[q++] -= a0;
    s += ld - shrink * (l + 1);
  }
}

export function divideReal(
  to: Float64Array,
  toAt: number,
  w: Float64Array,
  wAt: number,
  i0: number,
  i1: number,
  d: Float64Array,
  dAt: number,
): void {
  const pivot = d[dAt];
  for (let i = i0; i < i1; i++) to[toAt + i] = w[wAt + i] / pivot;
}

export function combineReal(
  x: Float64Array,
  c0: number,
  c1: number,
  i0: number,
  i1: number,
  f: Float64Array,
  fAt: number,
): void {
  const f0 = f[fAt];
  const f1 = f[fAt + 1];
  const f2 = f[fAt + 2];
  const f3 = f[fAt + 3];
  for (let i = i0; i < i1; i++) {
    const u = x[c0 + i];
    const v = x[c1 + i];
    x[c0 + i] = u * f0 + v * f1;
    x[c1 + i] = u * f2 + v * f3;
  }
}

export function invertPairReal(
  f: Float64Array,
  fAt: number,
  d11: Float64Array,
  at11: number,
  d21: Float64Array,
  at21: number,
  d22: Float64Array,
  at22: number,
): boolean {
  const a = d11[at11];
  const b = d21[at21];
  const c = d22[at22];
  const scale = Math.max(Math.abs(a), Math.abs(b), Math.abs(c));
  const x = a / scale;
  const y = b / scale;
  const z = c / scale;
  const determinant = (x * z - y * y) * scale;
  f[fAt] = z / determinant;
  f[fAt + 1] = -y / determinant;
  f[fAt + 2] = -y / determinant;
  f[fAt + 3] = x / determinant;
  return determinant !== 0 && Number.isFinite(determinant);
}

export function pairedCoefficientsReal(
  f: Float64Array,
  fAt: number,
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  l0: number,
  l1: number,
  row: number,
  d: Float64Array,
  e: Float64Array,
  dAt: number,
): void {
  let s = base + l0 * ld - ((shrink * l0 * (l0 + 1)) >> 1) + row;
  let q = fAt;
  for (let l = l0; l < l1; l++) {
    const v = x[s];
    s += ld - shrink * (l + 1);
    const off = e[dAt + l];
    if (off === 0) {
      f[q++] = d[dAt + l] * v;
      continue;
    }
    const u = x[s];
    f[q++] = d[dAt + l] * v + off * u;
    f[q++] = off * v + d[dAt + l + 1] * u;
    l++;
    s += ld - shrink * (l + 1);
  }
}

export function scaleGroupsReal(
  to: Float64Array,
  from: Float64Array,
  count: number,
  depth: number,
  d: Float64Array,
  e: Float64Array,
  dAt: number,
): void {
  let q = 0;
  for (let g = 0; g < count; g++) {
    for (let k = 0; k < depth; k++, q += 4) {
      const p = d[dAt + k];
      const off = e[dAt + k];
      if (off === 0) {
        to[q] = from[q] * p;
        to[q + 1] = from[q + 1] * p;
        to[q + 2] = from[q + 2] * p;
        to[q + 3] = from[q + 3] * p;
        continue;
      }
      const r = d[dAt + k + 1];
      for (let t = q; t < q + 4; t++) {
        const u = from[t];
        const v = from[t + 4];
        to[t] = u * p + v * off;
        to[t + 4] = u * off + v * r;
      }
      k++;
      q += 4;
    }
  }
}
