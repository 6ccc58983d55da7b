/** First pass over a coordinate file that can be read again: how many entries each column of the expanded matrix will hold. */
export class ColumnCount {
  readonly rows: number;
  readonly columns: number;
  readonly base: 0 | 1;
  readonly mirrored: boolean;
  /** column -> entries, mirrors included */
  readonly counts: Int32Array;
  entries = 0;
  above = 0;
  below = 0;
  /** false once a line was met that only the careful reader understands (or refuses) */
  plain = true;

  constructor(rows: number, columns: number, base: 0 | 1, mirrored: boolean) {
    this.rows = rows;
    this.columns = columns;
    this.base = base;
    this.mirrored = mirrored;
    this.counts = new Int32Array(columns + 1);
  }

  /** Counts the entries in the whole lines of bytes[start … end); values are not looked at. */
  take(bytes: Uint8Array, start: number, end: number): void {
    const { rows, columns, base, mirrored, counts } = this;
    let p = start;
    while (p < end) {
      let c = bytes[p];
      while (c === 32 || c === 9) c = bytes[++p];
      let d = c ^ 48;
      if (d <= 9) {
        let i = 0;
        do {
          i = i * 10 + d;
          d = bytes[++p] ^ 48;
        } while (d <= 9);
        c = bytes[p];
        while (c === 32 || c === 9) c = bytes[++p];
        d = c ^ 48;
        let j = d <= 9 ? 0 : -1;
        while (d <= 9 && p < end) {
          j = j * 10 + d;
          d = bytes[++p] ^ 48;
        }
        i -= base;
        j -= base;
        if (!(i >= 0 && i < rows && j >= 0 && j < columns)) {
          this.plain = false;
          return;
        }
        this.entries++;
        counts[j]++;
        if (mirrored && i !== j) {
          counts[i]++;
          if (i < j) this.above++;
          else this.below++;
        }
      } else if (c !== 37 && c !== 10 && c !== 13 && p < end) {
        this.plain = false;
        return;
      }
      while (p < end && bytes[p] !== 10 && bytes[p] !== 13) p++;
      if (bytes[p] === 13 && p + 1 < end && bytes[p + 1] === 10) p++;
      p++;
    }
  }
}
