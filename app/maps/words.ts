import { exactly, percent, plainNumber } from '../figures/format.ts';
import type { Spot } from '../workers/mapOperations.ts';
import type { CellFacts } from './draw.ts';
import type { MapImage } from './paneImages.ts';

/** "3" or "3–17": positions start … end − 1, written 1-based as in files. */
export function span(start: number, end: number): string {
  return end - start <= 1 ? exactly(start + 1) : `${exactly(start + 1)}–${exactly(end)}`;
}

/** What a cell holds, in words. */
export function sayCell(facts: CellFacts): string {
  const { original, fill, kind } = facts;
  if (original === 0 && fill === 0) return 'no entries';
  const about = kind === 'sampled' ? 'about ' : '';
  const parts = [];
  if (original > 0) parts.push(`${about}${exactly(original)} of the matrix`);
  if (fill > 0) parts.push(`${about}${exactly(fill)} of fill-in`);
  return parts.join(', ');
}

/** The value of an entry: a number, or a complex one. */
export function sayValue(value: readonly number[]): string {
  const [re, im] = value;
  if (im === undefined) return String(re);
  return `${re} ${im < 0 || Object.is(im, -0) ? '−' : '+'} ${Math.abs(im)}i`;
}

/** What stands at one position: kind and value. */
export function saySpot(spot: Spot): string {
  if (spot.kind === 'none') return 'no entry';
  if (spot.kind === 'fill')
    return spot.row === spot.column ? 'diagonal of the factor, not stored in the file' : 'fill-in';
  return spot.value === null ? 'entry of the matrix' : `entry of the matrix, ${sayValue(spot.value)}`;
}

/** Why an entry of fill-in is there. Unknowns original, 0-based, ends first and last; at most so many are named. */
export function sayPath(unknowns: ArrayLike<number>, most = 12): string {
  const name = (k: number): string => exactly(unknowns[k] + 1);
  const inner = unknowns.length - 2;
  const first = name(0);
  const last = name(unknowns.length - 1);
  if (inner < 1) return `${first} and ${last} are joined by an entry of the matrix.`;
  const shown = Math.min(inner, most);
  const steps = [first, ...Array.from({ length: shown }, (_, k) => name(k + 1))];
  if (inner > shown) steps.push(`… ${exactly(inner - shown)} more …`);
  steps.push(last);
  const who =
    inner === 1
      ? `Unknown ${name(1)} is joined to both ${first} and ${last}; eliminating it`
      : `A path of ${exactly(inner)} unknowns joins ${first} and ${last}; all are eliminated before both, and that`;
  return `${who} leaves an entry here. Path: ${steps.join(' – ')}.`;
}

/** Everything the picture shows, in words: for those who cannot see it, and under an exported one. */
export function sayMap(title: string, rows: number, columns: number, whole: MapImage | null): string {
  const size = `${exactly(rows)} rows and ${exactly(columns)} columns`;
  if (whole === null) return `Map of ${title}: ${size}; being drawn.`;
  const { counts } = whole;
  const sums = sumsOf(counts.original, counts.fill, counts.rows, counts.columns);
  const about = counts.kind === 'sampled' ? 'about ' : '';
  const parts = [`Map of ${title}: ${size}, ${about}${exactly(sums.original)} entries of the matrix`];
  if (sums.fill > 0) {
    parts.push(
      `${about}${exactly(sums.fill)} of fill-in, ${percent(sums.lastFill / sums.fill).digits} % of it in the last tenth of the rows`,
    );
  }
  const total = sums.original + sums.fill;
  if (total > 0)
    parts.push(`${percent(sums.near / total).digits} % lie within a twentieth of the order from the diagonal`);
  return `${parts.join('; ')}.`;
}

function sumsOf(original: Float64Array, fill: Float64Array, rows: number, columns: number) {
  const sums = { original: 0, fill: 0, lastFill: 0, near: 0 };
  for (let r = 0, at = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++, at++) {
      sums.original += original[at];
      sums.fill += fill[at];
      if (r >= 0.9 * rows) sums.lastFill += fill[at];
      if (Math.abs(r / rows - c / columns) <= 0.05) sums.near += original[at] + fill[at];
    }
  }
  return sums;
}

/** How large a dot of the map is. */
export function sayScale(rowsPerCell: number, columnsPerCell: number): string {
  if (rowsPerCell <= 1 && columnsPerCell <= 1) return 'every entry drawn singly';
  const side = (x: number): string => (x <= 1 ? '1' : plainNumber(x).digits);
  return `one dot = ${side(rowsPerCell)} × ${side(columnsPerCell)} places`;
}
