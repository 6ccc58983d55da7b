import { coarseDecomposition } from '../../graph/coarse.ts';
import { maximumTransversal } from '../../graph/transversal.ts';
import { Fault, type FaultPlace } from '../../matrix/fault.ts';
import type { SparseMatrix } from '../../matrix/pattern.ts';
import { type NullComponent, nearNullVectors } from '../accuracy/nearNull.ts';
import type { ColumnFactor } from './columnFactor.ts';

/** Where a matrix is singular, in the original numbering, 0-based. */
export interface SingularFinding {
  /** structural: no values could help; numerical: these values are dependent */
  readonly kind: 'structural' | 'numerical';
  /** how many pivots are missing: exact for the structure, a lower estimate for values */
  readonly deficiency: number;
  /**
   * structural: rows of the overdetermined part (more rows than columns to match them with).
   * numerical: rows with the largest components of the left null vector.
   */
  readonly rows: readonly number[];
  /** structural: columns of the underdetermined part; numerical: columns with the largest components of the null vector */
  readonly columns: readonly number[];
  /** numerical: largest components of the null vectors, sizes relative to the largest; empty for structural */
  readonly rowComponents: readonly NullComponent[];
  readonly columnComponents: readonly NullComponent[];
}

/** A Fault that knows the rows and columns at fault. */
export class SingularFault extends Fault {
  readonly finding: SingularFinding;

  constructor(code: string, message: string, place: FaultPlace, finding: SingularFinding) {
    super('not-completed', code, message, place);
    this.finding = finding;
  }
}

/** The structural finding of a square matrix, or null where a full matching exists. */
export function structuralFinding(a: SparseMatrix): SingularFinding | null {
  const matching = maximumTransversal(a);
  const deficiency = a.columns - matching.size;
  if (deficiency === 0) return null;
  const { overdetermined, underdetermined } = coarseDecomposition(a, matching);
  return {
    kind: 'structural',
    deficiency,
    rows: Array.from(overdetermined.rows),
    columns: Array.from(underdetermined.columns),
    rowComponents: [],
    columnComponents: [],
  };
}

/**
 * Throws the fault of a matrix whose elimination met pivot columns of zeros. `factor` was completed with replaced pivots there:
 * inverse iteration with it shows the null vectors.
 */
export function refuseSingular(a: SparseMatrix, factor: ColumnFactor, zeroPivots: readonly number[]): never {
  const structural = structuralFinding(a);
  if (structural !== null) {
    throw new SingularFault(
      'structurally-singular',
      `Structurally singular: ${structural.deficiency} of ${a.columns} pivots cannot exist whatever the values. ` +
        `Rows ${listed(structural.rows)} have too few columns between them, columns ${listed(structural.columns)} too few rows (1-based, original).`,
      { row: structural.rows[0] ?? 0, column: structural.columns[0] ?? 0 },
      structural,
    );
  }
  const k = zeroPivots[0];
  const row = factor.factors.rowOrder[k];
  const column = factor.factors.columnOrder[k];
  const vectors = nearNullVectors(a, factor);
  const rowComponents = vectors?.rows ?? [];
  const columnComponents = vectors?.columns ?? [];
  const finding: SingularFinding = {
    kind: 'numerical',
    deficiency: zeroPivots.length,
    rows: rowComponents.length > 0 ? rowComponents.map((c) => c.index) : [row],
    columns: columnComponents.length > 0 ? columnComponents.map((c) => c.index) : [column],
    rowComponents,
    columnComponents,
  };
  throw new SingularFault(
    'numerically-singular',
    `Numerically singular: ${zeroPivots.length} of ${a.columns} pivots are zero, the first in column ${column + 1}. ` +
      `Rows ${listed(finding.rows)} depend on each other, and so do columns ${listed(finding.columns)} (1-based, original; largest parts first).`,
    { row, column },
    finding,
  );
}

function listed(indices: readonly number[]): string {
  const shown = indices.slice(0, 10).map((i) => i + 1);
  return indices.length > 10 ? `${shown.join(', ')} … (${indices.length} in all)` : shown.join(', ');
}
