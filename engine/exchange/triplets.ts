/** Entries as they come out of a file, in growing arrays. 0-based. */
export class TripletStore {
  row: Int32Array;
  column: Int32Array;
  /** `width` doubles an entry; length 0 for a pattern */
  values: Float64Array;
  readonly width: 0 | 1 | 2;
  count = 0;

  /** `expected`: entries to make room for at once. */
  constructor(width: 0 | 1 | 2, expected: number) {
    this.width = width;
    const size = Math.max(16, expected);
    this.row = new Int32Array(size);
    this.column = new Int32Array(size);
    this.values = new Float64Array(size * width);
  }

  /** Makes room for at least `more` further entries. */
  reserve(more: number): void {
    const need = this.count + more;
    if (need <= this.row.length) return;
    const size = Math.max(need, Math.ceil(1.5 * this.row.length));
    this.row = grown(this.row, new Int32Array(size));
    this.column = grown(this.column, new Int32Array(size));
    this.values = grown(this.values, new Float64Array(size * this.width));
  }
}

function grown<T extends Int32Array | Float64Array>(from: T, into: T): T {
  into.set(from);
  return into;
}
