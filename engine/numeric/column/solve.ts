import { divideInto } from './columnKernels.ts';
import type { ColumnFactors } from './data.ts';

/**
 * Triangular solves with P·R·A·C·Q = L·U + F, block by block: from the last for A, from the first for Aᵀ. Right-hand sides go
 * four at a time where the factors are real, so that every index is read once for four; vectors are in the original numbering.
 */

/** Right-hand sides handled together by the real kernels. */
const together = 4;

/** Overwrites b with x of A·x = b. `x`: size · columns numbers, interleaved when complex. */
export function solveColumns(f: ColumnFactors, x: Float64Array, columns: number, transposed: boolean): void {
  const n = f.size;
  const width = f.complex ? 2 : 1;
  const y = new Float64Array(n * (f.complex ? 2 : Math.min(together, Math.max(1, columns))));
  for (let c = 0; c < columns; ) {
    const count = f.complex ? 1 : columns - c >= together ? together : 1;
    const base = c * n * width;
    gather(f, x, y, base, count, transposed);
    if (f.complex) transposed ? transposedComplex(f, y) : forwardComplex(f, y);
    else if (count === together) transposed ? transposedFour(f, y) : forwardFour(f, y);
    else transposed ? transposedReal(f, y) : forwardReal(f, y);
    scatter(f, x, y, base, count, transposed);
    c += count;
  }
}

/** y ← P·R·b, or Qᵀ·C·b for the transposed system; `count` vectors interleaved number by number. */
function gather(
  f: ColumnFactors,
  x: Float64Array,
  y: Float64Array,
  base: number,
  count: number,
  transposed: boolean,
): void {
  const order = transposed ? f.columnOrder : f.rowOrder;
  const scaling = transposed ? f.columnScaling : f.rowScaling;
  const n = f.size;
  for (let k = 0; k < n; k++) {
    const i = order[k];
    const s = scaling === null ? 1 : scaling[i];
    if (f.complex) {
      y[2 * k] = s * x[base + 2 * i];
      y[2 * k + 1] = s * x[base + 2 * i + 1];
    } else for (let c = 0; c < count; c++) y[k * count + c] = s * x[base + c * n + i];
  }
}

/** x ← C·Q·y, or R·Pᵀ·y for the transposed system. */
function scatter(
  f: ColumnFactors,
  x: Float64Array,
  y: Float64Array,
  base: number,
  count: number,
  transposed: boolean,
): void {
  const order = transposed ? f.rowOrder : f.columnOrder;
  const scaling = transposed ? f.rowScaling : f.columnScaling;
  const n = f.size;
  for (let k = 0; k < n; k++) {
    const i = order[k];
    const s = scaling === null ? 1 : scaling[i];
    if (f.complex) {
      x[base + 2 * i] = s * y[2 * k];
      x[base + 2 * i + 1] = s * y[2 * k + 1];
    } else for (let c = 0; c < count; c++) x[base + c * n + i] = s * y[k * count + c];
  }
}

function forwardReal(f: ColumnFactors, y: Float64Array): void {
  const { blockStart, pivots } = f;
  const { pointer: lp, index: li, values: lv } = f.lower;
  const { pointer: up, index: ui, values: uv } = f.upper;
  const { pointer: op, index: oi, values: ov } = f.offDiagonal;
  for (let b = blockStart.length - 2; b >= 0; b--) {
    const start = blockStart[b];
    const end = blockStart[b + 1];
    for (let k = start; k < end; k++) {
      const v = y[k];
      for (let p = lp[k]; p < lp[k + 1]; p++) y[li[p]] -= lv[p] * v;
    }
    for (let k = end - 1; k >= start; k--) {
      const v = y[k] / pivots[k];
      y[k] = v;
      for (let p = up[k]; p < up[k + 1]; p++) y[ui[p]] -= uv[p] * v;
    }
    for (let k = start; k < end; k++) {
      const v = y[k];
      for (let p = op[k]; p < op[k + 1]; p++) y[oi[p]] -= ov[p] * v;
    }
  }
}

function transposedReal(f: ColumnFactors, y: Float64Array): void {
  const { blockStart, pivots } = f;
  const { pointer: lp, index: li, values: lv } = f.lower;
  const { pointer: up, index: ui, values: uv } = f.upper;
  const { pointer: op, index: oi, values: ov } = f.offDiagonal;
  for (let b = 0; b < blockStart.length - 1; b++) {
    const start = blockStart[b];
    const end = blockStart[b + 1];
    for (let k = start; k < end; k++) {
      let v = y[k];
      for (let p = op[k]; p < op[k + 1]; p++) v -= ov[p] * y[oi[p]];
      for (let p = up[k]; p < up[k + 1]; p++) v -= uv[p] * y[ui[p]];
      y[k] = v / pivots[k];
    }
    for (let k = end - 1; k >= start; k--) {
      let v = y[k];
      for (let p = lp[k]; p < lp[k + 1]; p++) v -= lv[p] * y[li[p]];
      y[k] = v;
    }
  }
}

/** y[4i … 4i + 3] −= v·(y[4k … 4k + 3]) for the entries of one column. */
function subtractFour(
  y: Float64Array,
  k: number,
  start: number,
  end: number,
  index: Int32Array,
  values: Float64Array,
): void {
  const a = y[4 * k];
  const b = y[4 * k + 1];
  const c = y[4 * k + 2];
  const d = y[4 * k + 3];
  for (let p = start; p < end; p++) {
    const i = 4 * index[p];
    const v = values[p];
    y[i] -= v * a;
    y[i + 1] -= v * b;
    y[i + 2] -= v * c;
    y[i + 3] -= v * d;
  }
}

