import { magnitudeAt } from '../matrix/modulus.ts';
import { entryCount } from '../matrix/pattern.ts';
import { type Base, noValues } from './base.ts';
import { decade } from './decade.ts';
import { type Fact, fact, markEntry, markWhere, undefinedFact } from './fact.ts';
import type { Ticker } from './ticker.ts';
import { counted, figure, plural } from './wording.ts';

export interface Magnitudes {
  /** decade d: entries with 10ᵈ ≤ |a| < 10ᵈ⁺¹, increasing d, empty decades left out */
  readonly histogram: readonly { readonly decade: number; readonly entries: number }[];
  readonly zeros: number;
  readonly notFinite: number;
  /** largest |a| and where (row, column; 0-based); null where there is none */
  readonly largest: number | null;
  readonly largestAt: readonly [number, number] | null;
  /** smallest |a| > 0 */
  readonly smallest: number | null;
  readonly smallestAt: readonly [number, number] | null;
}

export function magnitudesFact(base: Base, ticker: Ticker): Fact<Magnitudes> {
  const { sizes } = base;
  if (sizes === null) return undefinedFact(noValues, 'as the values');
  const histogram = decades(base, ticker);
  const any = sizes.largest > 0;
  const marks = any
    ? [
        markEntry('largest entry', sizes.largestAt[0], sizes.largestAt[1]),
        markEntry('smallest entry that is not zero', sizes.smallestAt[0], sizes.smallestAt[1]),
        ...extremeRows(base),
      ]
    : [];
  const value: Magnitudes = {
    histogram,
    zeros: sizes.zeros,
    notFinite: sizes.notFinite,
    largest: any ? sizes.largest : null,
    largestAt: any ? sizes.largestAt : null,
    smallest: any ? sizes.smallest : null,
    smallestAt: any ? sizes.smallestAt : null,
  };
  return fact(value, sentenceOf(value), 'as the values', 'exact', marks);
}

function sentenceOf(m: Magnitudes): string {
  const rest =
    (m.zeros > 0 ? ` ${plural(m.zeros, 'entry is', 'entries are')} exactly zero.` : '') +
    (m.notFinite > 0
      ? ` ${plural(m.notFinite, 'entry is', 'entries are')} not finite: numeric work is impossible.`
      : '');
  if (m.largest === null || m.smallest === null || m.largestAt === null || m.smallestAt === null) {
    return rest === '' ? 'There are no values.' : `No entry has a finite value other than zero.${rest}`;
  }
  const span = m.histogram[m.histogram.length - 1].decade - m.histogram[0].decade + 1;
  const at = (p: readonly [number, number]): string => `row ${counted(p[0] + 1)}, column ${counted(p[1] + 1)}`;
  return (
    `Magnitudes from ${figure(m.smallest)} (${at(m.smallestAt)}) to ${figure(m.largest)} (${at(m.largestAt)}), ` +
    `over ${plural(span, 'decade')}.${rest}`
  );
}

function decades(base: Base, ticker: Ticker): { decade: number; entries: number }[] {
  const { matrix } = base;
  const values = matrix.values;
  if (values === null) return [];
  const width = matrix.field === 'complex' ? 2 : 1;
  const count = entryCount(matrix);
  const bins = new Float64Array(633);
  for (let from = 0; from < count; from += 65536) {
    const to = Math.min(count, from + 65536);
    for (let p = from; p < to; p++) {
      const x = magnitudeAt(values, width, p);
      if (x > 0 && x < Number.POSITIVE_INFINITY) bins[decade(x) + 324]++;
    }
    ticker.add(to - from);
  }
  const out: { decade: number; entries: number }[] = [];
  for (let b = 0; b < bins.length; b++) if (bins[b] > 0) out.push({ decade: b - 324, entries: bins[b] });
  return out;
}

/** Rows with an entry in the top decade, and rows with one in the bottom decade, where these are not the same decade. */
function extremeRows(base: Base): ReturnType<typeof markWhere>[] {
  const { sizes } = base;
  if (sizes === null) return [];
  const top = decade(sizes.largest);
  const bottom = decade(sizes.smallest);
  if (top === bottom) return [];
  const high = new Uint8Array(base.matrix.rows);
  const low = new Uint8Array(base.matrix.rows);
  for (let i = 0; i < high.length; i++) {
    const big = sizes.rowLargest[i];
    if (big > 0 && big < Number.POSITIVE_INFINITY && decade(big) === top) high[i] = 1;
    const small = sizes.rowSmallest[i];
    if (small < Number.POSITIVE_INFINITY && decade(small) === bottom) low[i] = 1;
  }
  return [
    markWhere('rows with an entry in the top decade', 'rows', high),
    markWhere('rows with an entry in the bottom decade', 'rows', low),
  ];
}
