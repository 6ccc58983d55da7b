import type { DenseKernels } from './kernels.ts';
import { swapScalars } from './ldlt.ts';
import type { PivotRule, PivotTally } from './pivoting.ts';
import { sweepUpdate } from './sweep.ts';
import { type DenseWorkspace, panelWidth, updateDepth } from './workspace.ts';

/**
 * An unsymmetric front under LU. `x` from `base` on: the m × p rectangle of fully summed columns (ld = m); behind it, transposed,
 * the fully summed rows of the m − p later columns: row k of the front is column k of an (m − p) × p rectangle.
 */
export interface GeneralPanel {
  readonly x: Float64Array;
  readonly base: number;
  /** order of the front */
  readonly m: number;
  /** fully summed rows and columns */
  readonly p: number;
  /** subscripts of rows and columns, reordered with the pivots, from `listAt` on */
  readonly rowList: Int32Array;
  readonly columnList: Int32Array;
  readonly listAt: number;
  /** subscript -> place of that row in the front */
  readonly localRow: Int32Array;
}

/**
 * Partial LU with threshold partial pivoting (Duff, Erisman & Reid 1986; fronts: Duff & Reid 1984): the pivot of a column is chosen
 * among the fully summed rows, the diagonal first, and passes only if it is ≥ u times the largest entry of the column in any row of
 * the front, contribution rows included. Columns without such a pivot go to the end and are tried again as long as others succeed.
 * In place: afterwards columns 0 … result − 1 hold unit-lower L below U, the rows behind hold the rest of U.
 * @returns number of pivots.
 */
export function partialLu(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: GeneralPanel,
  rule: PivotRule,
  tally: PivotTally,
  tick: (operations: number) => void,
): number {
  const { m, p } = panel;
  let done = 0;
  let end = p;
  let progress = false;
  while (done < p) {
    const k0 = done;
    const blockEnd = k0 + panelWidth < p ? k0 + panelWidth : p;
    while (done < blockEnd && done < end) {
      if (takePivot(kernels, work, panel, rule, tally, k0, done)) {
        done++;
        continue;
      }
      if (rule.pivoting !== 'threshold') break;
      end--;
      swapColumns(kernels, panel, done, end);
    }
    if (done > k0) {
      progress = true;
      trail(kernels, work, panel, k0, done, tick);
      tick(2 * (done - k0) * (done - k0) * (m - k0));
    }
    if (rule.pivoting !== 'threshold' && done < blockEnd) break;
    if (done < end) continue;
    if (!progress) break;
    progress = false;
    end = p;
  }
  return done;
}

/** Tries to find a pivot in column k, brought up to date with the pivots k0 … k − 1. @returns whether it was eliminated. */
function takePivot(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: GeneralPanel,
  rule: PivotRule,
  tally: PivotTally,
  k0: number,
  k: number,
): boolean {
  const { x, base, m, p, rowList, columnList, listAt, localRow } = panel;
  const wide = kernels.width;
  const w = work.first;
  const own = wide * (base + k * m);
  for (let i = wide * k0; i < wide * m; i++) w[i] = x[own + i];
  // the part of U inside the block, one unit-lower step at a time, then the rows below
  for (let l = k0; l < k - 1; l++) kernels.apply(w, 0, x, base, m, 0, l, l + 1, l + 1, k, w, l);
  if (k > k0) kernels.apply(w, 0, x, base, m, 0, k0, k, k, m, w, k0);
  const place = localRow[columnList[listAt + k]];
  const onDiagonal = place >= k && place < p && rowList[listAt + place] === columnList[listAt + k];
  let row = onDiagonal ? place : k;
  const size = kernels.modulus(w, row);
  if (rule.pivoting === 'threshold') {
    const most = kernels.modulus(w, kernels.largest(w, 0, k, m));
    if (!(onDiagonal && size > 0 && size >= rule.threshold * most)) {
      row = kernels.largest(w, 0, k, p);
      const best = kernels.modulus(w, row);
      if (!(best > 0 && best >= rule.threshold * most)) return false;
    }
  } else if (rule.pivoting === 'static' && !(size >= rule.smallest)) {
    tally.perturbed++;
    raise(wide, w, row, size, rule.smallest);
  } else if (size === 0) return false;
  if (rowList[listAt + row] !== columnList[listAt + k]) tally.offDiagonal++;
  swapRows(kernels, panel, k, row);
  swapScalars(wide, w, k, row);
  for (let i = wide * k0; i < wide * (k + 1); i++) x[own + i] = w[i];
  kernels.divide(x, base + k * m, w, 0, k + 1, m, w, k);
  return true;
}

