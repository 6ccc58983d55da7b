import { assemble } from '../matrix/assemble.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';

/** Collects real or complex entries in any order; duplicates are summed when built. 0-based. */
export class TripletBuilder {
  private row = new Int32Array(1024);
  private column = new Int32Array(1024);
  private values: Float64Array;
  private count = 0;
  private readonly width: 1 | 2;
  readonly rows: number;
  readonly columns: number;

  constructor(rows: number, columns: number, complex = false) {
    this.rows = rows;
    this.columns = columns;
    this.width = complex ? 2 : 1;
    this.values = new Float64Array(1024 * this.width);
  }

  /** Adds a(i,j) += re + im·i. */
  add(i: number, j: number, re: number, im = 0): void {
    const e = this.count++;
    if (e === this.row.length) this.grow();
    this.row[e] = i;
    this.column[e] = j;
    this.values[e * this.width] = re;
    if (this.width === 2) this.values[e * 2 + 1] = im;
  }

  private grow(): void {
    const size = 2 * this.row.length;
    const bigger = <T extends Int32Array | Float64Array>(a: T, b: T): T => {
      b.set(a);
      return b;
    };
    this.row = bigger(this.row, new Int32Array(size));
    this.column = bigger(this.column, new Int32Array(size));
    this.values = bigger(this.values, new Float64Array(size * this.width));
  }

  build(): SparseMatrix {
    return assemble({
      rows: this.rows,
      columns: this.columns,
      field: this.width === 2 ? 'complex' : 'real',
      row: this.row.subarray(0, this.count),
      column: this.column.subarray(0, this.count),
      values: this.values.subarray(0, this.count * this.width),
    }).matrix;
  }
}
