import { Fault } from '../../matrix/fault.ts';
import type { SparseMatrix } from '../../matrix/pattern.ts';
import { noProgress, type Progress } from '../../matrix/progress.ts';
import { Random } from '../../matrix/random.ts';
import type { PivotCounts, PivotPlace, Solver } from '../solver.ts';
import { estimateCondition } from './condition.ts';
import { estimateForwardError, trustedDigits } from './forwardError.ts';
import { multiplyInto } from './product.ts';
import { type RefinedColumn, type RefinementOptions, type RefinementStep, refine } from './refine.ts';
import { type MeasuredSystem, measuredSystem } from './system.ts';
import { judge, type Verdict } from './verdict.ts';

/** What to measure. */
export interface AccuracyOptions extends RefinementOptions {
  /** the user's right-hand sides, column after column, interleaved when `complex`; default none */
  readonly rightHandSides?: { readonly columns: number; readonly values: Float64Array; readonly complex: boolean };
  /** seed of the first random right-hand side, the second takes the next integer; default 1 */
  readonly seed?: number;
}

/** A refinement step as plain data: what is not finite is null. */
export interface CardStep {
  readonly step: number;
  readonly backwardError: number | null;
  readonly componentwiseBackwardError: number | null;
  readonly residualNorm: number | null;
}

/** Measured errors of one right-hand side. */
export interface CardColumn {
  /** "right-hand side 1", "A·1", "random, seed 1" */
  readonly name: string;
  readonly refinement: readonly CardStep[];
  /** which of `refinement` was returned and judged */
  readonly returned: number;
  readonly backwardError: number | null;
  readonly componentwiseBackwardError: number | null;
  readonly unrefinedBackwardError: number | null;
}

/**
 * The accuracy card: plain data, ready for JSON. Whatever is not finite or not defined is null, and `missing` says why.
 * Backward errors at the top are the largest over all right-hand sides; `refinement` is the history of the first.
 */
export interface AccuracyCard {
  readonly verdict: Verdict;
  /** sentences, at least one */
  readonly reasons: readonly string[];
  readonly backwardError: number | null;
  readonly componentwiseBackwardError: number | null;
  readonly unrefinedBackwardError: number | null;
  readonly refinement: readonly CardStep[];
  readonly rightHandSides: readonly CardColumn[];
  /** precision of the residuals that were measured and used */
  readonly residualPrecision: 'working' | 'doubled';
  /** ‖A‖₁·‖A⁻¹‖₁ estimated from below */
  readonly conditionEstimate: number | null;
  /** estimate of ‖x − x̂‖∞ / ‖x̂‖∞, the largest over all right-hand sides */
  readonly forwardErrorEstimate: number | null;
  readonly trustedDigits: number | null;
  /** ‖A‖₁, ‖A‖∞ */
  readonly norms: { readonly one: number | null; readonly infinity: number | null };
  readonly pivotGrowth: number | null;
  readonly pivots: PivotCounts;
  readonly smallestPivot: PivotPlace | null;
  readonly largestPivot: PivotPlace | null;
  /** largest over smallest pivot modulus: cheap, and no condition number */
  readonly pivotRatio: number | null;
  readonly inertia: readonly [number, number, number] | null;
  readonly logAbsDeterminant: number | null;
  readonly determinantSign: readonly [number, number] | null;
  /** field -> why it is null */
  readonly missing: Readonly<Record<string, string>>;
  readonly cautions: readonly string[];
}

/** The card, and the refined solutions of the user's right-hand sides (column after column), null where there were none. */
export interface AccuracyRun {
  readonly card: AccuracyCard;
  readonly solutions: { readonly columns: number; readonly values: Float64Array; readonly complex: boolean } | null;
}

/** The accuracy card of a factorization. See `measureAccuracy`. */
export function accuracyCard(
  matrix: SparseMatrix,
  solver: Solver,
  options: AccuracyOptions = {},
  progress: Progress = noProgress,
): AccuracyCard {
  return measureAccuracy(matrix, solver, options, progress).card;
}

/**
 * Solves with the user's right-hand sides, A·1 and two random ones, refines, measures, estimates and judges.
 * @param matrix the original matrix, with values, square
 * @throws Fault for a matrix without values, not square or with values that are not finite; for a right-hand side of wrong length
 */
