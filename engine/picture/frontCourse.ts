import { type StackLayout, stackCourse } from '../symbolic/stack.ts';
import type { AssemblyTree } from '../symbolic/types.ts';

/** What a run over fronts meets, from its first front to its last, in equal steps; each step keeps the largest value in it. */
export interface FrontCourse {
  readonly steps: number;
  /** along the unknowns eliminated: step -> largest front order */
  readonly frontOrder: Float64Array;
  /** along the operations done: step -> scalars of the stack of contribution blocks, at its highest */
  readonly stack: Float64Array;
  /** along the operations done: step -> scalars of the factors made by the end of the step */
  readonly factors: Float64Array;
  /** the highest stack, scalars, and the share of the operations done by then */
  readonly peak: number;
  readonly peakAt: number;
}

/**
 * The course of a run. Linear in supernodes.
 * @param work supernode -> operations of its front
 * @param lu both factors are kept: panels of L and of U
 */
export function frontCourse(
  tree: AssemblyTree,
  work: Float64Array,
  layout: StackLayout,
  lu: boolean,
  steps = 400,
): FrontCourse {
  const { count, size, firstColumn, frontOrder } = tree;
  const { high } = stackCourse(tree, layout);
  const out = {
    frontOrder: new Float64Array(steps),
    stack: new Float64Array(steps),
    factors: new Float64Array(steps),
  };
  let total = 0;
  for (let s = 0; s < count; s++) total += work[s];
  let done = 0;
  let made = 0;
  let peak = 0;
  let peakAt = 0;
  for (let s = 0; s < count; s++) {
    const p = firstColumn[s + 1] - firstColumn[s];
    const m = frontOrder[s];
    keepMost(out.frontOrder, firstColumn[s] / size, firstColumn[s + 1] / size, m);
    const from = total > 0 ? done / total : s / count;
    done += work[s];
    const to = total > 0 ? done / total : (s + 1) / count;
    keepMost(out.stack, from, to, high[s]);
    const trapezoid = p * m - (p * (p - 1)) / 2;
    made += lu ? 2 * trapezoid - p : trapezoid;
    keepMost(out.factors, from, to, made);
    if (high[s] > peak) {
      peak = high[s];
      peakAt = to;
    }
  }
  return { steps, ...out, peak, peakAt };
}

/** Raises the steps that shares from … to touch. */
function keepMost(steps: Float64Array, from: number, to: number, value: number): void {
  const n = steps.length;
  const first = Math.min(n - 1, Math.floor(from * n));
  const last = Math.max(first, Math.min(n - 1, Math.ceil(to * n) - 1));
  for (let k = first; k <= last; k++) if (value > steps[k]) steps[k] = value;
}
