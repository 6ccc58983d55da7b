/** Three yes/no lines, each with the figure that decides. */
export interface LimitLine {
  readonly question: string;
  readonly passed: boolean;
  readonly sentence: string;
}

export interface LimitQuestion {
  /** entries of the factors: exact, or expected */
  readonly largestCount: number;
  /** proven high end of that count where pivots can move it; null else */
  readonly highestCount: number | null;
  /** bytes needed at the peak, on the target */
  readonly peakBytes: number;
  /** modelled bytes where many pivots are delayed; null where none can be */
  readonly delayedBytes: number | null;
  readonly memoryBytes: number;
  /** bytes a run in this page would take */
  readonly pagePeakBytes: number;
  /** bytes this page may use */
  readonly pageMemoryBytes: number;
}

/** Bytes in the unit that fits. */
export function inUnit(bytes: number): string {
  if (bytes >= 2 ** 30 / 10) return `${(bytes / 2 ** 30).toPrecision(3)} GiB`;
  return bytes >= 2 ** 20 / 10 ? `${(bytes / 2 ** 20).toPrecision(3)} MiB` : `${(bytes / 2 ** 10).toPrecision(3)} KiB`;
}

/** Do counts exceed 2³¹ − 1? Does it fit the target? Can this page run it? `passed` is true when nothing is wrong. */
export function limitLines(q: LimitQuestion): readonly LimitLine[] {
  const counts = q.largestCount <= 2 ** 31 - 1;
  const fits = q.peakBytes <= q.memoryBytes;
  const highest =
    q.highestCount !== null && q.highestCount > 2 ** 31 - 1
      ? `; the proven worst case of pivoting, ${q.highestCount.toLocaleString('en-US')}, would pass them`
      : '';
  const delayed =
    q.delayedBytes !== null && q.delayedBytes > q.memoryBytes
      ? ` With a fifth of the pivots delayed it would need ${inUnit(q.delayedBytes)} (modelled) and would not.`
      : '';
  const page = q.pagePeakBytes <= q.pageMemoryBytes;
  return [
    {
      question: 'Do counts exceed 2³¹ − 1?',
      passed: counts,
      sentence: counts
        ? `No: the largest count is ${q.largestCount.toLocaleString('en-US')}; 32-bit pointers are enough${highest}.`
        : `Yes: a count reaches ${q.largestCount.toLocaleString('en-US')}; the solver needs 64-bit pointers.`,
    },
    {
      question: 'Does it fit the target’s memory?',
      passed: fits,
      sentence: fits
        ? `Yes: it needs ${inUnit(q.peakBytes)} of ${inUnit(q.memoryBytes)}.${delayed}`
        : `No: it needs ${inUnit(q.peakBytes)}, the target has ${inUnit(q.memoryBytes)}.`,
    },
    {
      question: 'Can this page run it?',
      passed: page,
      sentence: page
        ? `Yes: a proof here takes ${inUnit(q.pagePeakBytes)}.`
        : `No: a proof here would take ${inUnit(q.pagePeakBytes)}, more than the ${inUnit(q.pageMemoryBytes)} this page may use.`,
    },
  ];
}
