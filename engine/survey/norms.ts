import { magnitudeAt } from '../matrix/modulus.ts';
import { type Base, notFiniteReason, noValues } from './base.ts';
import { type Fact, fact, markList, undefinedFact } from './fact.ts';
import type { Ticker } from './ticker.ts';
import { counted, figure } from './wording.ts';

/** Smallest and largest of the lines that have a nonzero value. */
export interface Range {
  readonly smallest: number;
  readonly largest: number;
}

export interface Norms {
  /** max-norms of the rows, of the columns */
  readonly rows: Range;
  readonly columns: Range;
  /** ‖A‖₁, largest column sum of |a|; ‖A‖∞, largest row sum */
  readonly one: number;
  readonly infinity: number;
  /** the same ranges after one step of equilibration by max-norms, entry (i,j) divided by √(‖row i‖∞ ‖column j‖∞) */
  readonly equilibratedRows: Range;
  readonly equilibratedColumns: Range;
}

/** Row and column norms, and what one step of equilibration (Ruiz 2001) would make of them. */
export function normsFact(base: Base, ticker: Ticker): Fact<Norms> {
  const { sizes } = base;
  if (sizes === null) return undefinedFact(noValues, 'as the values');
  if (sizes.notFinite > 0) return undefinedFact(notFiniteReason(sizes.notFinite), 'as the values');
  if (sizes.largest === 0) return undefinedFact('No value is other than zero.', 'as the values');
  const rows = rangeOf(sizes.rowLargest);
  const columns = rangeOf(sizes.columnLargest);
  const after = equilibrated(base, ticker);
  const value: Norms = {
    rows: rows.range,
    columns: columns.range,
    one: largestSum(sizes.columnSum, sizes.diagonal),
    infinity: largestSum(sizes.rowSum, sizes.diagonal),
    equilibratedRows: after.rows,
    equilibratedColumns: after.columns,
  };
  const told = (r: Range): string => `${figure(r.smallest)} to ${figure(r.largest)}`;
  const ends =
    value.rows.smallest < value.rows.largest
      ? `row ${counted(rows.smallestAt + 1)}, row ${counted(rows.largestAt + 1)}`
      : 'all rows alike';
  const sentence =
    `Largest entry of each row: ${told(value.rows)} (${ends}); of each column: ${told(value.columns)}. One step of equilibration would make them ` +
    `${told(value.equilibratedRows)} and ${told(value.equilibratedColumns)}.`;
  const differs = value.rows.smallest < value.rows.largest;
  const columnsDiffer = value.columns.smallest < value.columns.largest;
  const marks = [
    markList('row with the smallest norm', 'rows', Int32Array.from(differs ? [rows.smallestAt] : [])),
    markList('row with the largest norm', 'rows', Int32Array.from(differs ? [rows.largestAt] : [])),
    markList('column with the smallest norm', 'columns', Int32Array.from(columnsDiffer ? [columns.smallestAt] : [])),
    markList('column with the largest norm', 'columns', Int32Array.from(columnsDiffer ? [columns.largestAt] : [])),
  ];
  return fact(value, sentence, 'as the values', 'rounded', marks);
}

function rangeOf(largest: Float64Array): { range: Range; smallestAt: number; largestAt: number } {
  let low = Number.POSITIVE_INFINITY;
  let high = 0;
  let smallestAt = -1;
  let largestAt = -1;
  for (let i = 0; i < largest.length; i++) {
    const x = largest[i];
    if (x === 0) continue;
    if (x < low) {
      low = x;
      smallestAt = i;
    }
    if (x > high) {
      high = x;
      largestAt = i;
    }
  }
  return { range: { smallest: low, largest: high }, smallestAt, largestAt };
}

function largestSum(sum: Float64Array, diagonal: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < sum.length; i++) {
    const s = sum[i] + (i < diagonal.length ? diagonal[i] : 0);
    if (s > largest) largest = s;
  }
  return largest;
}

function equilibrated(base: Base, ticker: Ticker): { rows: Range; columns: Range } {
  const { matrix, sizes } = base;
  const { values, columnPointer, rowIndex } = matrix;
  const rowAfter = new Float64Array(matrix.rows);
  const columnAfter = new Float64Array(matrix.columns);
  if (values !== null && sizes !== null) {
    const width = matrix.field === 'complex' ? 2 : 1;
    const rowRoot = sizes.rowLargest.map(Math.sqrt);
    for (let j = 0; j < matrix.columns; j++) {
      const root = Math.sqrt(sizes.columnLargest[j]);
      let best = 0;
      const end = columnPointer[j + 1];
      for (let p = columnPointer[j]; p < end; p++) {
        const x = magnitudeAt(values, width, p);
        if (x === 0) continue;
        const i = rowIndex[p];
        const y = x / rowRoot[i] / root;
        if (y > best) best = y;
        if (y > rowAfter[i]) rowAfter[i] = y;
      }
      columnAfter[j] = best;
      ticker.add(end - columnPointer[j]);
    }
  }
  return { rows: rangeOf(rowAfter).range, columns: rangeOf(columnAfter).range };
}
