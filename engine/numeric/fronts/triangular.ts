import type { DenseKernels } from '../dense/kernels.ts';

/** Columns handled together in a dense triangular solve: the triangle by single columns, the rest by blocks. */
const blockColumns = 32;

/** A dense panel whose first p columns hold a triangle in rows 0 … p − 1 and a rectangle in rows p … m − 1. */
export interface Panel {
  x: Float64Array;
  base: number;
  ld: number;
  shrink: number;
  m: number;
  p: number;
}

/** v := L⁻¹·v on places 0 … p − 1, and minus the rectangle times that on places p … m − 1. */
export function solveLower(kernels: DenseKernels, a: Panel, v: Float64Array, unit: boolean): void {
  const { x, base, ld, shrink, m, p } = a;
  for (let k0 = 0; k0 < p; k0 += blockColumns) {
    const k1 = k0 + blockColumns < p ? k0 + blockColumns : p;
    for (let k = k0; k < k1; k++) {
      if (!unit) kernels.divide(v, 0, v, 0, k, k + 1, x, start(a, k) + k);
      kernels.apply(v, 0, x, base, ld, shrink, k, k + 1, k + 1, k1, v, k);
    }
    kernels.apply(v, 0, x, base, ld, shrink, k0, k1, k1, m, v, k0);
  }
}

/** v := L⁻ᵀ·(v − rectangleᵀ·v below) on places 0 … p − 1; L conjugated where asked. */
export function solveLowerTransposed(
  kernels: DenseKernels,
  a: Panel,
  v: Float64Array,
  unit: boolean,
  conjugate: boolean,
): void {
  const { x, base, ld, shrink, m, p } = a;
  for (let k1 = p; k1 > 0; k1 -= blockColumns) {
    const k0 = k1 > blockColumns ? k1 - blockColumns : 0;
    kernels.applyTransposed(v, k0, x, base, ld, shrink, k0, k1, k1, m, v, 0, conjugate);
    for (let k = k1 - 1; k >= k0; k--) {
      kernels.applyTransposed(v, k, x, base, ld, shrink, k, k + 1, k + 1, k1, v, 0, conjugate);
      if (!unit) kernels.divide(v, 0, v, 0, k, k + 1, x, start(a, k) + k);
    }
  }
}

/** v := U⁻¹·v on places 0 … p − 1, U the upper triangle (with diagonal) of the panel's first p rows. */
export function solveUpper(kernels: DenseKernels, a: Panel, v: Float64Array): void {
  const { x, base, ld, p } = a;
  for (let k1 = p; k1 > 0; k1 -= blockColumns) {
    const k0 = k1 > blockColumns ? k1 - blockColumns : 0;
    for (let k = k1 - 1; k >= k0; k--) {
      kernels.divide(v, 0, v, 0, k, k + 1, x, base + k * ld + k);
      kernels.apply(v, 0, x, base, ld, 0, k, k + 1, k0, k, v, k);
    }
    kernels.apply(v, 0, x, base, ld, 0, k0, k1, 0, k0, v, k0);
  }
}

/** v := U⁻ᵀ·v on places 0 … p − 1. */
export function solveUpperTransposed(kernels: DenseKernels, a: Panel, v: Float64Array): void {
  const { x, base, ld, p } = a;
  for (let k0 = 0; k0 < p; k0 += blockColumns) {
    const k1 = k0 + blockColumns < p ? k0 + blockColumns : p;
    kernels.applyTransposed(v, k0, x, base, ld, 0, k0, k1, 0, k0, v, 0, false);
    for (let k = k0; k < k1; k++) {
      kernels.applyTransposed(v, k, x, base, ld, 0, k, k + 1, k0, k, v, 0, false);
      kernels.divide(v, 0, v, 0, k, k + 1, x, base + k * ld + k);
    }
  }
}

function start(a: Panel, j: number): number {
  return a.base + j * a.ld - ((a.shrink * j * (j + 1)) >> 1);
}
