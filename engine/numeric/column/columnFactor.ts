import type { SparseMatrix } from '../../matrix/pattern.ts';
import type { NewToOld } from '../../matrix/permutation.ts';
import { noProgress, type Progress } from '../../matrix/progress.ts';
import { refuseNotFinite } from '../accuracy/system.ts';
import type { Solver } from '../solver.ts';
import type { ColumnFactors, SweepFacts } from './data.ts';
import { eliminateColumns } from './eliminate.ts';
import { type ColumnOptions, checkedOptions } from './options.ts';
import { pivotReport } from './report.ts';
import { refuseSingular } from './singular.ts';
import { solveColumns } from './solve.ts';
import { ByteMeter } from './storage.ts';

/** A column LU that can solve: P·R·A·C·Q = L·U + F. */
export interface ColumnFactor extends Solver {
  readonly factors: ColumnFactors;
  /** original column -> original row of its planned pivot */
  readonly plannedRow: Int32Array;
  /** nnz(L) inside the diagonal blocks, unit diagonal included */
  readonly lowerEntries: number;
  /** nnz(U) inside the diagonal blocks, diagonal included */
  readonly upperEntries: number;
  /** nnz(F): entries above the diagonal blocks, not part of `factorEntries` */
  readonly offDiagonalBlockEntries: number;
}

/**
 * Column LU with partial or threshold pivoting (Gilbert & Peierls 1988), on block triangular form where options give it.
 *
 * @param matrix square, real or complex, with finite values
 * @param columnOrder Q, new-to-old; on block form it runs block by block (see `columnPlan`)
 * @throws Fault "structurally-singular" or "numerically-singular" (a `SingularFault` with the findings), "zero-pivot" without
 * pivoting, "not-finite-pivot" after overflow, "not-finite" values; kind "memory" where the factors outgrow it
 */
export function factorizeColumns(
  matrix: SparseMatrix,
  columnOrder: NewToOld,
  options: ColumnOptions = {},
  progress: Progress = noProgress,
): ColumnFactor {
  const checked = checkedOptions(matrix, columnOrder, options);
  refuseNotFinite(matrix);
  const meter = new ByteMeter();
  const { factors, facts } = eliminateColumns(matrix, columnOrder, checked, progress, meter);
  const factor = columnFactorOf(factors, facts, checked.plannedRow, meter.peak);
  if (facts.zeroPivots.length > 0) refuseSingular(matrix, factor, facts.zeroPivots);
  return factor;
}

/** Gives factors and the facts of their making the shape of a solver. */
export function columnFactorOf(
  factors: ColumnFactors,
  facts: SweepFacts,
  plannedRow: Int32Array,
  peakBytes: number,
): ColumnFactor {
  const n = factors.size;
  return {
    size: n,
    complex: factors.complex,
    report: pivotReport(factors, facts, plannedRow, peakBytes),
    factors,
    plannedRow,
    lowerEntries: factors.lower.pointer[n] + n,
    upperEntries: factors.upper.pointer[n] + n,
    offDiagonalBlockEntries: factors.offDiagonal.pointer[n],
    solveInPlace: (x, columns) => solveColumns(factors, x, columns, false),
    solveTransposedInPlace: (x, columns) => solveColumns(factors, x, columns, true),
  };
}
