import { noProgress, type Progress } from '../../matrix/progress.ts';
import { type Solver, solveComplexInPlace } from '../solver.ts';
import { backwardErrors } from './backwardError.ts';
import { type DoubledWorkspace, doubledWorkspace, residualDoubledInto, residualInto } from './doubled.ts';
import type { MeasuredSystem } from './system.ts';

/** How to refine. */
export interface RefinementOptions {
  /** most corrections to apply; 0 measures only; default 5 */
  readonly steps?: number;
  /** precision of the residual; default "doubled", which measures honestly and also mends the forward error (Wilkinson 1963) */
  readonly residual?: 'working' | 'doubled';
}

/** Errors of one iterate. */
export interface RefinementStep {
  /** corrections applied so far; 0 is the plain solution */
  readonly step: number;
  readonly backwardError: number;
  readonly componentwiseBackwardError: number;
  /** ‖b − A·x‖∞ */
  readonly residualNorm: number;
}

/** The outcome for one right-hand side. */
export interface RefinedColumn {
  /** the iterate with the smallest backward error; interleaved when complex */
  readonly solution: Float64Array;
  /** residual of `solution` on the measured (scaled) system */
  readonly residual: Float64Array;
  /** |A|·|x| + |b| of `solution` on the measured (scaled) system */
  readonly moduli: Float64Array;
  /** every iterate in the order in which it was made */
  readonly history: readonly RefinementStep[];
  /** which of `history` is returned */
  readonly returned: number;
}

/** Below this a backward error is rounding of the last place, and two iterates differ by chance only. */
const unitRoundoff = 2 ** -53;

/**
 * Solves A·x = b and refines: x ← x + A⁻¹(b − A·x) (Wilkinson 1963; Skeel 1980; Arioli, Demmel & Duff 1989). Stops when
 * both backward errors are down to rounding, when a step no longer halves the larger one, or after `steps` corrections, and
 * returns the iterate with the smallest normwise backward error (among those at rounding level, the smallest componentwise
 * one). All columns go through the solver together.
 *
 * @param b right-hand sides of the original (unscaled) A, column after column; interleaved when `complex`
 */
export function refine(
  system: MeasuredSystem,
  solver: Solver,
  b: Float64Array,
  columns: number,
  complex: boolean,
  options: RefinementOptions = {},
  progress: Progress = noProgress,
): RefinedColumn[] {
  const steps = options.steps ?? 5;
  const length = system.size * (complex ? 2 : 1);
  const scaledB = system.scale === 1 ? b : b.map((v) => v * system.scale);
  const work = doubledWorkspace(length);
  const states = Array.from({ length: columns }, (_, c) =>
    newState(scaledB.subarray(c * length, (c + 1) * length), length, system.size),
  );
  let active = states;
  for (let step = 0; active.length > 0; step++) {
    progress(Math.min(1, step / (steps + 1)), 'solving and refining');
    applyCorrection(system, solver, active, complex);
    for (const state of active) measure(system, state, step, complex, options.residual ?? 'doubled', work);
    active = active.filter((state) => step < steps && worthAnotherStep(state.history));
  }
  return states.map((s) => ({
    solution: s.bestX,
    residual: s.bestR,
    moduli: s.bestModuli,
    history: s.history,
    returned: s.best,
  }));
}

interface State {
  readonly b: Float64Array;
  readonly x: Float64Array;
  readonly r: Float64Array;
  readonly moduli: Float64Array;
  readonly bestX: Float64Array;
  readonly bestR: Float64Array;
  readonly bestModuli: Float64Array;
  readonly history: RefinementStep[];
  best: number;
}

/** Starts at x = 0, so that the first correction is the plain solution. */
function newState(b: Float64Array, length: number, size: number): State {
  return {
    b,
    x: new Float64Array(length),
    r: b.slice(),
    moduli: new Float64Array(size),
    bestX: new Float64Array(length),
    bestR: new Float64Array(length),
    bestModuli: new Float64Array(size),
    history: [],
    best: -1,
  };
}

/** x ← x + A⁻¹·r for all states in one blocked solve. */
function applyCorrection(system: MeasuredSystem, solver: Solver, states: readonly State[], complex: boolean): void {
  const length = system.size * (complex ? 2 : 1);
  const d = new Float64Array(length * states.length);
  states.forEach((s, c) => {
    d.set(s.r, c * length);
  });
  if (complex) solveComplexInPlace(solver, d, states.length);
  else solver.solveInPlace(d, states.length);
  states.forEach((s, c) => {
    // r belongs to scale·A, the solver to A
    for (let i = 0; i < length; i++) s.x[i] += d[c * length + i] / system.scale;
  });
}

function measure(
  system: MeasuredSystem,
  s: State,
  step: number,
  complex: boolean,
  precision: 'working' | 'doubled',
  work: DoubledWorkspace,
): void {
  if (precision === 'doubled') residualDoubledInto(system.matrix, s.x, s.b, s.r, complex, work);
  else residualInto(system.matrix, s.x, s.b, s.r, complex);
  const errors = backwardErrors(system, s.x, s.b, s.r, complex, s.moduli);
  s.history.push({
    step,
    backwardError: errors.normwise,
    componentwiseBackwardError: errors.componentwise,
    residualNorm: errors.residualNorm / system.scale,
  });
  if (s.best >= 0 && !isBetter(s.history[step], s.history[s.best])) return;
  s.best = step;
  s.bestX.set(s.x);
  s.bestR.set(s.r);
  s.bestModuli.set(s.moduli);
}

/** Whether `a` is to be preferred to `b`; what is not finite loses. */
function isBetter(a: RefinementStep, b: RefinementStep): boolean {
  const na = Math.max(a.backwardError, unitRoundoff);
  const nb = Math.max(b.backwardError, unitRoundoff);
  if (!Number.isFinite(na) || !Number.isFinite(a.componentwiseBackwardError)) return false;
  if (!Number.isFinite(nb) || !Number.isFinite(b.componentwiseBackwardError)) return true;
  if (na !== nb) return na < nb;
  return a.componentwiseBackwardError < b.componentwiseBackwardError;
}

function worthAnotherStep(history: readonly RefinementStep[]): boolean {
  const worst = (h: RefinementStep) => Math.max(h.backwardError, h.componentwiseBackwardError);
  const last = worst(history[history.length - 1]);
  // negated, so that NaN stops
  if (!(last > unitRoundoff && last < Infinity)) return false;
  return history.length < 2 || last <= worst(history[history.length - 2]) / 2;
}
