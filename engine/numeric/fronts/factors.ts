import type { NewToOld } from '../../matrix/permutation.ts';
import type { DenseKernels } from '../dense/kernels.ts';
import type { SettledOptions } from './options.ts';
import { panelSize } from './plan.ts';
import type { FrontRun } from './run.ts';
import type { FactorArray } from './storage.ts';

/**
 * Factors as a run leaves them: panels in a few large arrays. Symmetric panel: lower trapezoid, ld = m. LU panel: m × p rectangle
 * (unit-lower L below U), then the rest of U transposed, (m − p) × p. Subscripts are internal columns.
 */
export interface Factors {
  readonly size: number;
  readonly kernels: DenseKernels;
  readonly options: SettledOptions;
  /** internal column -> original column */
  readonly columnOrder: NewToOld;
  /** internal row -> original row */
  readonly rowOrder: Int32Array;
  /** number of fronts */
  readonly count: number;
  readonly listStart: Int32Array;
  readonly rowList: Int32Array;
  readonly columnList: Int32Array;
  readonly eliminated: Int32Array;
  /** front -> number of its first pivot in the order of elimination; length count + 1; the last is the number of pivots */
  readonly pivotStart: Int32Array;
  readonly chunks: readonly FactorArray[];
  readonly chunkOf: Int32Array;
  readonly panelAt: Int32Array;
  readonly diagonal: Float64Array;
  readonly subdiagonal: Float64Array;
  /** front of largest order */
  readonly largestFront: number;
}

/** Takes the factors out of a finished run. */
export function factorsOf(run: FrontRun): Factors {
  const rowOrder = new Int32Array(run.size);
  let largestFront = 0;
  for (let c = 0; c < run.size; c++) rowOrder[c] = run.originalRow(c);
  for (let s = 0; s < run.tree.count; s++) {
    largestFront = Math.max(largestFront, run.listStart[s + 1] - run.listStart[s]);
  }
  return {
    size: run.size,
    kernels: run.kernels,
    options: run.options,
    columnOrder: run.tree.order,
    rowOrder,
    count: run.tree.count,
    listStart: run.listStart,
    rowList: run.rowList,
    columnList: run.columnList,
    eliminated: run.eliminated,
    pivotStart: run.pivotStart,
    chunks: run.store.chunks,
    chunkOf: run.chunkOf,
    panelAt: run.panelAt,
    diagonal: run.diagonal,
    subdiagonal: run.subdiagonal,
    largestFront,
  };
}

/** A panel as the kernels read it. */
export interface PanelView {
  x: Float64Array;
  /** first scalar */
  base: number;
}

/** Scalars of the panel of front s. */
export function panelLength(f: Factors, s: number): number {
  return panelSize(f.options.kind !== 'lu', f.listStart[s + 1] - f.listStart[s], f.eliminated[s]);
}

/** Doubles that `openPanel` needs as scratch: none unless factors are stored in single precision. */
export function scratchLength(f: Factors): number {
  let most = 0;
  if (f.options.single) for (let s = 0; s < f.count; s++) most = Math.max(most, panelLength(f, s));
  return f.kernels.width * most;
}

/** Points `view` at the panel of front s: where it lies, or as doubles in `scratch`. */
export function openPanel(f: Factors, s: number, view: PanelView, scratch: Float64Array): void {
  const array = f.chunks[f.chunkOf[s]];
  if (array instanceof Float64Array) {
    view.x = array;
    view.base = f.panelAt[s];
    return;
  }
  const w = f.kernels.width;
  scratch.set(array.subarray(w * f.panelAt[s], w * (f.panelAt[s] + panelLength(f, s))));
  view.x = scratch;
  view.base = 0;
}
