import type { NewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { bestOf, type PortfolioSpread } from '../ordering/bestOf.ts';
import type { OrderingResult } from '../ordering/ordering.ts';
import { arrange, type OrderingTask } from './arrange.ts';
import type { Choice, MeasureName, OrderingName } from './choice.ts';
import { isFixed } from './order.ts';
import { type MatrixFacts, suitableOrderings } from './rules.ts';

/** What a portfolio tried, and what it kept. */
export interface PortfolioReport {
  readonly measure: MeasureName;
  /** value of the kept order by that measure */
  readonly value: number;
  readonly trials: readonly {
    readonly ordering: OrderingName;
    readonly seed: number;
    readonly relabelling: number | null;
    readonly value: number;
  }[];
  readonly spread: readonly PortfolioSpread[];
  /** whether the time limit cut it short */
  readonly stopped: boolean;
}

/** The most promising first, so that a time limit cuts the others. */
const promise: readonly OrderingName[] = [
  'minimum-degree',
  'column-minimum-degree',
  'minimum-fill',
  'nested-dissection',
  'geometric-dissection',
  'imported',
  'reverse-cuthill-mckee',
  'sloan',
  'natural',
];

/** The orderings that a portfolio runs, in their order. */
export function membersOf(facts: MatrixFacts, choice: Choice): readonly OrderingName[] {
  const named = choice.portfolio.members;
  if (named !== null) return named;
  const suitable = suitableOrderings(facts, choice.factorization);
  return promise.filter((name) => suitable.includes(name));
}

/**
 * Runs the portfolio of a choice and keeps the best.
 * @param measure value of a requested order, smaller is better
 * @returns the order and the choice that makes it again without a portfolio
 */
export function arrangeBest(
  task: OrderingTask,
  choice: Choice,
  members: readonly OrderingName[],
  measure: (order: NewToOld) => number,
  progress: Progress,
): { result: OrderingResult; ran: Choice; report: PortfolioReport } {
  const { rounds, timeLimit } = choice.portfolio;
  const seeds = Array.from({ length: rounds }, (_, k) => choice.seed + k);
  const choiceFor = (ordering: OrderingName, seed: number): Choice => ({
    ...choice,
    ordering,
    seed,
    // the first round takes the numbering as the choice has it
    relabelling: seed === choice.seed || isFixed(ordering) ? choice.relabelling : seed,
  });
  const best = bestOf(
    task.pattern,
    members.map((name) => ({
      name,
      order: (_pattern, { seed = choice.seed }, tick) => arrange(task, choiceFor(name, seed), tick),
    })),
    {
      measure,
      seeds,
      relabel: false,
      clock: () => performance.now() / 1000,
      ...(timeLimit === null ? {} : { timeLimit }),
    },
    progress,
  );
  const ran = choiceFor(members[best.member], best.seed);
  const tried = `Best of ${best.trials.length} trials by ${choice.portfolio.measure}: ${ran.ordering}, seed ${ran.seed}${best.stopped ? '; the time limit ended the portfolio' : ''}`;
  return {
    result: {
      order: best.order,
      notes: [tried, ...best.notes],
      ...(best.separators ? { separators: best.separators } : {}),
    },
    ran,
    report: {
      measure: choice.portfolio.measure,
      value: best.value,
      trials: best.trials.map((t) => {
        const c = choiceFor(members[t.member], t.seed);
        return { ordering: c.ordering, seed: c.seed, relabelling: c.relabelling, value: t.value };
      }),
      spread: best.spread,
      stopped: best.stopped,
    },
  };
}
