import { Fault } from '../../matrix/fault.ts';
import { modulus } from '../../matrix/modulus.ts';
import { entryCount, type SparseMatrix, valueWidth } from '../../matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../matrix/permutation.ts';
import type { Progress } from '../../matrix/progress.ts';
import { valuesOf } from '../accuracy/product.ts';
import { divideColumn, updateColumn } from './columnKernels.ts';
import type { ColumnFactors, SweepFacts } from './data.ts';
import type { CheckedColumnOptions } from './options.ts';
import { clearReach, newReach, prune, type Reach, reachFrom } from './reach.ts';
import { scaleInto } from './scatter.ts';
import { type ByteMeter, GrowingEntries } from './storage.ts';

/**
 * Column LU with row interchanges (Gilbert & Peierls 1988): column by column, x = L⁻¹·(column of P·R·A·C·Q) with a sparse
 * triangular solve whose cost is proportional to its arithmetic; the part of x in pivotal rows is a column of U, the rest, divided by
 * the pivot, a column of L. Entries that cancel to zero stay entries, so that the counts are structural ones.
 *
 * A pivot column of zeros does not stop the sweep: the pivot is replaced, the position noted, and the caller decides.
 */
export function eliminateColumns(
  a: SparseMatrix,
  columnOrder: NewToOld,
  options: CheckedColumnOptions,
  progress: Progress,
  meter: ByteMeter,
): { factors: ColumnFactors; facts: SweepFacts } {
  const n = a.columns;
  const width = valueWidth(a) === 2 ? 2 : 1;
  const s = newSweep(a, options, width, meter);
  const { plannedRow, blockStart } = options;
  const { reach, lower, upper, off, lowerPointer, upperPointer, offPointer, lookEnd } = s;
  const { rowPosition } = reach;
  const pivots = new Float64Array(n * width);
  meter.add(pivots.byteLength);
  let block = 0;
  for (let k = 0; k < n; k++) {
    if ((k & 0x3ff) === 0 || s.work > 1e7) {
      s.work = 0;
      progress(k / n, 'column factorization');
    }
    while (k >= blockStart[block + 1]) block++;
    const start = blockStart[block];
    const end = blockStart[block + 1];
    const j = columnOrder[k];
    lower.reserve(end - k);
    upper.reserve(k - start);
    off.reserve(a.columnPointer[j + 1] - a.columnPointer[j]);
    clearReach(reach);
    enterColumn(s, a, j, k, start);
    const updates = updateColumn(s, width);
    s.updates += updates;
    s.work += updates;
    const row = choosePivot(s, k, plannedRow[j], options, block, columnOrder);
    rowPosition[row] = k;
    s.rowOf[k] = row;
    takePivot(s, k, j, row, pivots, options, width);
    divideColumn(s, k, row, pivots, width);
    s.divisions += reach.foundCount - 1;
    upperPointer[k + 1] = upper.count;
    offPointer[k + 1] = off.count;
    lowerPointer[k + 1] = lower.count;
    lookEnd[k] = lower.count;
    prune(reach, row, lowerPointer, lookEnd, lower.index, lower.values, width);
  }
  // rows become positions
  for (let p = 0; p < lower.count; p++) lower.index[p] = rowPosition[lower.index[p]];
  progress(1, 'column factorization');
  return {
    factors: {
      size: n,
      complex: width === 2,
      columnOrder,
      rowOrder: asNewToOld(s.rowOf),
      blockStart,
      rowScaling: options.rowScaling,
      columnScaling: options.columnScaling,
      lower: { pointer: lowerPointer, index: lower.index, values: lower.values },
      upper: { pointer: upperPointer, index: upper.index, values: upper.values },
      pivots,
      offDiagonal: { pointer: offPointer, index: off.index, values: off.values },
    },
    facts: {
      largestEntry: s.largestEntry,
      largestUpper: s.largestUpper,
      updates: s.updates,
      divisions: s.divisions,
      perturbed: s.perturbed,
      zeroPivots: s.zeroPivots,
    },
  };
}

/** Everything a sweep works with. */
export interface Sweep {
  readonly reach: Reach;
  readonly lower: GrowingEntries;
  readonly upper: GrowingEntries;
  readonly off: GrowingEntries;
  readonly lowerPointer: Int32Array;
  readonly upperPointer: Int32Array;
  readonly offPointer: Int32Array;
  /** column of L -> end of the part that pruning left to look at */
  readonly lookEnd: Int32Array;
  /** values of A; with scalings applied */
  readonly values: Float64Array;
  /** row -> value of the current column; zero outside a column's work */
  readonly x: Float64Array;
  /** position -> row of its pivot */
  readonly rowOf: Int32Array;
  readonly largestEntry: number;
  largestUpper: number;
  updates: number;
  divisions: number;
  perturbed: number;
  /** updates since the last word to `progress` */
  work: number;
  readonly zeroPivots: number[];
  /** where to look next for a row without a pivot, when a column has none to offer */
  spare: number;
}

