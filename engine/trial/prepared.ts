import type { BlockTriangularForm } from '../graph/blockTriangular.ts';
import { type Graph, graphOf } from '../graph/graph.ts';
import { entryCount, type Pattern, type SparseMatrix } from '../matrix/pattern.ts';
import type { Progress } from '../matrix/progress.ts';
import { transposePattern } from '../matrix/transpose.ts';
import { heldFlags } from '../ordering/heldLast.ts';
import { structuralPairs } from '../ordering/saddle.ts';
import type { Effect } from '../prepare/effect.ts';
import { prepare } from '../prepare/prepare.ts';
import type { Choice } from './choice.ts';
import type { TrialContext } from './context.ts';
import { zeroDiagonals } from './zeroDiagonal.ts';

/** What was decided from the values before ordering; the numeric run takes it over. Vectors are in the original numbering. */
export interface TrialPlan {
  /** column -> row planned as its pivot; null: the diagonal */
  readonly plannedRow: Int32Array | null;
  /** unknown -> partner in a likely 2×2 pivot, or itself; null without pairing */
  readonly partner: Int32Array | null;
  readonly rowScaling: Float64Array | null;
  readonly columnScaling: Float64Array | null;
  /** column LU: block -> first position in the effective order; null: one block */
  readonly blockStart: Int32Array | null;
  /** sizes before and after scaling and matching; null for a pattern or where nothing was done */
  readonly effect: Effect | null;
}

/** Nothing decided. */
export const emptyPlan: TrialPlan = {
  plannedRow: null,
  partner: null,
  rowScaling: null,
  columnScaling: null,
  blockStart: null,
  effect: null,
};

/** Runs the preparations of a choice. Nothing asked for: nothing done. */
export function planOf(
  context: TrialContext,
  choice: Choice,
  progress: Progress,
): { plan: TrialPlan; valueDependent: boolean; notes: readonly string[] } {
  const none = choice.matching === 'none' && choice.scaling === 'none';
  if (none) return { plan: emptyPlan, valueDependent: false, notes: [] };
  const symmetric = choice.factorization === 'cholesky' || choice.factorization === 'ldlt';
  const done = prepare(
    context.input.matrix,
    { scaling: choice.scaling, matching: choice.matching, symmetric },
    progress,
  );
  const { plannedRow, rowScaling, columnScaling, effect, notes } = done;
  const structural = symmetric && choice.matching === 'structural' ? pairsByStructure(context) : null;
  const partner = structural?.partner ?? done.partner;
  const valueDependent = done.valueDependent || (structural?.fromValues ?? false);
  return { plan: { plannedRow, partner, rowScaling, columnScaling, blockStart: null, effect }, valueDependent, notes };
}

/** Zero diagonals with a partner each; a diagonal that is stored as zero is known from the values only. */
function pairsByStructure(context: TrialContext): { partner: Int32Array; fromValues: boolean } {
  const { matrix, heldLast } = context.input;
  const { zero, stored } = zeroDiagonals(matrix);
  const held = heldFlags(matrix.columns, heldLast ?? undefined);
  return { partner: structuralPairs(context.graph(), zero, held), fromValues: stored > 0 };
}

/** The pattern with its rows renumbered by the column they are planned for: planned pivots on the diagonal. */
export function pairedPattern(a: SparseMatrix, plannedRow: Int32Array | null): Pattern {
  if (plannedRow === null) return a;
  const pairedColumn = new Int32Array(a.rows);
  for (let j = 0; j < a.columns; j++) pairedColumn[plannedRow[j]] = j;
  const rowIndex = new Int32Array(entryCount(a));
  for (let p = 0; p < rowIndex.length; p++) rowIndex[p] = pairedColumn[a.rowIndex[p]];
  return transposePattern(
    transposePattern({ rows: a.rows, columns: a.columns, columnPointer: a.columnPointer, rowIndex }),
  );
}

/** The graph that fronts work on: of A + Aᵀ, rows paired where a matching was made. */
export function frontGraph(context: TrialContext, plan: TrialPlan): Graph {
  return plan.plannedRow === null ? context.graph() : graphOf(pairedPattern(context.input.matrix, plan.plannedRow));
}

/** column -> planned pivot row of a block triangular form. */
export function plannedRowOf(form: BlockTriangularForm): Int32Array {
  const out = new Int32Array(form.rowOrder.length);
  for (let k = 0; k < out.length; k++) out[form.columnOrder[k]] = form.rowOrder[k];
  return out;
}
