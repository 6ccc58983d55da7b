import { type Factors, openPanel, scratchLength } from './factors.ts';
import { type Panel, solveLower, solveLowerTransposed, solveUpper, solveUpperTransposed } from './triangular.ts';

/** Right-hand sides carried through the fronts together, so that each panel is read from memory once for all of them. */
const solveColumns = 16;

/**
 * Forward and back substitution over the fronts. Vectors go column by column; complex ones interleaved.
 * `x` in the original numbering is overwritten: with A·x = b, or Aᵀ·x = b when transposed.
 */
export function solveFronts(f: Factors, x: Float64Array, columns: number, transposed: boolean): void {
  const n = f.size;
  const width = f.kernels.width;
  const most = Math.min(columns, solveColumns);
  const y = new Float64Array(width * n * most);
  const z = new Float64Array(width * n * most);
  const v = new Float64Array(width * f.largestFront);
  const scratch = new Float64Array(scratchLength(f));
  const conjugate = transposed && f.options.hermitian;
  const flipped = transposed && f.options.kind === 'lu';
  for (let c0 = 0; c0 < columns; c0 += most) {
    const count = Math.min(most, columns - c0);
    const part = x.subarray(width * n * c0, width * n * (c0 + count));
    if (conjugate) conjugateInPlace(part);
    for (let c = 0; c < count; c++) enter(f, part, y, c, flipped);
    forward(f, y, z, v, scratch, count, flipped);
    backward(f, y, z, v, scratch, count, flipped);
    for (let c = 0; c < count; c++) leave(f, y, part, c, flipped);
    if (conjugate) conjugateInPlace(part);
  }
}

function conjugateInPlace(x: Float64Array): void {
  for (let i = 1; i < x.length; i += 2) x[i] = -x[i];
}

/** Original right-hand side, scaled, to internal numbering. */
function enter(f: Factors, b: Float64Array, y: Float64Array, c: number, flipped: boolean): void {
  const order = flipped ? f.columnOrder : f.rowOrder;
  move(f, b, y, c, order, flipped ? f.options.columnScale : f.options.rowScale, true);
}

/** Internal solution to original numbering, scaled. */
function leave(f: Factors, y: Float64Array, x: Float64Array, c: number, flipped: boolean): void {
  const order = flipped ? f.rowOrder : f.columnOrder;
  move(f, y, x, c, order, flipped ? f.options.rowScale : f.options.columnScale, false);
}

function move(
  f: Factors,
  from: Float64Array,
  to: Float64Array,
  c: number,
  order: Int32Array,
  scale: Float64Array | null,
  inward: boolean,
): void {
  const n = f.size;
  const w = f.kernels.width;
  const base = w * n * c;
  for (let k = 0; k < n; k++) {
    const i = order[k];
    const factor = scale === null ? 1 : scale[i];
    const source = base + w * (inward ? i : k);
    const target = base + w * (inward ? k : i);
    to[target] = from[source] * factor;
    if (w === 2) to[target + 1] = from[source + 1] * factor;
  }
}

const panel: Panel = { x: new Float64Array(0), base: 0, ld: 0, shrink: 0, m: 0, p: 0 };

function open(f: Factors, s: number, scratch: Float64Array): void {
  openPanel(f, s, panel, scratch);
  panel.m = f.listStart[s + 1] - f.listStart[s];
  panel.p = f.eliminated[s];
  panel.ld = panel.m;
  panel.shrink = f.options.kind === 'lu' ? 0 : 1;
}

