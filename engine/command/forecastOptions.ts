import { defaultTarget, defaultWorkload, type Target, type Workload } from '../forecast/target.ts';
import { type Choice, type MeasureName, measureNames, type OrderingName, orderingNames } from '../trial/choice.ts';
import type { Call, OptionRule } from './parse.ts';

type Rules = Readonly<Record<string, OptionRule>>;

/** What shapes an ordering beside its name. */
export const orderingOptions: Rules = {
  'leaf-size': {
    kind: 'integer',
    low: 1,
    high: 2 ** 31,
    help: 'dissections: pieces of at most so many vertices are ordered by minimum degree; default 200, fewer where rows are long',
  },
  balance: {
    kind: 'number',
    low: 0.5,
    high: 0.9,
    help: 'nested dissection: most share of both sides of a separator that one of them may have; default 0.7',
  },
  tries: {
    kind: 'integer',
    low: 1,
    high: 1000,
    help: 'nested dissection: growing starts for each separator; default 2',
  },
  'dense-threshold': {
    kind: 'text',
    value: 'N|off',
    help: 'rows with more neighbours than this are set aside and come last; default max(16, 10·√n)',
  },
  relabelling: {
    kind: 'integer',
    low: 1,
    high: 2 ** 31 - 2,
    help: 'orders a random renumbering with this seed and carries the order back; default none',
  },
};

/** What the ordering "best-of" runs. */
export const portfolioOptions: Rules = {
  'best-of': {
    kind: 'word',
    words: measureNames,
    help: 'runs several orderings and keeps the best by this measure, as the ordering "best-of"',
  },
  members: {
    kind: 'list',
    words: orderingNames.filter((name) => name !== 'best-of'),
    value: 'a,b,c',
    help: 'orderings that best-of runs; default all that suit the matrix',
  },
  rounds: {
    kind: 'integer',
    low: 1,
    high: 1000,
    help: 'rounds of best-of; those after the first take the next seeds and relabel the unknowns; default 1',
  },
  'time-limit': {
    kind: 'number',
    low: 0,
    value: 'SECONDS',
    help: 'after so many seconds best-of starts nothing more and drops what runs; the first trial always ends',
  },
};

/** The machine that will really run the factorization. */
export const targetOptions: Rules = {
  memory: { kind: 'bytes', value: 'BYTES', help: 'memory of the target, like 64GiB; default 16GiB' },
  workers: { kind: 'integer', low: 1, high: 1024, help: 'cores of the target; default 4' },
  'index-bits': { kind: 'word', words: ['32', '64'], help: 'width of its indices; default 32' },
  precision: { kind: 'word', words: ['double', 'single'], help: 'its scalars; default double' },
  'large-rate': {
    kind: 'number',
    low: 1,
    value: 'OPERATIONS/S',
    help: 'operations a second of one core in large fronts; default 1e10',
  },
  'small-rate': {
    kind: 'number',
    low: 1,
    value: 'OPERATIONS/S',
    help: 'the same in small fronts and scattered work; default 1e9',
  },
  bandwidth: { kind: 'number', low: 1, value: 'BYTES/S', help: 'bytes a second from memory; default 2e10' },
};

/** What will be done with the pattern. */
export const workloadOptions: Rules = {
  factorizations: { kind: 'integer', low: 1, high: 1e9, help: 'factorizations with this pattern; default 1' },
  'right-hand-sides': { kind: 'integer', low: 0, high: 1e9, help: 'right-hand sides of each; default 1' },
  'refinement-steps': { kind: 'integer', low: 0, high: 1000, help: 'refinement steps of each; default 1' },
};

/** The target a call describes; what it leaves open is the default. */
export function targetOf(call: Call): Target {
  return {
    memoryBytes: call.number('memory') ?? defaultTarget.memoryBytes,
    cores: call.number('workers') ?? defaultTarget.cores,
    indexBytes: call.text('index-bits') === '64' ? 8 : defaultTarget.indexBytes,
    scalarBytes: call.text('precision') === 'single' ? 4 : defaultTarget.scalarBytes,
    largeRate: call.number('large-rate') ?? defaultTarget.largeRate,
    smallRate: call.number('small-rate') ?? defaultTarget.smallRate,
    bandwidth: call.number('bandwidth') ?? defaultTarget.bandwidth,
  };
}

/** The workload a call describes. */
export function workloadOf(call: Call): Workload {
  return {
    factorizations: call.number('factorizations') ?? defaultWorkload.factorizations,
    rightHandSides: call.number('right-hand-sides') ?? defaultWorkload.rightHandSides,
    refinementSteps: call.number('refinement-steps') ?? defaultWorkload.refinementSteps,
  };
}

/** What a call says about the ordering itself, over the defaults of `choice`. */
export function orderedAs(call: Call, choice: Choice): Choice {
  const dense = call.text('dense-threshold');
  const members = call.list('members') as readonly OrderingName[] | null;
  return {
    ...choice,
    tuning: {
      leafSize: call.number('leaf-size'),
      balance: call.number('balance'),
      tries: call.number('tries'),
      // "off": more neighbours than a row can have
      denseThreshold: dense === null ? null : dense === 'off' ? 2 ** 31 : wholeOr(dense),
    },
    relabelling: call.number('relabelling'),
    portfolio: {
      members,
      measure: (call.text('best-of') as MeasureName | null) ?? choice.portfolio.measure,
      rounds: call.number('rounds') ?? choice.portfolio.rounds,
      timeLimit: call.number('time-limit'),
    },
  };
}

/** A whole number, or NaN, which the rules refuse with a sentence. */
function wholeOr(text: string): number {
  return /^\d+$/.test(text.trim()) ? Number(text) : Number.NaN;
}
