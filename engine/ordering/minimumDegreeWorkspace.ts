/**
 * The storage of a quotient graph (George & Liu 1989; Amestoy, Davis & Duff 1996): one Int32Array that holds a record of
 * eight integers for each vertex, the heads of the degree lists, the heads of the hash buckets, and the adjacency lists.
 *
 * Records lie together because one step of the elimination touches most fields of the same vertex: one cache line instead
 * of eight. A vertex is named by the address of its record (8 · index) everywhere, in the lists too, so that no index is
 * ever multiplied in a hot loop.
 */

/** Integers in a record. */
export const RECORD = 8;
/** unknowns the vertex stands for; negative while it belongs to the element being formed, 0 once eliminated or merged */
export const WEIGHT = 0;
/** of an element: flag + weight outside the element being formed, 0 once absorbed; of a variable: flag while lists are compared */
export const MARK = 1;
/** where its list starts */
export const START = 2;
/** length of its list: for a variable its elements, then its variables; for an element its variables */
export const LENGTH = 3;
/** of a variable: how many elements stand at the front of its list; `IS_ELEMENT`; or `IS_GONE` */
export const ELEMENTS = 4;
/** of a variable: approximate external degree; of an element: weight of its variables */
export const DEGREE = 5;
/** next vertex in its degree list or hash bucket; the vertex it went into once gone */
export const NEXT = 6;
/** previous vertex in its degree list, or hash; the number of the pivot, of an element */
export const PREVIOUS = 7;

/** value of ELEMENTS for a vertex eliminated as a pivot */
export const IS_ELEMENT = -1;
/** value of ELEMENTS for a vertex merged into another or eliminated together with it */
export const IS_GONE = -2;

/** Where things are in the array, in integers from its start. Records start at 0. */
export interface Layout {
  /** vertices */
  readonly order: number;
  /** ordering list l has its pseudo-record at heads + 2l − NEXT, so that NEXT and PREVIOUS of it are its first and last vertex */
  readonly heads: number;
  /** hash bucket -> first vertex, −1 when empty; a power of two of them */
  readonly buckets: number;
  readonly bucketMask: number;
  /** start of the adjacency lists */
  readonly lists: number;
  /** end of the array in use */
  readonly end: number;
}

/**
 * Layout for `order` vertices, `listed` list entries and `listCount` ordering lists. The room of one list of `order` entries behind
 * the lists suffices for ever: the lists of a quotient graph never outgrow those of the graph, and one element is formed at a time.
 */
export function layoutFor(order: number, listed: number, listCount: number): Layout {
  const heads = RECORD * order;
  const buckets = heads + 2 * listCount;
  let bucketCount = 1;
  while (bucketCount < order) bucketCount *= 2;
  const lists = buckets + bucketCount;
  const elbowRoom = order + Math.floor(listed / 5);
  return { order, heads, buckets, bucketMask: bucketCount - 1, lists, end: lists + listed + elbowRoom };
}

/** Integers that can be handed from call to call; grows when a call needs more, never shrinks. Contents are undefined between calls. */
export class Workspace {
  private held = new Int32Array(0);

  /** At least `size` integers, of undefined content. */
  take(size: number): Int32Array {
    if (this.held.length < size) this.held = new Int32Array(size);
    return this.held;
  }
}

/**
 * Moves the lists that are still in use to the front of their region; returns the first free place.
 * `free` is the end of the region so far. Every list in use is found once, because its first entry is exchanged for its owner's name.
 */
export function collectListsInPlace(w: Int32Array, layout: Layout, free: number): number {
  const records = RECORD * layout.order;
  for (let r = 0; r < records; r += RECORD) {
    const inUse = w[r + ELEMENTS] === IS_ELEMENT ? w[r + MARK] !== 0 : w[r + ELEMENTS] !== IS_GONE;
    if (!inUse || w[r + LENGTH] === 0) continue;
    const start = w[r + START];
    w[r + START] = w[start];
    w[start] = ~r;
  }
  let to = layout.lists;
  for (let from = layout.lists; from < free; ) {
    const name = w[from];
    if (name >= 0) {
      from++;
      continue;
    }
    const r = ~name;
    const length = w[r + LENGTH];
    w[from] = w[r + START];
    w[r + START] = to;
    w.copyWithin(to, from, from + length);
    to += length;
    from += length;
  }
  return to;
}

/** Marks stay below this, far from the end of 32 bits. */
export const FLAG_LIMIT = 1 << 30;

/** Sets the marks in use to 1; returns the next flag. */
export function lowerMarksInPlace(w: Int32Array, layout: Layout): number {
  for (let r = 0; r < RECORD * layout.order; r += RECORD) if (w[r + MARK] !== 0) w[r + MARK] = 1;
  return 2;
}
