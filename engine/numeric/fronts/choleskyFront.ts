import { Fault } from '../../matrix/fault.ts';
import { partialCholesky, updateFromCholesky } from '../dense/cholesky.ts';
import type { Front } from './front.ts';
import type { FrontRun } from './run.ts';

/** Eliminates all fully summed columns of a front by Cholesky. @throws Fault with the original row of a pivot that is not positive. */
export function eliminateCholesky(run: FrontRun, front: Front): number {
  const { kernels, work } = run;
  const { panel, base, m, summed } = front;
  const bad = partialCholesky(kernels, work, panel, base, m, 1, m, summed, run.tick);
  if (bad >= 0) {
    const row = run.tree.order[run.rowList[front.list + bad]];
    const value = panel[kernels.width * (base + bad * m - ((bad * (bad + 1)) >> 1) + bad)];
    throw new Fault(
      'not-completed',
      'not-positive-definite',
      `The matrix is not positive definite: at original row ${row} (0-based) the pivot is ${value}. Use LDLᵀ, or LU.`,
      { row, column: row },
      [{ id: 'use-ldlt', text: 'Factorize as LDLᵀ with threshold pivots.' }],
    );
  }
  return summed;
}

/** Subtracts L·Lᴴ from the contribution block at `at` of the stack. */
export function updateCholeskyBlock(run: FrontRun, front: Front, _done: number, at: number): void {
  const { m, summed, base, panel } = front;
  const s = m - summed;
  updateFromCholesky(run.kernels, run.work, panel, base, m, 1, m, summed, summed, run.stack.array, at, s, 1, run.tick);
}
