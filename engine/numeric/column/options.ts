import { checkPermutation } from '../../matrix/check.ts';
import { Fault } from '../../matrix/fault.ts';
import type { Pattern } from '../../matrix/pattern.ts';

/** How column LU chooses pivots, and what was decided before it starts. Every default is stated. */
export interface ColumnOptions {
  /**
   * threshold: rows are interchanged where the planned pivot is too small (default); none: the planned pivot whatever it is;
   * static: the planned pivot, replaced where it is tiny (Li & Demmel 1998).
   */
  readonly pivoting?: 'threshold' | 'none' | 'static';
  /** u, 0 < u ≤ 1: the planned row stays where its entry has at least u times the largest modulus; default 1 (partial pivoting) */
  readonly threshold?: number;
  /** original column -> original row of its planned pivot (a matching); a permutation; default the diagonal */
  readonly plannedRow?: Int32Array;
  /**
   * block -> its first position in the column order; length blocks + 1; default one block. The rows of a block are the planned
   * rows of its columns; an entry may lie in the rows of its own block or of an earlier one (upper block triangular).
   */
  readonly blockStart?: Int32Array;
  /** R, original row -> factor, positive; default 1 */
  readonly rowScaling?: Float64Array;
  /** C, original column -> factor, positive; default 1 */
  readonly columnScaling?: Float64Array;
  /** static: pivots below this share of max|P·R·A·C·Q| are replaced by it; default √ε = 2⁻²⁶ */
  readonly perturbation?: number;
}

/** Options with every field present and checked. */
export interface CheckedColumnOptions {
  readonly pivoting: 'threshold' | 'none' | 'static';
  readonly threshold: number;
  readonly plannedRow: Int32Array;
  readonly blockStart: Int32Array;
  readonly rowScaling: Float64Array | null;
  readonly columnScaling: Float64Array | null;
  readonly perturbation: number;
}

/** Fills in defaults; a Fault for a threshold out of range, an Error for a broken structure. */
export function checkedOptions(a: Pattern, columnOrder: Int32Array, o: ColumnOptions): CheckedColumnOptions {
  const n = a.columns;
  if (a.rows !== n) {
    throw new Fault('input', 'not-square', `A factorization needs a square matrix; this one is ${a.rows} × ${n}.`);
  }
  checkPermutation(columnOrder, n, 'columnOrder');
  const threshold = o.threshold ?? 1;
  if (!(threshold > 0 && threshold <= 1)) {
    throw new Fault(
      'input',
      'threshold-range',
      `The pivot threshold is ${threshold}; it must be above 0 and at most 1.`,
    );
  }
  const plannedRow = o.plannedRow ?? identity(n);
  checkPermutation(plannedRow, n, 'plannedRow');
  const blockStart = o.blockStart ?? Int32Array.of(0, n);
  checkBlocks(a, columnOrder, plannedRow, blockStart);
  checkScaling(o.rowScaling, n, 'rowScaling');
  checkScaling(o.columnScaling, n, 'columnScaling');
  return {
    pivoting: o.pivoting ?? 'threshold',
    threshold,
    plannedRow,
    blockStart,
    rowScaling: o.rowScaling ?? null,
    columnScaling: o.columnScaling ?? null,
    perturbation: o.perturbation ?? 2 ** -26,
  };
}

function identity(n: number): Int32Array {
  const p = new Int32Array(n);
  for (let i = 0; i < n; i++) p[i] = i;
  return p;
}

function checkScaling(s: Float64Array | undefined, n: number, name: string): void {
  if (s === undefined) return;
  if (s.length !== n) throw new Error(`invariant broken: ${name} has length ${s.length}, expected ${n}`);
  for (let i = 0; i < n; i++) {
    if (!(s[i] > 0 && s[i] < Infinity)) throw new Error(`invariant broken: ${name}[${i}] = ${s[i]}, expected > 0`);
  }
}

/** Throws unless the blocks cover all positions and every entry lies in its block or above it. */
function checkBlocks(a: Pattern, columnOrder: Int32Array, plannedRow: Int32Array, blockStart: Int32Array): void {
  const n = a.columns;
  const blocks = blockStart.length - 1;
  if (blocks < 0 || blockStart[0] !== 0 || blockStart[blocks] !== n) {
    throw new Error(`invariant broken: blockStart must run from 0 to ${n}`);
  }
  if (blocks <= 1) return;
  const blockOfRow = new Int32Array(n);
  for (let b = 0; b < blocks; b++) {
    if (blockStart[b + 1] < blockStart[b]) throw new Error(`invariant broken: blockStart[${b + 1}] falls`);
    for (let k = blockStart[b]; k < blockStart[b + 1]; k++) blockOfRow[plannedRow[columnOrder[k]]] = b;
  }
  for (let b = 0; b < blocks; b++) {
    for (let k = blockStart[b]; k < blockStart[b + 1]; k++) {
      const j = columnOrder[k];
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
        if (blockOfRow[a.rowIndex[p]] <= b) continue;
        throw new Error(`invariant broken: entry (${a.rowIndex[p]}, ${j}) lies below block ${b}`);
      }
    }
  }
}
