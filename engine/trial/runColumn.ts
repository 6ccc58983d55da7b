import { type BlockTriangularForm, blockTriangularForm } from '../graph/blockTriangular.ts';
import { graphOf } from '../graph/graph.ts';
import { asNewToOld, composeOrders, type NewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { analyseGraph, heightOf } from '../symbolic/analyse.ts';
import { columnTree } from '../symbolic/columnTree.ts';
import { factorOperations } from '../symbolic/operations.ts';
import { postorder } from '../symbolic/postorder.ts';
import { profileOf } from '../symbolic/profile.ts';
import { type RowMergeBound, rowMergeBound } from '../symbolic/rowMerge.ts';
import { arrange, type OrderingTask } from './arrange.ts';
import { factorBytes, usualWidths } from './bytes.ts';
import type { Choice } from './choice.ts';
import type { TrialContext } from './context.ts';
import { type DiagonalBlocks, diagonalBlocks } from './diagonalBlocks.ts';
import { heldBlockOf } from './heldBlock.ts';
import { columnMeasure, diagonalPivotCounts } from './measure.ts';
import { takesPostorder } from './order.ts';
import { arrangeBest, membersOf } from './portfolio.ts';
import { emptyPlan, plannedRowOf, planOf, type TrialPlan } from './prepared.ts';
import { columnLow, pointRange } from './ranges.ts';
import type { HeldBlock, PivotedFigures, Range, TrialCounts, TrialResult } from './result.ts';

const now = (): number => performance.now() / 1000;

/** Column LU: columns planned, rows chosen by pivoting; the counts are an expected value inside a proven range. */
export function runColumnTrial(context: TrialContext, choice: Choice, progress: Progress): TrialResult {
  const { matrix, heldLast, coordinates, imported } = context.input;
  const square = context.facts.rows === context.facts.columns;
  const t0 = now();
  const ordering: Progress = (fraction, phase) => progress(0.6 * fraction, phase);
  const { plan, valueDependent, notes } = square
    ? planOf(context, choice, ordering)
    : { plan: emptyPlan, valueDependent: false, notes: [] };
  const form = square ? blockFormOf(context, plan, ordering) : null;
  const inBlocks = choice.blocks && heldLast === null;
  const blocks = form === null ? null : diagonalBlocks(matrix, form, !inBlocks);
  const pattern = blocks?.pattern ?? matrix;
  const task: OrderingTask = {
    pattern,
    pairs: null,
    blocks:
      form === null || blocks === null || blocks.blocks === 1
        ? null
        : { matrix, form, blockOf: blocks.blockOf, alone: true },
    companions: { heldLast, coordinates, imported },
  };
  const measure = (order: NewToOld): number =>
    columnMeasure(choice.portfolio.measure, pattern, order, square, context.facts.complex ? 'complex' : 'real');
  const best =
    choice.ordering === 'best-of'
      ? arrangeBest(task, choice, membersOf(context.facts, choice), measure, ordering)
      : { result: arrange(task, choice, ordering), ran: choice, report: null };
  const requested = best.result.order;
  const t1 = now();
  progress(0.6, 'row-merge bound');
  const held = heldLast?.length ?? 0;
  // on the tree of AᵀA, where a postorder changes nothing whatever rows are interchanged
  const post = takesPostorder(best.ran.ordering) ? asNewToOld(postorder(columnTree(pattern, requested), held)) : null;
  const effective = post === null ? requested : composeOrders(requested, post);
  const bound = rowMergeBound(pattern, effective);
  progress(0.8, 'count without interchanges');
  const counted =
    blocks === null || form === null
      ? { counts: rectangularCounts(bound), heldBlock: null }
      : squareCounts(context, choice, blocks, inBlocks || form.blocks === 1, effective, bound, requested);
  const t2 = now();
  const left = choice.blocks && !inBlocks && form !== null && form.blocks > 1;
  return {
    choice,
    ran: best.ran,
    portfolio: best.report,
    heldBlock: counted.heldBlock,
    requested,
    effective,
    parent: bound.parent,
    columnCount: bound.lower,
    separators: best.result.separators ?? [],
    notes: [
      ...notes,
      ...(left ? ['Blocks left off: unknowns held last stay at the end of the whole matrix.'] : []),
      ...best.result.notes,
    ],
    valueDependent,
    plan: {
      ...plan,
      plannedRow: form === null ? null : plannedRowOf(form),
      blockStart: form === null || !inBlocks ? null : form.blockStart,
    },
    counts: counted.counts,
    seconds: { ordering: t1 - t0, symbolic: t2 - t1 },
  };
}

/** The block form on the planned pivots of a matching, or on any maximum matching. */
export function blockFormOf(context: TrialContext, plan: TrialPlan, progress: Progress): BlockTriangularForm {
  if (plan.plannedRow === null) return context.blockForm(progress);
  const n = plan.plannedRow.length;
  const columnOf = new Int32Array(n);
  for (let j = 0; j < n; j++) columnOf[plan.plannedRow[j]] = j;
  return blockTriangularForm(context.input.matrix, progress, { rowOf: plan.plannedRow, columnOf, size: n });
}

function rectangularCounts(bound: RowMergeBound): TrialCounts {
  const why = 'the matrix is not square: only its column ordering and structure are forecast';
  return {
    factorEntries: null,
    lowerEntries: null,
    upperEntries: bound.upperEntries,
    offDiagonalBlockEntries: 0,
    expected: null,
    range: null,
    staticStructure: null,
    operations: null,
    treeHeight: heightOf(bound.parent),
    largestFront: null,
    factorBytes: null,
    bandwidth: null,
    envelope: null,
    reasons: {
      factorEntries: why,
      lowerEntries: why,
      operations: why,
      largestFront: why,
      factorBytes: why,
      bandwidth: why,
      envelope: why,
    },
  };
}

function squareCounts(
  context: TrialContext,
  choice: Choice,
  blocks: DiagonalBlocks,
  strongHall: boolean,
  order: NewToOld,
  bound: RowMergeBound,
  requested: NewToOld,
): { counts: TrialCounts; heldBlock: HeldBlock | null } {
  const n = context.facts.columns;
  const arithmetic = context.facts.complex ? 'complex' : 'real';
  const widths = usualWidths(context.facts.complex);
  const graph = blocks.pattern === context.input.matrix ? context.graph() : graphOf(blocks.pattern);
  const symmetrised = analyseGraph(graph, order, { postorder: false });
  const exact = diagonalPivotCounts(blocks.pattern, order, symmetrised);
  const lower = exact?.lower ?? symmetrised.columnCount;
  const upper = exact?.upper ?? symmetrised.columnCount;
  const lowerEntries = exact?.lowerEntries ?? symmetrised.factorEntries;
  const upperEntries = exact?.upperEntries ?? symmetrised.factorEntries;
  const expected = {
    factorEntries: lowerEntries + upperEntries - n,
    operations: factorOperations('lu', lower, arithmetic, upper),
    bytes: factorBytes('column-lu', n, lowerEntries, upperEntries, widths),
  };
  const low = columnLow(blocks, strongHall, arithmetic, widths);
  const interchanges = choice.pivoting === 'threshold';
  const high = interchanges
    ? {
        factorEntries: bound.lowerEntries + bound.upperEntries - n,
        operations: factorOperations('lu', bound.lower, arithmetic, bound.upper),
        bytes: factorBytes('column-lu', n, bound.lowerEntries, bound.upperEntries, widths),
      }
    : expected;
  const range: PivotedFigures<Range> =
    exact !== null && !interchanges
      ? pointRange(expected)
      : {
          factorEntries: [low.factorEntries, high.factorEntries],
          operations: [low.operations, high.operations],
          bytes: [low.bytes, high.bytes],
        };
  const { bandwidth, envelope } = profileOf(graph, requested);
  const reasons: Record<string, string> = {};
  if (exact === null) {
    reasons.expected = 'the exact count passed its work limit: upper bound for diagonal pivots instead';
  }
  const uninformative = uninformativeBecause(blocks, bound);
  if (interchanges && uninformative !== null) reasons.range = uninformative;
  let largest = 0;
  for (let k = 0; k < n; k++) largest = Math.max(largest, lower[k], upper[k]);
  const held = context.input.heldLast?.length ?? 0;
  const counts = {
    factorEntries: expected.factorEntries,
    lowerEntries,
    upperEntries,
    offDiagonalBlockEntries: blocks.offDiagonalBlockEntries,
    expected,
    range,
    staticStructure: {
      factorEntries: 2 * symmetrised.factorEntries - n,
      operations: factorOperations('lu', symmetrised.columnCount, arithmetic),
    },
    operations: expected.operations,
    treeHeight: heightOf(bound.parent),
    largestFront: largest,
    factorBytes: expected.bytes,
    bandwidth,
    envelope,
    reasons,
  };
  return { counts, heldBlock: heldBlockOf('lu', lower, upper, held, arithmetic, widths.value) };
}

/** Why the upper bound says little, where it comes near full blocks: most often a dense row, which joins all columns it meets. */
function uninformativeBecause({ pattern, blockOf, blocks }: DiagonalBlocks, bound: RowMergeBound): string | null {
  const n = pattern.columns;
  const size = new Float64Array(blocks);
  for (let j = 0; j < n; j++) size[blockOf[j]]++;
  let full = 0;
  for (let b = 0; b < blocks; b++) full += size[b] * size[b];
  if (!(n > 16 && bound.lowerEntries + bound.upperEntries - n > 0.5 * full)) return null;
  const inRow = new Int32Array(n);
  for (let p = 0; p < pattern.rowIndex.length; p++) inRow[pattern.rowIndex[p]]++;
  let most = 0;
  for (let i = 0; i < n; i++) if (inRow[i] > inRow[most]) most = i;
  return inRow[most] > size[blockOf[most]] / 2
    ? `a dense row (${inRow[most].toLocaleString('en')} entries) makes the upper bound uninformative: it joins all columns it meets`
    : 'the upper bound comes near full blocks and is uninformative';
}