/** y[4k … 4k + 3] −= Σ v·y[4i … 4i + 3] over the entries of one column. */
function gatherFour(
  y: Float64Array,
  k: number,
  start: number,
  end: number,
  index: Int32Array,
  values: Float64Array,
): void {
  let a = y[4 * k];
  let b = y[4 * k + 1];
  let c = y[4 * k + 2];
  let d = y[4 * k + 3];
  for (let p = start; p < end; p++) {
    const i = 4 * index[p];
    const v = values[p];
    a -= v * y[i];
    b -= v * y[i + 1];
    c -= v * y[i + 2];
    d -= v * y[i + 3];
  }
  y[4 * k] = a;
  y[4 * k + 1] = b;
  y[4 * k + 2] = c;
  y[4 * k + 3] = d;
}

function forwardFour(f: ColumnFactors, y: Float64Array): void {
  const { blockStart, pivots, lower, upper, offDiagonal } = f;
  for (let b = blockStart.length - 2; b >= 0; b--) {
    const start = blockStart[b];
    const end = blockStart[b + 1];
    for (let k = start; k < end; k++) {
      subtractFour(y, k, lower.pointer[k], lower.pointer[k + 1], lower.index, lower.values);
    }
    for (let k = end - 1; k >= start; k--) {
      for (let c = 4 * k; c < 4 * k + 4; c++) y[c] /= pivots[k];
      subtractFour(y, k, upper.pointer[k], upper.pointer[k + 1], upper.index, upper.values);
    }
    for (let k = start; k < end; k++) {
      subtractFour(y, k, offDiagonal.pointer[k], offDiagonal.pointer[k + 1], offDiagonal.index, offDiagonal.values);
    }
  }
}

function transposedFour(f: ColumnFactors, y: Float64Array): void {
  const { blockStart, pivots, lower, upper, offDiagonal } = f;
  for (let b = 0; b < blockStart.length - 1; b++) {
    const start = blockStart[b];
    const end = blockStart[b + 1];
    for (let k = start; k < end; k++) {
      gatherFour(y, k, offDiagonal.pointer[k], offDiagonal.pointer[k + 1], offDiagonal.index, offDiagonal.values);
      gatherFour(y, k, upper.pointer[k], upper.pointer[k + 1], upper.index, upper.values);
      for (let c = 4 * k; c < 4 * k + 4; c++) y[c] /= pivots[k];
    }
    for (let k = end - 1; k >= start; k--) {
      gatherFour(y, k, lower.pointer[k], lower.pointer[k + 1], lower.index, lower.values);
    }
  }
}

function subtractComplex(
  y: Float64Array,
  k: number,
  start: number,
  end: number,
  index: Int32Array,
  values: Float64Array,
): void {
  const re = y[2 * k];
  const im = y[2 * k + 1];
  for (let p = start; p < end; p++) {
    const i = 2 * index[p];
    const vr = values[2 * p];
    const vi = values[2 * p + 1];
    y[i] -= vr * re - vi * im;
    y[i + 1] -= vr * im + vi * re;
  }
}

function gatherComplex(
  y: Float64Array,
  k: number,
  start: number,
  end: number,
  index: Int32Array,
  values: Float64Array,
): void {
  let re = y[2 * k];
  let im = y[2 * k + 1];
  for (let p = start; p < end; p++) {
    const i = 2 * index[p];
    const vr = values[2 * p];
    const vi = values[2 * p + 1];
    re -= vr * y[i] - vi * y[i + 1];
    im -= vr * y[i + 1] + vi * y[i];
  }
  y[2 * k] = re;
  y[2 * k + 1] = im;
}

function forwardComplex(f: ColumnFactors, y: Float64Array): void {
  const { blockStart, pivots, lower, upper, offDiagonal } = f;
  for (let b = blockStart.length - 2; b >= 0; b--) {
    const start = blockStart[b];
    const end = blockStart[b + 1];
    for (let k = start; k < end; k++) {
      subtractComplex(y, k, lower.pointer[k], lower.pointer[k + 1], lower.index, lower.values);
    }
    for (let k = end - 1; k >= start; k--) {
      divideInto(y[2 * k], y[2 * k + 1], pivots[2 * k], pivots[2 * k + 1], y, 2 * k);
      subtractComplex(y, k, upper.pointer[k], upper.pointer[k + 1], upper.index, upper.values);
    }
    for (let k = start; k < end; k++) {
      subtractComplex(y, k, offDiagonal.pointer[k], offDiagonal.pointer[k + 1], offDiagonal.index, offDiagonal.values);
    }
  }
}

function transposedComplex(f: ColumnFactors, y: Float64Array): void {
  const { blockStart, pivots, lower, upper, offDiagonal } = f;
  for (let b = 0; b < blockStart.length - 1; b++) {
    const start = blockStart[b];
    const end = blockStart[b + 1];
    for (let k = start; k < end; k++) {
      gatherComplex(y, k, offDiagonal.pointer[k], offDiagonal.pointer[k + 1], offDiagonal.index, offDiagonal.values);
      gatherComplex(y, k, upper.pointer[k], upper.pointer[k + 1], upper.index, upper.values);
      divideInto(y[2 * k], y[2 * k + 1], pivots[2 * k], pivots[2 * k + 1], y, 2 * k);
    }
    for (let k = end - 1; k >= start; k--) {
      gatherComplex(y, k, lower.pointer[k], lower.pointer[k + 1], lower.index, lower.values);
    }
  }
}
