import type { Target } from './target.ts';
import { rateAt } from './time.ts';

/** What a run here showed, to calibrate a target with. */
export interface Sample {
  readonly operations: number;
  /** seconds of the numeric phase */
  readonly seconds: number;
  /** mean order of the fronts, weighted by work; read where `fronts` is absent */
  readonly frontOrder: number;
  /** operations by order of front */
  readonly fronts?: readonly { readonly order: number; readonly operations: number }[];
}

/** Modelled seconds of a sample on one core. */
export function sampleSeconds(sample: Sample, target: Target): number {
  const fronts = sample.fronts ?? [{ order: sample.frontOrder, operations: sample.operations }];
  return fronts.reduce((sum, f) => sum + f.operations / rateAt(f.order, target), 0);
}

/** How far the model is from each sample: max(modelled / measured, measured / modelled) − 1, so that 1 means a factor of two. */
export function modelErrors(samples: readonly Sample[], target: Target): readonly number[] {
  return samples.map((s) => {
    const ratio = sampleSeconds(s, target) / s.seconds;
    return Math.max(ratio, 1 / ratio) - 1;
  });
}

/** most that large fronts are taken to be faster than small ones */
const widest = 100;

/** steps of the fit; far more than it needs */
const mostSteps = 100;

/**
 * The two rates that explain samples best: least squares on the logarithms of seconds, by damped Gauss–Newton steps on the logarithms of the
 * rates (Levenberg 1944). Small fronts are never taken to be faster than large ones. Samples that cannot tell the two apart leave their
 * ratio near that of `target`.
 */
export function calibrate(samples: readonly Sample[], target: Target): Target {
  const operations = samples.reduce((sum, s) => sum + s.operations, 0);
  const seconds = samples.reduce((sum, s) => sum + s.seconds, 0);
  if (!(operations > 0 && seconds > 0)) return target;
  const scale = operations / seconds / (operations / samples.reduce((sum, s) => sum + sampleSeconds(s, target), 0));
  let now = { ...target, smallRate: target.smallRate * scale, largeRate: target.largeRate * scale };
  let damping = 1e-3;
  let cost = costOf(samples, now);
  for (let step = 0; step < mostSteps && damping < 1e9; step++) {
    const [ds, dl] = direction(samples, now, damping);
    const free = now.largeRate * Math.exp(dl);
    const smallRate = Math.max(now.smallRate * Math.exp(ds), free / widest);
    const largeRate = Math.max(smallRate, free);
    const next = { ...now, smallRate, largeRate };
    const better = costOf(samples, next);
    if (better < cost) {
      now = next;
      cost = better;
      damping = Math.max(damping / 10, 1e-12);
    } else damping *= 10;
  }
  return now;
}

function costOf(samples: readonly Sample[], target: Target): number {
  return samples.reduce((sum, s) => sum + Math.log(sampleSeconds(s, target) / s.seconds) ** 2, 0);
}

/** Damped Gauss–Newton step for the logarithms of the small and the large rate. */
function direction(samples: readonly Sample[], target: Target, damping: number): [number, number] {
  let a11 = 0;
  let a12 = 0;
  let a22 = 0;
  let b1 = 0;
  let b2 = 0;
  const h = 1e-6;
  for (const s of samples) {
    const seconds = sampleSeconds(s, target);
    const residual = Math.log(seconds / s.seconds);
    const bySmall = (sampleSeconds(s, { ...target, smallRate: target.smallRate * (1 + h) }) / seconds - 1) / h;
    const byLarge = (sampleSeconds(s, { ...target, largeRate: target.largeRate * (1 + h) }) / seconds - 1) / h;
    a11 += bySmall * bySmall;
    a12 += bySmall * byLarge;
    a22 += byLarge * byLarge;
    b1 -= bySmall * residual;
    b2 -= byLarge * residual;
  }
  const d = damping * Math.max(a11, a22, 1e-12);
  const det = (a11 + d) * (a22 + d) - a12 * a12;
  return [(b1 * (a22 + d) - b2 * a12) / det, ((a11 + d) * b2 - a12 * b1) / det];
}
