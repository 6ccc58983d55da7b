import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { type AccuracyCard, type AccuracyOptions, measureAccuracy } from '../numeric/accuracy/card.ts';
import { factorizeColumns } from '../numeric/column/columnFactor.ts';
import { factorizeFronts } from '../numeric/fronts/frontFactor.ts';
import { predictPeakBytes } from '../numeric/fronts/plan.ts';
import type { PivotReport, Solver } from '../numeric/solver.ts';
import { type Amalgamation, usualAmalgamation } from '../symbolic/amalgamate.ts';
import { analyseGraph } from '../symbolic/analyse.ts';
import { assemblyTree } from '../symbolic/assemblyTree.ts';
import { frontRows } from '../symbolic/frontRows.ts';
import type { AssemblyTree } from '../symbolic/types.ts';
import type { TrialContext } from './context.ts';
import { frontGraph } from './prepared.ts';
import type { TrialResult } from './result.ts';
import { whyNoProof } from './rules.ts';

export interface ProofOptions {
  /** right-hand sides of the user; default none (A·1 and two random ones are always solved) */
  readonly rightHandSides?: AccuracyOptions['rightHandSides'];
  /** most refinement steps; default 5 */
  readonly refine?: number;
  /** padding of fronts; default usual */
  readonly amalgamation?: Amalgamation;
  /** bytes the run may take by its forecast; default no limit. More is refused before anything is allocated */
  readonly memoryLimit?: number;
}

/** What a numeric run showed, beside what was forecast. Plain data. */
export interface Proof {
  readonly card: AccuracyCard;
  readonly report: PivotReport;
  readonly forecast: {
    readonly factorEntries: number | null;
    readonly operations: number | null;
    readonly storedFactorEntries: number | null;
    /** null for column LU, whose storage grows with the pivots */
    readonly peakBytes: number | null;
  };
  /** operations of the factors without padding, from the run's own counts where pivots were delayed */
  readonly operations: number | null;
  readonly seconds: {
    readonly ordering: number;
    readonly symbolic: number;
    readonly numeric: number;
    /** solving, refining and estimating for all right-hand sides */
    readonly solve: number;
  };
  readonly solutions: { readonly columns: number; readonly values: Float64Array; readonly complex: boolean } | null;
}

const now = (): number => performance.now() / 1000;

/**
 * Runs the factorization of a finished trial and measures it.
 * @throws Fault "proof-impossible"; "memory"; "not-completed" with original rows
 */
export function runProof(
  context: TrialContext,
  trial: TrialResult,
  options: ProofOptions = {},
  progress: Progress = noProgress,
): Proof {
  const why = whyNoProof(context.facts, trial.choice);
  if (why !== null) throw new Fault('input', 'proof-impossible', why);
  const t0 = now();
  const analysis = trial.choice.factorization === 'column-lu' ? null : analyseFronts(context, trial, options);
  const t1 = now();
  const numeric: Progress = (fraction, phase) => progress(0.7 * fraction, phase);
  const solver = analysis === null ? runColumns(context.input.matrix, trial, numeric) : analysis.factorize(numeric);
  const t2 = now();
  const measured = measureAccuracy(
    context.input.matrix,
    solver,
    {
      ...(options.rightHandSides === undefined ? {} : { rightHandSides: options.rightHandSides }),
      ...(options.refine === undefined ? {} : { steps: options.refine }),
    },
    (fraction, phase) => progress(0.7 + 0.3 * fraction, phase),
  );
  const t3 = now();
  const { report } = solver;
  return {
    card: measured.card,
    report,
    forecast: {
      factorEntries: trial.counts.factorEntries,
      operations: trial.counts.operations,
      storedFactorEntries: analysis?.stored ?? null,
      peakBytes: analysis?.peakBytes ?? null,
    },
    operations:
      report.storedFactorEntries === report.factorEntries ? report.executedOperations : trial.counts.operations,
    seconds: {
      ordering: trial.seconds.ordering,
      symbolic: trial.seconds.symbolic + (t1 - t0),
      numeric: t2 - t1,
      solve: t3 - t2,
    },
    solutions: measured.solutions,
  };
}

interface FrontAnalysis {
  readonly tree: AssemblyTree;
  readonly stored: number;
  readonly peakBytes: number;
  factorize(progress: Progress): Solver;
}

/** Assembly tree and memory of a front factorization; refuses by the forecast. */
function analyseFronts(context: TrialContext, trial: TrialResult, options: ProofOptions): FrontAnalysis {
  const { choice, plan } = trial;
  const kind = choice.factorization as 'cholesky' | 'ldlt' | 'lu';
  const { matrix } = context.input;
  if (choice.blocks && context.facts.columns > 0 && kind === 'lu' && context.blockForm().blocks > 1) {
    throw new Fault(
      'input',
      'proof-impossible',
      'Fronts are not run block by block: turn blocks off, or choose column LU, which works on the block triangular form.',
    );
  }
  const graph = frontGraph(context, plan);
  const held = context.input.heldLast?.length ?? 0;
  const symbolic = analyseGraph(graph, trial.effective, { postorder: false, heldLast: held });
  const tree = assemblyTree(symbolic, {
    amalgamation: options.amalgamation ?? usualAmalgamation,
    blocks: kind === 'lu' ? 'square' : 'packed',
  });
  const entries = matrix.rowIndex.length;
  const peak = predictPeakBytes(tree, {
    kind,
    complex: context.facts.complex,
    entries,
    paired: plan.plannedRow !== null,
  });
  if (options.memoryLimit !== undefined && peak.total > options.memoryLimit) {
    throw new Fault(
      'memory',
      'peak-over-limit',
      `The run needs ${peak.total} bytes (${(peak.total / 2 ** 30).toFixed(2)} GiB) by its forecast; the limit is ${options.memoryLimit} bytes (${(options.memoryLimit / 2 ** 30).toFixed(2)} GiB). Choose an ordering with less fill, or raise the limit.`,
    );
  }
  return {
    tree,
    stored: kind === 'lu' ? 2 * tree.storedFactorEntries - tree.size : tree.storedFactorEntries,
    peakBytes: peak.total,
    factorize: (progress) =>
      factorizeFronts(
        matrix,
        tree,
        frontRows(tree, graph),
        {
          kind,
          hermitian: context.facts.complex && context.facts.hermitian && !context.facts.valueSymmetric,
          pivoting: choice.pivoting,
          ...(choice.pivoting === 'threshold' ? { threshold: choice.threshold } : {}),
          ...(plan.rowScaling === null ? {} : { rowScale: plan.rowScaling }),
          ...(plan.columnScaling === null || kind !== 'lu' ? {} : { columnScale: plan.columnScaling }),
          ...(plan.plannedRow === null ? {} : { rowPermutation: plan.plannedRow }),
        },
        progress,
      ),
  };
}

function runColumns(matrix: SparseMatrix, trial: TrialResult, progress: Progress): Solver {
  const { choice, plan } = trial;
  return factorizeColumns(
    matrix,
    trial.effective,
    {
      pivoting: choice.pivoting,
      threshold: choice.threshold,
      ...(plan.plannedRow === null ? {} : { plannedRow: plan.plannedRow }),
      ...(plan.blockStart === null ? {} : { blockStart: plan.blockStart }),
      ...(plan.rowScaling === null ? {} : { rowScaling: plan.rowScaling }),
      ...(plan.columnScaling === null ? {} : { columnScaling: plan.columnScaling }),
    },
    progress,
  );
}
