import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import type { ImportNote } from './loaded.ts';

/** Values up to so many significant digits are called few. */
const fewDigits = 6;
/** so many values are looked at for their digits */
const digitSample = 200_000;

/** Counts exact zeros and values that are not finite, and notes what an engineer should know of the values. Null for a pattern. */
export function valueNotes(
  a: SparseMatrix,
  symmetry: Symmetry,
  notes: ImportNote[],
): { zeros: number; notFinite: number } | null {
  const { values } = a;
  if (values === null) {
    notes.push({
      code: 'pattern-only',
      text: 'The file holds positions without values: structure can be analysed, numeric work needs values.',
      offers: [{ id: 'synthetic-values', text: 'Make up values, labelled synthetic: −1 off a dominant diagonal' }],
    });
    return null;
  }
  const width = a.field === 'complex' ? 2 : 1;
  let zeros = 0;
  let notFinite = 0;
  let imaginary = 0;
  let inexact = 0;
  let wide = 0;
  const places: number[] = [];
  for (let e = 0, k = 0; e < values.length; e += width, k++) {
    const re = values[e];
    const im = width === 2 ? values[e + 1] : 0;
    if (re === 0 && im === 0) zeros++;
    // x − x is 0 for finite x only
    else if (re - re !== 0 || im - im !== 0) {
      notFinite++;
      if (places.length < 5) places.push(k);
    }
    if (im !== 0) imaginary++;
    if (re >= 2147483648 || re < -2147483648) {
      wide++;
      if (re >= 9007199254740992 || re <= -9007199254740992) inexact++;
    }
  }
  if (zeros > 0) {
    notes.push({
      code: 'explicit-zeros',
      text: `${a.rowIndex.length} entries, ${zeros} of them exact zeros (kept: they are part of the pattern).`,
      offers: [{ id: 'drop-zeros', text: 'Drop the exact zeros' }],
    });
  }
  if (notFinite > 0) {
    const where = places.map((k) => placeOf(a, k)).join(', ');
    notes.push({
      code: 'not-finite',
      text: `${notFinite} values are NaN or infinite, first at (row, column) ${where}; the structure can be analysed, numeric work is impossible.`,
    });
  }
  if (width === 2 && imaginary === 0 && values.length > 0) {
    notes.push({
      code: 'imaginary-zero',
      text: 'The values are complex, but all imaginary parts are zero.',
      offers: [{ id: 'use-as-real', text: 'Use as real: half the memory' }],
    });
  }
  if (a.field === 'integer' && wide > 0) {
    notes.push({
      code: 'large-integers',
      text: `${wide} integers do not fit in 32 bits; all are held as doubles${inexact === 0 ? ', exactly.' : `. ${inexact} of them are 2^53 or more in modulus and may have lost their last digits.`}`,
    });
  }
  if (a.field === 'real' || width === 2) noteFewDigits(values, notes);
  if (width === 2 && symmetry === 'symmetric' && imaginary > 0) noteHermitianLook(a, values, notes);
  return { zeros, notFinite };
}

/** "(row, column)" of entry k, 1-based. */
function placeOf(a: SparseMatrix, k: number): string {
  let low = 0;
  let high = a.columns;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (a.columnPointer[middle] <= k) low = middle;
    else high = middle;
  }
  return `(${a.rowIndex[k] + 1}, ${low + 1})`;
}

function noteFewDigits(values: Float64Array, notes: ImportNote[]): void {
  let most = 0;
  const end = Math.min(values.length, digitSample);
  for (let k = 0; k < end; k++) {
    const v = values[k];
    if (Number.isInteger(v) || v - v !== 0) continue;
    if (Number(v.toPrecision(fewDigits)) !== v) return;
    most = Math.max(most, v.toExponential().replace(/^-/, '').indexOf('e') - 1);
  }
  if (most < 4 || values.length > digitSample) return;
  notes.push({
    code: 'few-digits',
    text: `Values carry at most ${most} digits: a residual below 1e-${most} of the true system cannot be judged.`,
  });
}

/** A complex symmetric matrix is suspicious where its diagonal is real and the rest is not: Hermitian ones look so. */
function noteHermitianLook(a: SparseMatrix, values: Float64Array, notes: ImportNote[]): void {
  let diagonal = 0;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (a.rowIndex[p] !== j) continue;
      if (values[2 * p + 1] !== 0) return;
      diagonal++;
    }
  }
  if (diagonal === 0) return;
  notes.push({
    code: 'looks-hermitian',
    text: 'Declared complex symmetric and read so, but the whole diagonal is real while other entries are not, as in a Hermitian matrix.',
    offers: [{ id: 'read-as-hermitian', text: 'Read as Hermitian' }],
  });
}
