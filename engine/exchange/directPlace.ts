import type { Symmetry } from '../matrix/pattern.ts';
import { type Columns, sortAndMergeInPlace } from './columns.ts';
import type { ColumnCount } from './coordinateCount.ts';
import type { TripletStore } from './triplets.ts';

/** Entries go straight to their column in the final arrays, mirrors with them. */
export class DirectPlace {
  private readonly pointer: Int32Array;
  private readonly next: Int32Array;
  private readonly rowIndex: Int32Array;
  private readonly values: Float64Array;
  private readonly width: 0 | 1 | 2;
  private readonly symmetry: Symmetry;
  /** entries handed in so far, without mirrors */
  stored = 0;

  constructor(count: Pick<ColumnCount, 'columns' | 'counts'>, width: 0 | 1 | 2, symmetry: Symmetry) {
    const n = count.columns;
    this.pointer = new Int32Array(n + 1);
    for (let j = 0; j < n; j++) this.pointer[j + 1] = this.pointer[j] + count.counts[j];
    // the counts are not needed any more: their place holds the next free entry of each column
    this.next = count.counts;
    this.next.set(this.pointer.subarray(0, n));
    this.rowIndex = new Int32Array(this.pointer[n]);
    this.values = new Float64Array(this.pointer[n] * width);
    this.width = width;
    this.symmetry = symmetry;
  }

  /** Takes the entries of `store` and empties it. */
  take(store: TripletStore): void {
    const { next, rowIndex, values, width } = this;
    const { row, column, count } = store;
    const from = store.values;
    const mirrored = this.symmetry !== 'general';
    const sign = this.symmetry === 'skew-symmetric' ? -1 : 1;
    const imaginarySign = this.symmetry === 'symmetric' ? 1 : -1;
    for (let e = 0; e < count; e++) {
      const i = row[e];
      const j = column[e];
      const q = next[j]++;
      rowIndex[q] = i;
      if (width === 1) values[q] = from[e];
      else if (width === 2) {
        values[2 * q] = from[2 * e];
        values[2 * q + 1] = from[2 * e + 1];
      }
      if (!mirrored || i === j) continue;
      const m = next[i]++;
      rowIndex[m] = j;
      if (width > 0) values[m * width] = sign * from[e * width];
      if (width === 2) values[2 * m + 1] = imaginarySign * from[2 * e + 1];
    }
    this.stored += count;
    store.count = 0;
  }

  /** Rows sorted, duplicates merged; `duplicates` counts stored entries, not mirrors. */
  finish(merge: 'sum' | 'last'): Columns {
    const c = sortAndMergeInPlace(this.pointer, this.rowIndex, this.values, this.width, merge);
    if (this.symmetry === 'general' || c.duplicates === 0) return c;
    let diagonal = 0;
    for (let j = 0; j < c.columnPointer.length - 1; j++) {
      for (let p = c.columnPointer[j]; p < c.columnPointer[j + 1]; p++) if (c.rowIndex[p] === j) diagonal++;
    }
    const distinct = (c.rowIndex.length + diagonal) / 2;
    return {
      ...c,
      duplicates: this.stored - distinct,
      // a place below the diagonal comes before its mirror, so half of the places listed suffice
      duplicatePlaces: c.duplicatePlaces.filter(([i, j]) => i >= j),
    };
  }
}
