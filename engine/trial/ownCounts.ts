import { workOfFronts } from '../forecast/frontWork.ts';
import type { OwnCounts } from '../forecast/reconcile.ts';
import type { Target } from '../forecast/target.ts';
import { Fault } from '../matrix/fault.ts';
import type { TrialContext } from './context.ts';
import { forecastTrial, treeOf } from './forecast.ts';
import type { TrialResult } from './result.ts';
import { arithmeticOf } from './run.ts';

/**
 * Every count of a trial that another solver may have reported, in the layouts of a target.
 * @throws Fault "reconcile-undefined" for rectangular matrices
 */
export function ownCountsOf(context: TrialContext, trial: TrialResult, target: Target): OwnCounts {
  const { counts, choice } = trial;
  const forecast = forecastTrial(context, trial, target, Number.POSITIVE_INFINITY);
  if (forecast === null || counts.lowerEntries === null || counts.operations === null) {
    throw new Fault('input', 'reconcile-undefined', 'Figures can be reconciled for square matrices only.');
  }
  const kind = choice.factorization === 'column-lu' ? 'lu' : choice.factorization;
  const tree = treeOf(context, trial);
  const padded =
    tree === null ? null : workOfFronts(kind, tree, arithmeticOf(context, kind)).reduce((a, b) => a + b, 0);
  const { storage } = forecast;
  const layouts = [
    ['supernodal panels', storage.panels.value],
    ['fronts with their stack', storage.multifrontal.value],
    ['stack of contribution blocks', storage.stack.value],
    ['compressed columns with their pointers', storage.compressedColumns.value],
    ['envelope (skyline)', storage.envelope.value],
  ] as const;
  return {
    size: context.facts.columns,
    name: choice.ordering,
    kind,
    lowerEntries: counts.lowerEntries,
    upperEntries: counts.upperEntries,
    storedFactorEntries: tree?.storedFactorEntries ?? null,
    operations: counts.operations,
    paddedOperations: padded,
    complex: context.facts.complex,
    layouts: layouts.flatMap(([word, value]) => (value === null ? [] : [[word, value] as const])),
  };
}