function newSweep(a: SparseMatrix, options: CheckedColumnOptions, width: 1 | 2, meter: ByteMeter): Sweep {
  const n = a.columns;
  const entries = entryCount(a);
  const scaled = options.rowScaling !== null || options.columnScaling !== null;
  const values = scaled ? new Float64Array(entries * width) : valuesOf(a);
  if (scaled) {
    scaleInto(a, options.rowScaling, options.columnScaling, values);
    meter.add(values.byteLength);
  }
  let largestEntry = 0;
  for (let p = 0; p < entries; p++) {
    const m = width === 2 ? modulus(values[2 * p], values[2 * p + 1]) : Math.abs(values[p]);
    if (m > largestEntry) largestEntry = m;
  }
  const room = entries + n;
  const s: Sweep = {
    reach: newReach(n),
    lower: new GrowingEntries(room, width, meter),
    upper: new GrowingEntries(room, width, meter),
    off: new GrowingEntries(options.blockStart.length > 2 ? entries : 0, width, meter),
    lowerPointer: new Int32Array(n + 1),
    upperPointer: new Int32Array(n + 1),
    offPointer: new Int32Array(n + 1),
    lookEnd: new Int32Array(n),
    values,
    x: new Float64Array(n * width),
    rowOf: new Int32Array(n),
    largestEntry,
    largestUpper: 0,
    updates: 0,
    divisions: 0,
    perturbed: 0,
    work: 0,
    zeroPivots: [],
    spare: 0,
  };
  meter.add(24 * n + 3 * 4 * (n + 1) + 8 * n + 8 * n * width);
  return s;
}

/** Scatters column j into x, finds what it reaches, and puts entries above the block into F. */
function enterColumn(s: Sweep, a: SparseMatrix, j: number, k: number, start: number): void {
  const { reach, off, x, values, lowerPointer, lookEnd, lower } = s;
  const { rowPosition } = reach;
  const wide = x.length > rowPosition.length;
  for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
    const i = a.rowIndex[p];
    const position = rowPosition[i];
    if (position >= 0 && position < start) {
      const q = off.count++;
      off.index[q] = position;
      if (wide) {
        off.values[2 * q] = values[2 * p];
        off.values[2 * q + 1] = values[2 * p + 1];
      } else off.values[q] = values[p];
      const m = wide ? modulus(values[2 * p], values[2 * p + 1]) : Math.abs(values[p]);
      if (m > s.largestUpper) s.largestUpper = m;
      continue;
    }
    reachFrom(reach, i, k, lowerPointer, lookEnd, lower.index);
    if (wide) {
      x[2 * i] = values[2 * p];
      x[2 * i + 1] = values[2 * p + 1];
    } else x[i] = values[p];
  }
}

/**
 * The pivot row of a column: the planned one where it is allowed and large enough, else the first of largest modulus. A row
 * that is not among the found ones is added to them with the value zero.
 */
function choosePivot(
  s: Sweep,
  k: number,
  planned: number,
  options: CheckedColumnOptions,
  block: number,
  columnOrder: NewToOld,
): number {
  const { reach, x } = s;
  const { found, foundCount, mark, rowPosition } = reach;
  const wide = x.length > rowPosition.length;
  const plannedFree = rowPosition[planned] < 0;
  const plannedFound = plannedFree && mark[planned] === k;
  if (options.pivoting !== 'threshold') {
    if (!plannedFound) addRow(reach, planned, k);
    return planned;
  }
  let largest = 0;
  let best = -1;
  for (let f = 0; f < foundCount; f++) {
    const i = found[f];
    const m = wide ? modulus(x[2 * i], x[2 * i + 1]) : Math.abs(x[i]);
    if (m > largest) {
      largest = m;
      best = i;
    }
  }
  if (best < 0) {
    if (plannedFound) return planned;
    if (foundCount > 0) return found[0];
    const row = plannedFree ? planned : spareRow(s, options, block, columnOrder);
    addRow(reach, row, k);
    return row;
  }
  if (plannedFound) {
    const m = wide ? modulus(x[2 * planned], x[2 * planned + 1]) : Math.abs(x[planned]);
    if (m >= options.threshold * largest) return planned;
  }
  return best;
}

function addRow(reach: Reach, row: number, k: number): void {
  reach.mark[row] = k;
  reach.found[reach.foundCount++] = row;
}

/** Any row of the block without a pivot; there is one, since columns and rows of a block are equally many. */
function spareRow(s: Sweep, options: CheckedColumnOptions, block: number, columnOrder: NewToOld): number {
  const { rowPosition } = s.reach;
  s.spare = Math.max(s.spare, options.blockStart[block]);
  for (; ; s.spare++) {
    const row = options.plannedRow[columnOrder[s.spare]];
    if (rowPosition[row] < 0) return row;
  }
}

/** Stores the pivot, replaced where it is zero or, by choice, tiny; clears its place in x. */
function takePivot(
  s: Sweep,
  k: number,
  j: number,
  row: number,
  pivots: Float64Array,
  options: CheckedColumnOptions,
  width: 1 | 2,
): void {
  const { x } = s;
  let re = x[width * row];
  let im = width === 2 ? x[2 * row + 1] : 0;
  x[width * row] = 0;
  if (width === 2) x[2 * row + 1] = 0;
  let m = width === 2 ? modulus(re, im) : Math.abs(re);
  if (!(m < Infinity)) {
    throw new Fault(
      'not-completed',
      'not-finite-pivot',
      `Elimination overflowed: the pivot at row ${row + 1}, column ${j + 1} (1-based, original) is not finite. Scaling may help.`,
      { row, column: j },
    );
  }
  const least = options.perturbation * s.largestEntry;
  if (m === 0 || (options.pivoting === 'static' && m < least)) {
    if (options.pivoting === 'none') {
      throw new Fault(
        'not-completed',
        'zero-pivot',
        `Without pivoting the pivot at row ${row + 1}, column ${j + 1} (1-based, original) is zero. Allow pivoting, or match large entries first.`,
        { row, column: j },
      );
    }
    if (options.pivoting === 'threshold') s.zeroPivots.push(k);
    s.perturbed++;
    const size = least > 0 ? least : 1;
    re = m > 0 ? (re / m) * size : size;
    im = m > 0 ? (im / m) * size : 0;
    m = size;
  }
  pivots[width * k] = re;
  if (width === 2) pivots[2 * k + 1] = im;
  if (m > s.largestUpper) s.largestUpper = m;
}
