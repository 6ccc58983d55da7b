import type { BlockTriangularForm } from '../graph/blockTriangular.ts';
import { type Graph, graphOf } from '../graph/graph.ts';
import { Fault } from '../matrix/fault.ts';
import { asNewToOld, type NewToOld } from '../matrix/permutation.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { analyseGraph } from '../symbolic/analyse.ts';
import { type Arithmetic, type FactorKind, factorOperations } from '../symbolic/operations.ts';
import { profileOf } from '../symbolic/profile.ts';
import { arrange, type OrderingTask } from './arrange.ts';
import { factorBytes, usualWidths } from './bytes.ts';
import type { Choice } from './choice.ts';
import type { TrialContext } from './context.ts';
import { type DiagonalBlocks, diagonalBlocks } from './diagonalBlocks.ts';
import { heldBlockOf } from './heldBlock.ts';
import { frontMeasure } from './measure.ts';
import { takesPostorder } from './order.ts';
import { arrangeBest, membersOf } from './portfolio.ts';
import { frontGraph, pairedPattern, plannedRowOf, planOf, type TrialPlan } from './prepared.ts';
import { frontRange, pointRange } from './ranges.ts';
import type { TrialResult } from './result.ts';
import { whyNoForecast } from './rules.ts';
import { blockFormOf, runColumnTrial } from './runColumn.ts';
import { zeroDiagonals } from './zeroDiagonal.ts';

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

/** What the fronts of a trial are: their graph, and the task of ordering it. */
interface FrontTask {
  readonly task: OrderingTask;
  readonly graph: Graph;
  readonly plan: TrialPlan;
  /** LU in block triangular form; null else */
  readonly blocks: DiagonalBlocks | null;
  readonly notes: readonly string[];
}

function frontTaskOf(
  context: TrialContext,
  choice: Choice,
  plan: TrialPlan,
  kind: FactorKind,
  progress: Progress,
): FrontTask {
  const { matrix, heldLast, coordinates, imported } = context.input;
  const companions = { heldLast, coordinates, imported };
  const pairs = plan.partner === null ? null : { partner: plan.partner, zero: zeroDiagonals(matrix).zero };
  const whole = (notes: readonly string[]): FrontTask => ({
    task: { pattern: pairedPattern(matrix, plan.plannedRow), pairs, blocks: null, companions },
    graph: frontGraph(context, plan),
    plan,
    blocks: null,
    notes,
  });
  if (!choice.blocks) return whole([]);
  if (heldLast !== null) return whole(['Blocks left off: unknowns held last stay at the end of the whole matrix.']);
  if (kind !== 'lu') {
    const form = componentForm(context);
    const blockOf = context.components().of;
    return {
      task: { pattern: matrix, pairs, blocks: { matrix, form, blockOf, alone: pairs === null }, companions },
      graph: context.graph(),
      plan,
      blocks: null,
      notes: [`${form.blocks.toLocaleString('en')} connected components, one after the other`],
    };
  }
  const form = blockFormOf(context, plan, progress);
  const blocks = diagonalBlocks(matrix, form, false);
  return {
    task: {
      pattern: blocks.pattern,
      pairs: null,
      blocks: { matrix, form, blockOf: blocks.blockOf, alone: true },
      companions,
    },
    graph: graphOf(blocks.pattern),
    plan: { ...plan, plannedRow: plannedRowOf(form), blockStart: form.blockStart },
    blocks,
    notes: [`${form.blocks.toLocaleString('en')} diagonal blocks; what lies outside them is not factorized`],
  };
}

/** The block form of a symmetric matrix whose pivots stay on the diagonal: its connected components. */
function componentForm(context: TrialContext): BlockTriangularForm {
  const { of, size, count } = context.components();
  const blockStart = new Int32Array(count + 1);
  for (let b = 0; b < count; b++) blockStart[b + 1] = blockStart[b] + size[b];
  const next = blockStart.slice(0, count);
  const order = new Int32Array(of.length);
  for (let i = 0; i < of.length; i++) order[next[of[i]]++] = i;
  return {
    blocks: count,
    rowOrder: asNewToOld(order),
    columnOrder: asNewToOld(order),
    blockStart,
    structuralRank: of.length,
    zeroFreeDiagonal: true,
  };
}

