import { type GeneralPanel, partialLu, updateFromLu } from '../dense/lu.ts';
import type { Front } from './front.ts';
import type { FrontRun } from './run.ts';

function panelOf(run: FrontRun, front: Front): GeneralPanel {
  return {
    x: front.panel,
    base: front.base,
    m: front.m,
    p: front.summed,
    rowList: run.rowList,
    columnList: run.columnList,
    listAt: front.list,
    localRow: run.localRow,
  };
}

/** Eliminates what passes the pivot rule by LU. @returns pivots. */
export function eliminateLu(run: FrontRun, front: Front): number {
  return partialLu(run.kernels, run.work, panelOf(run, front), run.rule, run.tally, run.tick);
}

/** Moves delayed rows and columns to the contribution block at `at` of the stack and subtracts L·U from the rest of it. */
export function updateLuBlock(run: FrontRun, front: Front, done: number, at: number): void {
  const { kernels, stack } = run;
  const { panel, base, m, summed } = front;
  const width = kernels.width;
  const size = m - done;
  const delayed = summed - done;
  const below = m - summed;
  const behind = base + m * summed;
  for (let j = done; j < summed; j++) {
    const from = base + j * m;
    const to = at + (j - done) * size;
    stack.array.set(panel.subarray(width * (from + done), width * (from + m)), width * to);
  }
  for (let k = done; k < summed; k++) {
    for (let c = 0; c < below; c++) {
      const from = width * (behind + k * below + c);
      const to = width * (at + (delayed + c) * size + k - done);
      stack.array[to] = panel[from];
      if (width === 2) stack.array[to + 1] = panel[from + 1];
    }
  }
  const inner = at + delayed * size + delayed;
  updateFromLu(kernels, run.work, panelOf(run, front), done, stack.array, inner, size, run.tick);
}

/**
 * Brings the panel into its final form when pivots were delayed: m × done rectangle of L over U, and behind it the rest of U transposed,
 * (m − done) × done, delayed columns first.
 */
export function closeLuPanel(run: FrontRun, front: Front, done: number): void {
  const { panel, base, m, summed } = front;
  const delayed = summed - done;
  if (delayed === 0 || done === 0) return;
  const width = run.kernels.width;
  const below = m - summed;
  const behind = base + m * summed;
  const rest = m - done;
  const upper = new Float64Array(width * rest * done);
  for (let k = 0; k < done; k++) {
    for (let j = 0; j < rest; j++) {
      const from = j < delayed ? base + (done + j) * m + k : behind + k * below + j - delayed;
      for (let c = 0; c < width; c++) upper[width * (k * rest + j) + c] = panel[width * from + c];
    }
  }
  panel.set(upper, width * (base + m * done));
}
