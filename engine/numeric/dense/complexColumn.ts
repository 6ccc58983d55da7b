/** Column primitives for complex scalars (interleaved, real part first); contracts in `DenseKernels`. */

export function modulusComplex(w: Float64Array, at: number): number {
  return Math.hypot(w[2 * at], w[2 * at + 1]);
}

export function largestComplex(w: Float64Array, at: number, i0: number, i1: number): number {
  let best = -1;
  let most = -1;
  for (let i = i0; i < i1; i++) {
    const re = w[2 * (at + i)];
    const im = w[2 * (at + i) + 1];
    const v = re * re + im * im;
    // squares that under- or overflow would hide the order of moduli
    if (v < 1e-280 ? re !== 0 || im !== 0 : !(v < 1e280)) return largestCarefully(w, at, i0, i1);
    if (v > most) {
      most = v;
      best = i;
    }
  }
  return best;
}

function largestCarefully(w: Float64Array, at: number, i0: number, i1: number): number {
  let best = -1;
  let most = -1;
  for (let i = i0; i < i1; i++) {
    const v = Math.hypot(w[2 * (at + i)], w[2 * (at + i) + 1]);
    if (v > most || Number.isNaN(v)) {
      most = v;
      best = i;
      if (Number.isNaN(v)) break;
    }
  }
  return best;
}

export function applyComplex(
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
  let q = 2 * fAt;
  let l = l0;
  const from = 2 * (wAt + i0);
  const end = 2 * (wAt + i1);
  for (; l + 2 <= l1; l += 2) {
    const s1 = s + ld - shrink * (l + 1);
    const f0 = f[q];
    const g0 = f[q + 1];
    const f1 = f[q + 2];
    const g1 = f[q + 3];
    let t = 2 * (s + i0);
    let u = 2 * (s1 + i0);
    for (let p = from; p < end; p += 2, t += 2, u += 2) {
      const a = x[t];
      const b = x[t + 1];
      const c = x[u];
      const d = x[u + 1];
      w[p] -= a * f0 - b * g0 + (c * f1 - d * g1);
      w[p + 1] -= a * g0 + b * f0 + (c * g1 + d * f1);
    }
    s = s1 + ld - shrink * (l + 2);
    q += 4;
  }
  if (l === l1) return;
  const f0 = f[q];
  const g0 = f[q + 1];
  let t = 2 * (s + i0);
  for (let p = from; p < end; p += 2, t += 2) {
    const a = x[t];
    const b = x[t + 1];
    w[p] -= a * f0 - b * g0;
    w[p + 1] -= a * g0 + b * f0;
  }
}

export function applyTransposedComplex(
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
  conjugate: boolean,
): void {
  let s = base + l0 * ld - ((shrink * l0 * (l0 + 1)) >> 1);
  const sign = conjugate ? -1 : 1;
  const from = 2 * (wAt + i0);
  const end = 2 * (wAt + i1);
  for (let l = l0; l < l1; l++) {
    let re = 0;
    let im = 0;
    let t = 2 * (s + i0);
    for (let p = from; p < end; p += 2, t += 2) {
      const a = x[t];
      const b = sign * x[t + 1];
      re += a * w[p] - b * w[p + 1];
      im += a * w[p + 1] + b * w[p];
    }
    const q = 2 * (fAt + l - l0);
    f[q] -= re;
    f[q + 1] -= im;
    s += ld - shrink * (l + 1);
  }
}

export function divideComplex(
  to: Float64Array,
  toAt: number,
  w: Float64Array,
  wAt: number,
  i0: number,
  i1: number,
  d: Float64Array,
  dAt: number,
): void {
  const re = d[2 * dAt];
  const im = d[2 * dAt + 1];
  if (im === 0) {
    for (let i = 2 * i0; i < 2 * i1; i++) to[2 * toAt + i] = w[2 * wAt + i] / re;
    return;
  }
  // Smith 1962: divides by the larger part first, so that nothing overflows in between
  const turned = Math.abs(re) < Math.abs(im);
  const ratio = turned ? re / im : im / re;
  const scale = turned ? re * ratio + im : re + im * ratio;
  for (let i = i0; i < i1; i++) {
    const a = w[2 * (wAt + i)];
    const b = w[2 * (wAt + i) + 1];
    to[2 * (toAt + i)] = (turned ? a * ratio + b : a + b * ratio) / scale;
    to[2 * (toAt + i) + 1] = (turned ? b * ratio - a : b - a * ratio) / scale;
  }
}

