import { trialCost } from '../forecast/cost.ts';
import type { TrialForecast } from '../forecast/forecast.ts';
import type { Target, Workload } from '../forecast/target.ts';
import { workloadSeconds } from '../forecast/workload.ts';
import { doubtsOf } from '../trial/advice.ts';
import type { Choice } from '../trial/choice.ts';
import type { TrialContext } from '../trial/context.ts';
import { countKindOf } from '../trial/forecast.ts';
import type { Proof } from '../trial/proof.ts';
import type { TrialResult } from '../trial/result.ts';
import type { MatrixFacts } from '../trial/rules.ts';
import { type Reserve, reserveFor } from './reserve.ts';
import { programVersion } from './version.ts';

/** What a numeric run showed, as far as a sheet tells it. */
export interface SheetProof {
  readonly verdict: 'green' | 'amber' | 'red';
  readonly backwardError: number | null;
  readonly componentwiseBackwardError: number | null;
  readonly conditionEstimate: number | null;
  readonly trustedDigits: number | null;
  readonly pivotGrowth: number | null;
  readonly factorEntries: number;
  readonly peakBytes: number;
  readonly numericSeconds: number;
}

/**
 * How a matrix is to be factorized, in neutral terms of the trade, for whichever solver will do it. JSON with the schema in
 * `public/configuration-sheet.schema.json`.
 */
export interface ConfigurationSheet {
  readonly format: 'configuration-sheet';
  readonly formatVersion: 1;
  readonly version: string;
  readonly matrix: {
    readonly name: string;
    readonly rows: number;
    readonly columns: number;
    readonly entries: number;
    readonly field: string;
    /** as measured, not as declared */
    readonly symmetry: 'symmetric' | 'hermitian' | 'symmetric pattern' | 'unsymmetric';
  };
  readonly factorization: {
    readonly kind: Choice['factorization'];
    readonly formula: string;
    readonly form: 'fronts' | 'columns';
  };
  readonly ordering: {
    readonly method: Choice['ordering'];
    /** whether the order handed over is the method's own, followed by a postorder of its elimination tree */
    readonly postordered: boolean;
    readonly seed: number;
    /** unknowns kept at the end */
    readonly heldLast: number;
    readonly advice: string;
  };
  readonly pivoting: {
    readonly strategy: Choice['pivoting'];
    readonly threshold: number | null;
    readonly meaning: string;
  };
  readonly scaling: {
    readonly strategy: Choice['scaling'];
    readonly matching: Choice['matching'];
    /** whether figures rest on the values and hold for these values only */
    readonly valueDependent: boolean;
  };
  readonly blockTriangularForm: { readonly used: boolean; readonly blocks: number };
  readonly fill: {
    readonly factorEntries: number | null;
    readonly fillIn: number | null;
    readonly kind: 'exact' | 'bound' | 'modelled';
    /** proven for every pivot sequence; null where pivots cannot move it */
    readonly range: readonly [number, number] | null;
  };
  readonly work: { readonly operations: number | null; readonly range: readonly [number, number] | null };
  readonly memory: Reserve | null;
  readonly threads: {
    readonly helpful: number;
    readonly modelledSpeedup: number;
    readonly bound: number | null;
    readonly basis: string;
  };
  readonly time: {
    readonly kind: 'modelled';
    readonly factorizationSeconds: number;
    readonly solveSeconds: number;
    readonly workloadSeconds: number;
    readonly basis: string;
  } | null;
  readonly target: Target;
  readonly workload: Workload;
  readonly proof: SheetProof | null;
  readonly cautions: readonly string[];
}

/** What a sheet is made from. */
export interface SheetQuestion {
  readonly name: string;
  readonly context: TrialContext;
  readonly trial: TrialResult;
  /** null where counts are not defined */
  readonly forecast: TrialForecast | null;
  readonly target: Target;
  readonly workload: Workload;
  /** null where no numeric run was made */
  readonly proof: Pick<Proof, 'card' | 'report' | 'seconds'> | null;
}

