import type { Front } from './front.ts';
import type { FrontRun } from './run.ts';

/**
 * Extend-add (Duff & Reid 1983): contribution blocks of children are added into their parent, in two steps. First what falls into
 * fully summed rows and columns goes to the panel; after its elimination the rest goes to the parent's own contribution block.
 */

/** A child's block on the stack. */
interface Block {
  /** first scalar on the stack */
  at: number;
  /** order */
  size: number;
  /** leading places that hold delayed unknowns */
  delayed: number;
  /** leading places that fall into fully summed places of the parent */
  summed: number;
}

const block: Block = { at: 0, size: 0, delayed: 0, summed: 0 };

/** Fills the maps of the c-th pending child and measures its block. */
function openBlock(run: FrontRun, c: number, front: Front): void {
  const child = run.pendingFront[c];
  const from = run.listStart[child] + run.eliminated[child];
  const size = run.listStart[child + 1] - from;
  const { rowMap, columnMap, rowList, columnList, localRow, localColumn } = run;
  for (let k = 0; k < size; k++) rowMap[k] = localRow[rowList[from + k]];
  if (!run.symmetric) for (let k = 0; k < size; k++) columnMap[k] = localColumn[columnList[from + k]];
  let summed = run.delayed[child];
  while (summed < size && rowMap[summed] < front.summed) summed++;
  block.at = run.pendingAt[c];
  block.size = size;
  block.delayed = run.delayed[child];
  block.summed = summed;
}

/** Adds the fully summed rows and columns of all children to the panel. */
export function extendIntoPanel(run: FrontRun, front: Front): void {
  for (let c = run.pendingCount - front.children; c < run.pendingCount; c++) {
    openBlock(run, c, front);
    if (run.symmetric) panelSymmetric(run, front);
    else panelGeneral(run, front);
  }
}

/** Adds the rest of all children to the contribution block at `at`, whose place 0 is front place `gone`. */
export function extendIntoBlock(run: FrontRun, front: Front, at: number, gone: number): void {
  for (let c = run.pendingCount - front.children; c < run.pendingCount; c++) {
    openBlock(run, c, front);
    const s = front.m - gone;
    if (run.symmetric) blockSymmetric(run, at, s, gone);
    else blockGeneral(run, at, s, gone);
  }
}

function panelSymmetric(run: FrontRun, front: Front): void {
  const { rowMap: map } = run;
  const from = run.stack.array;
  const to = front.panel;
  const { base, m } = front;
  const { size, delayed, summed } = block;
  const wide = run.kernels.width === 2;
  for (let c = 0; c < summed; c++) {
    const g = map[c];
    const source = block.at + c * size - ((c * (c + 1)) >> 1);
    const start = base + g * m - ((g * (g + 1)) >> 1);
    if (c < delayed) delayedColumn(run, front, c, source);
    else if (wide) {
      for (let i = c; i < size; i++) {
        const t = 2 * (start + map[i]);
        to[t] += from[2 * (source + i)];
        to[t + 1] += from[2 * (source + i) + 1];
      }
    } else for (let i = c; i < size; i++) to[start + map[i]] += from[source + i];
  }
}

/** A delayed column comes behind the parent's own columns, so that some of its entries change sides of the diagonal. */
function delayedColumn(run: FrontRun, front: Front, c: number, source: number): void {
  const { rowMap: map } = run;
  const from = run.stack.array;
  const to = front.panel;
  const { base, m } = front;
  const w = run.kernels.width;
  for (let i = c; i < block.size; i++) {
    const below = map[i] >= map[c];
    const column = below ? map[c] : map[i];
    const row = below ? map[i] : map[c];
    const t = w * (base + column * m - ((column * (column + 1)) >> 1) + row);
    to[t] += from[w * (source + i)];
    if (w === 1) continue;
    const imaginary = from[w * (source + i) + 1];
    to[t + 1] += below || !run.options.hermitian ? imaginary : -imaginary;
  }
}

function blockSymmetric(run: FrontRun, at: number, s: number, gone: number): void {
  const { rowMap: map } = run;
  const x = run.stack.array;
  const { size } = block;
  const wide = run.kernels.width === 2;
  for (let c = block.summed; c < size; c++) {
    const g = map[c] - gone;
    const source = block.at + c * size - ((c * (c + 1)) >> 1);
    const start = at + g * s - ((g * (g + 1)) >> 1) - gone;
    if (wide) {
      for (let i = c; i < size; i++) {
        const t = 2 * (start + map[i]);
        x[t] += x[2 * (source + i)];
        x[t + 1] += x[2 * (source + i) + 1];
      }
    } else for (let i = c; i < size; i++) x[start + map[i]] += x[source + i];
  }
}

function panelGeneral(run: FrontRun, front: Front): void {
  const { rowMap, columnMap } = run;
  const from = run.stack.array;
  const to = front.panel;
  const { m } = front;
  const { size, summed } = block;
  const w = run.kernels.width;
  for (let c = 0; c < summed; c++) {
    const start = front.base + columnMap[c] * m;
    addColumn(to, start, rowMap, from, block.at + c * size, 0, size, w);
  }
  const below = m - front.summed;
  const behind = front.base + m * front.summed - front.summed;
  for (let c = summed; c < size; c++) {
    const source = block.at + c * size;
    const place = behind + columnMap[c];
    for (let i = 0; i < summed; i++) {
      const t = w * (place + rowMap[i] * below);
      to[t] += from[w * (source + i)];
      if (w === 2) to[t + 1] += from[w * (source + i) + 1];
    }
  }
}

function blockGeneral(run: FrontRun, at: number, s: number, gone: number): void {
  const { rowMap, columnMap } = run;
  const x = run.stack.array;
  const { size, summed } = block;
  for (let c = summed; c < size; c++) {
    const start = at + (columnMap[c] - gone) * s - gone;
    addColumn(x, start, rowMap, x, block.at + c * size, summed, size, run.kernels.width);
  }
}

/** to[start + map[i]] += from[source + i] for i0 ≤ i < i1. */
function addColumn(
  to: Float64Array,
  start: number,
  map: Int32Array,
  from: Float64Array,
  source: number,
  i0: number,
  i1: number,
  width: number,
): void {
  if (width === 1) {
    for (let i = i0; i < i1; i++) to[start + map[i]] += from[source + i];
    return;
  }
  for (let i = i0; i < i1; i++) {
    const t = 2 * (start + map[i]);
    to[t] += from[2 * (source + i)];
    to[t + 1] += from[2 * (source + i) + 1];
  }
}
