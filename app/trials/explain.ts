import type {
  Choice,
  FactorizationName,
  MatchingName,
  OrderingName,
  PivotingName,
  ScalingName,
} from '../../engine/trial/choice.ts';

/** Names of the choices as they are said, and what each means in a sentence. */
export interface Said {
  readonly name: string;
  readonly means: string;
}

export const orderings: Readonly<Record<OrderingName, Said>> = {
  natural: { name: 'natural', means: 'The numbering of the file, unchanged. The yardstick for all others.' },
  'reverse-cuthill-mckee': {
    name: 'reverse Cuthill–McKee',
    means: 'Breadth-first levels, reversed: a narrow band. For band and profile solvers.',
  },
  sloan: { name: 'Sloan', means: 'Balances distance to the end and current front: a small profile and wavefront.' },
  'minimum-degree': {
    name: 'minimum degree',
    means: 'Eliminates next whatever has fewest neighbours. Quick; hard to beat on irregular and small systems.',
  },
  'minimum-fill': {
    name: 'minimum fill',
    means: 'Eliminates next whatever adds fewest entries. Slower to order, often a tenth less fill.',
  },
  'nested-dissection': {
    name: 'nested dissection',
    means:
      'Cuts the graph by small separators, ordered last. Best on large meshes, and gives a tree that parallelizes.',
  },
  'geometric-dissection': {
    name: 'geometric dissection',
    means: 'Nested dissection with cuts along the coordinates of the mesh nodes.',
  },
  'column-minimum-degree': {
    name: 'column minimum degree',
    means: 'Orders columns for row interchanges still unknown: works on AᵀA without forming it.',
  },
  imported: { name: 'imported', means: 'A permutation you have dropped, exactly as it stands.' },
  'best-of': { name: 'best of several', means: 'Runs several orderings and keeps the best by one measure.' },
};

export const factorizations: Readonly<Record<FactorizationName, Said>> = {
  cholesky: {
    name: 'Cholesky',
    means: 'A = L·Lᵀ. Symmetric or hermitian positive definite; no pivoting, least memory.',
  },
  ldlt: {
    name: 'LDLᵀ',
    means: 'A = L·D·Lᵀ with 1×1 and 2×2 pivots. Symmetric indefinite: saddle points, complex symmetric.',
  },
  lu: { name: 'LU', means: 'On dense fronts of the pattern of A + Aᵀ. Nearly symmetric patterns, large meshes.' },
  'column-lu': {
    name: 'column LU',
    means: 'Column by column with row interchanges. Circuits, process simulation, very unsymmetric patterns.',
  },
};

export const pivotings: Readonly<Record<PivotingName, Said>> = {
  none: { name: 'none', means: 'Pivots in the planned order, whatever their size.' },
  threshold: {
    name: 'threshold',
    means: 'A pivot must be at least u times the largest candidate; else it is interchanged or delayed.',
  },
  static: {
    name: 'static',
    means: 'Too small pivots are replaced, and the solution is refined. Fill stays as forecast.',
  },
};

export const scalings: Readonly<Record<ScalingName, Said>> = {
  none: { name: 'none', means: 'Values as they are.' },
  equilibrate: {
    name: 'equilibrate',
    means: 'Rows and columns brought to largest entries near 1, a few rounds (Ruiz).',
  },
  matching: {
    name: 'with matching',
    means: 'The scaling that comes with large-entry matching: matched entries 1, others at most 1.',
  },
};

export const matchings: Readonly<Record<MatchingName, Said>> = {
  none: { name: 'none', means: 'The diagonal stays what it is.' },
  structural: { name: 'structural', means: 'Any entry of each row moved to the diagonal, so that none is absent.' },
  'large-entry': {
    name: 'large entries',
    means: 'Large entries moved to the diagonal (Duff–Koster). Value-dependent.',
  },
};

/** "LDLᵀ, threshold 0.01, equilibrate": all of a choice but its ordering. */
export function sayFactorization(choice: Choice): string {
  const parts = [factorizations[choice.factorization].name];
  if (choice.pivoting === 'threshold') parts.push(`threshold ${choice.threshold}`);
  else if (choice.pivoting === 'static') parts.push('static pivots');
  else if (choice.factorization !== 'cholesky') parts.push('no pivoting');
  if (choice.scaling === 'equilibrate') parts.push('equilibrated');
  if (choice.matching !== 'none') parts.push(`${matchings[choice.matching].name} matched`);
  if (choice.blocks) parts.push('in blocks');
  if (choice.seed !== 1) parts.push(`seed ${choice.seed}`);
  return parts.join(', ');
}

/** "minimum degree, Cholesky" */
export function sayChoice(choice: Choice): string {
  return `${orderings[choice.ordering].name}, ${sayFactorization(choice)}`;
}
