import { modulus } from '../../matrix/modulus.ts';
import type { SparseMatrix } from '../../matrix/pattern.ts';
import { Random } from '../../matrix/random.ts';
import type { Solver } from '../solver.ts';
import { watchedInverse } from './condition.ts';
import { multiplyInto } from './product.ts';
import { measuredSystem } from './system.ts';

/** One component of a near-null vector. */
export interface NullComponent {
  /** original column (right vector) or row (left vector), 0-based */
  readonly index: number;
  /** modulus relative to the largest component, 0 to 1 */
  readonly share: number;
}

/** Directions in which a matrix is nearly singular. */
export interface NearNull {
  /** ‖A·v‖₂ / (‖A‖∞·‖v‖₂): how nearly the right vector is annihilated */
  readonly relativeResidual: number;
  /** columns (unknowns) that take part in A·v ≈ 0, largest first */
  readonly columns: readonly NullComponent[];
  /** rows (equations) that take part in wᴴ·A ≈ 0, largest first */
  readonly rows: readonly NullComponent[];
}

/**
 * Right and left vectors of the smallest singular value by inverse iteration with A and Aᴴ from a seeded random start; only
 * as good as the factors, and when several singular values are near zero the vectors lie anywhere in their span.
 * @returns null when a solve is not finite
 */
export function nearNullVectors(
  matrix: SparseMatrix,
  solver: Solver,
  options: { readonly largest?: number; readonly sweeps?: number; readonly seed?: number } = {},
): NearNull | null {
  const system = measuredSystem(matrix);
  const { size, complex } = system;
  const length = size * (complex ? 2 : 1);
  const inverse = watchedInverse(system, solver, complex, Infinity);
  const random = new Random(options.seed ?? 1);
  const v = new Float64Array(length).map(() => 2 * random.next() - 1);
  let w = v.slice();
  const sweeps = options.sweeps ?? 3;
  for (let sweep = 0; sweep < sweeps; sweep++) {
    inverse.applyAdjoint(v);
    if (!normalizeInPlace(v)) return null;
    w = v.slice();
    inverse.apply(v);
    if (!normalizeInPlace(v)) return null;
  }
  const y = new Float64Array(length);
  multiplyInto(system.matrix, v, y, complex);
  const residual = system.norms.infinity > 0 ? euclidean(y) / system.norms.infinity : 0;
  const count = options.largest ?? 10;
  return {
    relativeResidual: residual,
    columns: largestComponents(v, complex, count),
    rows: largestComponents(w, complex, count),
  };
}

function euclidean(x: Float64Array): number {
  let sum = 0;
  for (let p = 0; p < x.length; p++) sum += x[p] * x[p];
  return Math.sqrt(sum);
}

/** Divides by the largest number first, so that the squares cannot overflow. False if not finite or zero. */
function normalizeInPlace(x: Float64Array): boolean {
  let largest = 0;
  for (let p = 0; p < x.length; p++) {
    const m = Math.abs(x[p]);
    if (!(m <= largest)) largest = m;
  }
  if (!(largest > 0 && largest < Infinity)) return false;
  for (let p = 0; p < x.length; p++) x[p] /= largest;
  const norm = euclidean(x);
  for (let p = 0; p < x.length; p++) x[p] /= norm;
  return true;
}

function largestComponents(x: Float64Array, complex: boolean, count: number): NullComponent[] {
  const size = complex ? x.length / 2 : x.length;
  const moduli = new Float64Array(size);
  for (let i = 0; i < size; i++) moduli[i] = complex ? modulus(x[2 * i], x[2 * i + 1]) : Math.abs(x[i]);
  const order = Array.from({ length: size }, (_, i) => i).sort((a, b) => moduli[b] - moduli[a] || a - b);
  const top = order.slice(0, count);
  const largest = size > 0 ? moduli[top[0]] : 1;
  return top.map((index) => ({ index, share: moduli[index] / largest })).filter((c) => c.share > 1e-3);
}
