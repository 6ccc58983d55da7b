import { forecastOf, type TrialForecast } from '../forecast/forecast.ts';
import type { Target } from '../forecast/target.ts';
import { predictPeakBytes } from '../numeric/fronts/plan.ts';
import { assemblyTree } from '../symbolic/assemblyTree.ts';
import type { AssemblyTree, SymbolicFactor } from '../symbolic/types.ts';
import type { TrialContext } from './context.ts';
import type { TrialResult } from './result.ts';
import { arithmeticOf } from './run.ts';

/** The assembly tree of a finished trial on fronts; null for column LU. Near-linear in columns. */
export function treeOf(context: TrialContext, trial: TrialResult): AssemblyTree | null {
  if (trial.choice.factorization === 'column-lu' || trial.parent === null || trial.columnCount === null) return null;
  const symbolic: SymbolicFactor = {
    size: trial.parent.length,
    order: trial.effective,
    postordered: false,
    parent: trial.parent,
    columnCount: trial.columnCount,
    factorEntries: trial.counts.lowerEntries ?? 0,
    treeHeight: trial.counts.treeHeight ?? 0,
    largestFront: trial.counts.largestFront ?? 0,
  };
  return assemblyTree(symbolic, {
    held: context.input.heldLast?.length ?? 0,
    blocks: trial.choice.factorization === 'lu' ? 'square' : 'packed',
  });
}

/**
 * How certain the counts of a trial are: exact from the pattern, on fronts until a pivot is delayed; the count without interchanges, which
 * stands for column LU with row interchanges, is a model of it, and where that count passed its work limit a bound for diagonal pivots.
 */
export function countKindOf({ choice, counts }: TrialResult): 'exact' | 'bound' | 'modelled' {
  if (choice.factorization !== 'column-lu') return 'exact';
  if (counts.reasons.expected !== undefined) return 'bound';
  return choice.pivoting === 'threshold' ? 'modelled' : 'exact';
}

/**
 * What a finished trial would cost on a target.
 * @param pageMemoryBytes what a run in this process may use
 * @returns null where counts are undefined (rectangular matrices)
 */
export function forecastTrial(
  context: TrialContext,
  trial: TrialResult,
  target: Target,
  pageMemoryBytes: number,
): TrialForecast | null {
  const { counts, choice } = trial;
  if (counts.lowerEntries === null || counts.factorEntries === null || counts.operations === null) return null;
  const tree = treeOf(context, trial);
  const kind = choice.factorization === 'column-lu' ? 'lu' : choice.factorization;
  const { facts } = context;
  const page =
    tree === null
      ? (counts.factorBytes ?? 0)
      : predictPeakBytes(tree, {
          kind,
          complex: facts.complex,
          entries: facts.entries,
          paired: trial.plan.plannedRow !== null,
        }).total;
  return forecastOf({
    kind,
    pivoting: choice.pivoting === 'threshold',
    arithmetic: arithmeticOf(context, kind),
    size: facts.columns,
    matrixEntries: facts.entries,
    lowerEntries: counts.lowerEntries,
    upperEntries: counts.upperEntries,
    factorEntries: counts.factorEntries,
    highestEntries: choice.pivoting === 'threshold' ? (counts.range?.factorEntries[1] ?? null) : null,
    envelope: counts.envelope,
    operations: counts.operations,
    tree,
    countKind: countKindOf(trial),
    target,
    pagePeakBytes: page,
    pageMemoryBytes,
  });
}
