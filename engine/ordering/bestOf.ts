import { Fault } from '../matrix/fault.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld, composeOrders, type NewToOld, positionOf } from '../matrix/permutation.ts';
import { permutePattern } from '../matrix/permute.ts';
import type { Progress } from '../matrix/progress.ts';
import { Random } from '../matrix/random.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

/** One member of a portfolio. */
export interface PortfolioMember {
  readonly name: string;
  /** the ordering with everything but seed and held-last unknowns decided */
  readonly order: (pattern: Pattern, options: OrderingOptions, progress: Progress) => OrderingResult;
}

export interface BestOfOptions {
  /** what an order costs, smaller is better: factor entries, operations, peak bytes, critical path, … */
  readonly measure: (order: NewToOld, pattern: Pattern) => number;
  /** seeds, one trial of every member for each; default 1 alone. The first runs on the numbering as given. */
  readonly seeds?: readonly number[];
  /** whether the trials after the first also relabel the unknowns (square patterns only); default true */
  readonly relabel?: boolean;
  /** seconds on some clock of the caller; default none, and then no limit */
  readonly clock?: () => number;
  /** seconds after which no trial is started and the running one is dropped; default none. The first trial always ends. */
  readonly timeLimit?: number;
  /** unknowns kept at the end, as in every ordering */
  readonly heldLast?: Int32Array;
}

/** One trial that ended. */
export interface PortfolioTrial {
  readonly member: number;
  readonly seed: number;
  readonly relabelled: boolean;
  readonly value: number;
}

/** What the trials of one member showed. */
export interface PortfolioSpread {
  readonly name: string;
  readonly trials: number;
  /** null without trials */
  readonly least: number | null;
  readonly median: number | null;
  readonly most: number | null;
  /** its values and those of the winning member overlap: the two cannot be told apart */
  readonly noDifference: boolean;
}

export interface BestOfResult extends OrderingResult {
  /** place of the winning member in the portfolio, the seed and the value of the kept order */
  readonly member: number;
  readonly seed: number;
  readonly value: number;
  readonly trials: readonly PortfolioTrial[];
  readonly spread: readonly PortfolioSpread[];
  /** whether the time limit cut the portfolio short */
  readonly stopped: boolean;
}

/** Thrown through a running trial when its time is over; never leaves this file. */
class TimeOver extends Error {}

/**
 * Runs every member with every seed, seed by seed so that a time limit cuts all members alike, and keeps the order with
 * the least measure. A relabelled trial orders P·A·Pᵀ for a random P and carries the order back: its value shows how
 * far a member's result hangs on the numbering. Replaying the kept trial needs its member, seed and `relabelled` only.
 * Throws `Fault` "portfolio-empty" without members or seeds; what a member throws passes through.
 */
export function bestOf(
  pattern: Pattern,
  members: readonly PortfolioMember[],
  options: BestOfOptions,
  progress: Progress,
): BestOfResult {
  const { seeds = [1], relabel = true, clock, timeLimit } = options;
  if (members.length === 0 || seeds.length === 0) {
    throw new Fault('input', 'portfolio-empty', 'A portfolio needs at least one ordering and one seed.');
  }
  const end = clock === undefined || timeLimit === undefined ? null : clock() + timeLimit;
  const isOver = (): boolean => end !== null && clock !== undefined && clock() >= end;
  const trials: PortfolioTrial[] = [];
  let best: { trial: PortfolioTrial; result: OrderingResult } | null = null;
  const total = members.length * seeds.length;
  let stopped = false;
  for (let k = 0; k < total && !stopped; k++) {
    const member = k % members.length;
    const round = Math.floor(k / members.length);
    const relabelled = relabel && round > 0 && pattern.rows === pattern.columns;
    const watch: Progress = (fraction, phase) => {
      progress((k + fraction) / total, `${members[member].name}: ${phase}`);
      if (best !== null && isOver()) throw new TimeOver();
    };
    try {
      if (best !== null && isOver()) throw new TimeOver();
      const result = runTrial(pattern, members[member], seeds[round], relabelled, options.heldLast, watch);
      const trial = { member, seed: seeds[round], relabelled, value: options.measure(result.order, pattern) };
      trials.push(trial);
      if (best === null || trial.value < best.trial.value) best = { trial, result };
    } catch (error) {
      if (!(error instanceof TimeOver)) throw error;
      stopped = true;
    }
  }
  if (best === null) throw new Error('a portfolio without a trial');
  const { trial, result } = best;
  return {
    ...result,
    member: trial.member,
    seed: trial.seed,
    value: trial.value,
    trials,
    spread: spreadOf(members, trials, trial.member),
    stopped,
  };
}

/** The relabelling that belongs to a seed: new-to-old. */
export function relabellingOf(n: number, seed: number): NewToOld {
  const order = new Int32Array(n);
  for (let i = 0; i < n; i++) order[i] = i;
  return asNewToOld(new Random(seed).shuffleInPlace(order));
}

function runTrial(
  pattern: Pattern,
  member: PortfolioMember,
  seed: number,
  relabelled: boolean,
  heldLast: Int32Array | undefined,
  progress: Progress,
): OrderingResult {
  if (!relabelled) return member.order(pattern, heldLast === undefined ? { seed } : { seed, heldLast }, progress);
  const label = relabellingOf(pattern.columns, seed);
  const position = positionOf(label);
  const held = heldLast?.map((i) => position[i]);
  const other = permutePattern(pattern, label, label);
  const result = member.order(other, held === undefined ? { seed } : { seed, heldLast: held }, progress);
  return { ...result, order: composeOrders(label, result.order) };
}

function spreadOf(
  members: readonly PortfolioMember[],
  trials: readonly PortfolioTrial[],
  winner: number,
): PortfolioSpread[] {
  const valuesOf = (member: number): number[] =>
    trials
      .filter((t) => t.member === member)
      .map((t) => t.value)
      .sort((x, y) => x - y);
  const won = valuesOf(winner);
  return members.map((m, member) => {
    const values = valuesOf(member);
    const count = values.length;
    if (count === 0) return { name: m.name, trials: 0, least: null, median: null, most: null, noDifference: false };
    return {
      name: m.name,
      trials: count,
      least: values[0],
      median: (values[(count - 1) >> 1] + values[count >> 1]) / 2,
      most: values[count - 1],
      noDifference: values[0] <= won[won.length - 1],
    };
  });
}
