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
