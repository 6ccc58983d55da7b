import { type SparseMatrix, valueWidth } from '../matrix/pattern.ts';

/** Diagonal scalings R and C in the original numbering: the scaled matrix is R·A·C. All factors are positive. */
export interface Scaling {
  /** original row -> factor */
  readonly rowScaling: Float64Array;
  /** original column -> factor */
  readonly columnScaling: Float64Array;
}

/** R·A·C. The pattern is shared, values are new. */
export function applyScaling(a: SparseMatrix, { rowScaling, columnScaling }: Scaling): SparseMatrix {
  if (a.values === null) return a;
  const width = valueWidth(a);
  const values = new Float64Array(a.values.length);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const f = rowScaling[a.rowIndex[p]] * columnScaling[j];
      for (let w = 0; w < width; w++) values[p * width + w] = a.values[p * width + w] * f;
    }
  }
  return { ...a, field: a.field === 'integer' ? 'real' : a.field, values };
}