/** z := solution with the first factor, in the order of elimination; y is used up. */
function forward(
  f: Factors,
  y: Float64Array,
  z: Float64Array,
  v: Float64Array,
  scratch: Float64Array,
  count: number,
  flipped: boolean,
): void {
  const list = flipped ? f.columnList : f.rowList;
  const w = f.kernels.width;
  for (let s = 0; s < f.count; s++) {
    if (f.eliminated[s] === 0) continue;
    open(f, s, scratch);
    const { m, p } = panel;
    const at = f.listStart[s];
    for (let c = 0; c < count; c++) {
      const base = f.size * c;
      gather(v, y, list, at, 0, m, base, w);
      if (flipped) {
        solveUpperTransposed(f.kernels, panel, v);
        const behind = panel.base + m * p;
        f.kernels.apply(v, p, panel.x, behind, m - p, 0, 0, p, 0, m - p, v, 0);
      } else solveLower(f.kernels, panel, v, f.options.kind !== 'cholesky');
      scatter(y, v, list, at, p, m, base, w);
      const first = w * (base + f.pivotStart[s]);
      for (let k = 0; k < w * p; k++) z[first + k] = v[k];
    }
  }
}

/** y := solution with the second factor (and D), in internal numbering, from z. */
function backward(
  f: Factors,
  y: Float64Array,
  z: Float64Array,
  v: Float64Array,
  scratch: Float64Array,
  count: number,
  flipped: boolean,
): void {
  const lu = f.options.kind === 'lu';
  const list = flipped ? f.rowList : f.columnList;
  const w = f.kernels.width;
  for (let s = f.count - 1; s >= 0; s--) {
    if (f.eliminated[s] === 0) continue;
    open(f, s, scratch);
    const { m, p } = panel;
    const at = f.listStart[s];
    for (let c = 0; c < count; c++) {
      const base = f.size * c;
      const first = w * (base + f.pivotStart[s]);
      for (let k = 0; k < w * p; k++) v[k] = z[first + k];
      gather(v, y, list, at, p, m, base, w);
      if (lu && !flipped) {
        const behind = panel.base + m * p;
        f.kernels.applyTransposed(v, 0, panel.x, behind, m - p, 0, 0, p, 0, m - p, v, p, false);
        solveUpper(f.kernels, panel, v);
      } else {
        if (f.options.kind === 'ldlt') divideByPivots(f, f.pivotStart[s], p, v);
        solveLowerTransposed(f.kernels, panel, v, f.options.kind !== 'cholesky', f.options.hermitian);
      }
      scatter(y, v, list, at, 0, p, base, w);
    }
  }
}

function gather(
  v: Float64Array,
  y: Float64Array,
  list: Int32Array,
  at: number,
  from: number,
  to: number,
  base: number,
  width: number,
): void {
  if (width === 1) {
    for (let k = from; k < to; k++) v[k] = y[base + list[at + k]];
    return;
  }
  for (let k = from; k < to; k++) {
    const i = 2 * (base + list[at + k]);
    v[2 * k] = y[i];
    v[2 * k + 1] = y[i + 1];
  }
}

function scatter(
  y: Float64Array,
  v: Float64Array,
  list: Int32Array,
  at: number,
  from: number,
  to: number,
  base: number,
  width: number,
): void {
  if (width === 1) {
    for (let k = from; k < to; k++) y[base + list[at + k]] = v[k];
    return;
  }
  for (let k = from; k < to; k++) {
    const i = 2 * (base + list[at + k]);
    y[i] = v[2 * k];
    y[i + 1] = v[2 * k + 1];
  }
}

const inverse = new Float64Array(8);

/** v := D⁻¹·v for the pivots t … t + p − 1. */
function divideByPivots(f: Factors, t: number, p: number, v: Float64Array): void {
  const { kernels, diagonal: d, subdiagonal: e } = f;
  const w = kernels.width;
  for (let k = 0; k < p; k++) {
    if (!(kernels.modulus(e, t + k) > 0)) {
      kernels.divide(v, 0, v, 0, k, k + 1, d, t + k);
      continue;
    }
    kernels.invertPair(inverse, 0, d, t + k, e, t + k, d, t + k + 1, f.options.hermitian);
    for (let c = 0; c < w; c++) {
      // `combine` multiplies from the right; D⁻¹ from the left needs the mirrored off-diagonal pair
      const swap = inverse[w + c];
      inverse[w + c] = inverse[2 * w + c];
      inverse[2 * w + c] = swap;
    }
    kernels.combine(v, k, k + 1, 0, 1, inverse, 0);
    k++;
  }
}
