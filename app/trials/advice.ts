import { asText, bytes } from '../figures/format.ts';
import type { Settings } from '../state/settings.ts';
import type { Trial } from '../state/trial.ts';
import { advisedFactorization, type MatrixFacts } from '../workers/rules.ts';
import { compareWorkload } from '../workers/workload.ts';
import { costsOf } from './costs.ts';
import { factorizations, orderings } from './explain.ts';
import type { Figures } from './order.ts';

/** Sentences an engineer would say over the ledger as it stands; and the cautions that go with its figures. */
export interface Advice {
  readonly sentences: readonly string[];
  readonly cautions: readonly string[];
}

export function adviceOn(
  facts: MatrixFacts,
  trials: readonly Trial[],
  figures: Figures,
  { target, workload }: Settings,
): Advice {
  const { memoryBytes } = target;
  const { factorization, reason } = advisedFactorization(facts);
  const sentences = [`Advised: ${factorizations[factorization].name}, because ${reason}.`];
  const done = trials.filter((t) => figures.has(t.id));
  const value = (t: Trial, name: 'factorEntries' | 'peakBytes') => figures.get(t.id)?.[name].value ?? null;
  const best = least(done, (t) => value(t, 'factorEntries'));
  if (best !== null && done.length > 1) {
    const need = value(best, 'peakBytes');
    const name = `${best.letter}, ${orderings[best.choice.ordering].name}`;
    if (need !== null) {
      const fits = need <= memoryBytes ? 'It fits.' : 'It does not fit.';
      sentences.push(
        `Least fill: ${name}, needs ${asText(bytes(need))} at its peak; your limit is ${asText(bytes(memoryBytes))}. ${fits}`,
      );
    }
    const { remark, breakEvens } = compareWorkload(costsOf(done, target.cores), workload);
    if (remark !== null) sentences.push(remark);
    const next = breakEvens.find(
      (e) => e.better === best.letter && e.by === 'factorizations' && e.from > workload.factorizations,
    );
    if (next !== undefined) sentences.push(next.sentence);
  }
  const cautions: string[] = [];
  if (done.some((t) => t.choice.pivoting === 'threshold')) {
    cautions.push(
      'Pivoting for size moves rows: fill, memory and time can then pass the forecast. Only a proof run shows it.',
    );
  }
  if (done.some((t) => t.outcome?.valueDependent)) {
    cautions.push('Figures marked value-dependent hold for these values only, not for others on the same pattern.');
  }
  return { sentences, cautions };
}

function least(trials: readonly Trial[], value: (t: Trial) => number | null): Trial | null {
  let best: Trial | null = null;
  let bestValue = Number.POSITIVE_INFINITY;
  for (const t of trials) {
    const v = value(t);
    if (v !== null && v < bestValue) {
      best = t;
      bestValue = v;
    }
  }
  return best;
}
