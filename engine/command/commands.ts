import { orderingNames } from '../trial/choice.ts';
import { targetOptions, workloadOptions } from './forecastOptions.ts';
import { besideOptions, format, json, ordering, out, read, storage, trialOptions } from './options.ts';
import type { CommandRule } from './parse.ts';
import { recipeIn, recipeOut } from './recipeFile.ts';

/** The words of the command line. Checks of other programs are built on them: keep them stable. */
export const commands: readonly CommandRule[] = [
  {
    name: 'survey',
    help: 'the facts of a matrix, in its own numbering',
    files: [1, 1],
    options: { json, read },
    examples: [
      ['survey bridge.mtx', 'symmetry, bandwidth, components, diagonal, magnitudes'],
      ['survey bridge.mtx.gz --json', 'the same as one JSON object'],
    ],
  },
  {
    name: 'compare',
    help: 'what each ordering would cost on a target and for a workload: fill-in, memory, operations, time; no numeric work',
    files: [1, 1],
    options: {
      orderings: {
        kind: 'list',
        words: orderingNames,
        value: 'a,b,c',
        help: 'orderings to compare; default all that suit the matrix',
      },
      ...trialOptions,
      spread: {
        kind: 'integer',
        low: 1,
        high: 100,
        help: 'runs each ordering on so many seeded relabellings; differences inside the spread are marked "no difference"',
      },
      ...targetOptions,
      ...workloadOptions,
      'page-memory': {
        kind: 'bytes',
        value: 'BYTES',
        help: 'what a run in the page may use, for the line that says whether it can run it; default 6GiB',
      },
      'recipe-out': recipeOut,
      json,
    },
    examples: [
      ['compare bridge.mtx', 'every ordering that suits, the advised factorization'],
      [
        'compare bridge.mtx --orderings minimum-degree,nested-dissection --memory 64GiB --workers 16 --factorizations 200',
        'two orderings, for 200 factorizations on a machine with 64 GiB and 16 cores',
      ],
      ['compare bridge.mtx --spread 5', 'five numberings of each: which differences are real'],
      ['compare bridge.mtx --best-of operations --time-limit 10', 'one more line: the best that ten seconds can find'],
      ['compare saddle.mtx --factorization ldlt --pairing structure', 'zero diagonals kept in 2×2 pivots'],
      ['compare circuit.mtx --factorization column-lu --blocks', 'row interchanges, on block triangular form'],
      ['compare bridge.mtx --held-last 1,40-52', 'and what the Schur complement of these unknowns costs'],
      ['compare plate.mtx --coordinates nodes.txt --unknowns-per-node 2', 'geometric dissection too'],
      [
        'compare bridge.mtx --permutation order.txt',
        'an order of your own as one more line, read both ways if it must be',
      ],
    ],
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
      'recipe-out': recipeOut,
    },
    examples: [
      ['order bridge.mtx --ordering nested-dissection --out order.txt', '1-based, new-to-old, postordered'],
      [
        'order bridge.mtx --ordering sloan --which requested --direction old-to-new --base 0 --out position.txt',
        'as the method gave it, as positions, 0-based',
      ],
      ['order bridge.mtx --best-of entries --rounds 3 --out order.txt', 'the best of all orderings in three rounds'],
    ],
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
      'memory-limit': { kind: 'bytes', value: 'BYTES', help: 'refuse a run that needs more by its forecast' },
      precision: {
        kind: 'word',
        words: ['double', 'single'],
        help: 'factors kept in this precision, refined in double; default double',
      },
      transposed: { kind: 'flag', help: 'solves with the transpose of A, by the factors of A' },
      'solution-out': { kind: 'text', value: 'FILE', help: 'writes the solutions for --rhs, Matrix Market array' },
      second: {
        kind: 'text',
        value: 'FILE',
        help: 'a second matrix, new values on the same pattern: factorized without a new analysis where that will do',
      },
      sweep: { kind: 'flag', help: 'every pivot threshold and static pivoting, one line each' },
      'schur-out': {
        kind: 'text',
        value: 'FILE',
        help: 'writes the Schur complement onto the unknowns of --held-last, Matrix Market array',
      },
      'schur-failures': {
        kind: 'word',
        words: ['append', 'perturb'],
        help: 'pivots that fail at the boundary: appended to the complement (default), or replaced',
      },
      json,
    },
    examples: [
      ['factor bridge.mtx', 'minimum degree, the factorization advised, A·1 and two random right-hand sides'],
      ['factor saddle.mtx --factorization ldlt --sweep', 'what each pivot threshold costs'],
      ['factor step1.mtx --second step2.mtx', 'the second time step on the analysis of the first'],
      ['factor part.mtx --held-last 1-40 --schur-out interface.mtx', 'the Schur complement onto 40 unknowns'],
    ],
  },
  {
    name: 'growth',
    help: 'matrices of one family: how cost grows with n, and how large n can be in a given memory and time',
    files: [2, 1000],
    options: {
      ordering,
      ...trialOptions,
      dimension: {
        kind: 'word',
        words: ['2', '3'],
        help: 'dimension of the meshes, which chooses the law of the theory; default the law that predicts best',
      },
      seconds: { kind: 'number', low: 0, help: 'time that one factorization may take; default 3600' },
      ...targetOptions,
      json,
    },
    examples: [
      [
        'growth plate-10.mtx plate-20.mtx plate-40.mtx plate-80.mtx --memory 64GiB --seconds 3600',
        'four refinements of one mesh: fits, local exponents, and the largest n',
      ],
    ],
  },
  {
    name: 'reconcile',
    help: 'what another solver reported, against every convention of counting: which one explains it, or that none does',
    files: [1, 1],
    options: {
      orderings: {
        kind: 'list',
        words: orderingNames,
        value: 'a,b,c',
        help: 'orderings that may have been used; default all that suit the matrix',
      },
      ...trialOptions,
      entries: { kind: 'number', low: 1, value: 'N', help: 'factor entries it reported' },
      operations: { kind: 'number', low: 1, value: 'N', help: 'operations it reported' },
      memory: { kind: 'bytes', value: 'BYTES', help: 'memory it reported' },
      json,
    },
    examples: [
      [
        'reconcile bridge.mtx --entries 134208 --operations 8.1e6',
        'which ordering and which way of counting give these',
      ],
    ],
  },
  {
    name: 'calibrate',
    help: 'measures this machine in a few seconds: the rates and the bandwidth that forecasts of time rest on, and the error of their model',
    files: [0, 0],
    options: { json },
    examples: [['calibrate', 'prints the options that "compare" and "growth" take for this machine']],
  },
  {
    name: 'handover',
    help: 'writes every file of a chosen trial: order, matrix, structure, factors, configuration sheet, recipe, script, report',
    files: [1, 1],
    options: {
      ordering,
      orderings: {
        kind: 'list',
        words: orderingNames,
        value: 'a,b,c',
        help: 'orderings to compare in table and report; default the one handed over beside the natural one, or all that suit',
      },
      out: { kind: 'text', value: 'FOLDER', help: 'folder to write to, made where it is missing' },
      prove: { kind: 'flag', help: 'runs the factorization first, so that sheet and report tell what it showed' },
      'factor-limit': {
        kind: 'bytes',
        value: 'BYTES',
        help: 'memory that writing the factors may take, else they are refused with the figure; default 1GiB',
      },
      'memory-limit': { kind: 'bytes', value: 'BYTES', help: 'memory of the numeric run; default 6GiB' },
      ...trialOptions,
      ...targetOptions,
      ...workloadOptions,
      json,
    },
    examples: [
      ['handover bridge.mtx --out bridge-files', 'compares the orderings that suit and hands over the advised one'],
      [
        'handover bridge.mtx --ordering nested-dissection --prove --memory 64GiB --out bridge-files',
        'one ordering, with its proof, for a machine of 64 GiB',
      ],
    ],
  },
  {
    name: 'replay',
    help: 'runs a recipe again on its matrix: the same numbers, or which ones differ (status 4)',
    files: [1, 1],
    options: { recipe: recipeIn, ...besideOptions, read, json },
    examples: [
      ['compare bridge.mtx --recipe-out bridge-recipe.json', 'writes the recipe; the page opens it too'],
      ['replay bridge.mtx --recipe bridge-recipe.json', 'the numbers again, on any machine'],
    ],
  },
  {
    name: 'gate',
    help: 'the choice of a recipe on a matrix of today, held against limits: status 5 when one is passed, and by how much',
    files: [1, 1],
    options: {
      recipe: recipeIn,
      'max-factor-bytes': { kind: 'bytes', value: 'BYTES', help: 'most bytes of the factors in compressed columns' },
      'max-peak-bytes': {
        kind: 'bytes',
        value: 'BYTES',
        help: "most bytes at the peak of a run, fronts with their stack, on the recipe's target",
      },
      'max-operations': { kind: 'number', low: 0, value: 'N', help: 'most operations of the factorization' },
      trial: { kind: 'text', value: 'NAME|all', help: 'trial of the recipe to watch; default the chosen one' },
      ...besideOptions,
      read,
      json,
    },
    examples: [
      [
        'gate bridge.mtx --recipe bridge-recipe.json --max-peak-bytes 4GiB --max-operations 2e12',
        'in the tests of a simulation code: fails when a change of the model makes the factorization too dear',
      ],
    ],
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
