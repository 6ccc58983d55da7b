import { repairIds } from '../exchange/readOptions.ts';
import { factorizationNames, matchingNames, orderingNames, pivotingNames, scalingNames } from '../trial/choice.ts';
import { orderingOptions, portfolioOptions } from './forecastOptions.ts';
import type { OptionRule } from './parse.ts';

export const json: OptionRule = { kind: 'flag', help: 'print one JSON object instead of text' };
export const read: OptionRule = {
  kind: 'text',
  many: true,
  value: 'WORD',
  help: `how to read a file that has two readings; a refusal names the word. Known: ${repairIds.join(', ')}`,
};
export const factorization: OptionRule = {
  kind: 'word',
  words: factorizationNames,
  help: 'factorization; default the one advised for the matrix',
};
export const ordering: OptionRule = { kind: 'word', words: orderingNames, help: 'ordering method' };
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
export const out: OptionRule = { kind: 'text', value: 'FILE', help: 'file to write' };
export const format: OptionRule = {
  kind: 'word',
  words: ['matrix-market', 'rutherford-boeing'],
  help: 'format of the file; default matrix-market',
};
export const storage: OptionRule = {
  kind: 'word',
  words: ['full', 'half'],
  help: 'all entries, or one triangle of a matrix that is symmetric exactly; default full',
};
const unknownsPerNode: OptionRule = {
  kind: 'integer',
  low: 1,
  high: 1000,
  help: 'unknowns of each node, numbered one after the other; default what the two lengths say, else refused',
};
const held: OptionRule = {
  kind: 'text',
  value: 'FILE|LIST',
  help: 'unknowns to keep at the end in that order: a file of 1-based integers, or a list like 7,20-31',
};
const seed: OptionRule = { kind: 'integer', low: 1, high: 2 ** 31 - 2, help: 'seed of every random choice; default 1' };

/** What comes beside a matrix that a recipe speaks of. */
export const besideOptions: Readonly<Record<string, OptionRule>> = {
  permutation,
  'permutation-direction': permutationDirection,
  'permutation-base': permutationBase,
  'permutation-vector': permutationVector,
  coordinates,
  'unknowns-per-node': unknownsPerNode,
};

/** What shapes a trial; shared by the commands that make one. */
export const trialOptions: Readonly<Record<string, OptionRule>> = {
  factorization,
  permutation,
  'permutation-direction': permutationDirection,
  'permutation-base': permutationBase,
  'permutation-vector': permutationVector,
  coordinates,
  'unknowns-per-node': unknownsPerNode,
  pivoting: {
    kind: 'word',
    words: pivotingNames,
    help: 'none, threshold, or static (small pivots replaced, then refined)',
  },
  threshold: { kind: 'number', low: 1e-12, high: 1, help: 'u of threshold pivoting: multipliers stay at most 1/u' },
  scaling: { kind: 'word', words: scalingNames, help: 'scaling before ordering; default none' },
  matching: {
    kind: 'word',
    words: matchingNames,
    help: 'LU: rows moved so that planned pivots stand on the diagonal; LDLᵀ: pairs for 2×2 pivots, as --pairing; default none',
  },
  pairing: {
    kind: 'word',
    words: ['none', 'structure', 'magnitude'],
    help: 'LDLᵀ: unknowns paired for 2×2 pivots and kept together, zero diagonals by structure or all by magnitude (value-dependent)',
  },
  blocks: {
    kind: 'flag',
    help: 'block triangular form first; off by default for symmetric factorizations and lu, on for column-lu',
  },
  'no-blocks': { kind: 'flag', help: 'the whole matrix as one block' },
  'held-last': held,
  seed,
  ...orderingOptions,
  ...portfolioOptions,
  read,
};