export function measureAccuracy(
  matrix: SparseMatrix,
  solver: Solver,
  options: AccuracyOptions = {},
  progress: Progress = noProgress,
): AccuracyRun {
  const system = measuredSystem(matrix);
  const complex = system.complex || solver.complex || (options.rightHandSides?.complex ?? false);
  const { names, b } = rightHandSides(matrix, complex, options);
  const columns = refine(system, solver, b, names.length, complex, options, phase(progress, 0, 0.5));
  const judged = columns.map((c, k) => judgedColumn(c, names[k]));
  const condition = estimateCondition(system, solver, undefined, phase(progress, 0.5, 0.75));
  const finite = judged.every((c) => c.finite);
  const forward = finite
    ? estimateForwardError(system, solver, columns, complex, phase(progress, 0.75, 1))
    : { value: null, reason: 'a solution is not finite' };
  const digits = trustedDigits(forward.value);
  const { verdict, reasons } = judge(judged, forward.value, digits, forward.reason);
  const card: AccuracyCard = {
    verdict,
    reasons,
    backwardError: worstOf(judged.map((c) => c.backwardError)),
    componentwiseBackwardError: worstOf(judged.map((c) => c.componentwiseBackwardError)),
    unrefinedBackwardError: worstOf(columns.map((c) => c.history[0].backwardError)),
    refinement: columns.length > 0 ? columns[0].history.map(cardStep) : [],
    rightHandSides: columns.map((c, k) => cardColumn(c, names[k])),
    residualPrecision: options.residual ?? 'doubled',
    conditionEstimate: condition.value,
    forwardErrorEstimate: forward.value,
    trustedDigits: digits,
    norms: { one: orNull(system.norms.one / system.scale), infinity: orNull(system.norms.infinity / system.scale) },
    ...pivotFacts(solver),
    missing: {},
    cautions: cautionsOf(solver),
  };
  const missing = missingReasons(card, solver, condition.reason, forward.reason);
  return { card: { ...card, missing }, solutions: userSolutions(columns, system, complex, options) };
}

/** All right-hand sides, column after column: the user's, A·1, two random ones. None for an empty matrix. */
function rightHandSides(
  matrix: SparseMatrix,
  complex: boolean,
  options: AccuracyOptions,
): { names: string[]; b: Float64Array } {
  const width = complex ? 2 : 1;
  const length = matrix.columns * width;
  if (length === 0) return { names: [], b: new Float64Array(0) };
  const given = options.rightHandSides;
  const own = given?.columns ?? 0;
  const b = new Float64Array(length * (own + 3));
  if (given !== undefined) copyGiven(given, matrix.columns, complex, b);
  const ones = new Float64Array(length);
  for (let p = 0; p < length; p += width) ones[p] = 1;
  multiplyInto(matrix, ones, b.subarray(own * length, (own + 1) * length), complex);
  const seed = options.seed ?? 1;
  for (let k = 0; k < 2; k++) {
    const random = new Random(seed + k);
    const start = (own + 1 + k) * length;
    for (let p = start; p < start + length; p++) b[p] = 2 * random.next() - 1;
  }
  const names = Array.from({ length: own }, (_, c) => `right-hand side ${c + 1}`);
  return { names: [...names, 'A·1', `random, seed ${seed}`, `random, seed ${seed + 1}`], b };
}

function copyGiven(
  given: NonNullable<AccuracyOptions['rightHandSides']>,
  size: number,
  complex: boolean,
  b: Float64Array,
): void {
  const expected = size * given.columns * (given.complex ? 2 : 1);
  if (given.values.length !== expected) {
    throw new Fault(
      'input',
      'right-hand-side-length',
      `The right-hand sides hold ${given.values.length} numbers; ${given.columns} columns of ${size} unknowns need ${expected}.`,
    );
  }
  if (given.complex === complex) b.set(given.values);
  else for (let p = 0; p < given.values.length; p++) b[2 * p] = given.values[p];
}

function judgedColumn(c: RefinedColumn, name: string) {
  const { backwardError, componentwiseBackwardError } = c.history[c.returned];
  const finite = c.solution.every(Number.isFinite) && Number.isFinite(backwardError);
  return { name, backwardError, componentwiseBackwardError, finite };
}

