import type { SparseMatrix } from '../../matrix/pattern.ts';
import { transpose } from '../../matrix/transpose.ts';
import type { ColumnFactors, FactorPart } from './data.ts';

/** Factors as matrices over positions: P·R·A·C·Q = lower·upper + offDiagonal. */
export interface ExportedFactors {
  /** unit lower triangular, the ones stored */
  readonly lower: SparseMatrix;
  /** upper triangular with the pivots on its diagonal */
  readonly upper: SparseMatrix;
  /** entries above the diagonal blocks; empty for one block */
  readonly offDiagonal: SparseMatrix;
}

/** Sorted, exact-length copies of the factors. */
export function exportFactors(f: ColumnFactors): ExportedFactors {
  const ones = new Float64Array(f.pivots.length);
  for (let p = 0; p < ones.length; p += f.complex ? 2 : 1) ones[p] = 1;
  return {
    lower: matrixOf(f, f.lower, ones),
    upper: matrixOf(f, f.upper, f.pivots),
    offDiagonal: matrixOf(f, f.offDiagonal, null),
  };
}

/** A part with a diagonal put in; transposing twice sorts the rows. */
function matrixOf(f: ColumnFactors, part: FactorPart, diagonal: Float64Array | null): SparseMatrix {
  const n = f.size;
  const width = f.complex ? 2 : 1;
  const extra = diagonal === null ? 0 : 1;
  const entries = part.pointer[n] + extra * n;
  const columnPointer = new Int32Array(n + 1);
  const rowIndex = new Int32Array(entries);
  const values = new Float64Array(entries * width);
  let q = 0;
  for (let k = 0; k < n; k++) {
    if (diagonal !== null) {
      rowIndex[q] = k;
      for (let w = 0; w < width; w++) values[q * width + w] = diagonal[k * width + w];
      q++;
    }
    const count = part.pointer[k + 1] - part.pointer[k];
    rowIndex.set(part.index.subarray(part.pointer[k], part.pointer[k + 1]), q);
    values.set(part.values.subarray(part.pointer[k] * width, part.pointer[k + 1] * width), q * width);
    q += count;
    columnPointer[k + 1] = q;
  }
  const field = f.complex ? 'complex' : 'real';
  return transpose(transpose({ rows: n, columns: n, columnPointer, rowIndex, field, values }));
}
