import { type Advice, type AdviceTrial, adviseOn } from '../forecast/advice.ts';
import { trialCost } from '../forecast/cost.ts';
import type { TrialForecast } from '../forecast/forecast.ts';
import type { Target, Workload } from '../forecast/target.ts';
import { type Choice, type FactorizationName, factorizationNames } from './choice.ts';
import type { TrialCounts, TrialResult } from './result.ts';
import { advisedFactorization, defaultChoice, type MatrixFacts, nameOf, whyNoProof } from './rules.ts';

/** A finished trial with its forecast, as far as advice needs it; plain data. */
export interface AdvisedTrial {
  /** how it is called in sentences */
  readonly name: string;
  readonly choice: Choice;
  readonly counts: Pick<TrialCounts, 'factorEntries'>;
  readonly seconds: TrialResult['seconds'];
  readonly valueDependent: boolean;
  readonly forecast: TrialForecast | null;
}

/** What the choice of a factorization rests on without a run. */
export function doubtsOf(facts: MatrixFacts, factorization: FactorizationName): readonly string[] {
  const out: string[] = [];
  if (!facts.hasValues) out.push('Only a pattern is known: values can ask for another factorization.');
  else if (factorization === 'cholesky' && facts.hermitian) {
    out.push(
      'A positive diagonal does not make a matrix positive definite: a run proves it, or names the row that breaks it.',
    );
  }
  if (factorization === 'ldlt' && facts.zeroDiagonals > 0) {
    out.push(
      `${facts.zeroDiagonals.toLocaleString('en-US')} diagonal entries are zero or absent: 2×2 pivots will come; pairing by structure (matching "structural") lets the forecast know of them.`,
    );
  }
  if (facts.notFinite > 0)
    out.push(`${facts.notFinite.toLocaleString('en-US')} values are not finite: no run is possible.`);
  return out;
}

/** Which factorizations a numeric run could take on these values, and why the others could not. */
export function possibleFactorizations(facts: MatrixFacts): readonly string[] {
  const possible: string[] = [];
  const not: string[] = [];
  for (const name of factorizationNames) {
    const why = whyNoProof(facts, defaultChoice(name, 'natural'));
    if (why === null) possible.push(nameOf(name));
    else not.push(why);
  }
  const out: string[] = possible.length === 0 ? [] : [`A run could factorize it by ${listed(possible)}.`];
  // one sentence often stands for several factorizations
  return [...out, ...new Set(not)];
}

function listed(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words[words.length - 1]}`;
}

/** Advice over finished trials of one matrix, for a target and a workload. Trials without a forecast are left out. */
export function adviceFor(
  facts: MatrixFacts,
  factorization: FactorizationName,
  trials: readonly AdvisedTrial[],
  target: Target,
  workload: Workload,
): Advice {
  const advised = advisedFactorization(facts);
  const seen: AdviceTrial[] = trials.flatMap(({ name, choice, counts, seconds, valueDependent, forecast }) => {
    if (forecast === null) return [];
    const analysis = seconds.ordering + seconds.symbolic;
    return [
      {
        name,
        cost: trialCost(forecast, target.cores, analysis, counts.factorEntries ?? 0, name),
        peak: forecast.peak,
        countsFit: forecast.limits[0].passed,
        pivoted: choice.pivoting === 'threshold',
        valueDependent,
      },
    ];
  });
  const advice = adviseOn({
    factorization: nameOf(factorization),
    reason:
      advised.factorization === factorization
        ? `${nameOf(factorization)} is advised because ${advised.reason}.`
        : `${nameOf(factorization)} was asked for; ${nameOf(advised.factorization)} is advised because ${advised.reason}.`,
    doubts: doubtsOf(facts, factorization),
    trials: seen,
    target,
    workload,
  });
  const [first, ...rest] = advice.reasons;
  return { ...advice, reasons: [first, ...possibleFactorizations(facts), ...rest] };
}
