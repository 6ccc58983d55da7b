import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import { noProgress } from '../matrix/progress.ts';
import { type Base, notSquare } from './base.ts';
import { type Fact, fact, markEntry, undefinedFact } from './fact.ts';
import { type Difference, type MirrorScan, scanMirrors } from './mirror.ts';
import { Ticker } from './ticker.ts';
import { counted, figure, percent, plural } from './wording.ts';

export interface Symmetries {
  /** share of the off-diagonal entries whose mirror is an entry, 0 … 1; 1 where there are none */
  readonly patternSymmetry: number;
  /** off-diagonal entries whose mirror is not an entry */
  readonly unmatched: number;
  /** A = Aᵀ exactly; for a pattern (entries taken as ones): the pattern is symmetric */
  readonly valueSymmetric: boolean;
  /** A = Aᴴ exactly; for real values the same as valueSymmetric */
  readonly hermitian: boolean;
  /** A = −Aᵀ exactly; null for a pattern */
  readonly skewSymmetric: boolean | null;
  /** max |A − Aᵀ| and its place (row, column; −1 where there is none), a mirror that is not stored taken as zero; null for a pattern */
  readonly difference: Difference | null;
  /** max |A − Aᴴ|, likewise */
  readonly hermitianDifference: Difference | null;
  /** max |A − Aᵀ| ÷ max |A|; null for a pattern or without values */
  readonly relativeDifference: number | null;
  readonly relativeHermitianDifference: number | null;
  /** entries of A + Aᵀ */
  readonly symmetrisedEntries: number;
}

/** `scan` is null for a rectangular matrix. */
export function symmetryFact(base: Base, scan: MirrorScan | null): Fact<Symmetries> {
  if (scan === null) return undefinedFact(notSquare(base.matrix), '1');
  const unmatched = scan.offDiagonal - scan.mirrored;
  const hasValues = base.sizes !== null;
  const largest = base.sizes === null ? 0 : base.sizes.largest;
  const value: Symmetries = {
    patternSymmetry: scan.offDiagonal === 0 ? 1 : scan.mirrored / scan.offDiagonal,
    unmatched,
    valueSymmetric: scan.symmetric.differing === 0,
    hermitian: scan.hermitian.differing === 0,
    skewSymmetric: hasValues ? scan.skew.differing === 0 : null,
    difference: hasValues ? scan.symmetric : null,
    hermitianDifference: hasValues ? scan.hermitian : null,
    relativeDifference: largest > 0 ? scan.symmetric.largest / largest : null,
    relativeHermitianDifference: largest > 0 ? scan.hermitian.largest / largest : null,
    symmetrisedEntries: base.entries + unmatched,
  };
  return fact(value, `${patternSentence(value)} ${valueSentence(base, value)}`, 'as the values', 'exact', [
    markEntry('an entry whose mirror is not stored', scan.lone[0], scan.lone[1]),
    ...(hasValues
      ? [
          markEntry('largest |A − Aᵀ|', scan.symmetric.at[0], scan.symmetric.at[1]),
          markEntry('largest |A − Aᴴ|', scan.hermitian.at[0], scan.hermitian.at[1]),
        ]
      : []),
  ]);
}

function patternSentence(value: Symmetries): string {
  if (value.unmatched === 0) return 'The pattern is symmetric.';
  return (
    `The pattern is ${percent(value.patternSymmetry)} symmetric: ` +
    `${plural(value.unmatched, 'off-diagonal entry has no mirror entry', 'off-diagonal entries have no mirror entry')}.`
  );
}

function valueSentence(base: Base, value: Symmetries): string {
  const complex = base.matrix.field === 'complex';
  if (value.difference === null || value.hermitianDifference === null) return 'It has no values.';
  if (value.skewSymmetric && base.entries > 0 && !value.valueSymmetric) return 'The values are skew-symmetric exactly.';
  if (!complex) return `The values are ${nearness('symmetric', 'Aᵀ', value.difference, value.relativeDifference)}.`;
  const plain = nearness('symmetric', 'Aᵀ', value.difference, value.relativeDifference);
  const conjugate = nearness('hermitian', 'Aᴴ', value.hermitianDifference, value.relativeHermitianDifference);
  return `The values are ${plain}; they are ${conjugate}.`;
}

/** Below this, a difference is told as rounding: a thousand units in the last place of the largest value. */
const roundingLevel = 1000 * 2 ** -52;

function nearness(word: string, mirror: string, d: Difference, relative: number | null): string {
  if (d.differing === 0) return `${word} exactly`;
  if (relative === null) return `not ${word}`;
  const where = d.at[0] < 0 ? '' : ` in row ${counted(d.at[0] + 1)}, column ${counted(d.at[1] + 1)}`;
  const pairs = plural(d.differing, 'pair differs', 'pairs differ');
  if (relative <= roundingLevel && d.largest > 0) {
    return `${word} up to ${figure(relative)} of the largest value (${pairs}, largest${where})`;
  }
  return `not ${word}: max |A − ${mirror}| = ${figure(d.largest)}${where}; ${pairs}`;
}

/** The symmetry a matrix has exactly, strongest use first; null for none or a rectangular one. */
export function mirrorSymmetry(a: SparseMatrix): Symmetry | null {
  if (a.rows !== a.columns) return null;
  const scan = scanMirrors(a, null, new Ticker(noProgress, 1));
  if (scan.mirrored < scan.offDiagonal) return null;
  if (scan.symmetric.differing === 0) return 'symmetric';
  if (scan.hermitian.differing === 0) return 'hermitian';
  return scan.skew.differing === 0 ? 'skew-symmetric' : null;
}
