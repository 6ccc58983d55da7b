import type { Choice, FactorizationName, OrderingName, OrderingTuning, Portfolio } from './choice.ts';

/** The facts of a matrix that decide what can be done with it. */
export interface MatrixFacts {
  readonly rows: number;
  readonly columns: number;
  readonly entries: number;
  /** entries off the diagonal */
  readonly offDiagonalEntries: number;
  readonly hasValues: boolean;
  readonly complex: boolean;
  /** pattern of A equals that of Aᵀ */
  readonly patternSymmetric: boolean;
  /** A = Aᵀ exactly; false without values */
  readonly valueSymmetric: boolean;
  /** A = Aᴴ exactly (equal to `valueSymmetric` for real); false without values */
  readonly hermitian: boolean;
  /** every diagonal entry is stored, real and above zero; null without values */
  readonly diagonalPositive: boolean | null;
  /** diagonal entries that are absent or zero */
  readonly zeroDiagonals: number;
  /** entries that are NaN or infinite */
  readonly notFinite: number;
  readonly hasCoordinates: boolean;
  readonly hasImported: boolean;
}

/** Whether a symmetric or hermitian factorization describes the matrix itself, and not only A + Aᵀ. */
export function isSymmetric(facts: MatrixFacts): boolean {
  return facts.hasValues ? facts.valueSymmetric || facts.hermitian : facts.patternSymmetric;
}

/** Why a trial cannot be forecast, in one sentence; null if it can. */
export function whyNoForecast(facts: MatrixFacts, choice: Choice): string | null {
  const square = facts.rows === facts.columns;
  if (!square && choice.factorization !== 'column-lu') {
    return `The matrix is ${facts.rows} × ${facts.columns}: ${nameOf(choice.factorization)} needs a square one. Column orderings and structure are available.`;
  }
  if (choice.factorization !== 'column-lu' && choice.ordering === 'column-minimum-degree') {
    return 'Column minimum degree orders columns only; it suits column LU.';
  }
  if (!square && !rectangularOrderings.includes(choice.ordering)) {
    return `The matrix is ${facts.rows} × ${facts.columns}: only column orderings (${rectangularOrderings.join(', ')}) make sense.`;
  }
  if (choice.ordering === 'geometric-dissection' && !facts.hasCoordinates) {
    return 'Geometric dissection needs the coordinates of the mesh nodes: drop their file beside the matrix.';
  }
  if (choice.ordering === 'imported' && !facts.hasImported) return 'No permutation has been read yet.';
  if (choice.ordering === 'best-of') {
    const why = whyNoPortfolio(facts, choice);
    if (why !== null) return why;
  }
  const tuning = whyNoTuning(choice.tuning);
  if (tuning !== null) return tuning;
  if (choice.factorization === 'cholesky' && choice.pivoting !== 'none')
    return 'Cholesky takes its pivots in order: pivoting is none.';
  if (choice.factorization === 'ldlt' && choice.pivoting === 'threshold' && choice.threshold > 0.5) {
    return 'LDLᵀ keeps symmetry with 2×2 pivots only up to a threshold of 0.5.';
  }
  if (choice.pivoting === 'threshold' && !(choice.threshold > 0 && choice.threshold <= 1)) {
    return 'A pivot threshold lies above 0 and is at most 1.';
  }
  const usesValues = choice.matching === 'large-entry' || choice.scaling !== 'none';
  if (usesValues && !facts.hasValues) return 'Scaling and large-entry matching use values; this is a pattern.';
  if (usesValues && facts.notFinite > 0)
    return `Scaling and large-entry matching need finite values; ${facts.notFinite} are not.`;
  if (choice.scaling === 'matching' && choice.matching !== 'large-entry') {
    return 'Scaling by matching comes with large-entry matching: choose both.';
  }
  if (choice.factorization === 'cholesky' && choice.matching !== 'none')
    return 'A Cholesky factorization needs no matching.';
  if (
    choice.factorization === 'ldlt' &&
    choice.matching === 'large-entry' &&
    !facts.valueSymmetric &&
    !facts.hermitian
  ) {
    return 'Pairs by magnitude need A = Aᵀ or A = Aᴴ; pairs by structure need only the pattern.';
  }
  return null;
}

function whyNoPortfolio(facts: MatrixFacts, choice: Choice): string | null {
  const { members, measure, rounds, timeLimit } = choice.portfolio;
  if (choice.factorization === 'column-lu' && measure === 'critical-path') {
    return 'Column LU has no fronts, so no critical path: let the portfolio be judged by entries, operations or peak memory.';
  }
  if (!(Number.isInteger(rounds) && rounds >= 1 && rounds <= 1000)) return 'A portfolio takes 1 to 1000 rounds.';
  if (timeLimit !== null && !(timeLimit >= 0)) return 'A time limit is a number of seconds, 0 or more.';
  if (members === null) return null;
  if (members.length === 0) return 'A portfolio needs at least one ordering.';
  if (members.includes('best-of')) return 'A portfolio cannot hold another one.';
  for (const ordering of members) {
    const why = whyNoForecast(facts, { ...choice, ordering });
    if (why !== null) return why;
  }
  return null;
}

