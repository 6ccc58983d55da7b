/**
 * The primitives of dense fronts once more, by their definitions, one scalar at a time, every operation counted: a second opinion on
 * the blocked kernels and on the operations a run states.
 */
import type { DenseKernels } from '../../../engine/numeric/dense/kernels.ts';

/** Operations on reduced entries; products with D that only serve a later update are not counted (see `DenseKernels`). */
export interface Count {
  multiplyAdds: number;
  divisions: number;
  roots: number;
}

type Scalar = readonly [number, number];

const times = (a: Scalar, b: Scalar): Scalar => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
const minus = (a: Scalar, b: Scalar): Scalar => [a[0] - b[0], a[1] - b[1]];
const plus = (a: Scalar, b: Scalar): Scalar => [a[0] + b[0], a[1] + b[1]];
const conjugateOf = (a: Scalar, yes: boolean): Scalar => (yes ? [a[0], -a[1]] : a);
const over = (a: Scalar, b: Scalar): Scalar => {
  if (b[1] === 0) return [a[0] / b[0], a[1] / b[0]];
  const size = b[0] * b[0] + b[1] * b[1];
  const q = times(a, [b[0], -b[1]]);
  return [q[0] / size, q[1] / size];
};

/** Kernels of the given width that count into `count`. */
export function countingKernels(width: 1 | 2, count: Count): DenseKernels {
  const group = width === 1 ? 4 : 2;
  const get = (x: Float64Array, at: number): Scalar => (width === 1 ? [x[at], 0] : [x[2 * at], x[2 * at + 1]]);
  const set = (x: Float64Array, at: number, v: Scalar): void => {
    x[width * at] = v[0];
    if (width === 2) x[2 * at + 1] = v[1];
  };
  const place = (base: number, ld: number, shrink: number, i: number, j: number): number =>
    base + j * ld - (shrink * j * (j + 1)) / 2 + i;
  const packed = (at: number, depth: number, row: number, k: number): number =>
    at + Math.floor(row / group) * group * depth + k * group + (row % group);
  const modulus = (w: Float64Array, at: number): number => Math.hypot(...get(w, at));

  return {
    width,
    group,
    modulus,
    pack(to, at, x, base, ld, shrink, k0, k1, i0, i1, conjugate) {
      const depth = k1 - k0;
      const rows = Math.ceil((i1 - i0) / group) * group;
      for (let r = 0; r < rows; r++) {
        for (let k = 0; k < depth; k++) {
          const v: Scalar = r < i1 - i0 ? get(x, place(base, ld, shrink, i0 + r, k0 + k)) : [0, 0];
          set(to, packed(at, depth, r, k), conjugateOf(v, conjugate));
        }
      }
    },
    packTransposed(to, at, x, base, ld, j0, j1, l0, l1) {
      for (let j = j0; j < j1; j++) {
        for (let l = l0; l < l1; l++) set(to, packed(at, l1 - l0, j - j0, l - l0), get(x, base + j * ld + l));
      }
    },
    update(c, base, ld, shrink, i0, i1, j0, j1, lower, a, aAt, b, bAt, depth) {
      for (let j = j0; j < j1; j++) {
        for (let i = i0; i < i1; i++) {
          if (lower && i < j) continue;
          let sum: Scalar = [0, 0];
          for (let k = 0; k < depth; k++) {
            sum = plus(sum, times(get(a, packed(aAt, depth, i - i0, k)), get(b, packed(bAt, depth, j - j0, k))));
          }
          const at = place(base, ld, shrink, i, j);
          set(c, at, minus(get(c, at), sum));
          count.multiplyAdds += depth;
        }
      }
    },
    cholesky(x, base, ld, shrink, k0, k1, m) {
      for (let j = k0; j < k1; j++) {
        const diagonal = place(base, ld, shrink, j, j);
        for (let l = k0; l < j; l++) {
          const f = conjugateOf(get(x, place(base, ld, shrink, j, l)), true);
          for (let i = j; i < m; i++) {
            const at = place(base, ld, shrink, i, j);
            set(x, at, minus(get(x, at), times(get(x, place(base, ld, shrink, i, l)), f)));
            count.multiplyAdds++;
          }
        }
        const pivot = get(x, diagonal)[0];
        if (!(pivot > 0)) return j;
        const root = Math.sqrt(pivot);
        count.roots++;
        set(x, diagonal, [root, 0]);
        for (let i = j + 1; i < m; i++) {
          const at = place(base, ld, shrink, i, j);
          set(x, at, over(get(x, at), [root, 0]));
          count.divisions++;
        }
      }
      return -1;
    },
    largest(w, at, i0, i1) {
      let best = -1;
      for (let i = i0; i < i1; i++) {
        if (Number.isNaN(modulus(w, at + i))) return i;
        if (best < 0 || modulus(w, at + i) > modulus(w, at + best)) best = i;
      }
      return best;
    },
    apply(w, wAt, x, base, ld, shrink, l0, l1, i0, i1, f, fAt) {
      for (let l = l0; l < l1; l++) {
        for (let i = i0; i < i1; i++) {
          const product = times(get(x, place(base, ld, shrink, i, l)), get(f, fAt + l - l0));
          set(w, wAt + i, minus(get(w, wAt + i), product));
          count.multiplyAdds++;
        }
      }
    },
    applyTransposed(f, fAt, x, base, ld, shrink, l0, l1, i0, i1, w, wAt, conjugate) {
      for (let l = l0; l < l1; l++) {
        for (let i = i0; i < i1; i++) {
          const v = conjugateOf(get(x, place(base, ld, shrink, i, l)), conjugate);
          set(f, fAt + l - l0, minus(get(f, fAt + l - l0), times(v, get(w, wAt + i))));
          count.multiplyAdds++;
        }
      }
    },
    divide(to, toAt, w, wAt, i0, i1, d, dAt) {
      const pivot = get(d, dAt);
      for (let i = i0; i < i1; i++) {
        set(to, toAt + i, over(get(w, wAt + i), pivot));
        count.divisions++;
      }
    },
    combine(x, c0, c1, i0, i1, f, fAt) {
      for (let i = i0; i < i1; i++) {
        const u = get(x, c0 + i);
        const v = get(x, c1 + i);
        set(x, c0 + i, plus(times(u, get(f, fAt)), times(v, get(f, fAt + 1))));
        set(x, c1 + i, plus(times(u, get(f, fAt + 2)), times(v, get(f, fAt + 3))));
        count.divisions += 2;
      }
    },
    invertPair(f, fAt, d11, at11, d21, at21, d22, at22, hermitian) {
      const a = get(d11, at11);
      const b = get(d21, at21);
      const c = get(d22, at22);
      const across = conjugateOf(b, hermitian);
      const determinant = minus(times(a, c), times(b, across));
      set(f, fAt, over(c, determinant));
      set(f, fAt + 1, over([-b[0], -b[1]], determinant));
      set(f, fAt + 2, over([-across[0], -across[1]], determinant));
      set(f, fAt + 3, over(a, determinant));
      const size = Math.hypot(...determinant);
      return size > 0 && Number.isFinite(size);
    },
    pairedCoefficients(f, fAt, x, base, ld, shrink, l0, l1, row, d, e, dAt, hermitian) {
      const entry = (l: number) => conjugateOf(get(x, place(base, ld, shrink, row, l)), hermitian);
      for (let l = l0; l < l1; l++) set(f, fAt + l - l0, times(get(d, dAt + l), entry(l)));
      for (let l = l0; l < l1 - 1; l++) {
        const off = get(e, dAt + l);
        const q = fAt + l - l0;
        set(f, q, plus(get(f, q), times(conjugateOf(off, hermitian), entry(l + 1))));
        set(f, q + 1, plus(get(f, q + 1), times(off, entry(l))));
      }
    },
    scaleGroups(to, from, groups, depth, d, e, dAt, hermitian) {
      for (let r = 0; r < groups * group; r++) {
        const entry = (k: number) => conjugateOf(get(from, packed(0, depth, r, k)), hermitian);
        for (let k = 0; k < depth; k++) set(to, packed(0, depth, r, k), times(get(d, dAt + k), entry(k)));
        for (let k = 0; k < depth - 1; k++) {
          const off = get(e, dAt + k);
          const at = packed(0, depth, r, k);
          const next = packed(0, depth, r, k + 1);
          set(to, at, plus(get(to, at), times(conjugateOf(off, hermitian), entry(k + 1))));
          set(to, next, plus(get(to, next), times(off, entry(k))));
        }
      }
    },
  };
}
