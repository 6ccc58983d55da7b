import { resultOf } from '../state/vault.ts';
import type { Pane } from './contract.ts';

/** Where the unknowns of a pane lie: lookups between positions and original numbers, 0-based. */
export interface Ground {
  readonly rows: number;
  readonly columns: number;
  /** position -> original row or column */
  originalRow(position: number): number;
  originalColumn(position: number): number;
  /** original -> position; made on first use */
  rowPosition(original: number): number;
  columnPosition(original: number): number;
  readonly separators: readonly { readonly start: number; readonly end: number; readonly level: number }[];
}

const same = (k: number): number => k;

/** The ground of a pane: the identity for the matrix as read, the trial's orders else. */
export function groundOf(pane: Pane, rows: number, columns: number): Ground {
  const result = pane.trial === null ? null : resultOf(pane.trial);
  if (result === null) {
    return {
      rows,
      columns,
      originalRow: same,
      originalColumn: same,
      rowPosition: same,
      columnPosition: same,
      separators: [],
    };
  }
  const { effective, plan, requested, separators } = result;
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
    // a postorder may move separators; their ranges are drawn only where the order is the requested one
    separators: sameOrder(requested, effective) ? separators : [],
  };
}

function sameOrder(a: Int32Array, b: Int32Array): boolean {
  for (let k = 0; k < a.length; k++) if (a[k] !== b[k]) return false;
  return true;
}