function whyNoTuning({ leafSize, balance, tries, denseThreshold }: OrderingTuning): string | null {
  const whole = (x: number | null, low: number, high: number): boolean =>
    x === null || (Number.isInteger(x) && x >= low && x <= high);
  if (!whole(leafSize, 1, 2 ** 31)) return 'Leaf size is a whole number of at least 1.';
  if (balance !== null && !(balance >= 0.5 && balance <= 0.9)) return 'Balance lies between 0.5 and 0.9.';
  if (!whole(tries, 1, 1000)) return 'The number of tries is a whole number from 1 to 1000.';
  if (!whole(denseThreshold, 0, 2 ** 31)) return 'The threshold of dense rows is a whole number of at least 0.';
  return null;
}

/** Why a trial cannot be proved by a numeric run, in one sentence; null if it can. */
export function whyNoProof(facts: MatrixFacts, choice: Choice): string | null {
  const forecast = whyNoForecast(facts, choice);
  if (forecast !== null) return forecast;
  if (facts.rows !== facts.columns)
    return `The matrix is ${facts.rows} × ${facts.columns}: only square ones are factorized.`;
  if (!facts.hasValues)
    return 'A pattern has no values to factorize. Synthetic values can be made, and are then labelled so.';
  if (facts.notFinite > 0) return `${facts.notFinite} values are NaN or infinite: numeric work is impossible.`;
  if (choice.factorization === 'cholesky' && !facts.hermitian) {
    return facts.complex
      ? 'Cholesky needs A = Aᴴ; this matrix is not hermitian. LDLᵀ or LU can take it.'
      : 'Cholesky needs A = Aᵀ; this matrix is not symmetric. LU can take it.';
  }
  if (choice.factorization === 'ldlt' && !facts.valueSymmetric && !facts.hermitian) {
    return 'LDLᵀ needs A = Aᵀ or A = Aᴴ; this matrix is neither. LU can take it.';
  }
  return null;
}

const rectangularOrderings: readonly OrderingName[] = ['natural', 'column-minimum-degree', 'imported', 'best-of'];

/** A factorization as it is said. */
export function nameOf(factorization: FactorizationName): string {
  return { cholesky: 'Cholesky', ldlt: 'LDLᵀ', lu: 'LU', 'column-lu': 'column LU' }[factorization];
}

const defaultTuning: OrderingTuning = { leafSize: null, balance: null, tries: null, denseThreshold: null };
const defaultPortfolio: Portfolio = { members: null, measure: 'operations', rounds: 1, timeLimit: null };

/** A choice with the defaults of its factorization; what is given in `changes` stands. */
export function defaultChoice(
  factorization: FactorizationName,
  ordering: OrderingName,
  changes: Partial<Choice> = {},
): Choice {
  const pivoting = factorization === 'cholesky' ? 'none' : 'threshold';
  const threshold = factorization === 'ldlt' ? 0.01 : factorization === 'lu' ? 0.1 : 1;
  return {
    ordering,
    factorization,
    pivoting,
    threshold,
    scaling: 'none',
    matching: 'none',
    blocks: factorization === 'column-lu',
    seed: 1,
    tuning: defaultTuning,
    relabelling: null,
    portfolio: defaultPortfolio,
    ...changes,
  };
}

/** Orderings that suit a matrix and a factorization, in the order in which they are tried; "best-of" runs several of them and is not among them. */
export function suitableOrderings(facts: MatrixFacts, factorization: FactorizationName): readonly OrderingName[] {
  if (facts.rows !== facts.columns) {
    return facts.hasImported ? ['natural', 'column-minimum-degree', 'imported'] : ['natural', 'column-minimum-degree'];
  }
  const out: OrderingName[] = ['natural', 'reverse-cuthill-mckee', 'sloan'];
  out.push('minimum-degree', 'minimum-fill', 'nested-dissection');
  if (factorization === 'column-lu') out.push('column-minimum-degree');
  if (facts.hasCoordinates) out.push('geometric-dissection');
  if (facts.hasImported) out.push('imported');
  return out;
}

/** Which factorization the facts alone advise, and why. */
export function advisedFactorization(facts: MatrixFacts): {
  readonly factorization: FactorizationName;
  readonly reason: string;
} {
  if (facts.rows !== facts.columns) {
    return {
      factorization: 'column-lu',
      reason: `the matrix is ${facts.rows} × ${facts.columns}, so only column orderings and structure apply`,
    };
  }
  if (!facts.hasValues) {
    return facts.patternSymmetric
      ? {
          factorization: 'cholesky',
          reason: 'only a pattern is given and it is symmetric; the counts hold for LDLᵀ without delayed pivots too',
        }
      : { factorization: 'lu', reason: 'only a pattern is given and it is not symmetric' };
  }
  if (facts.hermitian && facts.diagonalPositive === true) {
    const word = facts.complex ? 'hermitian' : 'symmetric';
    return {
      factorization: 'cholesky',
      reason: `the matrix is ${word} with a positive diagonal; a numeric run then proves definiteness or names the row that breaks it`,
    };
  }
  if (facts.valueSymmetric || facts.hermitian) {
    const why =
      facts.zeroDiagonals > 0
        ? `${facts.zeroDiagonals} diagonal entries are zero or absent`
        : facts.complex && !facts.hermitian
          ? 'it is complex symmetric, not hermitian'
          : 'its diagonal is not positive throughout';
    return { factorization: 'ldlt', reason: `the matrix is symmetric, but ${why}` };
  }
  return {
    factorization: 'lu',
    reason: facts.patternSymmetric ? 'the matrix is symmetric only in pattern' : 'the matrix is not symmetric',
  };
}
