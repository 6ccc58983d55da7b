import { type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';
import { valuesOf } from '../accuracy/product.ts';

/** Values of R·A·C into `out` (as many numbers as A has), R and C in the original numbering, null for all 1. */
export function scaleInto(
  a: SparseMatrix,
  rowScaling: Float64Array | null,
  columnScaling: Float64Array | null,
  out: Float64Array,
): void {
  const v = valuesOf(a);
  const width = valueWidth(a);
  for (let j = 0; j < a.columns; j++) {
    const c = columnScaling === null ? 1 : columnScaling[j];
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const f = rowScaling === null ? c : rowScaling[a.rowIndex[p]] * c;
      for (let w = 0; w < width; w++) out[p * width + w] = v[p * width + w] * f;
    }
  }
}
