import { type Graph, graphOf } from '../../engine/graph/graph.ts';
import type { Pattern, SparseMatrix } from '../../engine/matrix/pattern.ts';
import { type NewToOld, type OldToNew, positionOf } from '../../engine/matrix/permutation.ts';
import { factorDensity } from '../../engine/picture/factorDensity.ts';
import { countPatternInto, patternDensity } from '../../engine/picture/patternDensity.ts';
import type { DensityMap, PictureWindow } from '../../engine/picture/window.ts';
import { analyseGraph } from '../../engine/symbolic/analyse.ts';
import { RowIntervals } from '../../engine/symbolic/rowIntervals.ts';
import { pairedPattern } from '../../engine/trial/prepared.ts';
import type { TrialResult } from '../../engine/trial/result.ts';

/** What a map of a trial is drawn from; made once in the worker that draws. */
export interface MapPlan {
  /** the matrix with its rows paired as the trial plans them; row i of it is the original row `rowOf[i]` (null: the same) */
  readonly paired: Pattern;
  readonly rowOf: Int32Array | null;
  readonly order: NewToOld;
  readonly position: OldToNew;
  /** null for a rectangular matrix: no factor is drawn */
  readonly factor: {
    /** entries inside the diagonal blocks: the part that is factorized */
    readonly inside: Pattern;
    /** the other entries; null when there are none */
    readonly outside: Pattern | null;
    readonly graph: Graph;
    readonly rows: RowIntervals;
    readonly half: 'lower' | 'both';
  } | null;
}

/** Prepares the maps of a trial. Near-linear in entries. */
export function mapPlanOf(matrix: SparseMatrix, trial: TrialResult): MapPlan {
  const order = trial.effective;
  const square = matrix.rows === matrix.columns;
  if (!square) return { paired: matrix, rowOf: null, order, position: positionOf(order), factor: null };
  const { plannedRow, blockStart } = trial.plan;
  const paired = pairedPattern(matrix, plannedRow);
  const split = blockStart === null || blockStart.length <= 2 ? null : splitByBlock(paired, order, blockStart);
  const inside = split?.inside ?? paired;
  const graph = graphOf(inside);
  const column = trial.choice.factorization === 'column-lu';
  const parent =
    column || trial.parent === null ? analyseGraph(graph, order, { postorder: false }).parent : trial.parent;
  const symmetric = trial.choice.factorization === 'cholesky' || trial.choice.factorization === 'ldlt';
  return {
    paired,
    rowOf: plannedRow,
    order,
    position: positionOf(order),
    factor: {
      inside,
      outside: split?.outside ?? null,
      graph,
      rows: new RowIntervals(graph, order, parent),
      half: symmetric ? 'lower' : 'both',
    },
  };
}

function splitByBlock(a: Pattern, order: NewToOld, blockStart: Int32Array): { inside: Pattern; outside: Pattern } {
  const blockOf = new Int32Array(a.columns);
  for (let b = 0; b + 1 < blockStart.length; b++) {
    for (let k = blockStart[b]; k < blockStart[b + 1]; k++) blockOf[order[k]] = b;
  }
  const part = (keep: boolean): Pattern => {
    const columnPointer = new Int32Array(a.columns + 1);
    const rowIndex = new Int32Array(a.rowIndex.length);
    let q = 0;
    for (let j = 0; j < a.columns; j++) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
        if ((blockOf[a.rowIndex[p]] === blockOf[j]) === keep) rowIndex[q++] = a.rowIndex[p];
      }
      columnPointer[j + 1] = q;
    }
    return { rows: a.rows, columns: a.columns, columnPointer, rowIndex: rowIndex.slice(0, q) };
  };
  return { inside: part(true), outside: part(false) };
}

/** Counts in the cells of a window: the matrix as read without a plan, the trial's factor with one. */
export function mapOf(
  matrix: Pattern,
  plan: MapPlan | null,
  window: PictureWindow,
  cellRows: number,
  cellColumns: number,
): DensityMap {
  if (plan === null) return patternDensity(matrix, null, null, window, cellRows, cellColumns);
  const { factor, order, position } = plan;
  if (factor === null) return patternDensity(matrix, null, order, window, cellRows, cellColumns);
  const picture = { matrix: factor.inside, order, position, rows: factor.rows, half: factor.half };
  const map = factorDensity(picture, window, cellRows, cellColumns);
  if (factor.outside !== null) {
    countPatternInto(map.original, factor.outside, position, order, window, cellRows, cellColumns);
  }
  return map;
}
