/** Helpers of the front tests: plain dense complex arithmetic, and ways to analyse. */
import { assemble } from '../../../engine/matrix/assemble.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import type { NewToOld } from '../../../engine/matrix/permutation.ts';
import { Random } from '../../../engine/matrix/random.ts';
import { type FrontFactor, factorizeFronts } from '../../../engine/numeric/fronts/frontFactor.ts';
import type { FrontOptions } from '../../../engine/numeric/fronts/options.ts';
import { plainTree } from '../../support/plainTree.ts';

/** A dense complex matrix, column after column. */
export interface Dense {
  readonly n: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export function zeros(n: number): Dense {
  return { n, re: new Float64Array(n * n), im: new Float64Array(n * n) };
}

export function dense(a: SparseMatrix): Dense {
  const d = zeros(a.rows);
  const wide = a.field === 'complex';
  const values = a.values as Float64Array;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      d.re[j * a.rows + a.rowIndex[p]] = wide ? values[2 * p] : values[p];
      d.im[j * a.rows + a.rowIndex[p]] = wide ? values[2 * p + 1] : 0;
    }
  }
  return d;
}

/** (A·B, |A|·|B|) by the definition. */
export function multiply(a: Dense, b: Dense): { product: Dense; bound: Float64Array } {
  const n = a.n;
  const product = zeros(n);
  const bound = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    for (let k = 0; k < n; k++) {
      const re = b.re[j * n + k];
      const im = b.im[j * n + k];
      if (re === 0 && im === 0) continue;
      for (let i = 0; i < n; i++) {
        const x = a.re[k * n + i];
        const y = a.im[k * n + i];
        product.re[j * n + i] += x * re - y * im;
        product.im[j * n + i] += x * im + y * re;
        bound[j * n + i] += Math.hypot(x, y) * Math.hypot(re, im);
      }
    }
  }
  return { product, bound };
}

export function transposed(a: Dense, conjugate: boolean): Dense {
  const t = zeros(a.n);
  for (let j = 0; j < a.n; j++) {
    for (let i = 0; i < a.n; i++) {
      t.re[i * a.n + j] = a.re[j * a.n + i];
      t.im[i * a.n + j] = conjugate ? -a.im[j * a.n + i] : a.im[j * a.n + i];
    }
  }
  return t;
}

export type Shape = 'definite' | 'symmetric' | 'hermitian' | 'general' | 'saddle' | 'shifted';

/**
 * Random matrices of a shape: definite (Hermitian, dominant diagonal), symmetric and hermitian (small or absent diagonal),
 * general, saddle (zero block with full rank beside it), shifted (general with a full transversal off the diagonal).
 */
export function shaped(shape: Shape, n: number, complex: boolean, seed: number, density = 2): SparseMatrix {
  const random = new Random(seed);
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  const put = (i: number, j: number, re: number, im: number): void => {
    row.push(i);
    column.push(j);
    values.push(re);
    if (complex) values.push(im);
  };
  const primal = Math.ceil(n * 0.6);
  const mirrored = shape !== 'general' && shape !== 'shifted';
  const sign = shape === 'definite' || shape === 'hermitian' ? -1 : 1;
  for (let k = 0; k < density * n; k++) {
    const i = random.below(n);
    const j = random.below(n);
    const re = 2 * random.next() - 1;
    const im = 2 * random.next() - 1;
    if (i === j || (shape === 'saddle' && i >= primal && j >= primal)) continue;
    put(i, j, re, im);
    if (mirrored) put(j, i, re, sign * im);
  }
  for (let i = 0; i < n; i++) {
    const re = 2 * random.next() - 1;
    const im = 2 * random.next() - 1;
    if (shape === 'definite') put(i, i, 4 * density + 2, 0);
    else if (shape === 'saddle' && i >= primal) {
      put(i, i - primal, 1, 0.5);
      put(i - primal, i, 1, 0.5);
    } else if (shape === 'saddle') put(i, i, 1 + Math.abs(re), 0);
    else if (shape === 'shifted') put(i, (i + 1) % n, 3 + re, im);
    else if (shape === 'general') put(i, i, 1 + re, im);
    else {
      // a chain keeps the matrix from being singular by structure
      const k = (i + 1) % n;
      put(i, k, 0.5 + re, shape === 'hermitian' ? im : 0);
      put(k, i, 0.5 + re, shape === 'hermitian' ? -im : 0);
      put(i, i, random.next() < 0.3 && i + 1 < n ? 0 : re, shape === 'hermitian' ? 0 : im);
    }
  }
  const field = complex ? 'complex' : 'real';
  const triplets = { rows: n, columns: n, field, row, column } as const;
  return assemble({
    ...triplets,
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: Float64Array.from(values),
  }).matrix;
}

/** Factorizes in a given order, the tree made by the plain merge of test/support. */
export function factorized(a: SparseMatrix, order: NewToOld, options: FrontOptions, padding = 0): FrontFactor {
  const { tree, rows } = plainTree(a, order, padding);
  return factorizeFronts(a, tree, rows, options);
}

/** Normwise backward error ‖b − A·x‖∞ / (‖A‖∞‖x‖∞ + ‖b‖∞) (Rigal & Gaches 1967), by the definition; Aᵀ when transposed. */
export function backwardError(a: SparseMatrix, x: Float64Array, b: Float64Array, isTransposed = false): number {
  const d = isTransposed ? transposed(dense(a), false) : dense(a);
  const n = d.n;
  const wide = a.field === 'complex';
  let worst = 0;
  let normA = 0;
  let normX = 0;
  let normB = 0;
  const part = (v: Float64Array, i: number): [number, number] => (wide ? [v[2 * i], v[2 * i + 1]] : [v[i], 0]);
  for (let i = 0; i < n; i++) {
    let [re, im] = part(b, i);
    normB = Math.max(normB, Math.hypot(re, im));
    let rowSum = 0;
    for (let j = 0; j < n; j++) {
      const [xr, xi] = part(x, j);
      const ar = d.re[j * n + i];
      const ai = d.im[j * n + i];
      re -= ar * xr - ai * xi;
      im -= ar * xi + ai * xr;
      rowSum += Math.hypot(ar, ai);
    }
    normA = Math.max(normA, rowSum);
    worst = Math.max(worst, Math.hypot(re, im));
    normX = Math.max(normX, Math.hypot(...part(x, i)));
  }
  return worst / (normA * normX + normB);
}

/** b − A·x, or b − Aᵀ·x, by the definition. */
export function residual(a: SparseMatrix, x: Float64Array, b: Float64Array, isTransposed: boolean): Float64Array {
  const r = b.slice();
  const v = a.values as Float64Array;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const [to, from] = isTransposed ? [j, a.rowIndex[p]] : [a.rowIndex[p], j];
      if (a.field !== 'complex') {
        r[to] -= v[p] * x[from];
        continue;
      }
      r[2 * to] -= v[2 * p] * x[2 * from] - v[2 * p + 1] * x[2 * from + 1];
      r[2 * to + 1] -= v[2 * p] * x[2 * from + 1] + v[2 * p + 1] * x[2 * from];
    }
  }
  return r;
}

export function randomVector(length: number, seed: number): Float64Array {
  const random = new Random(seed);
  return Float64Array.from({ length }, () => 2 * random.next() - 1);
}
