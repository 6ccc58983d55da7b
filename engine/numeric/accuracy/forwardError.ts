import { modulus } from '../../matrix/modulus.ts';
import { noProgress, type Progress } from '../../matrix/progress.ts';
import type { Solver } from '../solver.ts';
import { type Estimate, toEstimate, watchedInverse } from './condition.ts';
import { largestModulus } from './largestModulus.ts';
import { estimateOneNorm } from './oneNorm.ts';
import type { RefinedColumn } from './refine.ts';
import type { MeasuredSystem } from './system.ts';

/**
 * Estimate of ‖x − x̂‖∞ / ‖x̂‖∞, the largest over the given solutions:
 *
 *     ‖ |A⁻¹|·( |r| + ε(|A||x̂| + |b|) ) ‖∞ / ‖x̂‖∞        (Arioli, Demmel & Duff 1989; Higham 2002, section 7)
 *
 * The second term stands for data that are right to the last place only, so that no more digits are promised than the
 * numbers of the file carry. The bound is taken for the largest of the right-hand sides entry by entry, which bounds each of
 * them, and ‖|A⁻¹|f‖∞ = ‖F·A⁻ᴴ‖₁ is estimated as a 1-norm. It rests on an estimate from below, so it is no proof.
 */
export function estimateForwardError(
  system: MeasuredSystem,
  solver: Solver,
  columns: readonly RefinedColumn[],
  complex: boolean,
  progress: Progress = noProgress,
): Estimate {
  const { size } = system;
  if (size === 0) return { value: null, reason: 'an empty matrix has no unknowns' };
  const weight = new Float64Array(size);
  for (const column of columns) {
    const norm = largestModulus(column.solution, complex);
    // zero is the exact answer to a zero right-hand side
    if (norm === 0) continue;
    for (let i = 0; i < size; i++) {
      const r = complex ? modulus(column.residual[2 * i], column.residual[2 * i + 1]) : Math.abs(column.residual[i]);
      const w = (r + 2 ** -52 * column.moduli[i]) / norm;
      if (!(w <= weight[i])) weight[i] = w;
    }
  }
  const inverse = watchedInverse(system, solver, complex, undefined, progress);
  const width = complex ? 2 : 1;
  const applyWeight = (x: Float64Array): void => {
    for (let p = 0; p < x.length; p++) x[p] *= weight[width === 2 ? p >> 1 : p];
  };
  const value = estimateOneNorm({
    size,
    complex,
    apply(x) {
      inverse.applyAdjoint(x);
      applyWeight(x);
    },
    applyAdjoint(x) {
      applyWeight(x);
      inverse.apply(x);
    },
  });
  return toEstimate(value, inverse);
}

/** Decimal digits that can be trusted: max(0, ⌊−log₁₀(forward error)⌋), at most the 15 that a double carries. */
export function trustedDigits(forwardError: number | null): number | null {
  if (forwardError === null || !Number.isFinite(forwardError)) return null;
  return Math.min(15, Math.max(0, Math.floor(-Math.log10(Math.max(forwardError, 2 ** -53)))));
}
