import { Fault } from '../../matrix/fault.ts';

/** Largest length of one array of factors, in doubles (1 GiB); a panel that is larger gets an array of its own. */
const chunkLength = 2 ** 27;

/** Longest typed array the engine asks for, in elements. */
const longestArray = 2 ** 31 - 1;

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

  int32(length: number): Int32Array {
    this.take(4 * length, length);
    return this.made(length, () => new Int32Array(length));
  }

  /** States that an array made here is no longer held. */
  release(array: Float64Array | Int32Array): void {
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
  readonly chunks: Float64Array[] = [];
  private readonly planned: number[] = [];
  private used = 0;
  /** scalars of the last array that were ever in use: beyond, it is zero as it was made */
  private touched = 0;

  /** @param panels scalars of each panel in the order in which they will be asked for; @param width doubles a scalar */
  constructor(
    private readonly allocator: Allocator,
    panels: Float64Array,
    private readonly width: number,
  ) {
    const limit = chunkLength / width;
    let room = 0;
    for (let s = 0; s < panels.length; s++) {
      if (room > 0 && room + panels[s] > limit) {
        this.planned.push(room);
        room = 0;
      }
      room += panels[s];
    }
    if (room > 0) this.planned.push(room);
    this.planned.reverse();
  }

  /** Room for a panel, zeroed; its array is the last of `chunks`. @returns offset in scalars. */
  reserve(scalars: number): number {
    const width = this.width;
    const last = this.chunks.length - 1;
    if (last < 0 || (this.used + scalars) * width > this.chunks[last].length) {
      const planned = this.planned.pop() ?? 0;
      const grown = Math.min(chunkLength / width, Math.max(1024, 8 * scalars));
      this.chunks.push(this.allocator.float64(width * Math.max(scalars, planned > 0 ? planned : grown)));
      this.used = 0;
      this.touched = 0;
    }
    const at = this.used;
    this.used += scalars;
    if (this.touched > at) this.chunks[this.chunks.length - 1].fill(0, width * at, width * this.touched);
    if (this.used > this.touched) this.touched = this.used;
    return at;
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
