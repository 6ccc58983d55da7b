import type { AccuracyCard } from '../numeric/accuracy/card.ts';
import type { Proof } from '../trial/proof.ts';
import type { TrialResult } from '../trial/result.ts';
import type { Reuse } from '../trial/reuse.ts';
import type { SchurRun } from '../trial/schurProof.ts';
import type { SweepRow } from '../trial/sweep.ts';
import { shortBytes, shortNumber, shortSeconds, tableText } from './output.ts';

/** The run as JSON. */
export function proofJson(trial: TrialResult, proof: Proof): Record<string, unknown> {
  const { card, report } = proof;
  const complex = card.determinantSign !== null && card.determinantSign[1] !== 0;
  return {
    ordering: trial.choice.ordering,
    factorization: trial.choice.factorization,
    factorEntries: report.factorEntries,
    operations: proof.operations,
    storedFactorEntries: report.storedFactorEntries,
    executedOperations: report.executedOperations,
    peakBytes: report.peakBytes,
    forecast: proof.forecast,
    seconds: proof.seconds,
    backwardError: card.backwardError,
    unrefinedBackwardError: card.unrefinedBackwardError,
    componentwiseBackwardError: card.componentwiseBackwardError,
    refinement: card.refinement,
    rightHandSides: card.rightHandSides,
    conditionEstimate: card.conditionEstimate,
    forwardErrorEstimate: card.forwardErrorEstimate,
    trustedDigits: card.trustedDigits,
    pivotGrowth: card.pivotGrowth,
    pivots: card.pivots,
    smallestPivot: card.smallestPivot,
    largestPivot: card.largestPivot,
    inertia: card.inertia,
    logAbsDeterminant: card.logAbsDeterminant,
    determinantSign: complex ? card.determinantSign : (card.determinantSign?.[0] ?? null),
    verdict: card.verdict,
    reasons: card.reasons,
    missing: card.missing,
    cautions: card.cautions,
    choice: trial.choice,
    valueDependent: trial.valueDependent,
    notes: [...trial.notes, ...report.notes],
  };
}

/** The run in words. */
export function proofText(trial: TrialResult, proof: Proof): string {
  const { card, report, forecast, seconds } = proof;
  const side = tableText([
    ['', 'forecast', 'measured'],
    ['factor entries', shortNumber(forecast.factorEntries), shortNumber(report.factorEntries)],
    ['operations', shortNumber(forecast.operations), shortNumber(proof.operations)],
    ['peak bytes', shortBytes(forecast.peakBytes), shortBytes(report.peakBytes)],
  ]);
  const lines = [
    `${trial.choice.factorization} in the ordering ${trial.choice.ordering}, pivoting ${trial.choice.pivoting}`,
    '',
    side,
    '',
    `seconds, measured: ordering ${seconds.ordering.toFixed(3)}, symbolic ${seconds.symbolic.toFixed(3)}, numeric ${seconds.numeric.toFixed(3)}, solve ${seconds.solve.toFixed(3)}`,
    `backward error: normwise ${figure(card.backwardError)} (${figure(card.unrefinedBackwardError)} before refinement), componentwise ${figure(card.componentwiseBackwardError)}`,
    `condition estimate (1-norm, from below): ${figure(card.conditionEstimate)}; pivot growth ${figure(card.pivotGrowth)}`,
    `pivots: ${card.pivots.offDiagonal} off the diagonal, ${card.pivots.delayed} delayed, ${card.pivots.twoByTwo} of order two, ${card.pivots.perturbed} perturbed`,
  ];
  if (card.inertia !== null) lines.push(`inertia (+, −, 0): ${card.inertia.join(', ')}`);
  lines.push(card.trustedDigits === null ? 'trusted digits: –' : `about ${card.trustedDigits} digits can be trusted`);
  lines.push('', ...verdictLines(card));
  return lines.join('\n');
}

const figure = (x: number | null): string => (x === null ? '–' : x.toExponential(2));

const verdictLines = ({ verdict, reasons, cautions }: AccuracyCard): string[] => [
  `verdict: ${verdict}`,
  ...reasons.map((reason) => `  ${reason}`),
  ...cautions.map((caution) => `  ${caution}`),
];

const headOf = ({ choice }: TrialResult) => ({ ordering: choice.ordering, factorization: choice.factorization });

export function sweepJson(trial: TrialResult, rows: readonly SweepRow[]): Record<string, unknown> {
  return { ...headOf(trial), sweep: rows };
}

export function sweepText(trial: TrialResult, rows: readonly SweepRow[]): string {
  const table = tableText([
    [
      'pivoting',
      'factor entries',
      'numeric',
      'growth',
      'unrefined',
      'backward error',
      'delayed',
      '2×2',
      'replaced',
      'verdict',
    ],
    ...rows.map((r) => [
      r.threshold === null ? 'static' : `threshold ${r.threshold}`,
      shortNumber(r.factorEntries),
      shortSeconds(r.seconds),
      figure(r.pivotGrowth),
      figure(r.unrefinedBackwardError),
      figure(r.backwardError),
      String(r.delayed),
      String(r.twoByTwo),
      String(r.perturbed),
      r.verdict ?? 'not completed',
    ]),
  ]);
  const failures = rows.flatMap((r) => (r.failure === null ? [] : [`${r.threshold ?? 'static'}: ${r.failure}`]));
  return [
    `${trial.choice.factorization} in the ordering ${trial.choice.ordering}, swept over pivot thresholds`,
    '',
    table,
    ...failures,
  ].join('\n');
}

export function reuseJson(trial: TrialResult, reuse: Reuse): Record<string, unknown> {
  const { difference: d, reused, notices, card, report, seconds } = reuse;
  return {
    ...headOf(trial),
    samePattern: d.samePattern,
    newPositions: d.added.count,
    gonePositions: d.missing.count,
    changedValues: d.values?.changed ?? null,
    reused,
    notices,
    factorEntries: report.factorEntries,
    peakBytes: report.peakBytes,
    backwardError: card.backwardError,
    unrefinedBackwardError: card.unrefinedBackwardError,
    pivotGrowth: card.pivotGrowth,
    pivots: card.pivots,
    verdict: card.verdict,
    reasons: card.reasons,
    seconds,
  };
}

export function reuseText(_trial: TrialResult, { notices, card, seconds }: Reuse): string {
  return [
    ...notices,
    '',
    `numeric phase: first ${shortSeconds(seconds.first)}, second ${shortSeconds(seconds.second)}${seconds.analysis > 0 ? ` after a new analysis of ${shortSeconds(seconds.analysis)}` : ', no analysis'}`,
    `backward error of the second: ${figure(card.backwardError)}; pivot growth ${figure(card.pivotGrowth)}`,
    '',
    ...verdictLines(card),
  ].join('\n');
}

export function schurJson(trial: TrialResult, run: SchurRun, path: string): Record<string, unknown> {
  const { complement, report, seconds, notes } = run;
  return {
    ...headOf(trial),
    schur: {
      size: complement.size,
      appended: complement.appended,
      originalRows: Array.from(complement.rows, (r) => r + 1),
      file: path,
    },
    factorEntries: report.factorEntries,
    peakBytes: report.peakBytes,
    pivots: report.counts,
    seconds,
    notes,
  };
}

export function schurText(_trial: TrialResult, { complement, seconds, notes }: SchurRun, path: string): string {
  return [
    `Schur complement onto ${complement.size} unknowns, made in ${shortSeconds(seconds)}, written to ${path}.`,
    ...notes,
  ].join('\n');
}
