import { noProgress, type Progress } from '../../matrix/progress.ts';
import { transpose } from '../../matrix/transpose.ts';
import type { Solver } from '../solver.ts';
import { normwiseRatio } from './backwardError.ts';
import { doubledWorkspace, residualDoubledInto } from './doubled.ts';
import { largestModulus } from './largestModulus.ts';
import { estimateOneNorm, type Operator } from './oneNorm.ts';
import { type MeasuredSystem, measuredSystem, solveVectorInPlace } from './system.ts';

/** Solves with A and Aᴴ whose quality is watched: an estimate through bad solves would be worth nothing. */
export interface WatchedInverse extends Operator {
  /** largest normwise backward error that any plain solve had so far; NaN if one was not finite */
  worstBackwardError(): number;
}

/**
 * The inverse of the measured (scaled) matrix as an operator.
 * Every solve is measured with a residual in doubled precision, and corrected once where its backward error is above
 * `correctAbove`: after perturbed pivots the factors are not those of A, and the estimate must be about A.
 */
export function watchedInverse(
  system: MeasuredSystem,
  solver: Solver,
  complex: boolean,
  correctAbove = 1e-14,
  progress: Progress = noProgress,
): WatchedInverse {
  const length = system.size * (complex ? 2 : 1);
  const work = doubledWorkspace(length);
  const b = new Float64Array(length);
  const r = new Float64Array(length);
  let worst = 0;
  let solves = 0;
  let transposed: MeasuredSystem | null = null;
  const solve = (x: Float64Array, of: MeasuredSystem, isTransposed: boolean): void => {
    progress(1 - 1 / (1 + 0.1 * solves++), 'estimating the condition');
    b.set(x);
    solveVectorInPlace(solver, x, complex, isTransposed);
    for (let i = 0; i < length; i++) x[i] /= system.scale;
    residualDoubledInto(of.matrix, x, b, r, complex, work);
    const rNorm = largestModulus(r, complex);
    const error = normwiseRatio(rNorm, of.norms.infinity, largestModulus(x, complex), largestModulus(b, complex));
    if (!(error <= worst || Number.isNaN(worst))) worst = error;
    if (!(error > correctAbove)) return;
    solveVectorInPlace(solver, r, complex, isTransposed);
    for (let i = 0; i < length; i++) x[i] += r[i] / system.scale;
  };
  return {
    size: system.size,
    complex,
    apply: (x) => solve(x, system, false),
    applyAdjoint(x) {
      transposed ??= { ...system, ...normsOnly(system) };
      for (let p = 1; complex && p < length; p += 2) x[p] = -x[p];
      solve(x, transposed, true);
      for (let p = 1; complex && p < length; p += 2) x[p] = -x[p];
    },
    worstBackwardError: () => worst,
  };
}

function normsOnly(system: MeasuredSystem): Pick<MeasuredSystem, 'matrix' | 'norms'> {
  const t = measuredSystem(transpose(system.matrix));
  return { matrix: t.matrix, norms: t.norms };
}

/** What an estimate needs to be believed: beyond it the factors are too far from A for one correction to mend. */
export const reliableSolve = 1e-8;

/** A figure, or the reason why there is none. */
export interface Estimate {
  readonly value: number | null;
  /** null where there is a value */
  readonly reason: string | null;
}

/** Turns what an estimator gave into a figure or a reason. */
export function toEstimate(value: number, inverse: WatchedInverse): Estimate {
  if (!Number.isFinite(value)) return { value: null, reason: 'the estimate is not finite' };
  const worst = inverse.worstBackwardError();
  if (worst <= reliableSolve) return { value, reason: null };
  return {
    value: null,
    reason: `the solves behind the estimate are too inexact (backward error ${worst.toExponential(1)})`,
  };
}

/** 1-norm condition number ‖A‖₁·‖A⁻¹‖₁, estimated from below (Hager 1984; Higham 1988). */
export function estimateCondition(
  system: MeasuredSystem,
  solver: Solver,
  correctAbove?: number,
  progress: Progress = noProgress,
): Estimate {
  if (system.size === 0) return { value: null, reason: 'an empty matrix has no condition number' };
  const inverse = watchedInverse(system, solver, system.complex, correctAbove, progress);
  return toEstimate(system.norms.one * estimateOneNorm(inverse), inverse);
}
