import { Fault } from '../../matrix/fault.ts';
import type { SparseMatrix } from '../../matrix/pattern.ts';
import { noProgress, type Progress } from '../../matrix/progress.ts';
import type { AssemblyTree, FrontRows } from '../../symbolic/types.ts';
import { complexKernels } from '../dense/complex.ts';
import { realKernels } from '../dense/real.ts';
import type { PivotReport, Solver } from '../solver.ts';
import { type Factors, factorsOf } from './factors.ts';
import { type FrontOptions, settleOptions } from './options.ts';
import { reportOf } from './report.ts';
import { FrontRun } from './run.ts';
import { type SchurComplement, schurOf } from './schur.ts';
import { solveFronts } from './solve.ts';
import type { FactorArray } from './storage.ts';
import { walkFronts } from './walk.ts';

/**
 * A matrix factorized over its assembly tree: P·S·A·S·Pᵀ = L·Lᵀ or L·D·Lᵀ (conjugated when Hermitian), or P·R·A·C·Q = L·U.
 * Holds the analysis and the options too, so that new values on the same pattern need nothing else.
 */
export class FrontFactor implements Solver {
  readonly size: number;
  readonly complex: boolean;
  readonly report: PivotReport;
  private held: Factors | null;
  /** Schur complement onto the unknowns that were not eliminated; null unless unknowns were held */
  readonly schur: SchurComplement | null;

  constructor(
    readonly tree: AssemblyTree,
    readonly rows: FrontRows,
    readonly options: FrontOptions,
    run: FrontRun,
  ) {
    this.size = tree.size;
    this.complex = run.kernels.width === 2;
    const factors = factorsOf(run);
    this.held = factors;
    this.schur = run.options.schur > 0 ? schurOf(run) : null;
    this.report = reportOf(run, factors);
  }

  /** Panels, subscripts and pivots, for extraction and export. @throws Fault where a refactorization has taken them over. */
  get factors(): Factors {
    if (this.held !== null) return this.held;
    throw new Fault('input', 'factors-taken-over', 'These factors were overwritten by a factorization of new values.');
  }

  /** Gives up the arrays of the factors, to be overwritten. */
  takeArrays(): FactorArray[] {
    const arrays = [...this.factors.chunks];
    this.held = null;
    return arrays;
  }

  solveInPlace(x: Float64Array, columns: number): void {
    this.checkSolve(x, columns);
    solveFronts(this.factors, x, columns, false);
  }

  solveTransposedInPlace(x: Float64Array, columns: number): void {
    this.checkSolve(x, columns);
    solveFronts(this.factors, x, columns, true);
  }

  private checkSolve(x: Float64Array, columns: number): void {
    const expected = this.size * columns * (this.complex ? 2 : 1);
    if (x.length !== expected) {
      throw new Fault(
        'input',
        'length-mismatch',
        `The right-hand sides have ${x.length} numbers; expected ${expected} for ${columns} columns of ${this.size} unknowns.`,
      );
    }
    if (this.schur === null) return;
    throw new Fault(
      'input',
      'held-unknowns',
      `${this.schur.size} unknowns were not eliminated: the factors give their Schur complement, not a solution. Factorize without held unknowns to solve.`,
    );
  }
}

/**
 * Factorizes over the fronts of an assembly tree.
 * @param matrix square, with values; both triangles present, also for the symmetric kinds (which read the lower one of the tree's order).
 * @param tree of the pattern A + Aᵀ + I of the matrix (of the matrix with its rows paired, where `rowPermutation` is given).
 * @param rows subscripts of the tree's fronts.
 * @throws Fault "input" for a call that cannot be, "not-completed" with original rows where pivots are missing, "memory".
 */
export function factorizeFronts(
  matrix: SparseMatrix,
  tree: AssemblyTree,
  rows: FrontRows,
  options: FrontOptions,
  progress: Progress = noProgress,
): FrontFactor {
  return factorizeInto(matrix, tree, rows, options, progress, () => []);
}

/**
 * New values on the same pattern: the same analysis and options, pivots chosen anew where the rule allows a choice.
 * @param overwrite whether the arrays of `factor` may be taken over, so that both never exist at once; it cannot solve afterwards,
 *   also where the new factorization fails.
 */
export function refactorizeFronts(
  factor: FrontFactor,
  matrix: SparseMatrix,
  progress: Progress = noProgress,
  overwrite = false,
): FrontFactor {
  const { tree, rows, options } = factor;
  return factorizeInto(matrix, tree, rows, options, progress, () => (overwrite ? factor.takeArrays() : []));
}

function factorizeInto(
  matrix: SparseMatrix,
  tree: AssemblyTree,
  rows: FrontRows,
  options: FrontOptions,
  progress: Progress,
  recycled: () => FactorArray[],
): FrontFactor {
  if (matrix.rows !== matrix.columns || matrix.rows !== tree.size) {
    throw new Fault(
      'input',
      'not-square',
      `The matrix is ${matrix.rows} × ${matrix.columns} and the tree has ${tree.size} columns; expected a square matrix of the tree's size.`,
    );
  }
  if (matrix.values === null) {
    throw new Fault('input', 'no-values', 'The matrix is a pattern without values; a factorization needs values.');
  }
  const complex = matrix.field === 'complex';
  const settled = settleOptions(options, matrix.rows, complex);
  progress(0, 'factorizing');
  const kernels = complex ? complexKernels : realKernels;
  const run = new FrontRun(matrix, tree, rows, settled, kernels, progress, recycled());
  walkFronts(run);
  if (settled.schur === 0) refuseLeftovers(run);
  return new FrontFactor(tree, rows, options, run);
}

/** Unknowns that no front could eliminate: the matrix is singular, or not finite. */
function refuseLeftovers(run: FrontRun): void {
  const rows: number[] = [];
  const columns: number[] = [];
  let finite = true;
  for (let b = 0; b < run.pendingCount; b++) {
    const s = run.pendingFront[b];
    for (let q = run.listStart[s] + run.eliminated[s]; q < run.listStart[s + 1]; q++) {
      rows.push(run.originalRow(run.rowList[q]));
      columns.push(run.tree.order[run.columnList[q]]);
    }
    const width = run.kernels.width;
    const size = run.listStart[s + 1] - run.listStart[s] - run.eliminated[s];
    const scalars = run.symmetric ? (size * (size + 1)) / 2 : size * size;
    for (let q = 0; q < width * scalars; q++) {
      if (!Number.isFinite(run.stack.array[width * run.pendingAt[b] + q])) finite = false;
    }
  }
  if (rows.length === 0) return;
  const many = rows.length === 1 ? 'one pivot is' : `${rows.length} pivots are`;
  const shown = rows.slice(0, 10).join(', ') + (rows.length > 10 ? ', …' : '');
  throw finite
    ? new Fault(
        'not-completed',
        'singular',
        `The matrix is singular to working precision: ${many} zero with everything else eliminated, in original rows ${shown} (0-based).`,
        { row: rows[0], column: columns[0] },
        [{ id: 'use-static', text: 'Use static pivoting: zero pivots are replaced and counted.' }],
      )
    : new Fault(
        'not-completed',
        'not-finite',
        `The elimination met values that are not finite, in original rows ${shown} (0-based): overflow, or NaN in the input. Scale the matrix.`,
        { row: rows[0], column: columns[0] },
      );
}
