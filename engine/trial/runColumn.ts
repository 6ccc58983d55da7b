import { type BlockTriangularForm, blockTriangularForm } from '../graph/blockTriangular.ts';
import { graphOf } from '../graph/graph.ts';
import { asNewToOld, composeOrders, type NewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { analyse, heightOf } from '../symbolic/analyse.ts';
import { luCounts } from '../symbolic/luCounts.ts';
import { factorOperations } from '../symbolic/operations.ts';
import { postorder } from '../symbolic/postorder.ts';
import { profileOf } from '../symbolic/profile.ts';
import { type RowMergeBound, rowMergeBound } from '../symbolic/rowMerge.ts';
import { factorBytes, usualWidths } from './bytes.ts';
import type { Choice } from './choice.ts';
import type { TrialContext } from './context.ts';
import { byBlock, type DiagonalBlocks, diagonalBlocks } from './diagonalBlocks.ts';
import { runOrdering, takesPostorder } from './order.ts';
import { plannedRowOf, planOf, type TrialPlan } from './prepared.ts';
import type { TrialCounts, TrialResult } from './result.ts';

const now = (): number => performance.now() / 1000;

/** Steps of search and entries held beyond which the exact count without interchanges is given up. */
const countWorkLimit = 2e8;

/** Column LU: columns planned, rows chosen by pivoting; the counts are an expected value inside a proven range. */
export function runColumnTrial(context: TrialContext, choice: Choice, progress: Progress): TrialResult {
  const square = context.facts.rows === context.facts.columns;
  const t0 = now();
  const ordering: Progress = (fraction, phase) => progress(0.6 * fraction, phase);
  const { plan, valueDependent, notes } = planOf(context, choice, ordering);
  const form = square ? blockFormOf(context, plan, ordering) : null;
  const blocks = form === null ? null : diagonalBlocks(context.input.matrix, form, !choice.blocks);
  const pattern = blocks?.pattern ?? context.input.matrix;
  const ordered = runOrdering(pattern, choice, context.input, ordering);
  const requested = blocks === null ? ordered.order : asNewToOld(byBlock(ordered.order, blocks.blockOf, blocks.blocks));
  const t1 = now();
  progress(0.6, 'row-merge bound');
  const first = rowMergeBound(pattern, requested);
  const held = context.input.heldLast?.length ?? 0;
  const post = takesPostorder(choice.ordering) ? asNewToOld(postorder(first.parent, held)) : null;
  const effective = post === null ? requested : composeOrders(requested, post);
  const bound = post === null ? first : rowMergeBound(pattern, effective);
  progress(0.8, 'count without interchanges');
  const counts =
    blocks === null ? rectangularCounts(bound) : squareCounts(context, blocks, effective, bound, requested);
  const t2 = now();
  return {
    choice,
    requested,
    effective,
    parent: bound.parent,
    columnCount: bound.lower,
    separators: blocks !== null && blocks.blocks > 1 ? [] : (ordered.separators ?? []),
    notes: [...notes, ...ordered.notes],
    valueDependent,
    plan: {
      ...plan,
      plannedRow: form === null ? null : plannedRowOf(form),
      blockStart: form === null || !choice.blocks ? null : form.blockStart,
    },
    counts,
    seconds: { ordering: t1 - t0, symbolic: t2 - t1 },
  };
}

/** The block form on the planned pivots of a matching, or on any maximum matching. */
function blockFormOf(context: TrialContext, plan: TrialPlan, progress: Progress): BlockTriangularForm {
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
  blocks: DiagonalBlocks,
  order: NewToOld,
  bound: RowMergeBound,
  requested: NewToOld,
): TrialCounts {
  const n = context.facts.columns;
  const arithmetic = context.facts.complex ? 'complex' : 'real';
  const exact = luCounts(blocks.pattern, order, countWorkLimit);
  const fallback = exact === null ? analyse(blocks.pattern, order, { postorder: false }) : null;
  const lower = exact?.lower ?? fallback?.columnCount ?? new Int32Array(0);
  const upper = exact?.upper ?? lower;
  const lowerEntries = exact?.lowerEntries ?? fallback?.factorEntries ?? 0;
  const upperEntries = exact?.upperEntries ?? fallback?.factorEntries ?? 0;
  const entries = lowerEntries + upperEntries - n;
  const high = bound.lowerEntries + bound.upperEntries - n;
  const { bandwidth, envelope } = profileOf(graphOf(blocks.pattern), requested);
  const reasons: Record<string, string> = {};
  if (exact === null) {
    reasons.expected = 'the exact count passed its work limit: upper bound for diagonal pivots instead';
  }
  if (high > (n * (n + 1)) / 2) reasons.range = 'a dense row makes the upper bound uninformative';
  let largest = 0;
  for (let k = 0; k < n; k++) largest = Math.max(largest, lower[k], upper[k]);
  return {
    factorEntries: entries,
    lowerEntries,
    upperEntries,
    offDiagonalBlockEntries: blocks.offDiagonalBlockEntries,
    expected: { factorEntries: entries },
    range: { factorEntries: [blocks.inside, Math.max(high, entries)] },
    operations: factorOperations('lu', lower, arithmetic, upper),
    treeHeight: heightOf(bound.parent),
    largestFront: largest,
    factorBytes: factorBytes('column-lu', n, lowerEntries, upperEntries, usualWidths(context.facts.complex)),
    bandwidth,
    envelope,
    reasons,
  };
}
