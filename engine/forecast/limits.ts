/** Three yes/no lines, each with the figure that decides. */
export interface LimitLine {
  readonly question: string;
  readonly passed: boolean;
  readonly sentence: string;
}

export interface LimitQuestion {
  /** entries of each factor, highest end of the range where there is one */
  readonly largestCount: number;
  /** bytes needed at the peak, on the target */
  readonly peakBytes: number;
  readonly memoryBytes: number;
  /** bytes a run in this page would take */
  readonly pagePeakBytes: number;
  /** bytes this page may use */
  readonly pageMemoryBytes: number;
}

const gib = (bytes: number): string => `${(bytes / 2 ** 30).toPrecision(3)} GiB`;

/** Do counts exceed 2³¹ − 1? Does it fit the target? Can this page run it? `passed` is true when nothing is wrong. */
export function limitLines(q: LimitQuestion): readonly LimitLine[] {
  const counts = q.largestCount <= 2 ** 31 - 1;
  const fits = q.peakBytes <= q.memoryBytes;
  const page = q.pagePeakBytes <= q.pageMemoryBytes;
  return [
    {
      question: 'Do counts exceed 2³¹ − 1?',
      passed: counts,
      sentence: counts
        ? `No: the largest count is ${q.largestCount.toLocaleString('en-US')}; 32-bit indices are enough.`
        : `Yes: a count reaches ${q.largestCount.toLocaleString('en-US')}; the solver needs 64-bit pointers.`,
    },
    {
      question: 'Does it fit the target’s memory?',
      passed: fits,
      sentence: fits
        ? `Yes: it needs ${gib(q.peakBytes)} of ${gib(q.memoryBytes)}.`
        : `No: it needs ${gib(q.peakBytes)}, the target has ${gib(q.memoryBytes)}.`,
    },
    {
      question: 'Can this page run it?',
      passed: page,
      sentence: page
        ? `Yes: a proof here takes ${gib(q.pagePeakBytes)}.`
        : `No: a proof here would take ${gib(q.pagePeakBytes)}, more than the ${gib(q.pageMemoryBytes)} this page may use.`,
    },
  ];
}
