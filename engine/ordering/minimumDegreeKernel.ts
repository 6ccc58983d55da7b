/**
 * The five stages of eliminating one pivot p from a quotient graph: Amestoy, Davis & Duff 1996, "An approximate minimum degree ordering
 * algorithm". Each stage is a function of its own on one Int32Array (see minimumDegreeWorkspace.ts), so that each is compiled, and stays
 * compiled, by itself. Between the stages the variables of the element p have negative weights.
 */
import {
  DEGREE,
  ELEMENTS,
  IS_ELEMENT,
  IS_GONE,
  LENGTH,
  MARK,
  NEXT,
  PREVIOUS,
  START,
  WEIGHT,
} from './minimumDegreeWorkspace.ts';

/** Upper bound of the length of the element p. */
export function elementBound(w: Int32Array, p: number): number {
  const from = w[p + START];
  const elements = w[p + ELEMENTS];
  let bound = w[p + LENGTH] - elements;
  for (let q = from; q < from + elements; q++) bound += w[w[q] + LENGTH];
  return bound;
}

/**
 * Stage 1: the variables adjacent to p, itself or by an element, become the element p; its old elements are absorbed.
 * The list is formed in place when p has no elements, else at `free`. Variables leave their degree lists.
 * @returns the end of the element's list
 */
export function formElement(w: Int32Array, p: number, free: number): number {
  const from = w[p + START];
  const elements = w[p + ELEMENTS];
  const length = w[p + LENGTH];
  const begin = elements === 0 ? from : free;
  let end = begin;
  let weight = 0;
  w[p + WEIGHT] = -w[p + WEIGHT];
  for (let k = 0; k <= elements; k++) {
    let q = from + elements;
    let stop = from + length;
    if (k < elements) {
      const e = w[from + k];
      q = w[e + START];
      stop = q + w[e + LENGTH];
      w[e + MARK] = 0;
    }
    for (; q < stop; q++) {
      const i = w[q];
      const wi = w[i + WEIGHT];
      if (wi <= 0) continue;
      w[i + WEIGHT] = -wi;
      weight += wi;
      w[end++] = i;
      const after = w[i + NEXT];
      const before = w[i + PREVIOUS];
      w[after + PREVIOUS] = before;
      w[before + NEXT] = after;
    }
  }
  w[p + START] = begin;
  w[p + LENGTH] = end - begin;
  w[p + ELEMENTS] = IS_ELEMENT;
  w[p + DEGREE] = weight;
  return end;
}

/** Stage 2: MARK of every element e that meets p becomes flag + weight of e outside p. Marks in use were below `flag` before. */
export function weighElements(w: Int32Array, p: number, flag: number): void {
  const begin = w[p + START];
  const end = begin + w[p + LENGTH];
  for (let q = begin; q < end; q++) {
    const i = w[q];
    const wi = w[i + WEIGHT]; // negative
    const from = w[i + START];
    const to = from + w[i + ELEMENTS];
    for (let s = from; s < to; s++) {
      const e = w[s];
      const mark = w[e + MARK];
      if (mark >= flag) w[e + MARK] = mark + wi;
      else if (mark !== 0) w[e + MARK] = w[e + DEGREE] + flag + wi;
    }
  }
}

/**
 * Stage 3: lists and degrees of the variables of p. Elements inside p are absorbed, also those that p was not adjacent to (aggressive
 * absorption). Variables with nothing outside p are eliminated with it (mass elimination). The others get the part of their degree that
 * lies outside p, and go into hash buckets.
 */
