import { repairIds } from '../exchange/readOptions.ts';
import { factorizationNames, matchingNames, orderingNames, pivotingNames, scalingNames } from '../trial/choice.ts';
import type { CommandRule, OptionRule } from './parse.ts';

const json: OptionRule = { kind: 'flag', help: 'print one JSON object instead of text' };
const read: OptionRule = {
  kind: 'text',
  many: true,
  value: 'WORD',
  help: `how to read a file that has two readings; a refusal names the word. Known: ${repairIds.join(', ')}`,
};
const factorization: OptionRule = {
  kind: 'word',
  words: factorizationNames,
  help: 'factorization; default the one advised for the matrix',
};
const ordering: OptionRule = { kind: 'word', words: orderingNames, help: 'ordering method' };
const permutation: OptionRule = {
  kind: 'text',
  value: 'FILE',
  help: 'a permutation to use as the ordering "imported"; its direction comes from its header or --permutation-direction',
};
const permutationDirection: OptionRule = {
  kind: 'word',
  words: ['new-to-old', 'old-to-new'],
  help: 'direction of the permutation file, where the file does not state it',
};
const permutationBase: OptionRule = {
  kind: 'word',
  words: ['0', '1'],
  help: 'base of the permutation file; default detected',
};
const permutationVector: OptionRule = {
  kind: 'word',
  words: ['1', '2'],
  help: 'which of two vectors in the permutation file: left or first, right or second',
};
const coordinates: OptionRule = {
  kind: 'text',
  value: 'FILE',
  help: 'coordinates of the mesh nodes, one node a line, for geometric dissection',
};
const out: OptionRule = { kind: 'text', value: 'FILE', help: 'file to write' };
const format: OptionRule = {
  kind: 'word',
  words: ['matrix-market', 'rutherford-boeing'],
  help: 'format of the file; default matrix-market',
};
const storage: OptionRule = {
  kind: 'word',
  words: ['full', 'half'],
  help: 'all entries, or one triangle of a matrix that is symmetric exactly; default full',
};
const held: OptionRule = {
  kind: 'text',
  value: 'FILE',
  help: 'unknowns to keep at the end, 1-based integers, in that order',
};
const seed: OptionRule = { kind: 'integer', low: 1, high: 2 ** 31 - 2, help: 'seed of every random choice; default 1' };

/** What shapes a trial; shared by the commands that make one. */
const trialOptions: Readonly<Record<string, OptionRule>> = {
  factorization,
  permutation,
  'permutation-direction': permutationDirection,
  'permutation-base': permutationBase,
  'permutation-vector': permutationVector,
  coordinates,
  pivoting: {
    kind: 'word',
    words: pivotingNames,
    help: 'none, threshold, or static (small pivots replaced, then refined)',
  },
  threshold: { kind: 'number', low: 1e-12, high: 1, help: 'u of threshold pivoting: multipliers stay at most 1/u' },
  scaling: { kind: 'word', words: scalingNames, help: 'scaling before ordering; default none' },
  matching: { kind: 'word', words: matchingNames, help: 'matching of rows and columns before ordering; default none' },
  blocks: {
    kind: 'flag',
    help: 'block triangular form first; off by default for symmetric factorizations, on for column-lu',
  },
  'held-last': held,
  seed,
  read,
};

/** The words of the command line. Checks of other programs are built on them: keep them stable. */
export const commands: readonly CommandRule[] = [
  {
    name: 'survey',
    help: 'the facts of a matrix, in its own numbering',
    files: [1, 1],
    options: { json, read },
  },
  {
    name: 'compare',
    help: 'what each ordering would cost: fill-in, memory, operations; no numeric work',
    files: [1, 1],
    options: {
      orderings: {
        kind: 'list',
        words: orderingNames,
        value: 'a,b,c',
        help: 'orderings to compare; default all that suit the matrix',
      },
      ...trialOptions,
      json,
    },
  },
  {
    name: 'order',
    help: 'writes the permutation of one ordering, with its direction and base in the file',
    files: [1, 1],
    options: {
      ordering,
      out: { kind: 'text', value: 'FILE', help: 'file to write' },
      direction: {
        kind: 'word',
        words: ['new-to-old', 'old-to-new'],
        help: 'direction of the file; default new-to-old',
      },
      base: { kind: 'word', words: ['0', '1'], help: 'base of the file; default 1' },
      format: { kind: 'word', words: ['plain', 'matrix-market-array'], help: 'default plain' },
      which: {
        kind: 'word',
        words: ['requested', 'effective'],
        help: 'the order as the method gave it, or postordered as the counts assume; default effective',
      },
      ...trialOptions,
    },
  },
  {
    name: 'factor',
    help: 'factorizes, solves, measures the errors and judges',
    files: [1, 1],
    options: {
      ordering,
      ...trialOptions,
      rhs: { kind: 'text', value: 'FILE', help: 'right-hand sides; A·1 and two random ones are solved besides' },
      refine: { kind: 'integer', low: 0, high: 100, help: 'most refinement steps; default 5' },
      'memory-limit': { kind: 'number', low: 0, value: 'BYTES', help: 'refuse a run that needs more by its forecast' },
      json,
    },
  },
  {
    name: 'convert',
    help: 'writes the matrix as read: sorted, duplicates summed, full or half, in either format',
    files: [1, 1],
    options: { out, format, storage, read },
  },
  {
    name: 'combine',
    help: 'writes a sum of matrices with real or complex coefficients, on the union of their patterns',
    files: [1, 99],
    options: {
      coefficients: { kind: 'list', value: 'a,b,c', help: 'one number for each file, like 1,-0.5,0.25-2i' },
      out,
      format,
      storage,
      read,
    },
  },
  {
    name: 'difference',
    help: 'what the second matrix has that the first has not, and the other way round; whether an analysis can be used again',
    files: [2, 2],
    options: { json, read },
  },
];
