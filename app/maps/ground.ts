import { resultOf } from '../state/vault.ts';
import type { Pane } from './contract.ts';

/** Where the unknowns of a pane lie: lookups between positions and original numbers, 0-based. */
export interface Ground {
  readonly rows: number;
  readonly columns: number;
  /** only the lower triangle is drawn: what the factorization works on */
  readonly half: boolean;
  /** position -> original row or column */
  originalRow(position: number): number;
  originalColumn(position: number): number;
  /** original -> position; made on first use */
  rowPosition(original: number): number;
  columnPosition(original: number): number;
}

const same = (k: number): number => k;

/** The ground of a pane: the identity for the matrix as read, the trial's orders else. */
export function groundOf(pane: Pane, rows: number, columns: number): Ground {
  const result = pane.trial === null ? null : resultOf(pane.trial);
  if (result === null) {
    return {
      rows,
      columns,
      half: false,
      originalRow: same,
      originalColumn: same,
      rowPosition: same,
      columnPosition: same,
    };
  }
  const { effective, plan, choice } = result;
  const square = rows === columns;
  const { plannedRow } = plan;
  let columnAt: Int32Array | null = null;
  let rowAt: Int32Array | null = null;
  const originalRow = (k: number): number =>
    !square ? k : plannedRow === null ? effective[k] : plannedRow[effective[k]];
  const inverse = (n: number, of: (k: number) => number): Int32Array => {
    const out = new Int32Array(n);
    for (let k = 0; k < n; k++) out[of(k)] = k;
    return out;
  };
  return {
    rows,
    columns,
    half: square && (choice.factorization === 'cholesky' || choice.factorization === 'ldlt'),
    originalRow,
    originalColumn: (k) => effective[k],
    rowPosition: (i) => {
      rowAt ??= inverse(rows, originalRow);
      return rowAt[i];
    },
    columnPosition: (j) => {
      columnAt ??= inverse(columns, (k) => effective[k]);
      return columnAt[j];
    },
  };
}

/** Where an original entry is drawn on a ground: in the lower triangle where only that is drawn. */
export function placeOf(ground: Ground, originalRow: number, originalColumn: number): { row: number; column: number } {
  const row = ground.rowPosition(originalRow);
  const column = ground.columnPosition(originalColumn);
  return ground.half && row < column ? { row: column, column: row } : { row, column };
}
