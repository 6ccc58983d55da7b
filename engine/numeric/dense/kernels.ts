/**
 * The scalar-dependent primitives of dense fronts. Everything above them (blocking, pivot search, assembly, solves) is written
 * once, for real and complex alike; there are two implementations of this interface.
 *
 * Arrays hold scalars: one double each when real, two (real part first) when complex. All offsets, strides and counts are in
 * scalars. A block of columns is addressed by (base, ld, shrink): element (i, j) is scalar base + j·ld − shrink·j(j+1)/2 + i;
 * shrink 0 is a rectangle, shrink 1 a lower trapezoid packed column by column (rows i ≥ j only).
 */
export interface DenseKernels {
  /** doubles a scalar takes */
  readonly width: 1 | 2;
  /** rows of a packed group (the tile of the update is group × group) */
  readonly group: 2 | 4;

  /**
   * Packs rows i0 … i1 − 1 of columns k0 … k1 − 1 into groups of `group` rows, column after column inside a group, the last group
   * filled up with zeros; conjugated where asked. Takes group · ⌈(i1 − i0)/group⌉ · (k1 − k0) scalars of `to` from `at` on.
   */
  pack(
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
  ): void;

  /** Packs the transpose of a rectangle: its columns j0 … j1 − 1 become packed rows, its rows l0 … l1 − 1 the depth. */
  packTransposed(
    to: Float64Array,
    at: number,
    x: Float64Array,
    base: number,
    ld: number,
    j0: number,
    j1: number,
    l0: number,
    l1: number,
  ): void;

  /**
   * C(i, j) := C(i, j) − Σ_k A(i, k)·B(j, k) for i0 ≤ i < i1, j0 ≤ j < j1; with `lower` only where i ≥ j (then i0 − j0 is a
   * multiple of `group`). A and B are packed groups of the given depth, A from row i0 on at a[aAt], B from row j0 on at b[bAt].
   */
  update(
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
  ): void;

  /**
   * Cholesky (LLᵀ, LLᴴ) of columns k0 … k1 − 1 (at most 128), rows k0 … m − 1, in place; earlier columns have been applied already.
   * @returns −1, or the first column whose pivot is not positive (its updated value is left in its diagonal place).
   */
  cholesky(x: Float64Array, base: number, ld: number, shrink: number, k0: number, k1: number, m: number): number;

  /** modulus of scalar w[at] */
  modulus(w: Float64Array, at: number): number;

  /** The i of i0 … i1 − 1 for which w[at + i] has the largest modulus (the first NaN, if any); −1 for an empty range. */
  largest(w: Float64Array, at: number, i0: number, i1: number): number;

  /** w[wAt + i] := w[wAt + i] − Σ_l X(i, l)·f[fAt + l − l0] for i0 ≤ i < i1, l0 ≤ l < l1. */
  apply(
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
  ): void;

  /** f[fAt + l − l0] := f[fAt + l − l0] − Σ_i X(i, l)·w[wAt + i] for l0 ≤ l < l1, i0 ≤ i < i1; X conjugated where asked. */
  applyTransposed(
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
  ): void;

  /** to[toAt + i] := w[wAt + i] / d[dAt] for i0 ≤ i < i1. */
  divide(
    to: Float64Array,
    toAt: number,
    w: Float64Array,
    wAt: number,
    i0: number,
    i1: number,
    d: Float64Array,
    dAt: number,
  ): void;

  /** (x[c0 + i], x[c1 + i]) := (u·f0 + v·f1, u·f2 + v·f3) of the old u = x[c0 + i], v = x[c1 + i], for i0 ≤ i < i1; f0 at f[fAt]. */
  combine(x: Float64Array, c0: number, c1: number, i0: number, i1: number, f: Float64Array, fAt: number): void;

  /**
   * For a pivot of order two D = (d11 d12; d21 d22), d12 = d21 or its conjugate: the f0 … f3 with which `combine` turns two columns
   * of the reduced matrix into two columns of L, that is D⁻¹ from the right. @returns false where D is singular or not finite.
   */
  invertPair(
    f: Float64Array,
    fAt: number,
    d11: Float64Array,
    at11: number,
    d21: Float64Array,
    at21: number,
    d22: Float64Array,
    at22: number,
    hermitian: boolean,
  ): boolean;

  /** f[fAt + l − l0] := (D·Lᵀ)(l, row), or D·Lᴴ, for l0 ≤ l < l1; D by d[dAt + l] and, at the first of a pair, d21 in e[dAt + l] ≠ 0. */
  pairedCoefficients(
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
  ): void;

  /** Packed groups of L (`from`, not conjugated) into packed groups of L·Dᵀ, or of the conjugate of L times Dᵀ when Hermitian. */
  scaleGroups(
    to: Float64Array,
    from: Float64Array,
    groups: number,
    depth: number,
    d: Float64Array,
    e: Float64Array,
    dAt: number,
    hermitian: boolean,
  ): void;
}
