import { partialLdlt, type SymmetricPanel, updateFromLdlt } from '../dense/ldlt.ts';
import type { Front } from './front.ts';
import type { FrontRun } from './run.ts';

function panelOf(run: FrontRun, front: Front): SymmetricPanel {
  return {
    x: front.panel,
    base: front.base,
    m: front.m,
    p: front.summed,
    d: run.diagonal,
    e: run.subdiagonal,
    dAt: run.pivotStart[front.s],
    list: run.rowList,
    listAt: front.list,
  };
}

/** Eliminates what passes the pivot rule by LDLᵀ or LDLᴴ. @returns pivot columns. */
export function eliminateLdlt(run: FrontRun, front: Front): number {
  return partialLdlt(run.kernels, run.work, panelOf(run, front), run.rule, run.tally, run.tick);
}

/** Moves delayed columns to the contribution block at `at` of the stack and subtracts L·D·Lᵀ from the rest of it. */
export function updateLdltBlock(run: FrontRun, front: Front, done: number, at: number): void {
  const { kernels, stack } = run;
  const { panel, base, m, summed } = front;
  const size = m - done;
  const width = kernels.width;
  let to = at;
  for (let j = done; j < summed; j++) {
    const from = base + j * m - ((j * (j + 1)) >> 1) + j;
    stack.array.set(panel.subarray(width * from, width * (from + m - j)), width * to);
    to += m - j;
  }
  updateFromLdlt(
    kernels,
    run.work,
    panelOf(run, front),
    run.options.hermitian,
    done,
    summed,
    stack.array,
    to,
    size - (summed - done),
    run.tick,
  );
}
