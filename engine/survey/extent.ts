import { type Base, notSquare } from './base.ts';
import { type Fact, fact, markEntry, undefinedFact } from './fact.ts';
import { counted, figure, percent, plural } from './wording.ts';

export interface Sizes {
  readonly rows: number;
  readonly columns: number;
  /** stored positions, both triangles, duplicates summed */
  readonly entries: number;
  readonly field: 'real' | 'integer' | 'complex' | 'pattern';
  /** entries ÷ (rows · columns); null without positions */
  readonly density: number | null;
  /** entries whose value is exactly zero; null for a pattern */
  readonly storedZeros: number | null;
  /** entries that are NaN or infinite; null for a pattern */
  readonly notFinite: number | null;
}

export function sizesFact(base: Base): Fact<Sizes> {
  const { rows, columns, field } = base.matrix;
  const cells = rows * columns;
  const density = cells === 0 ? null : base.entries / cells;
  const zeros = base.sizes === null ? null : base.sizes.zeros;
  const notFinite = base.sizes === null ? null : base.sizes.notFinite;
  let sentence = `${plural(rows, 'row')}, ${plural(columns, 'column')}, ${plural(base.entries, 'entry', 'entries')}`;
  if (density !== null) sentence += `: ${percent(density)} of all positions`;
  if (zeros !== null && zeros > 0) sentence += `; ${counted(zeros)} stored with the value zero`;
  if (notFinite !== null && notFinite > 0) sentence += `; ${counted(notFinite)} not finite`;
  const value = { rows, columns, entries: base.entries, field, density, storedZeros: zeros, notFinite };
  return fact(value, `${sentence}.`, 'entries');
}

export interface Bandwidth {
  /** max i − j over the entries */
  readonly lower: number;
  /** max j − i over the entries */
  readonly upper: number;
}

export function bandwidthFact(base: Base): Fact<Bandwidth> {
  const { lowerBandwidth: lower, upperBandwidth: upper, lowest, highest } = base.positions;
  return fact(
    { lower, upper },
    `Lower bandwidth ${counted(lower)}, upper bandwidth ${counted(upper)} (largest distance of an entry from the diagonal, below and above).`,
    'positions',
    'exact',
    [
      markEntry('farthest entry below the diagonal', lowest[0], lowest[1]),
      markEntry('farthest entry above the diagonal', highest[0], highest[1]),
    ],
  );
}

export interface Envelope {
  /** Σ over the rows of A + Aᵀ + I of i − smallest column */
  readonly envelope: number;
}

export function envelopeFact(base: Base): Fact<Envelope> {
  if (!base.square) return undefinedFact(notSquare(base.matrix), 'positions');
  const { first } = base.positions;
  let envelope = 0;
  for (let i = 0; i < first.length; i++) envelope += i - first[i];
  return fact(
    { envelope },
    `Envelope ${counted(envelope)}: the sum over the rows of A + Aᵀ + I of the distance from the first entry to the diagonal.`,
    'positions',
  );
}

export interface Wavefront {
  /** largest number of rows active at one step of an elimination in this order */
  readonly largest: number;
  /** 0-based step at which it is first reached; −1 for an empty matrix */
  readonly at: number;
  /** √(Σ f² ÷ n) */
  readonly rootMeanSquare: number;
}

/** Row i of A + Aᵀ + I is active from the step of its first entry to its own (Sloan 1986; Σ of the wavefronts = envelope + n). */
export function wavefrontFact(base: Base): Fact<Wavefront> {
  if (!base.square) return undefinedFact(notSquare(base.matrix), 'rows');
  const { first } = base.positions;
  const n = first.length;
  const starts = new Int32Array(n);
  for (let i = 0; i < n; i++) starts[first[i]]++;
  let active = 0;
  let largest = 0;
  let at = -1;
  let squares = 0;
  for (let k = 0; k < n; k++) {
    active += starts[k];
    squares += active * active;
    if (active > largest) {
      largest = active;
      at = k;
    }
    active--;
  }
  const rootMeanSquare = n === 0 ? 0 : Math.sqrt(squares / n);
  return fact(
    { largest, at, rootMeanSquare },
    n === 0
      ? 'No wavefront: the matrix is empty.'
      : `Wavefront at most ${plural(largest, 'row')} (at step ${counted(at + 1)}), root mean square ${figure(rootMeanSquare)} rows.`,
    'rows',
    'rounded',
  );
}
