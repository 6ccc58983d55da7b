/**
 * A binary heap of rows by their distance, with decrease-key. Ties go to the smaller row, so that results do not depend on the
 * order of insertion. Typed arrays sized once.
 */
export class RowHeap {
  private readonly row: Int32Array;
  /** row -> its place in the heap, −1 outside */
  private readonly place: Int32Array;
  private readonly distance: Float64Array;
  private count = 0;

  /** @param distance row -> key, owned by the caller; change it through `lower` only */
  constructor(rows: number, distance: Float64Array) {
    this.row = new Int32Array(rows);
    this.place = new Int32Array(rows).fill(-1);
    this.distance = distance;
  }

  get isEmpty(): boolean {
    return this.count === 0;
  }

  /** The row of smallest distance; not for an empty heap. */
  top(): number {
    return this.row[0];
  }

  /** Gives a row a smaller distance, and puts it in if it is not there. */
  lower(row: number, distance: number): void {
    this.distance[row] = distance;
    let at = this.place[row];
    if (at < 0) at = this.count++;
    while (at > 0) {
      const parent = (at - 1) >> 1;
      const other = this.row[parent];
      if (!this.before(row, other)) break;
      this.row[at] = other;
      this.place[other] = at;
      at = parent;
    }
    this.row[at] = row;
    this.place[row] = at;
  }

  /** Takes the row of smallest distance out. */
  pop(): number {
    const top = this.row[0];
    this.place[top] = -1;
    const last = this.row[--this.count];
    if (this.count === 0) return top;
    let at = 0;
    for (;;) {
      let child = 2 * at + 1;
      if (child >= this.count) break;
      if (child + 1 < this.count && this.before(this.row[child + 1], this.row[child])) child++;
      if (!this.before(this.row[child], last)) break;
      this.row[at] = this.row[child];
      this.place[this.row[at]] = at;
      at = child;
    }
    this.row[at] = last;
    this.place[last] = at;
    return top;
  }

  /** Empties the heap in time proportional to what is in it. */
  clear(): void {
    for (let k = 0; k < this.count; k++) this.place[this.row[k]] = -1;
    this.count = 0;
  }

  private before(a: number, b: number): boolean {
    const d = this.distance[a] - this.distance[b];
    return d < 0 || (d === 0 && a < b);
  }
}
