import type { DenseKernels } from './kernels.ts';
import { sweepUpdate } from './sweep.ts';
import { type DenseWorkspace, panelWidth, updateDepth } from './workspace.ts';

/**
 * Partial Cholesky of a front, right-looking in blocks: columns 0 … p − 1 of the panel become those of L. In place.
 * @param x panel of m rows, addressed by (base, ld, shrink), see `DenseKernels`.
 * @param tick called after every block with the operations done.
 * @returns −1, or the first column whose pivot is not positive.
 */
export function partialCholesky(
  kernels: DenseKernels,
  work: DenseWorkspace,
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  m: number,
  p: number,
  tick: (operations: number) => void,
): number {
  for (let k0 = 0; k0 < p; k0 += panelWidth) {
    const k1 = k0 + panelWidth < p ? k0 + panelWidth : p;
    const bad = kernels.cholesky(x, base, ld, shrink, k0, k1, m);
    if (bad >= 0) return bad;
    if (k1 === p) break;
    const left = work.left;
    kernels.pack(left, 0, x, base, ld, shrink, k0, k1, k1, m, false);
    let right = left;
    if (kernels.width === 2) {
      right = work.right;
      kernels.pack(right, 0, x, base, ld, shrink, k0, k1, k1, p, true);
    }
    sweepUpdate(kernels, x, base, ld, shrink, k1, m, k1, p, true, left, right, k1 - k0, tick);
  }
  return -1;
}

/**
 * C := C − L·Lᴴ on the lower triangle of the contribution block, L being rows i0 … m − 1 of columns 0 … p − 1 of the panel.
 * @param c contribution block addressed by (cBase, cLd, cShrink), its row and column 0 belonging to panel row i0.
 */
export function updateFromCholesky(
  kernels: DenseKernels,
  work: DenseWorkspace,
  x: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  m: number,
  p: number,
  i0: number,
  c: Float64Array,
  cBase: number,
  cLd: number,
  cShrink: number,
  tick: (operations: number) => void,
): void {
  const size = m - i0;
  for (let k0 = 0; k0 < p; k0 += updateDepth) {
    const k1 = k0 + updateDepth < p ? k0 + updateDepth : p;
    const depth = k1 - k0;
    const left = work.left;
    kernels.pack(left, 0, x, base, ld, shrink, k0, k1, i0, m, false);
    let right = left;
    if (kernels.width === 2) {
      right = work.right;
      kernels.pack(right, 0, x, base, ld, shrink, k0, k1, i0, m, true);
    }
    sweepUpdate(kernels, c, cBase, cLd, cShrink, 0, size, 0, size, true, left, right, depth, tick);
  }
}
