import type { DenseKernels } from './kernels.ts';

/** Rows of A packed groups swept at a time, so that they stay in the second cache level while B streams past. */
const sweepRows = 128;

/** Columns updated between two ticks: with a depth of 256 some 2.7e8 operations, well below a tenth of a second. */
const sweepColumns = 4096;

/**
 * C(i, j) := C(i, j) − Σ_k A(i, k)·B(j, k) for i0 ≤ i < i1, j0 ≤ j < j1, with `lower` only where i ≥ j, in pieces that suit the caches.
 * Both operands are packed from place 0 on, A from row i0, B from row j0; with `lower`, i0 − j0 is a multiple of the group.
 * @param tick called after every piece with its operations (multiplication and addition of a scalar counted two).
 */
export function sweepUpdate(
  kernels: DenseKernels,
  c: Float64Array,
  base: number,
  ld: number,
  shrink: number,
  i0: number,
  i1: number,
  j0: number,
  j1: number,
  lower: boolean,
  left: Float64Array,
  right: Float64Array,
  depth: number,
  tick: (operations: number) => void,
): void {
  for (let r0 = i0; r0 < i1; r0 += sweepRows) {
    const r1 = r0 + sweepRows < i1 ? r0 + sweepRows : i1;
    const last = lower && r1 < j1 ? r1 : j1;
    for (let q0 = j0; q0 < last; q0 += sweepColumns) {
      const q1 = q0 + sweepColumns < last ? q0 + sweepColumns : last;
      const [a, b] = [(r0 - i0) * depth, (q0 - j0) * depth];
      kernels.update(c, base, ld, shrink, r0, r1, q0, q1, lower, left, a, right, b, depth);
      tick(2 * depth * (r1 - r0) * (q1 - q0));
    }
  }
}