export function combineComplex(
  x: Float64Array,
  c0: number,
  c1: number,
  i0: number,
  i1: number,
  f: Float64Array,
  fAt: number,
): void {
  const q = 2 * fAt;
  for (let i = i0; i < i1; i++) {
    const s = 2 * (c0 + i);
    const t = 2 * (c1 + i);
    const a = x[s];
    const b = x[s + 1];
    const c = x[t];
    const d = x[t + 1];
    x[s] = a * f[q] - b * f[q + 1] + (c * f[q + 2] - d * f[q + 3]);
    x[s + 1] = a * f[q + 1] + b * f[q] + (c * f[q + 3] + d * f[q + 2]);
    x[t] = a * f[q + 4] - b * f[q + 5] + (c * f[q + 6] - d * f[q + 7]);
    x[t + 1] = a * f[q + 5] + b * f[q + 4] + (c * f[q + 7] + d * f[q + 6]);
  }
}

export function invertPairComplex(
  f: Float64Array,
  fAt: number,
  d11: Float64Array,
  at11: number,
  d21: Float64Array,
  at21: number,
  d22: Float64Array,
  at22: number,
  hermitian: boolean,
): boolean {
  const scale = Math.max(modulusComplex(d11, at11), modulusComplex(d21, at21), modulusComplex(d22, at22));
  const ar = d11[2 * at11] / scale;
  const ai = d11[2 * at11 + 1] / scale;
  const br = d21[2 * at21] / scale;
  const bi = d21[2 * at21 + 1] / scale;
  const cr = d22[2 * at22] / scale;
  const ci = d22[2 * at22 + 1] / scale;
  // d12 is the conjugate of d21 or d21 itself
  const ti = hermitian ? -bi : bi;
  const re = ar * cr - ai * ci - (br * br - bi * ti);
  const im = ar * ci + ai * cr - (br * ti + bi * br);
  const size = re * re + im * im;
  const q = 2 * fAt;
  quotient(f, q, cr, ci, re, im, size, scale);
  quotient(f, q + 2, -br, -bi, re, im, size, scale);
  quotient(f, q + 4, -br, -ti, re, im, size, scale);
  quotient(f, q + 6, ar, ai, re, im, size, scale);
  return size > 0 && Number.isFinite(size) && Number.isFinite(1 / scale);
}

/** f[q], f[q + 1] := (a + i·b) / (re + i·im) / scale, where size = re² + im². */
function quotient(
  f: Float64Array,
  q: number,
  a: number,
  b: number,
  re: number,
  im: number,
  size: number,
  scale: number,
): void {
  f[q] = (a * re + b * im) / size / scale;
  f[q + 1] = (b * re - a * im) / size / scale;
}

export function pairedCoefficientsComplex(
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
  hermitian: boolean,
): void {
  const sign = hermitian ? -1 : 1;
  let s = base + l0 * ld - ((shrink * l0 * (l0 + 1)) >> 1) + row;
  let q = 2 * fAt;
  for (let l = l0; l < l1; l++, q += 2) {
    const a = x[2 * s];
    const b = sign * x[2 * s + 1];
    s += ld - shrink * (l + 1);
    const t = 2 * (dAt + l);
    const pr = d[t];
    const pi = d[t + 1];
    const er = e[t];
    const ei = e[t + 1];
    f[q] = pr * a - pi * b;
    f[q + 1] = pr * b + pi * a;
    if (er === 0 && ei === 0) continue;
    const c = x[2 * s];
    const g = sign * x[2 * s + 1];
    l++;
    s += ld - shrink * (l + 1);
    const rr = d[t + 2];
    const ri = d[t + 3];
    // row one of D is (d11, d12), d12 = d21 or its conjugate; row two is (d21, d22)
    f[q] += er * c - sign * ei * g;
    f[q + 1] += er * g + sign * ei * c;
    q += 2;
    f[q] = er * a - ei * b + (rr * c - ri * g);
    f[q + 1] = er * b + ei * a + (rr * g + ri * c);
  }
}

export function scaleGroupsComplex(
  to: Float64Array,
  from: Float64Array,
  groups: number,
  depth: number,
  d: Float64Array,
  e: Float64Array,
  dAt: number,
  hermitian: boolean,
): void {
  const sign = hermitian ? -1 : 1;
  let q = 0;
  for (let g = 0; g < groups; g++) {
    for (let k = 0; k < depth; k++, q += 4) {
      const t = 2 * (dAt + k);
      const pr = d[t];
      const pi = d[t + 1];
      const er = e[t];
      const ei = e[t + 1];
      const paired = er !== 0 || ei !== 0;
      for (let r = q; r < q + 4; r += 2) {
        const a = from[r];
        const b = sign * from[r + 1];
        to[r] = pr * a - pi * b;
        to[r + 1] = pr * b + pi * a;
        if (!paired) continue;
        const c = from[r + 4];
        const h = sign * from[r + 5];
        to[r] += er * c - sign * ei * h;
        to[r + 1] += er * h + sign * ei * c;
        to[r + 4] = er * a - ei * b + (d[t + 2] * c - d[t + 3] * h);
        to[r + 5] = er * b + ei * a + (d[t + 2] * h + d[t + 3] * c);
      }
      if (!paired) continue;
      k++;
      q += 4;
    }
  }
}
