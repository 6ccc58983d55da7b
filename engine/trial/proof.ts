import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { transpose } from '../matrix/transpose.ts';
import { type AccuracyCard, type AccuracyOptions, measureAccuracy } from '../numeric/accuracy/card.ts';
import { type ColumnFactor, factorizeColumns } from '../numeric/column/columnFactor.ts';
import { type FrontFactor, factorizeFronts } from '../numeric/fronts/frontFactor.ts';
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
  /** `single`: factors kept in single precision, residuals and corrections in double; fronts only. Default double */
  readonly precision?: 'double' | 'single';
  /** solves Aᵀ·x = b with the factors of A (transposed, not conjugated); default false */
  readonly transposed?: boolean;
  /** seed of the random right-hand sides; default 1 */
  readonly seed?: number;
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
  const t0 = now();
  const made = factorizeTrial(context, trial, options, (fraction, phase) => progress(0.7 * fraction, phase));
  const t2 = now();
  const { matrix } = context.input;
  const measured = measureAccuracy(
    options.transposed === true ? transpose(matrix) : matrix,
    options.transposed === true ? transposedSolver(made.solver) : made.solver,
    {
      ...(options.rightHandSides === undefined ? {} : { rightHandSides: options.rightHandSides }),
      ...(options.refine === undefined ? {} : { steps: options.refine }),
      ...(options.seed === undefined ? {} : { seed: options.seed }),
    },
    (fraction, phase) => progress(0.7 + 0.3 * fraction, phase),
  );
  const t3 = now();
  const { report } = made.solver;
  return {
    card: measured.card,
    report,
    forecast: {
      factorEntries: trial.counts.factorEntries,
      operations: trial.counts.operations,
      storedFactorEntries: made.stored,
      peakBytes: made.peakBytes,
    },
    operations:
      report.storedFactorEntries === report.factorEntries ? report.executedOperations : trial.counts.operations,
    seconds: {
      ordering: trial.seconds.ordering,
      symbolic: trial.seconds.symbolic + made.analysisSeconds,
      numeric: t2 - t0 - made.analysisSeconds,
      solve: t3 - t2,
    },
    solutions: measured.solutions,
  };
}

/** The factors of a trial, before anything is solved with them. */
export interface FactorizedTrial {
  readonly solver: FrontFactor | ColumnFactor;
  /** forecast entries with padding; null for column LU */
  readonly stored: number | null;
  /** forecast high-water mark of the run, bytes; null for column LU, whose storage grows with the pivots */
  readonly peakBytes: number | null;
  readonly analysisSeconds: number;
}

/**
 * Runs the numeric factorization of a finished trial.
 * @param held unknowns at the end that are not eliminated: their Schur complement is then in the factor, which cannot solve. Default 0
 * @throws Fault "proof-impossible"; "memory"; "not-completed" with original rows
 */
export function factorizeTrial(
  context: TrialContext,
  trial: TrialResult,
  options: Pick<ProofOptions, 'amalgamation' | 'memoryLimit' | 'precision'> = {},
  progress: Progress = noProgress,
  held = 0,
): FactorizedTrial {
  const why = whyNoProof(context.facts, trial.choice);
  if (why !== null) throw new Fault('input', 'proof-impossible', why);
  if (trial.choice.factorization === 'column-lu') {
    if (options.precision === 'single' || held > 0) {
      const what = held > 0 ? 'A Schur complement' : 'Single precision';
      throw new Fault(
        'input',
        'proof-impossible',
        `${what} is made on fronts: choose LU on fronts instead of column LU.`,
      );
    }
    const solver = runColumns(context.input.matrix, trial, progress);
    return { solver, stored: null, peakBytes: null, analysisSeconds: 0 };
  }
  const t0 = now();
  const analysis = analyseFronts(context, trial, options, held);
  const analysisSeconds = now() - t0;
  return {
    solver: analysis.factorize(progress),
    stored: analysis.stored,
    peakBytes: analysis.peakBytes,
    analysisSeconds,
  };
}

/** The same factors, solving with Aᵀ where they solved with A. */
function transposedSolver(solver: Solver): Solver {
  return {
    size: solver.size,
    complex: solver.complex,
    report: solver.report,
    solveInPlace: (x, columns) => solver.solveTransposedInPlace(x, columns),
    solveTransposedInPlace: (x, columns) => solver.solveInPlace(x, columns),
  };
}

interface FrontAnalysis {
  readonly tree: AssemblyTree;
  readonly stored: number;
  readonly peakBytes: number;
  factorize(progress: Progress): FrontFactor;
}

/** Assembly tree and memory of a front factorization; refuses by the forecast. */
function analyseFronts(
  context: TrialContext,
  trial: TrialResult,
  options: Pick<ProofOptions, 'amalgamation' | 'memoryLimit' | 'precision'>,
  schur: number,
): FrontAnalysis {
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
    held,
  });
  const entries = matrix.rowIndex.length;
  const peak = predictPeakBytes(tree, {
    kind,
    complex: context.facts.complex,
    entries,
    paired: plan.plannedRow !== null,
    single: options.precision === 'single',
    schur,
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
          precision: options.precision ?? 'double',
          schur,
          ...(choice.pivoting === 'threshold' ? { threshold: choice.threshold } : {}),
          ...(plan.rowScaling === null ? {} : { rowScale: plan.rowScaling }),
          ...(plan.columnScaling === null || kind !== 'lu' ? {} : { columnScale: plan.columnScaling }),
          ...(plan.plannedRow === null ? {} : { rowPermutation: plan.plannedRow }),
        },
        progress,
      ),
  };
}

function runColumns(matrix: SparseMatrix, trial: TrialResult, progress: Progress): ColumnFactor {
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