export function configurationSheet(q: SheetQuestion): ConfigurationSheet {
  const { context, trial, forecast, target, workload } = q;
  const { facts } = context;
  const { choice, ran, counts } = trial;
  const pivoted = choice.pivoting === 'threshold';
  const cost =
    forecast === null
      ? null
      : trialCost(
          forecast,
          target.cores,
          trial.seconds.ordering + trial.seconds.symbolic,
          counts.factorEntries ?? 0,
          q.name,
        );
  return {
    format: 'configuration-sheet',
    formatVersion: 1,
    version: programVersion,
    matrix: {
      name: q.name,
      rows: facts.rows,
      columns: facts.columns,
      entries: facts.entries,
      field: context.input.matrix.field,
      symmetry: symmetryOf(facts),
    },
    factorization: {
      kind: choice.factorization,
      formula: formulaOf(choice, facts),
      form: choice.factorization === 'column-lu' ? 'columns' : 'fronts',
    },
    ordering: {
      method: ran.ordering,
      postordered: trial.effective.some((i, k) => i !== trial.requested[k]),
      seed: ran.seed,
      heldLast: context.input.heldLast?.length ?? 0,
      advice:
        'Give the permutation file to the solver as a user ordering; the same method inside another program can order otherwise.',
    },
    pivoting: {
      strategy: choice.pivoting,
      threshold: pivoted ? choice.threshold : null,
      meaning: pivotingMeaning(choice),
    },
    scaling: { strategy: choice.scaling, matching: choice.matching, valueDependent: trial.valueDependent },
    blockTriangularForm: { used: trial.plan.blockStart !== null, blocks: blocksOf(trial) },
    fill: {
      factorEntries: counts.factorEntries,
      fillIn:
        counts.factorEntries === null
          ? null
          : counts.factorEntries - replacedEntries(context, choice) + counts.offDiagonalBlockEntries,
      kind: countKindOf(trial),
      range: pivoted ? (counts.range?.factorEntries ?? null) : null,
    },
    work: { operations: counts.operations, range: pivoted ? (counts.range?.operations ?? null) : null },
    memory: forecast === null ? null : reserveFor(context, trial, forecast, target),
    threads: threadsOf(forecast),
    time:
      cost === null
        ? null
        : {
            kind: 'modelled',
            factorizationSeconds: cost.factorization,
            solveSeconds: cost.solve,
            workloadSeconds: workloadSeconds(cost, workload),
            basis: `${target.cores} cores at ${target.largeRate.toExponential(1)} operations a second in large fronts and ${target.smallRate.toExponential(1)} in small ones; substitutions by ${target.bandwidth.toExponential(1)} bytes a second`,
          },
    target,
    workload,
    proof: q.proof === null ? null : sheetProof(q.proof),
    cautions: cautionsFor(q),
  };
}

function symmetryOf(f: MatrixFacts): ConfigurationSheet['matrix']['symmetry'] {
  if (f.complex && f.hermitian) return 'hermitian';
  if (f.valueSymmetric) return 'symmetric';
  return f.patternSymmetric ? 'symmetric pattern' : 'unsymmetric';
}

function formulaOf(choice: Choice, facts: MatrixFacts): string {
  const mirror = facts.complex && facts.hermitian ? 'ᴴ' : 'ᵀ';
  const scaled = choice.scaling === 'none' ? '' : 'S·';
  const back = choice.scaling === 'none' ? '' : '·S';
  if (choice.factorization === 'cholesky') return `P·${scaled}A${back}·Pᵀ = L·L${mirror}`;
  if (choice.factorization === 'ldlt') return `P·${scaled}A${back}·Pᵀ = L·D·L${mirror}`;
  return 'P·R·A·C·Q = L·U, L with unit diagonal';
}

function pivotingMeaning({ pivoting, threshold, factorization }: Choice): string {
  if (pivoting === 'none') return 'pivots are taken in the given order, whatever their size';
  if (pivoting === 'static')
    return 'pivots in the given order; too small ones are replaced, and the solution is refined';
  const what = factorization === 'ldlt' ? 'a 1×1 or 2×2 pivot' : 'a pivot';
  return `${what} is taken only where multipliers stay at most 1/u, u = ${threshold}; else it is interchanged or delayed`;
}

