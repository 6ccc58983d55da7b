/**
 * A binary heap of vertices by integer gain, largest on top, with the place of every vertex known so that gains can be
 * changed. Ties are decided by the course of the heap alone, so by nothing but the sequence of calls.
 */
export class GainHeap {
  private readonly heap: Int32Array;
  /** vertex -> its place in the heap, −1 when absent */
  private readonly place: Int32Array;
  private readonly gain: Int32Array;
  size = 0;

  /** Room for vertices 0 … capacity − 1. */
  constructor(capacity: number) {
    this.heap = new Int32Array(capacity);
    this.place = new Int32Array(capacity).fill(-1);
    this.gain = new Int32Array(capacity);
  }

  clear(): void {
    for (let k = 0; k < this.size; k++) this.place[this.heap[k]] = -1;
    this.size = 0;
  }

  has(v: number): boolean {
    return this.place[v] >= 0;
  }

  /** The vertex on top; the heap must not be empty. */
  top(): number {
    return this.heap[0];
  }

  /** The gain on top; the heap must not be empty. */
  topGain(): number {
    return this.gain[this.heap[0]];
  }

  /** Adds a vertex that is not in the heap. */
  push(v: number, gain: number): void {
    this.gain[v] = gain;
    this.rise(this.size++, v, gain);
  }

  /** Changes the gain of a vertex by `change`; no effect when it is not in the heap. */
  change(v: number, change: number): void {
    const at = this.place[v];
    if (at < 0) return;
    const gain = this.gain[v] + change;
    this.gain[v] = gain;
    if (change > 0) this.rise(at, v, gain);
    else this.sink(at, v, gain);
  }

  /** Takes a vertex out; no effect when it is not in the heap. */
  remove(v: number): void {
    const at = this.place[v];
    if (at < 0) return;
    this.place[v] = -1;
    const last = this.heap[--this.size];
    if (last === v) return;
    const gain = this.gain[last];
    if (gain > this.gain[v]) this.rise(at, last, gain);
    else this.sink(at, last, gain);
  }

  private rise(from: number, v: number, gain: number): void {
    const { heap, place } = this;
    let at = from;
    while (at > 0) {
      const up = (at - 1) >> 1;
      const u = heap[up];
      if (this.gain[u] >= gain) break;
      heap[at] = u;
      place[u] = at;
      at = up;
    }
    heap[at] = v;
    place[v] = at;
  }

  private sink(from: number, v: number, gain: number): void {
    const { heap, place, size } = this;
    let at = from;
    for (;;) {
      let down = 2 * at + 1;
      if (down >= size) break;
      let u = heap[down];
      if (down + 1 < size && this.gain[heap[down + 1]] > this.gain[u]) u = heap[++down];
      if (this.gain[u] <= gain) break;
      heap[at] = u;
      place[u] = at;
      at = down;
    }
    heap[at] = v;
    place[v] = at;
  }
}
