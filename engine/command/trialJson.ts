import type { Direction } from '../exchange/writePermutation.ts';
import { trialCost } from '../forecast/cost.ts';
import type { TrialForecast } from '../forecast/forecast.ts';
import type { Target, Workload } from '../forecast/target.ts';
import { workloadSeconds } from '../forecast/workload.ts';
import { countKindOf } from '../trial/forecast.ts';
import type { TrialResult } from '../trial/result.ts';
import type { TrialSpread } from '../trial/spread.ts';

/** A trial of `compare` with all that belongs to it. */
export interface ComparedTrial {
  /** how it is called in tables and sentences: its ordering, and the reading of an imported one */
  readonly name: string;
  /** how an imported permutation was read, where its file does not say it */
  readonly direction: Direction | null;
  readonly result: TrialResult;
  /** null where counts are not defined */
  readonly forecast: TrialForecast | null;
  /** null unless asked for */
  readonly spread: (TrialSpread & { readonly noDifference: { factorEntries: boolean; operations: boolean } }) | null;
}

/** A trial as JSON, named as in the house's definitions: counts alone. */
export function trialJson(trial: TrialResult): Record<string, unknown> {
  const c = trial.counts;
  const kind = countKindOf(trial);
  const reasons: Record<string, string> = { ...c.reasons };
  if (c.upperEntries === null && c.lowerEntries !== null) {
    reasons.upperEntries ??= 'a symmetric factorization stores L alone';
  }
  return {
    ordering: trial.choice.ordering,
    factorization: trial.choice.factorization,
    factorEntries: c.factorEntries,
    lowerEntries: c.lowerEntries,
    upperEntries: c.upperEntries,
    offDiagonalBlockEntries: c.offDiagonalBlockEntries,
    ...(c.expected === null ? {} : { expected: c.expected }),
    ...(c.range === null ? {} : { range: c.range }),
    ...(c.staticStructure === null ? {} : { staticStructure: c.staticStructure }),
    operations: c.operations,
    treeHeight: c.treeHeight,
    largestFront: c.largestFront,
    factorBytes: c.factorBytes,
    bandwidth: c.bandwidth,
    envelope: c.envelope,
    kinds: {
      factorEntries: kind,
      operations: kind,
      factorBytes: kind,
      ...(c.range === null ? {} : { range: 'bound' }),
      bandwidth: 'exact',
      envelope: 'exact',
      seconds: 'measured',
    },
    ...(holds(trial) === null ? {} : { holds: holds(trial) }),
    rounded: { operations: (c.operations ?? 0) > 2 ** 53, factorEntries: (c.factorEntries ?? 0) > 2 ** 53 },
    valueDependent: trial.valueDependent,
    choice: trial.choice,
    ...(trial.portfolio === null ? {} : { ran: trial.ran, portfolio: trial.portfolio }),
    ...(trial.heldBlock === null ? {} : { heldBlock: trial.heldBlock }),
    notes: trial.notes,
    ...(Object.keys(reasons).length === 0 ? {} : { reasons }),
    seconds: trial.seconds,
  };
}

/** What the counts rest on where pivoting could move them; null where nothing can. */
function holds({ choice, counts }: TrialResult): string | null {
  if (counts.factorEntries === null || choice.pivoting !== 'threshold') return null;
  return choice.factorization === 'column-lu'
    ? 'while pivots stay on the planned diagonal'
    : 'until a pivot is delayed';
}

/** The same with spread and forecast. */
export function comparedJson(trial: ComparedTrial, target: Target, workload: Workload): Record<string, unknown> {
  const base = trialJson(trial.result);
  const spread = {
    ...(trial.direction === null ? {} : { permutationDirection: trial.direction }),
    ...(trial.spread === null ? {} : { spread: trial.spread }),
  };
  const { forecast } = trial;
  if (forecast === null) {
    const why = 'the counts it rests on are not defined for this matrix';
    const none = { storage: null, peak: null, limits: null, work: null, time: null, parallel: null, delayed: null };
    const reasons = {
      ...(base.reasons as object | undefined),
      ...Object.fromEntries(Object.keys(none).map((k) => [k, why])),
    };
    return { ...base, ...spread, ...none, reasons };
  }
  const reasons: Record<string, string> = { ...(base.reasons as Record<string, string> | undefined) };
  if (forecast.parallel === null) reasons.parallel = 'column LU has no fronts; its parallelism is not modelled';
  if (forecast.delayed === null) reasons.delayed = 'no pivot is delayed in this factorization';
  const { factorEntries } = trial.result.counts;
  const { ordering, symbolic } = trial.result.seconds;
  const cost = trialCost(forecast, target.cores, ordering + symbolic, factorEntries ?? 0, trial.name);
  const [counts, fits, here] = forecast.limits;
  return {
    ...base,
    ...spread,
    storage: forecast.storage,
    peak: forecast.peak,
    limits: {
      countsExceed32Bit: !counts.passed,
      fitsTarget: fits.passed,
      runsHere: here.passed,
      sentences: forecast.limits.map((l) => `${l.question} ${l.sentence}`),
    },
    work: forecast.operations,
    time: { ...forecast.time, onTarget: cost.factorization },
    parallel: forecast.parallel,
    delayed: forecast.delayed,
    // the one place of figures that rest on a clock
    seconds: { ...trial.result.seconds, workload: workloadSeconds(cost, workload) },
    ...(Object.keys(reasons).length === 0 ? {} : { reasons }),
  };
}