/** How the scalars of a factorization count. */
export function arithmeticOf(context: TrialContext, kind: FactorKind): Arithmetic {
  if (!context.facts.complex) return 'real';
  return kind !== 'lu' && context.facts.hermitian ? 'hermitian' : 'complex';
}

function runSymmetricTrial(context: TrialContext, choice: Choice, kind: FactorKind, progress: Progress): TrialResult {
  const n = context.facts.columns;
  const t0 = now();
  const prepared = planOf(context, choice, orderingProgress(progress));
  const front = frontTaskOf(context, choice, prepared.plan, kind, orderingProgress(progress));
  const { task, graph, plan } = front;
  const arithmetic = arithmeticOf(context, kind);
  const held = context.input.heldLast?.length ?? 0;
  const measure = (order: NewToOld): number =>
    frontMeasure(choice.portfolio.measure, kind, graph, order, held, arithmetic);
  const best =
    choice.ordering === 'best-of'
      ? arrangeBest(task, choice, membersOf(context.facts, choice), measure, orderingProgress(progress))
      : { result: arrange(task, choice, orderingProgress(progress)), ran: choice, report: null };
  const ordered = best.result;
  const t1 = now();
  const symbolic = analyseGraph(
    graph,
    ordered.order,
    { postorder: takesPostorder(best.ran.ordering), heldLast: held },
    (fraction, phase) => progress(0.8 + 0.15 * fraction, phase),
  );
  const t2 = now();
  const { bandwidth, envelope } = profileOf(graph, ordered.order);
  const lower = symbolic.factorEntries;
  const lu = kind === 'lu';
  const widths = usualWidths(context.facts.complex);
  const figures = {
    factorEntries: lu ? 2 * lower - n : lower,
    operations: factorOperations(kind, symbolic.columnCount, arithmetic),
    bytes: factorBytes(kind, n, lower, lower, widths),
  };
  // planned pivots that fail are delayed to the parent front: the static count then grows, at most to dense components
  const pivoted = kind !== 'cholesky' && choice.pivoting === 'threshold';
  return {
    choice,
    ran: best.ran,
    portfolio: best.report,
    heldBlock: heldBlockOf(kind, symbolic.columnCount, symbolic.columnCount, held, arithmetic, widths.value),
    requested: ordered.order,
    effective: symbolic.order,
    parent: symbolic.parent,
    columnCount: symbolic.columnCount,
    separators: ordered.separators ?? [],
    notes: [...prepared.notes, ...front.notes, ...ordered.notes],
    valueDependent: prepared.valueDependent,
    plan,
    counts: {
      factorEntries: figures.factorEntries,
      lowerEntries: lower,
      upperEntries: lu ? lower : null,
      offDiagonalBlockEntries: front.blocks?.offDiagonalBlockEntries ?? 0,
      expected: pivoted || lu ? figures : null,
      range: pivoted
        ? frontRange(lu ? 'lu' : 'ldlt', graph, insideEntries(front, lu), arithmetic, widths)
        : lu
          ? pointRange(figures)
          : null,
      staticStructure: lu ? { factorEntries: figures.factorEntries, operations: figures.operations } : null,
      operations: figures.operations,
      treeHeight: symbolic.treeHeight,
      largestFront: symbolic.largestFront,
      factorBytes: figures.bytes,
      bandwidth,
      envelope,
      reasons: {},
    },
    seconds: { ordering: t1 - t0, symbolic: t2 - t1 },
  };
}

/** Entries that keep a place in the factors whatever pivots come: of the matrix in its blocks, diagonals added. */
function insideEntries({ task, graph }: FrontTask, lu: boolean): number {
  const { pattern } = task;
  const n = graph.order;
  if (!lu) return n + graph.neighbour.length / 2;
  let off = 0;
  for (let j = 0; j < n; j++) {
    for (let p = pattern.columnPointer[j]; p < pattern.columnPointer[j + 1]; p++) if (pattern.rowIndex[p] !== j) off++;
  }
  return n + off;
}