/** Moves a pivot that is too small out to the given modulus, keeping its sign or direction. */
function raise(wide: number, w: Float64Array, k: number, own: number, smallest: number): void {
  const f = smallest / own;
  const keep = own > 0 && Number.isFinite(f);
  w[wide * k] = keep ? w[wide * k] * f : smallest;
  if (wide === 2) w[2 * k + 1] = keep ? w[2 * k + 1] * f : 0;
}

function swapColumns(kernels: DenseKernels, panel: GeneralPanel, a: number, b: number): void {
  if (a === b) return;
  const { x, base, m, columnList, listAt } = panel;
  const t = columnList[listAt + a];
  columnList[listAt + a] = columnList[listAt + b];
  columnList[listAt + b] = t;
  const wide = kernels.width;
  const sa = wide * (base + a * m);
  const sb = wide * (base + b * m);
  for (let i = 0; i < wide * m; i++) {
    const v = x[sa + i];
    x[sa + i] = x[sb + i];
    x[sb + i] = v;
  }
}

function swapRows(kernels: DenseKernels, panel: GeneralPanel, a: number, b: number): void {
  if (a === b) return;
  const { x, base, m, p, rowList, listAt, localRow } = panel;
  const wide = kernels.width;
  const t = rowList[listAt + a];
  rowList[listAt + a] = rowList[listAt + b];
  rowList[listAt + b] = t;
  localRow[rowList[listAt + a]] = a;
  localRow[rowList[listAt + b]] = b;
  for (let j = 0; j < p; j++) swapScalars(wide, x, base + j * m + a, base + j * m + b);
  const below = m - p;
  const behind = base + m * p;
  const sa = wide * (behind + a * below);
  const sb = wide * (behind + b * below);
  for (let i = 0; i < wide * below; i++) {
    const v = x[sa + i];
    x[sa + i] = x[sb + i];
    x[sb + i] = v;
  }
}

/** Brings the remaining fully summed columns and rows up to date with the pivots k0 … done − 1. */
function trail(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: GeneralPanel,
  k0: number,
  done: number,
  tick: (operations: number) => void,
): void {
  const { x, base, m, p } = panel;
  const { left, right } = work;
  const depth = done - k0;
  // rows of U of this block in the remaining fully summed columns
  for (let j = done; j < p; j++) {
    const column = base + j * m;
    for (let l = k0; l < done - 1; l++) kernels.apply(x, column, x, base, m, 0, l, l + 1, l + 1, done, x, column + l);
  }
  if (done < p) {
    kernels.pack(left, 0, x, base, m, 0, k0, done, done, m, false);
    kernels.packTransposed(right, 0, x, base, m, done, p, k0, done);
    sweepUpdate(kernels, x, base, m, 0, done, m, done, p, false, left, right, depth, tick);
  }
  const below = m - p;
  if (below === 0) return;
  // the same rows in the later columns, which are stored transposed
  const behind = base + m * p;
  const f = work.factors;
  for (let k = k0 + 1; k < done; k++) {
    copyRow(kernels.width, f, x, base, m, k, k0, k);
    kernels.apply(x, behind + k * below, x, behind, below, 0, k0, k, 0, below, f, 0);
  }
  if (done === p) return;
  kernels.pack(left, 0, x, behind, below, 0, k0, done, 0, below, false);
  kernels.pack(right, 0, x, base, m, 0, k0, done, done, p, false);
  sweepUpdate(kernels, x, behind, below, 0, 0, below, done, p, false, left, right, depth, tick);
}

/** f[l − l0] := X(row, l) of a rectangle, l0 ≤ l < l1. */
function copyRow(
  wide: number,
  f: Float64Array,
  x: Float64Array,
  base: number,
  ld: number,
  row: number,
  l0: number,
  l1: number,
): void {
  for (let l = l0; l < l1; l++) {
    const s = wide * (base + l * ld + row);
    f[wide * (l - l0)] = x[s];
    if (wide === 2) f[2 * (l - l0) + 1] = x[s + 1];
  }
}

/**
 * C := C − L·U on the (m − p) × (m − p) contribution rows and columns, with the `done` pivots eliminated.
 * @param c rectangle addressed by (cBase, cLd), its row and column 0 belonging to place p of the front.
 */
export function updateFromLu(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: GeneralPanel,
  done: number,
  c: Float64Array,
  cBase: number,
  cLd: number,
  tick: (operations: number) => void,
): void {
  const { x, base, m, p } = panel;
  const { left, right } = work;
  const below = m - p;
  const behind = base + m * p;
  for (let k0 = 0; k0 < done; k0 += updateDepth) {
    const k1 = k0 + updateDepth < done ? k0 + updateDepth : done;
    const depth = k1 - k0;
    kernels.pack(left, 0, x, base, m, 0, k0, k1, p, m, false);
    kernels.pack(right, 0, x, behind, below, 0, k0, k1, 0, below, false);
    sweepUpdate(kernels, c, cBase, cLd, 0, 0, below, 0, below, false, left, right, depth, tick);
  }
}
