import { Fault } from '../../matrix/fault.ts';

/** Largest length of one array of factors, in doubles (1 GiB); a panel that is larger gets an array of its own. */
const chunkLength = 2 ** 27;

/** Longest typed array the engine asks for, in elements. */
const longestArray = 2 ** 31 - 1;

/** An array of factors: double, or rounded to single. */
export type FactorArray = Float64Array | Float32Array;

/** Makes the arrays of a numeric run and knows how many bytes are held now and were held at most. */
export class Allocator {
  /** bytes held now */
  bytes = 0;
  /** high-water mark of `bytes` */
  peakBytes = 0;

  float64(length: number): Float64Array {
    this.take(8 * length, length);
    return this.made(length, () => new Float64Array(length));
  }

  float32(length: number): Float32Array {
    this.take(4 * length, length);
    return this.made(length, () => new Float32Array(length));
  }

  int32(length: number): Int32Array {
    this.take(4 * length, length);
    return this.made(length, () => new Int32Array(length));
  }

  /** Counts an array that is taken over from a finished run. */
  adopt(array: FactorArray): FactorArray {
    this.take(array.byteLength, array.length);
    return array;
  }

  /** States that an array made here is no longer held. */
  release(array: FactorArray | Int32Array): void {
    this.bytes -= array.byteLength;
  }

  private take(bytes: number, length: number): void {
    if (length > longestArray) throw memoryFault(bytes, 'one array would pass 2³¹ − 1 elements');
    this.bytes += bytes;
    if (this.bytes > this.peakBytes) this.peakBytes = this.bytes;
  }

  private made<T>(length: number, make: () => T): T {
    try {
      return make();
    } catch (error) {
      if (error instanceof RangeError) throw memoryFault(8 * length, 'the runtime refused the array');
      throw error;
    }
  }
}

function memoryFault(bytes: number, why: string): Fault {
  const gib = (bytes / 2 ** 30).toFixed(2);
  return new Fault(
    'memory',
    'array-refused',
    `The factorization needs an array of ${gib} GiB and ${why}. Choose an ordering with a smaller forecast, or run it where more memory is available.`,
  );
}

/**
 * Where factor panels live: a few large arrays, filled from the front. A panel lies in one array. Reserved room that a front did not
 * use (delayed pivots) is given back before the next panel.
 */
export class FactorStore {
  readonly chunks: FactorArray[] = [];
  private readonly planned: number[] = [];
  private used = 0;
  /** scalars of the last array that were ever in use: beyond, it is zero as it was made */
  private touched = 0;

  /** scalars of an array that delayed pivots make necessary beyond the plan */
  private readonly extra: number;

  /**
   * @param panels scalars of each panel in the order in which they will be asked for; @param width doubles a scalar
   * @param recycled arrays of an earlier run that may be overwritten; @param single whether the arrays are of single precision
   */
  constructor(
    private readonly allocator: Allocator,
    panels: Float64Array,
    private readonly width: number,
    private readonly recycled: FactorArray[],
    private readonly single: boolean,
  ) {
    const limit = chunkLength / width;
    let room = 0;
    let total = 0;
    for (let s = 0; s < panels.length; s++) {
      if (room > 0 && room + panels[s] > limit) {
        this.planned.push(room);
        room = 0;
      }
      room += panels[s];
      total += panels[s];
    }
    if (room > 0) this.planned.push(room);
    this.planned.reverse();
    this.extra = Math.min(limit, Math.ceil(total / 8) + 1024);
  }

  /** Room for a panel, zeroed; its array is the last of `chunks`. @returns offset in scalars. */
  reserve(scalars: number): number {
    const width = this.width;
    const last = this.chunks.length - 1;
    if (last < 0 || (this.used + scalars) * width > this.chunks[last].length) this.open(scalars);
    const at = this.used;
    this.used += scalars;
    const end = this.used < this.touched ? this.used : this.touched;
    if (end > at) this.chunks[this.chunks.length - 1].fill(0, width * at, width * end);
    if (this.used > this.touched) this.touched = this.used;
    return at;
  }

  /** Starts another array, for a panel of so many scalars to begin with. */
  private open(scalars: number): void {
    const length = this.width * Math.max(scalars, this.planned.pop() ?? this.extra);
    const found = this.recycled.findIndex(
      (array) => array.length >= length && this.single === array instanceof Float32Array,
    );
    this.used = 0;
    this.touched = 0;
    if (found < 0) {
      this.chunks.push(this.single ? this.allocator.float32(length) : this.allocator.float64(length));
      return;
    }
    const [array] = this.recycled.splice(found, 1);
    this.chunks.push(this.allocator.adopt(array));
    this.touched = array.length / this.width;
  }

  /** Gives back the end of the panel reserved last: only `scalars` of it, from `at` on, are kept. */
  keep(at: number, scalars: number): void {
    this.used = at + scalars;
  }
}

/** The arena of contribution blocks, last in, first out. */
export class Stack {
  array: Float64Array;
  /** scalars in use */
  top = 0;
  /** how often it had to grow */
  growths = 0;
  /** most scalars in use at once */
  highest = 0;

  constructor(
    private readonly allocator: Allocator,
    scalars: number,
    private readonly width: number,
  ) {
    this.array = allocator.float64(width * scalars);
  }

  /** Room on top, not zeroed; grows by half where delayed pivots need more than the forecast. @returns offset in scalars. */
  push(scalars: number): number {
    const at = this.top;
    const need = (at + scalars) * this.width;
    if (need > this.array.length) {
      const grown = this.allocator.float64(Math.max(need, Math.ceil(this.array.length * 1.5)));
      grown.set(this.array.subarray(0, at * this.width));
      this.allocator.release(this.array);
      this.array = grown;
      this.growths++;
    }
    this.top = at + scalars;
    if (this.top > this.highest) this.highest = this.top;
    return at;
  }

  /** Moves the block at `from` down to `to` and drops everything above it. */
  settle(from: number, to: number, scalars: number): void {
    if (from !== to) {
      const w = this.width;
      this.array.copyWithin(to * w, from * w, (from + scalars) * w);
    }
    this.top = to + scalars;
  }
}
