import { Fault } from '../../matrix/fault.ts';

/** How a factorization over fronts is to be made. Vectors are in the original numbering. */
export interface FrontOptions {
  /** `cholesky`: LLᵀ or LLᴴ; `ldlt`: LDLᵀ or LDLᴴ; `lu`: on the pattern of A + Aᵀ */
  readonly kind: 'cholesky' | 'ldlt' | 'lu';
  /** complex only: factorize LLᴴ / LDLᴴ; complex `cholesky` is always Hermitian. Default false */
  readonly hermitian?: boolean;
  /** `none`: the planned pivots whatever they are; `threshold`: delay those that fail; `static`: replace those that are too small */
  readonly pivoting: 'none' | 'threshold' | 'static';
  /** u of threshold pivoting: multipliers stay ≤ 1/u. LDLᵀ: 0 < u ≤ 0.5, default 0.01; LU: 0 < u ≤ 1, default 0.1 */
  readonly threshold?: number;
  /** static pivoting: a pivot smaller than this · max|R·A·C| is replaced by that modulus (Li & Demmel 1998). Default √ε */
  readonly perturbation?: number;
  /**
   * `single`: factors are rounded to single precision when they are stored, half the memory; the arithmetic of the factorization and
   * of the solves stays double. Refine the solution. Default `double`
   */
  readonly precision?: 'double' | 'single';
  /** R of R·A·C (S of S·A·S for the symmetric kinds), by original row; default ones */
  readonly rowScale?: Float64Array;
  /** C of R·A·C, by original column; default ones. Not for the symmetric kinds, where it is S too */
  readonly columnScale?: Float64Array;
  /** the last so many unknowns of the tree's order are held: not eliminated, their Schur complement is returned. Default 0 */
  readonly schur?: number;
  /** LU only: row rowPermutation[j] of the matrix is paired with column j (large-entry matching), and the tree is of that paired matrix */
  readonly rowPermutation?: Int32Array;
}

/** All options, defaults filled in. */
export interface SettledOptions {
  readonly kind: 'cholesky' | 'ldlt' | 'lu';
  readonly hermitian: boolean;
  readonly pivoting: 'none' | 'threshold' | 'static';
  readonly threshold: number;
  readonly perturbation: number;
  readonly single: boolean;
  readonly rowScale: Float64Array | null;
  readonly columnScale: Float64Array | null;
  readonly schur: number;
  readonly rowPermutation: Int32Array | null;
}

/** Fills in defaults and refuses what cannot be. @throws Fault of kind "input". */
export function settleOptions(o: FrontOptions, n: number, complex: boolean): SettledOptions {
  const threshold = o.threshold ?? (o.kind === 'lu' ? 0.1 : 0.01);
  const most = o.kind === 'lu' ? 1 : 0.5;
  if (!(threshold > 0 && threshold <= most)) {
    throw refusal(
      'threshold-out-of-range',
      `The pivot threshold is ${threshold}; expected more than 0 and at most ${most}.`,
    );
  }
  const perturbation = o.perturbation ?? Math.sqrt(Number.EPSILON);
  if (!(perturbation > 0 && perturbation < 1)) {
    throw refusal('perturbation-out-of-range', `The perturbation is ${perturbation}; expected between 0 and 1.`);
  }
  const schur = o.schur ?? 0;
  if (!(Number.isInteger(schur) && schur >= 0 && schur <= n)) {
    throw refusal('held-out-of-range', `${schur} unknowns are to be held; expected an integer from 0 to ${n}.`);
  }
  if (o.kind !== 'lu' && o.rowPermutation !== undefined) {
    throw refusal(
      'pairing-not-symmetric',
      'A pairing of rows with columns is for LU; the symmetric kinds keep their order.',
    );
  }
  checkLength(o.rowScale, n, 'row scaling');
  checkLength(o.columnScale, n, 'column scaling');
  checkLength(o.rowPermutation, n, 'pairing of rows');
  const rowScale = o.rowScale ?? null;
  return {
    kind: o.kind,
    hermitian: complex && (o.kind === 'cholesky' || (o.kind === 'ldlt' && o.hermitian === true)),
    pivoting: o.kind === 'cholesky' ? 'none' : o.pivoting,
    threshold,
    perturbation,
    single: o.precision === 'single',
    rowScale,
    columnScale: o.kind === 'lu' ? (o.columnScale ?? null) : rowScale,
    schur,
    rowPermutation: o.rowPermutation ?? null,
  };
}

function checkLength(v: { readonly length: number } | undefined, n: number, what: string): void {
  if (v !== undefined && v.length !== n) {
    throw refusal('length-mismatch', `The ${what} has ${v.length} numbers; the matrix has ${n} rows.`);
  }
}

function refusal(code: string, message: string): Fault {
  return new Fault('input', code, message);
}
