import { asText, bytes } from '../figures/format.ts';
import type { Trial } from '../state/trial.ts';
import { advisedFactorization, type MatrixFacts } from '../workers/rules.ts';
import { factorizations, orderings } from './explain.ts';
import type { Figures } from './order.ts';

/** Sentences an engineer would say over the ledger as it stands; and the cautions that go with its figures. */
export interface Advice {
  readonly sentences: readonly string[];
  readonly cautions: readonly string[];
}

export function adviceOn(facts: MatrixFacts, trials: readonly Trial[], figures: Figures, memoryBytes: number): Advice {
  const { factorization, reason } = advisedFactorization(facts);
  const sentences = [`Advised: ${factorizations[factorization].name}, because ${reason}.`];
  const done = trials.filter((t) => figures.has(t.id));
  const value = (t: Trial, name: 'factorEntries' | 'factorBytes' | 'operations') =>
    figures.get(t.id)?.[name].value ?? null;
  const best = least(done, (t) => value(t, 'factorEntries'));
  if (best !== null && done.length > 1) {
    const need = value(best, 'factorBytes');
    const name = `${best.letter}, ${orderings[best.choice.ordering].name}`;
    if (need !== null) {
      const fits = need <= memoryBytes ? 'It fits.' : 'It does not fit.';
      sentences.push(
        `Least fill: ${name}, with factors of ${asText(bytes(need))}; your limit is ${asText(bytes(memoryBytes))}. ${fits}`,
      );
    }
    const fewest = least(done, (t) => value(t, 'operations'));
    if (fewest !== null && fewest.id !== best.id) {
      sentences.push(`Least fill is not least work here: ${fewest.letter} takes fewer operations.`);
    }
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
