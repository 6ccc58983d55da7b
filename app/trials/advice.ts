import type { Settings } from '../state/settings.ts';
import type { Trial } from '../state/trial.ts';
import { type AdvisedTrial, adviceFor } from '../workers/advice.ts';
import { advisedFactorization, type MatrixFacts } from '../workers/rules.ts';
import { compareWorkload } from '../workers/workload.ts';
import { costsOf } from './costs.ts';
import { sayChoice } from './explain.ts';

/** What an engineer would say over the ledger as it stands: advice in a sentence, its reasons, and what could go wrong. */
export interface Advice {
  readonly sentences: readonly string[];
  readonly reasons: readonly string[];
  readonly cautions: readonly string[];
}

/** Advice on the trials that are finished and forecast, for the target and the workload in force. */
export function adviceOn(
  facts: MatrixFacts,
  trials: readonly Trial[],
  { target, workload }: Pick<Settings, 'target' | 'workload'>,
): Advice {
  const { factorization } = advisedFactorization(facts);
  const done = trials.filter((t) => t.outcome !== null && t.forecast !== null);
  const seen: AdvisedTrial[] = done.flatMap(({ letter, choice, outcome, forecast }) =>
    outcome === null
      ? []
      : [
          {
            name: `${letter} (${sayChoice(choice)})`,
            choice,
            counts: outcome.counts,
            seconds: outcome.seconds,
            valueDependent: outcome.valueDependent,
            forecast,
          },
        ],
  );
  const advice = adviceFor(facts, factorization, seen, target, workload);
  const sentences = [advice.sentence];
  if (advice.change !== null) sentences.push(advice.change);
  const reasons = [...advice.reasons];
  if (done.length > 1) {
    const { remark, breakEvens } = compareWorkload(costsOf(done, target.cores), workload);
    if (remark !== null) reasons.push(remark);
    const ahead = breakEvens.filter((e) => e.by === 'factorizations' && e.from > workload.factorizations);
    reasons.push(...ahead.slice(0, 6).map((e) => e.sentence));
  }
  return { sentences, reasons, cautions: advice.cautions };
}
