import type { FrontRun } from './run.ts';

/** Schur complement onto the unknowns that were not eliminated: A₂₂ − A₂₁·A₁₁⁻¹·A₁₂, scalings taken out again. */
export interface SchurComplement {
  readonly size: number;
  readonly complex: boolean;
  /** original rows, held ones in the tree's order, then those appended */
  readonly rows: Int32Array;
  /** original columns in the same sense */
  readonly columns: Int32Array;
  /** how many at the end were not held but found no acceptable pivot */
  readonly appended: number;
  /** size × size, column after column, both triangles; complex interleaved */
  readonly values: Float64Array;
}

/** Collects what is left on the stack after the walk. */
export function schurOf(run: FrontRun): SchurComplement {
  const { order, size: n } = run.tree;
  const left = n - run.options.schur;
  const internalRows: number[] = [];
  const internalColumns: number[] = [];
  for (let c = left; c < n; c++) {
    internalRows.push(c);
    internalColumns.push(c);
  }
  for (let b = 0; b < run.pendingCount; b++) {
    const s = run.pendingFront[b];
    const from = run.listStart[s] + run.eliminated[s];
    for (let k = 0; k < run.delayed[s]; k++) {
      internalRows.push(run.rowList[from + k]);
      internalColumns.push(run.columnList[from + k]);
    }
  }
  const size = internalRows.length;
  const width = run.kernels.width;
  const values = new Float64Array(width * size * size);
  internalRows.forEach((r, k) => {
    run.localRow[r] = k;
  });
  internalColumns.forEach((c, k) => {
    run.localColumn[c] = k;
  });
  for (let b = 0; b < run.pendingCount; b++) addBlock(run, b, values, size);
  const rows = Int32Array.from(internalRows, (r) => run.originalRow(r));
  const columns = Int32Array.from(internalColumns, (c) => order[c]);
  unscale(run, values, rows, columns);
  return { size, complex: width === 2, rows, columns, appended: size - run.options.schur, values };
}

function addBlock(run: FrontRun, b: number, values: Float64Array, size: number): void {
  const s = run.pendingFront[b];
  const from = run.listStart[s] + run.eliminated[s];
  const order = run.listStart[s + 1] - from;
  const w = run.kernels.width;
  const x = run.stack.array;
  let q = w * run.pendingAt[b];
  for (let c = 0; c < order; c++) {
    const column = run.localColumn[run.columnList[from + c]];
    for (let i = run.symmetric ? c : 0; i < order; i++, q += w) {
      const row = run.localRow[run.rowList[from + i]];
      const to = w * (column * size + row);
      values[to] += x[q];
      if (w === 2) values[to + 1] += x[q + 1];
      if (!run.symmetric || i === c) continue;
      const mirror = w * (row * size + column);
      values[mirror] += x[q];
      if (w === 2) values[mirror + 1] += run.options.hermitian ? -x[q + 1] : x[q + 1];
    }
  }
}

function unscale(run: FrontRun, values: Float64Array, rows: Int32Array, columns: Int32Array): void {
  const { rowScale, columnScale } = run.options;
  const w = run.kernels.width;
  const size = rows.length;
  for (let c = 0; c < size; c++) {
    const right = columnScale === null ? 1 : columnScale[columns[c]];
    for (let r = 0; r < size; r++) {
      const scale = right * (rowScale === null ? 1 : rowScale[rows[r]]);
      for (let k = 0; k < w; k++) values[w * (c * size + r) + k] /= scale;
    }
  }
}
