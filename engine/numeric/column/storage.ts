import { Fault } from '../../matrix/fault.ts';

/** Bytes alive in the arrays of one run, and their high-water mark. */
export class ByteMeter {
  live = 0;
  peak = 0;

  add(bytes: number): void {
    this.live += bytes;
    if (this.live > this.peak) this.peak = this.live;
  }

  release(bytes: number): void {
    this.live -= bytes;
  }
}

/** Row indices and values that grow by doubling. Arrays are replaced on growth: read them anew after `reserve`. */
export class GrowingEntries {
  index: Int32Array;
  values: Float64Array;
  /** entries in use */
  count = 0;
  private readonly width: 1 | 2;
  private readonly meter: ByteMeter;

  constructor(capacity: number, width: 1 | 2, meter: ByteMeter) {
    this.width = width;
    this.meter = meter;
    this.index = new Int32Array(capacity);
    this.values = new Float64Array(capacity * width);
    meter.add(this.index.byteLength + this.values.byteLength);
  }

  /** Makes room for `extra` more entries. */
  reserve(extra: number): void {
    const need = this.count + extra;
    if (need <= this.index.length) return;
    const limit = 2 ** 31 - 1;
    if (need > limit) {
      throw new Fault(
        'memory',
        'factor-entries-limit',
        `A factor would pass ${limit} entries, the most that 32-bit counts can address.`,
      );
    }
    const capacity = Math.min(limit, Math.max(need, 2 * this.index.length));
    const old = this.index.byteLength + this.values.byteLength;
    try {
      const index = new Int32Array(capacity);
      const values = new Float64Array(capacity * this.width);
      this.meter.add(index.byteLength + values.byteLength);
      index.set(this.index.subarray(0, this.count));
      values.set(this.values.subarray(0, this.count * this.width));
      this.index = index;
      this.values = values;
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      const bytes = capacity * (4 + 8 * this.width);
      throw new Fault(
        'memory',
        'factor-does-not-fit',
        `The factors outgrew memory: ${bytes} bytes more were asked for after ${this.count} entries.`,
      );
    }
    this.meter.release(old);
  }
}
