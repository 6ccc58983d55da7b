import type { AssemblyTree } from '../symbolic/types.ts';
import { type Figure, figure } from './figure.ts';
import type { Target } from './target.ts';

/** front order at which half of the way from the small to the large rate is reached */
const halfWay = 96;

/** Modelled rate of one core in a front of order m: from the small rate at m = 0 towards the large one. */
export function rateAt(m: number, target: Target): number {
  const share = m / (m + halfWay);
  return target.smallRate + (target.largeRate - target.smallRate) * share;
}

/** Modelled seconds of one core. */
export interface TimeForecast {
  readonly factorization: Figure;
  /** forward and back substitution for one right-hand side */
  readonly solve: Figure;
  /** one refinement step: a residual and a solve */
  readonly refinementStep: Figure;
}

export interface TimeQuestion {
  readonly tree: AssemblyTree | null;
  /** supernode -> operations, complex ones already in real operations; null with no tree */
  readonly work: Float64Array | null;
  /** operations in all, for column LU */
  readonly operations: number;
  /** bytes of the factors, read once forward and once back */
  readonly factorBytes: number;
  readonly matrixBytes: number;
  readonly target: Target;
}

/** Factorization by rates, substitution by memory bandwidth: every solve reads the factors once forward and once back (symmetric: twice the same). */
export function timeOf(q: TimeQuestion): TimeForecast {
  let seconds = 0;
  if (q.tree !== null && q.work !== null) {
    for (let s = 0; s < q.tree.count; s++) seconds += q.work[s] / rateAt(q.tree.frontOrder[s], q.target);
  } else seconds = q.operations / q.target.smallRate;
  const solve = (2 * q.factorBytes) / q.target.bandwidth;
  return {
    factorization: figure(seconds, 'seconds', 'modelled'),
    solve: figure(solve, 'seconds', 'modelled'),
    refinementStep: figure(solve + q.matrixBytes / q.target.bandwidth, 'seconds', 'modelled'),
  };
}

/** What a run here showed, to calibrate a target with. */
export interface Sample {
  readonly operations: number;
  /** seconds of the numeric phase */
  readonly seconds: number;
  /** mean order of the fronts, weighted by work */
  readonly frontOrder: number;
}

/** Rates that explain samples best (least squares on seconds an operation); falls back on the mean rate where they do not differ. */
export function calibrate(samples: readonly Sample[], target: Target): Target {
  let a11 = 0;
  let a12 = 0;
  let a22 = 0;
  let b1 = 0;
  let b2 = 0;
  for (const s of samples) {
    const share = s.frontOrder / (s.frontOrder + halfWay);
    const rate = s.operations / s.seconds;
    a11 += (1 - share) ** 2;
    a12 += (1 - share) * share;
    a22 += share ** 2;
    b1 += (1 - share) * rate;
    b2 += share * rate;
  }
  const det = a11 * a22 - a12 * a12;
  const mean = samples.reduce((sum, s) => sum + s.operations, 0) / samples.reduce((sum, s) => sum + s.seconds, 0);
  if (!(det > 1e-6)) return { ...target, smallRate: mean, largeRate: mean };
  const small = (b1 * a22 - b2 * a12) / det;
  const large = (a11 * b2 - a12 * b1) / det;
  return { ...target, smallRate: Math.max(small, mean / 20), largeRate: Math.max(large, mean) };
}