export function updateDegrees(
  w: Int32Array,
  p: number,
  flag: number,
  interiorEnd: number,
  buckets: number,
  bucketMask: number,
): void {
  const begin = w[p + START];
  const end = begin + w[p + LENGTH];
  let weight = w[p + DEGREE];
  for (let q = begin; q < end; q++) {
    const i = w[q];
    const from = w[i + START];
    const middle = from + w[i + ELEMENTS];
    const to = from + w[i + LENGTH];
    let at = from;
    let degree = 0;
    let hash = 0;
    for (let s = from; s < middle; s++) {
      const e = w[s];
      const outside = w[e + MARK] - flag;
      if (outside > 0) {
        degree += outside;
        hash = (hash + e) | 0;
        w[at++] = e;
      } else w[e + MARK] = 0;
    }
    const kept = at;
    for (let s = middle; s < to; s++) {
      const j = w[s];
      const wj = w[j + WEIGHT];
      if (wj <= 0) continue;
      degree += wj;
      hash = (hash + j) | 0;
      w[at++] = j;
    }
    if (degree === 0 && i < interiorEnd) {
      weight += w[i + WEIGHT];
      w[i + WEIGHT] = 0;
      w[i + ELEMENTS] = IS_GONE;
      w[i + NEXT] = p;
      continue;
    }
    if (degree < w[i + DEGREE]) w[i + DEGREE] = degree;
    // p goes behind the elements: it takes the place of an element or variable that left the list
    w[at] = w[kept];
    w[kept] = p;
    w[i + ELEMENTS] = kept - from + 1;
    w[i + LENGTH] = at - from + 1;
    const bucket = buckets + ((hash >>> 3) & bucketMask);
    w[i + PREVIOUS] = bucket;
    w[i + NEXT] = w[bucket];
    w[bucket] = i;
  }
  w[p + DEGREE] = weight;
}

/**
 * Stage 4: variables of p with the same list are merged (indistinguishable, found by hash). Interior and halo are never merged.
 * @returns a flag above all marks in use
 */
export function mergeIndistinguishable(w: Int32Array, p: number, flag0: number, interiorEnd: number): number {
  const begin = w[p + START];
  const end = begin + w[p + LENGTH];
  let flag = flag0;
  for (let q = begin; q < end; q++) {
    if (w[w[q] + WEIGHT] === 0) continue;
    const bucket = w[w[q] + PREVIOUS];
    let i = w[bucket];
    if (i === -1) continue;
    w[bucket] = -1;
    while (w[i + NEXT] !== -1) {
      mergeInto(w, i, flag, interiorEnd);
      flag++;
      i = w[i + NEXT];
      if (i === -1) break;
    }
  }
  return flag;
}

/** Merges into i all variables behind it in its bucket that have its list. */
function mergeInto(w: Int32Array, i: number, flag: number, interiorEnd: number): void {
  const length = w[i + LENGTH];
  const elements = w[i + ELEMENTS];
  const from = w[i + START];
  for (let s = from; s < from + length; s++) w[w[s] + MARK] = flag;
  let before = i;
  let j = w[i + NEXT];
  while (j !== -1) {
    const next = w[j + NEXT];
    let same = w[j + LENGTH] === length && w[j + ELEMENTS] === elements && i < interiorEnd === j < interiorEnd;
    const start = w[j + START];
    for (let s = start; same && s < start + length; s++) same = w[w[s] + MARK] === flag;
    if (same) {
      w[i + WEIGHT] += w[j + WEIGHT];
      w[j + WEIGHT] = 0;
      w[j + ELEMENTS] = IS_GONE;
      w[j + NEXT] = i;
      w[before + NEXT] = next;
    } else before = j;
    j = next;
  }
}

/**
 * Stage 5: what is left of the element p, weights positive again, full degrees, variables back in their degree lists.
 * They queue behind the others of equal degree, or step before them (`atFront`). NEXT of p becomes the list of least degree among them (or the halo list).
 * @returns the end of the element's list
 */
export function finishElement(
  w: Int32Array,
  p: number,
  remaining: number,
  interiorEnd: number,
  heads: number,
  haloList: number,
  atFront: boolean,
): number {
  const begin = w[p + START];
  const end = begin + w[p + LENGTH];
  const weight = w[p + DEGREE];
  let at = begin;
  let least = haloList;
  for (let q = begin; q < end; q++) {
    const i = w[q];
    const wi = -w[i + WEIGHT];
    if (wi === 0) continue;
    w[i + WEIGHT] = wi;
    w[at++] = i;
    let degree = w[i + DEGREE] + weight - wi;
    if (degree > remaining - wi) degree = remaining - wi;
    w[i + DEGREE] = degree;
    const list = i < interiorEnd ? heads + 4 * degree + (wi > 1 ? 2 : 0) - NEXT : haloList;
    if (list < least) least = list;
    // right after `before`: behind all others of the list, or before them
    const before = atFront ? list : w[list + PREVIOUS];
    const next = w[before + NEXT];
    w[i + PREVIOUS] = before;
    w[i + NEXT] = next;
    w[before + NEXT] = i;
    w[next + PREVIOUS] = i;
  }
  w[p + WEIGHT] = 0;
  w[p + LENGTH] = at - begin;
  w[p + MARK] = at > begin ? 1 : 0;
  w[p + NEXT] = least;
  return at;
}
