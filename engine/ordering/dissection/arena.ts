/**
 * A bump arena of 32-bit integers: a stack of chunks from which views are cut and to which they return all at once.
 * A dissection works depth first, so the work arrays of one recursion level live exactly between a mark and its release.
 */
export class IntegerArena {
  private readonly chunks: Int32Array[] = [];
  private chunk = 0;
  private top = 0;
  private readonly chunkLength: number;

  /** `chunkLength`: integers of a chunk; longer requests get a chunk of their own. */
  constructor(chunkLength: number) {
    this.chunkLength = Math.max(1024, chunkLength);
  }

  /** A view of `length` integers with arbitrary contents. */
  take(length: number): Int32Array {
    while (this.chunk < this.chunks.length && this.top + length > this.chunks[this.chunk].length) {
      this.chunk++;
      this.top = 0;
    }
    if (this.chunk === this.chunks.length) {
      this.chunks.push(new Int32Array(Math.max(length, this.chunkLength)));
    }
    const view = this.chunks[this.chunk].subarray(this.top, this.top + length);
    this.top += length;
    return view;
  }

  /** Gives back the end of the view taken last, of which only the first `used` integers are needed. */
  trim(view: Int32Array, used: number): Int32Array {
    this.top -= view.length - used;
    return view.subarray(0, used);
  }

  /** The present height of the stack, for `release`. Exact: below 2⁵³. */
  mark(): number {
    return this.chunk * 4294967296 + this.top;
  }

  /** Returns everything taken since that mark. */
  release(mark: number): void {
    this.chunk = Math.floor(mark / 4294967296);
    this.top = mark - this.chunk * 4294967296;
  }
}
