import { Fault } from '../matrix/fault.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import type { OrderingResult } from '../ordering/ordering.ts';
import { compressPairs } from '../prepare/compressPairs.ts';
import { analyseGraph } from '../symbolic/analyse.ts';
import { type FactorKind, factorOperations } from '../symbolic/operations.ts';
import { profileOf } from '../symbolic/profile.ts';
import { factorBytes, usualWidths } from './bytes.ts';
import type { Choice } from './choice.ts';
import type { TrialContext } from './context.ts';
import { runOrdering, takesPostorder } from './order.ts';
import { frontGraph, pairedPattern, planOf, type TrialPlan } from './prepared.ts';
import type { TrialResult } from './result.ts';
import { whyNoForecast } from './rules.ts';
import { runColumnTrial } from './runColumn.ts';

/** Seconds of a monotonic clock. */
const now = (): number => performance.now() / 1000;

/**
 * One candidate without numeric work: ordering, analysis, counts. Progress: ordering takes the first 0.8.
 * @throws Fault "trial-impossible" with the reason.
 */
export function runTrial(context: TrialContext, choice: Choice, progress: Progress = noProgress): TrialResult {
  const why = whyNoForecast(context.facts, choice);
  if (why !== null) throw new Fault('input', 'trial-impossible', why);
  return choice.factorization === 'column-lu'
    ? runColumnTrial(context, choice, progress)
    : runSymmetricTrial(context, choice, choice.factorization, progress);
}

function orderingProgress(progress: Progress): Progress {
  return (fraction, phase) => progress(0.8 * fraction, phase);
}

function runSymmetricTrial(context: TrialContext, choice: Choice, kind: FactorKind, progress: Progress): TrialResult {
  const n = context.facts.columns;
  const t0 = now();
  const { plan, valueDependent, notes } = planOf(context, choice, orderingProgress(progress));
  const graph = frontGraph(context, plan);
  const ordered = orderWithPairs(context, choice, plan, orderingProgress(progress));
  const t1 = now();
  const symbolic = analyseGraph(
    graph,
    ordered.order,
    { postorder: takesPostorder(choice.ordering), heldLast: context.input.heldLast?.length ?? 0 },
    (fraction, phase) => progress(0.8 + 0.15 * fraction, phase),
  );
  const t2 = now();
  const { bandwidth, envelope } = profileOf(graph, ordered.order);
  const arithmetic = !context.facts.complex
    ? 'real'
    : kind !== 'lu' && context.facts.hermitian
      ? 'hermitian'
      : 'complex';
  const lower = symbolic.factorEntries;
  const lu = kind === 'lu';
  // planned pivots that fail are delayed to the parent front: the static count then grows, at most to dense components
  const pivoted = kind !== 'cholesky' && choice.pivoting === 'threshold';
  return {
    choice,
    requested: ordered.order,
    effective: symbolic.order,
    parent: symbolic.parent,
    columnCount: symbolic.columnCount,
    separators: ordered.separators ?? [],
    notes: [...notes, ...ordered.notes],
    valueDependent,
    plan,
    counts: {
      factorEntries: lu ? 2 * lower - n : lower,
      lowerEntries: lower,
      upperEntries: lu ? lower : null,
      offDiagonalBlockEntries: 0,
      expected: pivoted || lu ? { factorEntries: lu ? 2 * lower - n : lower } : null,
      range: pivoted ? { factorEntries: denseRange(context, lu) } : null,
      operations: factorOperations(kind, symbolic.columnCount, arithmetic),
      treeHeight: symbolic.treeHeight,
      largestFront: symbolic.largestFront,
      factorBytes: factorBytes(kind, n, lower, lower, usualWidths(context.facts.complex)),
      bandwidth,
      envelope,
      reasons: {},
    },
    seconds: { ordering: t1 - t0, symbolic: t2 - t1 },
  };
}

/** The ordering of a choice; where unknowns are paired, the graph of the pairs is ordered (Duff & Pralet 2005). */
function orderWithPairs(context: TrialContext, choice: Choice, plan: TrialPlan, progress: Progress): OrderingResult {
  const { input } = context;
  if (plan.partner === null || input.heldLast !== null) {
    return runOrdering(pairedPattern(input.matrix, plan.plannedRow), choice, input, progress);
  }
  const compressed = compressPairs(input.matrix, plan.partner);
  const { order, notes } = runOrdering(compressed.pattern, choice, input, progress);
  return { order: compressed.expand(order), notes };
}

/** Proven for any delayed pivots: no less than the entries of A + Aᵀ + I that stay in place, no more than dense components. */
function denseRange(context: TrialContext, lu: boolean): readonly [number, number] {
  const graph = context.graph();
  const { size, count } = context.components();
  let high = 0;
  for (let c = 0; c < count; c++) high += lu ? size[c] * size[c] : (size[c] * (size[c] + 1)) / 2;
  const offDiagonal = graph.neighbour.length;
  return [graph.order + (lu ? context.facts.offDiagonalEntries : offDiagonal / 2), high];
}
