import type { Figure as EngineFigure } from '../../engine/forecast/figure.ts';
import type { TrialForecast } from '../../engine/forecast/forecast.ts';
import type { Target, Workload } from '../../engine/forecast/target.ts';
import { workloadSeconds } from '../../engine/forecast/workload.ts';
import { factorBytes } from '../../engine/trial/bytes.ts';
import type { Choice } from '../../engine/trial/choice.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { MatrixFacts } from '../../engine/trial/rules.ts';
import type { Kind } from '../figures/Figure.tsx';
import type { ShownProof } from '../state/trial.ts';

/** The plain part of a finished trial: all that the ledger needs. */
export interface TrialOutcome extends Pick<TrialResult, 'counts' | 'seconds' | 'valueDependent' | 'notes'> {
  /** entries of the matrix that the factors replace: its lower triangle for Cholesky and LDLᵀ (of A + Aᵀ), all of it for LU */
  readonly replaced: number;
}

/** One figure of a trial. Null with a reason where it is not defined. */
export interface TrialFigure {
  readonly value: number | null;
  readonly kind: Kind;
  readonly reason: string | null;
}

/** The figures of a trial, in the order of the ledger. */
export type FigureName =
  | 'factorEntries'
  | 'fillIn'
  | 'fillRatio'
  | 'operations'
  | 'factorBytes'
  | 'largestFront'
  | 'treeHeight'
  | 'bandwidth'
  | 'envelope'
  | 'peakBytes'
  | 'mostSpeedup'
  | 'criticalPath'
  | 'factorSeconds'
  | 'totalSeconds'
  | 'provenSeconds'
  | 'backwardError'
  | 'orderingSeconds'
  | 'symbolicSeconds';
export type TrialFigures = Readonly<Record<FigureName, TrialFigure>>;

/** The figures of a trial for a target. Plain arithmetic on counts. */
export function figuresOf(
  { counts, seconds, valueDependent, replaced }: TrialOutcome,
  { factorization, pivoting }: Choice,
  { columns, complex }: MatrixFacts,
  { indexBytes, scalarBytes, cores }: Target,
  workload: Workload,
  forecast: TrialForecast | null,
  proof: ShownProof | null,
): TrialFigures {
  // row interchanges and delayed pivots move entries: the counts are then those of an undisturbed run
  const undisturbed =
    pivoting === 'threshold' ? 'Holds while pivoting moves no rows; it can only be known by a run.' : null;
  const kind: Kind = valueDependent ? 'value-dependent' : undisturbed === null ? 'exact' : 'modelled';
  const figure = (name: string, value: number | null, as: Kind = kind): TrialFigure => ({
    value,
    kind: as,
    reason: value === null ? (counts.reasons[name] ?? 'Not defined for this trial.') : as === kind ? undisturbed : null,
  });
  const { factorEntries, lowerEntries, upperEntries } = counts;
  const widths = { value: complex ? 2 * scalarBytes : scalarBytes, index: indexBytes, pointer: 8 };
  const bytes =
    lowerEntries === null
      ? null
      : factorBytes(factorization, columns, lowerEntries, upperEntries ?? lowerEntries, widths);
  return {
    factorEntries: figure('factorEntries', factorEntries),
    fillIn: figure('factorEntries', factorEntries === null ? null : factorEntries - replaced),
    fillRatio: figure('factorEntries', factorEntries === null || replaced === 0 ? null : factorEntries / replaced),
    operations: figure('operations', counts.operations),
    factorBytes: figure('factorBytes', bytes),
    largestFront: figure('largestFront', counts.largestFront),
    treeHeight: figure('treeHeight', counts.treeHeight),
    bandwidth: figure('bandwidth', counts.bandwidth, 'exact'),
    envelope: figure('envelope', counts.envelope, 'exact'),
    ...forecastFigures(forecast, cores, seconds.ordering + seconds.symbolic, workload, factorEntries),
    provenSeconds: measured(proof, (p) => p.seconds.numeric),
    backwardError: measured(proof, (p) => p.card.backwardError),
    orderingSeconds: figure('orderingSeconds', seconds.ordering, 'measured'),
    symbolicSeconds: figure('symbolicSeconds', seconds.symbolic, 'measured'),
  };
}

const waiting: TrialFigure = {
  value: null,
  kind: 'modelled',
  reason: 'The forecast for your target is on its way, or not defined here.',
};

function taken({ value, kind, reason }: EngineFigure): TrialFigure {
  return { value, kind, reason: value === null ? (reason ?? 'Not defined here.') : null };
}

/** The figures that rest on the target: memory and time. Time is divided by what so many cores can gain on the tree. */
function forecastFigures(
  forecast: TrialForecast | null,
  cores: number,
  analysis: number,
  workload: Workload,
  factorEntries: number | null,
): Pick<TrialFigures, 'peakBytes' | 'mostSpeedup' | 'criticalPath' | 'factorSeconds' | 'totalSeconds'> {
  if (forecast === null)
    return {
      peakBytes: waiting,
      mostSpeedup: waiting,
      criticalPath: waiting,
      factorSeconds: waiting,
      totalSeconds: waiting,
    };
  const cost = costOf(forecast, cores, analysis, factorEntries ?? 0, '');
  const { parallel, storage } = forecast;
  const modelled = (value: number): TrialFigure => ({ value, kind: 'modelled', reason: null });
  return {
    peakBytes: taken(storage.multifrontal),
    mostSpeedup:
      parallel === null
        ? { value: null, kind: 'modelled', reason: 'Column LU has no fronts; its parallelism is not modelled.' }
        : { value: parallel.divisibleFrontsSpeedup, kind: 'bound', reason: null },
    criticalPath:
      parallel === null
        ? { value: null, kind: 'exact', reason: 'Column LU has no fronts; its critical path is not counted.' }
        : { value: parallel.sequentialFrontsPath, kind: 'exact', reason: null },
    factorSeconds: modelled(cost.factorization),
    totalSeconds: modelled(workloadSeconds(cost, workload)),
  };
}

/** What a trial costs on the cores of the target, in the form in which workloads are compared. */
export function costOf(forecast: TrialForecast, cores: number, analysis: number, factorEntries: number, name: string) {
  const { time, parallel } = forecast;
  const row = parallel?.rows.filter((r) => r.workers <= cores).at(-1);
  const speedup = row === undefined ? 1 : Math.max(row.splitSpeedup, row.speedup, 1);
  return {
    name,
    factorEntries,
    analysis,
    factorization: (time.factorization.value ?? 0) / speedup,
    solve: time.solve.value ?? 0,
    refinementStep: time.refinementStep.value ?? 0,
  };
}

function measured(proof: ShownProof | null, value: (proof: ShownProof) => number | null): TrialFigure {
  const reason = proof === null ? 'Known after a proof.' : 'Not finite.';
  const x = proof === null ? null : value(proof);
  return { value: x, kind: 'measured', reason: x === null ? reason : null };
}
