import { difference, type MatrixDifference } from '../matrix/difference.ts';
import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { type AccuracyCard, measureAccuracy } from '../numeric/accuracy/card.ts';
import { refactorizeColumns } from '../numeric/column/refactorize.ts';
import { FrontFactor, refactorizeFronts } from '../numeric/fronts/frontFactor.ts';
import type { PivotReport, Solver } from '../numeric/solver.ts';
import { TrialContext } from './context.ts';
import { factorizeTrial, type ProofOptions } from './proof.ts';
import type { TrialResult } from './result.ts';
import { runTrial } from './run.ts';

/** A second matrix factorized with the analysis of the first, or with a new one. Plain data. */
export interface Reuse {
  readonly difference: MatrixDifference;
  /** whether the analysis of the first matrix was enough */
  readonly reused: boolean;
  /** what happened, in sentences: "same pattern: yes", why a new analysis was made */
  readonly notices: readonly string[];
  readonly card: AccuracyCard;
  readonly report: PivotReport;
  readonly seconds: {
    /** numeric phase of the first matrix */
    readonly first: number;
    /** of the second one, on the analysis it was done with; without that analysis */
    readonly second: number;
    /** the new analysis, ordering included; 0 where none was made */
    readonly analysis: number;
  };
}

/** Growth that is too much for kept pivots: more than so many times that of the first run, and more than `leastGrowth`. */
const growthFactor = 100;
const leastGrowth = 1e6;

const now = (): number => performance.now() / 1000;

/**
 * Factorizes the first matrix, then a second one of the same pattern on the same analysis; growth and backward error are watched. Where
 * the pattern differs, the kept pivots fail, growth is too large or the verdict is red, the second matrix is analysed anew, with a notice.
 * @throws Fault "shape-differs"; what `factorizeTrial` throws, for the second matrix only where the new analysis fails too
 */
export function proveSecond(
  context: TrialContext,
  trial: TrialResult,
  second: SparseMatrix,
  options: ProofOptions = {},
  progress: Progress = noProgress,
): Reuse {
  const { matrix } = context.input;
  const found = difference(matrix, second);
  if (!found.sameShape) {
    throw new Fault(
      'input',
      'shape-differs',
      `The second matrix is ${second.rows} × ${second.columns}, the first ${matrix.rows} × ${matrix.columns}; expected the same numbers of rows and columns.`,
    );
  }
  const notices = [patternSentence(found)];
  const t0 = now();
  const first = factorizeTrial(context, trial, options, (fraction, phase) => progress(0.3 * fraction, phase));
  const firstSeconds = now() - t0 - first.analysisSeconds;
  const measure = (solver: Solver) =>
    measureAccuracy(
      second,
      solver,
      {
        ...(options.refine === undefined ? {} : { steps: options.refine }),
        ...(options.rightHandSides === undefined ? {} : { rightHandSides: options.rightHandSides }),
      },
      (fraction, phase) => progress(0.6 + 0.2 * fraction, phase),
    ).card;
  if (found.samePattern) {
    const t1 = now();
    const kept = keepPivots(first.solver, matrix, second, (fraction, phase) => progress(0.3 + 0.3 * fraction, phase));
    const seconds = now() - t1;
    if (typeof kept === 'string') notices.push(`${kept} It was analysed anew.`);
    else {
      const growth = kept.report.pivotGrowth;
      const limit = Math.max(leastGrowth, growthFactor * (first.solver.report.pivotGrowth ?? 1));
      const card = measure(kept);
      const unfit =
        growth !== null && growth > limit
          ? `Pivot growth rose to ${growth.toExponential(2)}, past ${limit.toExponential(2)}.`
          : card.verdict === 'red'
            ? `With the analysis of the first matrix the result is red: ${card.reasons[0]}`
            : null;
      if (unfit === null) {
        notices.push('The analysis of the first matrix was enough.');
        return {
          difference: found,
          reused: true,
          notices,
          card,
          report: kept.report,
          seconds: { first: firstSeconds, second: seconds, analysis: 0 },
        };
      }
      notices.push(`${unfit} It was analysed anew.`);
    }
  } else notices.push('The analysis of the first matrix does not fit another pattern: it was made anew.');
  const t2 = now();
  const fresh = new TrialContext({ ...context.input, matrix: second });
  const result = runTrial(fresh, trial.choice);
  const t3 = now();
  const again = factorizeTrial(fresh, result, options, (fraction, phase) => progress(0.8 + 0.1 * fraction, phase));
  const t4 = now();
  return {
    difference: found,
    reused: false,
    notices,
    card: measure(again.solver),
    report: again.solver.report,
    seconds: {
      first: firstSeconds,
      second: t4 - t3 - again.analysisSeconds,
      analysis: t3 - t2 + again.analysisSeconds,
    },
  };
}

/** The factors of the second matrix on the pivots or the analysis of the first; a sentence where they do not do. */
function keepPivots(
  factor: ReturnType<typeof factorizeTrial>['solver'],
  first: SparseMatrix,
  second: SparseMatrix,
  progress: Progress,
): Solver | string {
  try {
    return factor instanceof FrontFactor
      ? refactorizeFronts(factor, second, progress)
      : refactorizeColumns(factor, first, second, {}, progress);
  } catch (thrown) {
    if (thrown instanceof Fault && thrown.kind === 'not-completed') return thrown.message;
    throw thrown;
  }
}

/** "Same pattern: no; 12 new positions, 3 gone." */
export function patternSentence({ samePattern, added, missing }: MatrixDifference): string {
  if (samePattern) return 'Same pattern: yes.';
  const places = (n: number): string => (n === 1 ? '1 new position' : `${n} new positions`);
  return `Same pattern: no; ${places(added.count)}, ${missing.count} gone.`;
}
