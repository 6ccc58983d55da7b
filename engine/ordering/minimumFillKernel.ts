/**
 * What approximate minimum fill adds to the stages of minimumDegreeKernel.ts: how much of the clique a pivot would form is there already,
 * and lists by fill instead of degree.
 */
import { DEGREE, ELEMENTS, LENGTH, MARK, NEXT, PREVIOUS, RECORD, START, WEIGHT } from './minimumDegreeWorkspace.ts';

/**
 * Between stages 2 and 3: overlap[i] becomes the pairs of neighbours of i that other elements than p already join, x of the weight of an
 * element lying outside p: x (x − 1) / 2 pairs outside, x · (rest) across. Elements are taken as disjoint outside p, as in the approximate
 * degree. Ng & Raghavan 1999 subtract all cliques in this way; Rothberg & Eisenstat 1998 only the latest.
 */
export function measureOverlap(w: Int32Array, p: number, flag: number, overlap: Float64Array): void {
  const begin = w[p + START];
  const end = begin + w[p + LENGTH];
  for (let q = begin; q < end; q++) {
    const i = w[q];
    const own = -w[i + WEIGHT];
    const from = w[i + START];
    const to = from + w[i + ELEMENTS];
    let pairs = 0;
    for (let s = from; s < to; s++) {
      const e = w[s];
      const x = w[e + MARK] - flag;
      if (x > 0) pairs += x * ((x - 1) / 2 + (w[e + DEGREE] - x - own));
    }
    overlap[i / RECORD] = pairs;
  }
}

/** Lists of fill: numbers below 2⁶⁴ by exponent and the first bits of the fraction. */
const FRACTION_BITS = 7;
export const FILL_LISTS = (64 << FRACTION_BITS) + 1;
const asFloat = new Float32Array(1);
const asBits = new Int32Array(asFloat.buffer);

/** Number of the list of a score ≥ 0: equal within a part in 2⁷. Shared scratch is safe: no call lies between its write and its read. */
export function fillList(score: number): number {
  asFloat[0] = score + 1;
  return (asBits[0] >> (23 - FRACTION_BITS)) - (127 << FRACTION_BITS);
}

/**
 * Mean fill (Rothberg & Eisenstat 1998): new pairs for each unknown eliminated, when `weight` unknowns with external degree d go and `joined`
 * pairs of their neighbours are joined already. Both are approximate, so the difference can fall below 0.
 */
export function fillScore(d: number, weight: number, joined: number): number {
  const fill = (d * (d - 1)) / 2 - joined;
  return fill > 0 ? fill / weight : 0;
}

/** A set of list numbers: two levels of bits. */
export class ListSet {
  private readonly words: Int32Array;
  private readonly summary: Int32Array;
  constructor(size: number) {
    this.words = new Int32Array((size >> 5) + 1);
    this.summary = new Int32Array((size >> 10) + 1);
  }
  add(l: number): void {
    this.words[l >> 5] |= 1 << (l & 31);
    this.summary[l >> 10] |= 1 << ((l >> 5) & 31);
  }
  remove(l: number): void {
    this.words[l >> 5] &= ~(1 << (l & 31));
    if (this.words[l >> 5] === 0) this.summary[l >> 10] &= ~(1 << ((l >> 5) & 31));
  }
  /** The least number in the set, −1 when it is empty. */
  least(): number {
    const { words, summary } = this;
    for (let s = 0; s < summary.length; s++) {
      if (summary[s] === 0) continue;
      const k = (s << 5) + 31 - Math.clz32(summary[s] & -summary[s]);
      return (k << 5) + 31 - Math.clz32(words[k] & -words[k]);
    }
    return -1;
  }
}

/** Stage 5 by fill: weights positive again, full degrees, variables into the lists of their scores. Returns the end of the element's list. */
export function finishElementByFill(
  w: Int32Array,
  p: number,
  remaining: number,
  interiorEnd: number,
  heads: number,
  haloList: number,
  overlap: Float64Array,
  occupied: ListSet,
): number {
  const begin = w[p + START];
  const end = begin + w[p + LENGTH];
  const weight = w[p + DEGREE];
  let at = begin;
  for (let q = begin; q < end; q++) {
    const i = w[q];
    const wi = -w[i + WEIGHT];
    if (wi === 0) continue;
    w[i + WEIGHT] = wi;
    w[at++] = i;
    const inside = weight - wi;
    let degree = w[i + DEGREE] + inside;
    if (degree > remaining - wi) degree = remaining - wi;
    w[i + DEGREE] = degree;
    let list = haloList;
    if (i < interiorEnd) {
      const joined = overlap[i / RECORD] + (inside * (inside - 1)) / 2;
      const l = fillList(fillScore(degree, wi, joined));
      occupied.add(l);
      list = heads + 2 * l - NEXT;
    }
    const last = w[list + PREVIOUS];
    w[i + PREVIOUS] = last;
    w[i + NEXT] = list;
    w[last + NEXT] = i;
    w[list + PREVIOUS] = i;
  }
  w[p + WEIGHT] = 0;
  w[p + LENGTH] = at - begin;
  w[p + MARK] = at > begin ? 1 : 0;
  return at;
}
