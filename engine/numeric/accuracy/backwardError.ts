import { modulus } from '../../matrix/modulus.ts';
import { largestModulus } from './largestModulus.ts';
import { multiplyModuliInto } from './product.ts';
import type { MeasuredSystem } from './system.ts';

/** How far the system that x solves exactly is from the one that was posed. */
export interface BackwardErrors {
  /** ‖b−Ax‖∞ / (‖A‖∞‖x‖∞+‖b‖∞): smallest relative change of A and b in norm (Rigal & Gaches 1967) */
  readonly normwise: number;
  /**
   * max |r|ᵢ / dᵢ: smallest relative change entry by entry (Oettli & Prager 1964), dᵢ = (|A||x|+|b|)ᵢ; where that is no more
   * than rounding noise, dᵢ = (|A||x|)ᵢ + ‖row i‖₁‖x‖∞ (Arioli, Demmel & Duff 1989)
   */
  readonly componentwise: number;
  /** ‖b−Ax‖∞ of the scaled system */
  readonly residualNorm: number;
}

/**
 * Both backward errors of x from its residual.
 * @param r residual b − A·x of the measured (scaled) system, `b` its right-hand side; interleaved when `complex`
 * @param moduli receives (|A||x|+|b|), length size
 */
export function backwardErrors(
  system: MeasuredSystem,
  x: Float64Array,
  b: Float64Array,
  r: Float64Array,
  complex: boolean,
  moduli: Float64Array,
): BackwardErrors {
  const { norms, size } = system;
  const xNorm = largestModulus(x, complex);
  const bNorm = largestModulus(b, complex);
  const rNorm = largestModulus(r, complex);
  multiplyModuliInto(system.matrix, x, moduli, complex);
  let componentwise = 0;
  const epsilon = 2 ** -52;
  for (let i = 0; i < size; i++) {
    const product = moduli[i];
    const bi = complex ? modulus(b[2 * i], b[2 * i + 1]) : Math.abs(b[i]);
    const ri = complex ? modulus(r[2 * i], r[2 * i + 1]) : Math.abs(r[i]);
    moduli[i] = product + bi;
    // the limit below which a denominator is rounding noise: 1000·n·ε·(‖row‖∞‖x‖∞ + |b|), figures of the paper, from memory
    const noise = 1000 * size * epsilon * (norms.rowLargest[i] * xNorm + bi);
    const small = moduli[i] <= noise;
    const denominator = small ? product + norms.rowSum[i] * xNorm : moduli[i];
    // a row and right-hand side of zeros leave nothing to measure; a right-hand side without a row is a full miss
    const error = ri === 0 ? 0 : denominator > 0 ? ri / denominator : 1;
    if (!(error <= componentwise)) componentwise = error;
    if (Number.isNaN(componentwise)) break;
  }
  // an infinite denominator would make any residual look small
  const finite = xNorm < Infinity && bNorm < Infinity && rNorm < Infinity;
  return {
    normwise: normwiseRatio(rNorm, norms.infinity, xNorm, bNorm),
    componentwise: finite ? componentwise : Number.NaN,
    residualNorm: rNorm,
  };
}

/** r / (a·x + b), 0 for r = 0, NaN for an infinite x or b; an overflow of a·x does not turn into a small error. */
export function normwiseRatio(r: number, a: number, x: number, b: number): number {
  if (!(x < Infinity && b < Infinity && r < Infinity)) return Number.NaN;
  if (r === 0) return 0;
  const denominator = a * x + b;
  if (denominator < Infinity) return denominator > 0 ? r / denominator : 1;
  // a·x overflowed: divide by the norm of A first
  return r / a / (x + b / a);
}