function cardStep(h: RefinementStep): CardStep {
  return {
    step: h.step,
    backwardError: orNull(h.backwardError),
    componentwiseBackwardError: orNull(h.componentwiseBackwardError),
    residualNorm: orNull(h.residualNorm),
  };
}

function cardColumn(c: RefinedColumn, name: string): CardColumn {
  return {
    name,
    refinement: c.history.map(cardStep),
    returned: c.returned,
    backwardError: orNull(c.history[c.returned].backwardError),
    componentwiseBackwardError: orNull(c.history[c.returned].componentwiseBackwardError),
    unrefinedBackwardError: orNull(c.history[0].backwardError),
  };
}

function pivotFacts(solver: Solver) {
  const { report } = solver;
  const { smallestPivot, largestPivot } = report;
  return {
    pivotGrowth: orNull(report.pivotGrowth),
    pivots: report.counts,
    smallestPivot,
    largestPivot,
    pivotRatio:
      smallestPivot === null || largestPivot === null ? null : orNull(largestPivot.modulus / smallestPivot.modulus),
    inertia: report.inertia,
    logAbsDeterminant: orNull(report.logAbsDeterminant),
    determinantSign: report.determinantSign,
  };
}

function cautionsOf(solver: Solver): string[] {
  const out = [
    'A small residual says that the system was solved, not that the model behind the matrix is right; results that safety ' +
      'rests on stay under the local codes and licensed practice.',
  ];
  const { perturbed } = solver.report.counts;
  if (perturbed > 0) {
    out.push(
      `${perturbed} pivots were perturbed: determinant and inertia are unknown, and the answer rests on refinement.`,
    );
  }
  return out;
}

/** Why each null of the card is one. */
function missingReasons(
  card: AccuracyCard,
  solver: Solver,
  condition: string | null,
  forward: string | null,
): Record<string, string> {
  const missing: Record<string, string> = {};
  const empty = card.rightHandSides.length === 0;
  const notFinite = empty ? 'nothing was solved' : 'not finite';
  const perturbed = solver.report.counts.perturbed > 0 ? 'pivots were perturbed' : null;
  const note = (field: keyof AccuracyCard, why: string): void => {
    if (card[field] === null) missing[field] = why;
  };
  note('backwardError', notFinite);
  note('componentwiseBackwardError', notFinite);
  note('unrefinedBackwardError', notFinite);
  note('conditionEstimate', condition ?? notFinite);
  note('forwardErrorEstimate', forward ?? notFinite);
  note('trustedDigits', forward ?? notFinite);
  note('pivotGrowth', solver.report.pivotGrowth === null ? 'not measured by this factorization' : 'not finite');
  note('smallestPivot', 'there is no pivot');
  note('largestPivot', 'there is no pivot');
  note('pivotRatio', 'there is no pivot, or the ratio is not finite');
  note('inertia', perturbed ?? 'not defined for this factorization');
  note('logAbsDeterminant', perturbed ?? 'not given by this factorization');
  note('determinantSign', perturbed ?? 'not given by this factorization');
  return missing;
}

function userSolutions(
  columns: readonly RefinedColumn[],
  system: MeasuredSystem,
  complex: boolean,
  options: AccuracyOptions,
): AccuracyRun['solutions'] {
  const own = options.rightHandSides?.columns ?? 0;
  if (own === 0) return null;
  const length = system.size * (complex ? 2 : 1);
  const values = new Float64Array(own * length);
  for (let c = 0; c < own && length > 0; c++) values.set(columns[c].solution, c * length);
  return { columns: own, values, complex };
}

/** The largest, null if any is not finite or there is none. */
function worstOf(values: readonly number[]): number | null {
  if (values.length === 0 || !values.every(Number.isFinite)) return null;
  return Math.max(...values);
}

function orNull(x: number | null): number | null {
  return x !== null && Number.isFinite(x) ? x : null;
}

/** A progress that covers the part from … to of another one. */
function phase(progress: Progress, from: number, to: number): Progress {
  return (fraction, name) => progress(from + (to - from) * fraction, name);
}
