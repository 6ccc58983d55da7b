import { magnitudeAt } from '../matrix/modulus.ts';
import { entryCount, type SparseMatrix, valueWidth } from '../matrix/pattern.ts';
import type { Ticker } from './ticker.ts';

/** What one pass over the positions gives; shared by many facts. */
export interface Positions {
  /** row -> number of entries */
  readonly rowCount: Int32Array;
  /** column -> number of entries */
  readonly columnCount: Int32Array;
  /** unknown i < min(rows, columns) -> the entry (i,i) as a position in `rowIndex`, −1 where it is not stored */
  readonly diagonalEntry: Int32Array;
  /** square: unknown i -> smallest index joined with it in A + Aᵀ + I, i itself included; else empty */
  readonly first: Int32Array;
  /** max i − j over the entries, 0 where no entry lies below the diagonal */
  readonly lowerBandwidth: number;
  /** max j − i over the entries, 0 where no entry lies above the diagonal */
  readonly upperBandwidth: number;
  /** an entry farthest below and farthest above the diagonal: row, column; −1, −1 where there is none */
  readonly lowest: readonly [number, number];
  readonly highest: readonly [number, number];
}

/** One pass over the positions. */
export function positions(a: SparseMatrix, ticker: Ticker): Positions {
  const { rows, columns, columnPointer, rowIndex } = a;
  const square = rows === columns;
  const rowCount = new Int32Array(rows);
  const columnCount = new Int32Array(columns);
  const diagonalEntry = new Int32Array(Math.min(rows, columns)).fill(-1);
  const first = new Int32Array(square ? rows : 0);
  let lower = 0;
  let upper = 0;
  let lowest: readonly [number, number] = [-1, -1];
  let highest: readonly [number, number] = [-1, -1];
  for (let i = 0; i < first.length; i++) first[i] = i;
  for (let j = 0; j < columns; j++) {
    const start = columnPointer[j];
    const end = columnPointer[j + 1];
    columnCount[j] = end - start;
    if (start === end) continue;
    for (let p = start; p < end; p++) {
      const i = rowIndex[p];
      rowCount[i]++;
      if (i === j) diagonalEntry[j] = p;
      if (square && j < first[i]) first[i] = j;
    }
    // rows are sorted: the outermost entries of a column are its first and last
    if (square && rowIndex[start] < first[j]) first[j] = rowIndex[start];
    if (j - rowIndex[start] > upper) {
      upper = j - rowIndex[start];
      highest = [rowIndex[start], j];
    }
    if (rowIndex[end - 1] - j > lower) {
      lower = rowIndex[end - 1] - j;
      lowest = [rowIndex[end - 1], j];
    }
    ticker.add(end - start);
  }
  return {
    rowCount,
    columnCount,
    diagonalEntry,
    first,
    lowerBandwidth: lower,
    upperBandwidth: upper,
    lowest,
    highest,
  };
}

/** Sizes of the values along each row and column. Finite only where all values are. */
export interface LineSizes {
  /** row -> largest |a| */
  readonly rowLargest: Float64Array;
  /** row -> smallest |a| > 0, Infinity where there is none */
  readonly rowSmallest: Float64Array;
  /** column -> largest |a| */
  readonly columnLargest: Float64Array;
  /** row -> Σ |a| off the diagonal */
  readonly rowSum: Float64Array;
  /** column -> Σ |a| off the diagonal */
  readonly columnSum: Float64Array;
  /** |a| of the diagonal entry, 0 where it is not stored; length min(rows, columns) */
  readonly diagonal: Float64Array;
  readonly zeros: number;
  readonly notFinite: number;
  /** largest |a| over all entries (finite ones) and its place; 0 and −1 where there is none */
  readonly largest: number;
  readonly largestAt: readonly [number, number];
  /** smallest |a| > 0 and its place; Infinity and −1 where there is none */
  readonly smallest: number;
  readonly smallestAt: readonly [number, number];
}

/** One pass over the values; null for a pattern. */
export function lineSizes(a: SparseMatrix, ticker: Ticker): LineSizes | null {
  const { rows, columns, columnPointer, rowIndex, values } = a;
  if (values === null) return null;
  const width = valueWidth(a) as 1 | 2;
  const rowLargest = new Float64Array(rows);
  const rowSmallest = new Float64Array(rows).fill(Number.POSITIVE_INFINITY);
  const columnLargest = new Float64Array(columns);
  const rowSum = new Float64Array(rows);
  const columnSum = new Float64Array(columns);
  const diagonal = new Float64Array(Math.min(rows, columns));
  let zeros = 0;
  let notFinite = 0;
  let largest = 0;
  let smallest = Number.POSITIVE_INFINITY;
  let largestEntry = -1;
  let largestColumn = -1;
  let smallestEntry = -1;
  let smallestColumn = -1;
  for (let j = 0; j < columns; j++) {
    const end = columnPointer[j + 1];
    let columnBig = 0;
    let sum = 0;
    for (let p = columnPointer[j]; p < end; p++) {
      const i = rowIndex[p];
      const x = magnitudeAt(values, width, p);
      if (i === j) diagonal[j] = x;
      else {
        rowSum[i] += x;
        sum += x;
      }
      if (x === 0) {
        zeros++;
        continue;
      }
      if (!(x < Number.POSITIVE_INFINITY)) {
        notFinite++;
        rowLargest[i] = columnBig = Number.POSITIVE_INFINITY;
        continue;
      }
      if (x > rowLargest[i]) rowLargest[i] = x;
      if (x < rowSmallest[i]) rowSmallest[i] = x;
      if (x > columnBig) columnBig = x;
      if (x > largest) {
        largest = x;
        largestEntry = p;
        largestColumn = j;
      }
      if (x < smallest) {
        smallest = x;
        smallestEntry = p;
        smallestColumn = j;
      }
    }
    columnLargest[j] = columnBig;
    columnSum[j] = sum;
    ticker.add(end - columnPointer[j]);
  }
  const place = (p: number, j: number): readonly [number, number] => (p < 0 ? [-1, -1] : [rowIndex[p], j]);
  return {
    rowLargest,
    rowSmallest,
    columnLargest,
    rowSum,
    columnSum,
    diagonal,
    zeros,
    notFinite,
    largest,
    largestAt: place(largestEntry, largestColumn),
    smallest,
    smallestAt: place(smallestEntry, smallestColumn),
  };
}

/** The matrix with what every fact may need; made once a survey. */
export interface Base {
  readonly matrix: SparseMatrix;
  readonly square: boolean;
  readonly entries: number;
  readonly positions: Positions;
  /** null for a pattern */
  readonly sizes: LineSizes | null;
}

export function makeBase(matrix: SparseMatrix, ticker: Ticker): Base {
  ticker.begin('positions');
  const where = positions(matrix, ticker);
  ticker.begin('values');
  return {
    matrix,
    square: matrix.rows === matrix.columns,
    entries: entryCount(matrix),
    positions: where,
    sizes: lineSizes(matrix, ticker),
  };
}

/** The reason given by facts that need values. */
export const noValues = 'The matrix is a pattern: it has positions and no values.';

/** The reason given by facts that need a square matrix. */
export function notSquare(a: { rows: number; columns: number }): string {
  return `Defined for square matrices only; this one has ${a.rows} rows and ${a.columns} columns.`;
}

/** The reason given by sums over values where some are NaN or infinite. */
export function notFiniteReason(count: number): string {
  return `${count === 1 ? 'One value is' : `${count} values are`} not finite.`;
}
