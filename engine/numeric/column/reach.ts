/**
 * Which entries a column of L and U will have: everything that can be reached from the column's entries through the columns
 * of L already made (Gilbert & Peierls 1988). Time proportional to the entries of L that are looked at; with symmetric
 * pruning (Eisenstat & Liu 1992) a column of L is looked at only up to the entries that later columns cannot do without.
 */
export interface Reach {
  /** position of a pivotal row, −1 while a row has no pivot; row -> position */
  readonly rowPosition: Int32Array;
  /** row -> last column (position) that reached it; start with −1 */
  readonly mark: Int32Array;
  /** pivotal positions reached, in topological order, in order[top … n − 1] */
  readonly order: Int32Array;
  /** rows without a pivot that were reached, in found[0 … foundCount − 1] */
  readonly found: Int32Array;
  foundCount: number;
  top: number;
  /** depth-first stack: positions, and where to go on in their columns of L */
  readonly stack: Int32Array;
  readonly resume: Int32Array;
}

/** Workspace for n rows. Bytes: 24·n. */
export function newReach(n: number): Reach {
  return {
    rowPosition: new Int32Array(n).fill(-1),
    mark: new Int32Array(n).fill(-1),
    order: new Int32Array(n),
    found: new Int32Array(n),
    foundCount: 0,
    top: n,
    stack: new Int32Array(n),
    resume: new Int32Array(n),
  };
}

/** Forgets the last column's reach. */
export function clearReach(reach: Reach): void {
  reach.foundCount = 0;
  reach.top = reach.order.length;
}

/**
 * Adds what can be reached from `row` for the column at position k. `lowerIndex` holds rows (original), column c of L from
 * lowerPointer[c] to lookEnd[c] − 1 as far as pruning left it. No recursion.
 */
export function reachFrom(
  reach: Reach,
  row: number,
  k: number,
  lowerPointer: Int32Array,
  lookEnd: Int32Array,
  lowerIndex: Int32Array,
): void {
  const { rowPosition, mark, order, found, stack, resume } = reach;
  if (mark[row] === k) return;
  mark[row] = k;
  if (rowPosition[row] < 0) {
    found[reach.foundCount++] = row;
    return;
  }
  let { foundCount, top } = reach;
  let depth = 0;
  stack[0] = rowPosition[row];
  resume[0] = lowerPointer[stack[0]];
  while (depth >= 0) {
    const c = stack[depth];
    const end = lookEnd[c];
    let p = resume[depth];
    let child = -1;
    while (p < end) {
      const i = lowerIndex[p++];
      if (mark[i] === k) continue;
      mark[i] = k;
      const position = rowPosition[i];
      if (position < 0) found[foundCount++] = i;
      else {
        child = position;
        break;
      }
    }
    resume[depth] = p;
    if (child >= 0) {
      stack[++depth] = child;
      resume[depth] = lowerPointer[child];
    } else {
      order[--top] = c;
      depth--;
    }
  }
  reach.foundCount = foundCount;
  reach.top = top;
}

/**
 * Symmetric pruning after position k got the pivot row `pivotRow`: where U(c,k) and L(k,c) are both entries, whatever column c
 * of L reaches beyond k is reached through column k too, so only its pivotal rows have to be looked at from now on. They are
 * moved to the front of the column, values along with them.
 */
export function prune(
  reach: Reach,
  pivotRow: number,
  lowerPointer: Int32Array,
  lookEnd: Int32Array,
  lowerIndex: Int32Array,
  lowerValues: Float64Array,
  width: 1 | 2,
): void {
  const { order, rowPosition } = reach;
  for (let t = reach.top; t < order.length; t++) {
    const c = order[t];
    const start = lowerPointer[c];
    const end = lowerPointer[c + 1];
    // pruned before
    if (lookEnd[c] < end) continue;
    let p = start;
    while (p < end && lowerIndex[p] !== pivotRow) p++;
    if (p === end) continue;
    let front = start;
    let back = end - 1;
    while (front <= back) {
      const i = lowerIndex[front];
      if (rowPosition[i] >= 0) {
        front++;
        continue;
      }
      lowerIndex[front] = lowerIndex[back];
      lowerIndex[back] = i;
      for (let w = 0; w < width; w++) {
        const v = lowerValues[front * width + w];
        lowerValues[front * width + w] = lowerValues[back * width + w];
        lowerValues[back * width + w] = v;
      }
      back--;
    }
    lookEnd[c] = front;
  }
}
