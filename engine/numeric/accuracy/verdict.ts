/** Green, amber or red: judged by measured errors, never by the absence of an exception. */
export type Verdict = 'green' | 'amber' | 'red';

/** The limits, common practice chosen for this house; no outside source. */
export const limits = {
  /** green needs a normwise backward error of at most this */
  greenNormwise: 1e-12,
  /** green needs a componentwise backward error of at most this */
  greenComponentwise: 1e-10,
  /** green needs at least this many trusted digits */
  greenDigits: 1,
  /** red beyond this normwise backward error */
  redNormwise: 1e-8,
} as const;

/** What is judged for one right-hand side: the iterate returned. */
export interface JudgedColumn {
  /** how the user knows it: "right-hand side 1", "A·1" */
  readonly name: string;
  /** NaN where not finite */
  readonly backwardError: number;
  readonly componentwiseBackwardError: number;
  /** whether every number of the solution is finite */
  readonly finite: boolean;
}

/** The verdict over all right-hand sides with its reasons in words; there is always at least one reason. */
export function judge(
  columns: readonly JudgedColumn[],
  forwardError: number | null,
  digits: number | null,
  whyNoForwardError: string | null,
): { verdict: Verdict; reasons: string[] } {
  const red: string[] = [];
  const amber: string[] = [];
  for (const c of columns) {
    if (!c.finite || !Number.isFinite(c.backwardError) || !Number.isFinite(c.componentwiseBackwardError)) {
      red.push(`${c.name}: the solution or its residual is not finite.`);
    } else if (c.backwardError > limits.redNormwise) {
      red.push(`${c.name}: normwise backward error ${show(c.backwardError)} is above ${show(limits.redNormwise)}.`);
    } else {
      if (c.backwardError > limits.greenNormwise) {
        amber.push(
          `${c.name}: normwise backward error ${show(c.backwardError)} is above ${show(limits.greenNormwise)}.`,
        );
      }
      if (c.componentwiseBackwardError > limits.greenComponentwise) {
        const error = show(c.componentwiseBackwardError);
        amber.push(`${c.name}: componentwise backward error ${error} is above ${show(limits.greenComponentwise)}.`);
      }
    }
  }
  if (columns.length === 0) amber.push('There was nothing to solve, so nothing was measured.');
  else if (digits === null) {
    amber.push(`No digit can be promised: ${whyNoForwardError ?? 'there is no estimate of the forward error'}.`);
  } else if (digits < limits.greenDigits) {
    amber.push(`No digit can be trusted: the forward error is estimated at ${show(forwardError ?? Number.NaN)}.`);
  }
  if (red.length > 0) return { verdict: 'red', reasons: [...red, ...amber] };
  if (amber.length > 0) return { verdict: 'amber', reasons: amber };
  const worst = (f: (c: JudgedColumn) => number) => show(Math.max(...columns.map(f)));
  return {
    verdict: 'green',
    reasons: [
      `Over ${columns.length} right-hand sides the backward error is at most ${worst((c) => c.backwardError)} normwise and ` +
        `${worst((c) => c.componentwiseBackwardError)} componentwise; about ${digits} digits can be trusted.`,
    ],
  };
}

function show(x: number): string {
  return x.toExponential(1);
}