/** Diagonal blocks of the block triangular form; 1 without. */
function blocksOf({ plan }: TrialResult): number {
  return plan.blockStart === null ? 1 : plan.blockStart.length - 1;
}

/** Entries of the matrix that the factors replace: its lower triangle for Cholesky and LDLᵀ (of A + Aᵀ), all of it for LU. */
function replacedEntries(context: TrialContext, { factorization }: Choice): number {
  const { entries, offDiagonalEntries } = context.facts;
  if (factorization === 'lu' || factorization === 'column-lu') return entries;
  return context.graph().neighbour.length / 2 + (entries - offDiagonalEntries);
}

function threadsOf(forecast: TrialForecast | null): ConfigurationSheet['threads'] {
  const parallel = forecast?.parallel ?? null;
  if (parallel === null) {
    return {
      helpful: 1,
      modelledSpeedup: 1,
      bound: null,
      basis: 'column LU has no fronts; its parallelism is not modelled',
    };
  }
  const gain = (row: (typeof parallel.rows)[number]) => Math.max(row.speedup, row.splitSpeedup);
  const worth = parallel.rows.filter((row) => gain(row) >= row.workers / 2).at(-1);
  return {
    helpful: worth?.workers ?? 1,
    modelledSpeedup: worth === undefined ? 1 : gain(worth),
    bound: parallel.divisibleFrontsSpeedup,
    basis:
      'the most workers of 1, 2, 4, 8 … that are busy at least half of the time in a schedule of the assembly tree, communication left out',
  };
}

function sheetProof({ card, report, seconds }: NonNullable<SheetQuestion['proof']>): SheetProof {
  return {
    verdict: card.verdict,
    backwardError: finite(card.backwardError),
    componentwiseBackwardError: finite(card.componentwiseBackwardError),
    conditionEstimate: finite(card.conditionEstimate),
    trustedDigits: card.trustedDigits,
    pivotGrowth: finite(card.pivotGrowth),
    factorEntries: report.factorEntries,
    peakBytes: report.peakBytes,
    numericSeconds: seconds.numeric,
  };
}

function finite(x: number | null): number | null {
  return x !== null && Number.isFinite(x) ? x : null;
}

/** Cautions that belong to every paper that leaves the program. */
export const standingCautions: readonly string[] = [
  'A small residual says that the equations as given were solved; it does not say that the model behind them is right.',
  'Where people rely on the result (structures, networks, vehicles), local codes and licensed practice decide; this paper does not replace them.',
];

function cautionsFor({ context, trial, forecast, proof }: SheetQuestion): readonly string[] {
  const { choice } = trial;
  const out: string[] = [];
  if (choice.pivoting === 'threshold') {
    out.push(
      'A forecast is no guarantee under numerical pivoting: rows interchanged and pivots delayed add entries, operations and memory.',
    );
  }
  if (choice.pivoting === 'static') {
    out.push(
      'Replaced pivots change the system that is factorized: refine each solution and look at its backward error.',
    );
  }
  if (trial.valueDependent)
    out.push('Matching or scaling before ordering rests on the values: new values can ask for a new analysis.');
  if (proof === null) {
    out.push(...doubtsOf(context.facts, choice.factorization));
    out.push('No numeric run was made: accuracy is not known.');
  } else {
    out.push(
      ...proof.card.reasons.map((r) => `Proof, ${proof.card.verdict}: ${r}`),
      ...proof.card.cautions.filter((c) => !c.startsWith('A small residual')),
    );
  }
  const full = forecast?.limits.find((l) => !l.passed && l.question.includes('target'));
  if (full !== undefined) out.push(`It does not fit the target. ${full.sentence}`);
  const wide = forecast?.limits[0];
  if (wide !== undefined && !wide.passed) out.push(wide.sentence);
  out.push('Seconds are modelled from the rates of the target; measure there before relying on them.');
  return [...out, ...standingCautions];
}
