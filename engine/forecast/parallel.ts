import type { AssemblyTree } from '../symbolic/types.ts';

/** How parallel a factorization over fronts is. Communication is ignored throughout. */
export interface ParallelProfile {
  /** operations of all fronts */
  readonly work: number;
  /** longest way from a leaf to a root, operations: fronts one worker each */
  readonly sequentialFrontsPath: number;
  /** the same where a front's column updates run side by side: a pivot step takes its column and one column update */
  readonly divisibleFrontsPath: number;
  /** work over each path: average parallelism, and the bound for any number of workers */
  readonly sequentialFrontsSpeedup: number;
  readonly divisibleFrontsSpeedup: number;
  /** shares of the work in the largest fronts, most first, at most ten */
  readonly largestFronts: readonly { readonly supernode: number; readonly order: number; readonly share: number }[];
  readonly leaves: number;
  readonly rows: readonly WorkersRow[];
}

/** Prediction for p workers. */
export interface WorkersRow {
  readonly workers: number;
  /** no schedule with whole fronts is faster: min(p, work / path) */
  readonly bound: number;
  /** list schedule of whole fronts, longest way first */
  readonly speedup: number;
  /** share of the workers' time spent waiting */
  readonly idle: number;
  /** the same with fronts at the root divided among all workers, and its own bound */
  readonly splitBound: number;
  readonly splitSpeedup: number;
  readonly splitIdle: number;
  /** scalars of the fronts in work at one time and of the blocks that wait, for the busiest moment, over the workers */
  readonly memoryPerWorker: number;
}

/** Longest ways up: supernode -> operations from its own front to a root, inclusive. */
export function waysToRoot(parent: Int32Array, work: Float64Array): Float64Array {
  const way = new Float64Array(work.length);
  for (let s = work.length - 1; s >= 0; s--) way[s] = work[s] + (parent[s] < 0 ? 0 : way[parent[s]]);
  return way;
}

/** Operations that remain in a front when all column updates of a step run side by side: c for the column, 2(c − 1) for the update. */
function divisibleWork(tree: AssemblyTree): Float64Array {
  const out = new Float64Array(tree.count);
  for (let s = 0; s < tree.count; s++) {
    const m = tree.frontOrder[s];
    const p = tree.firstColumn[s + 1] - tree.firstColumn[s];
    const sum = (m * (m + 1)) / 2 - ((m - p) * (m - p + 1)) / 2;
    out[s] = 3 * sum - 2 * p;
  }
  return out;
}

export const workerCounts: readonly number[] = [1, 2, 4, 8, 16, 32, 64, 128, 256, 512, 1024];

/** The profile of an assembly tree with the given work for each front. */
export function parallelProfile(tree: AssemblyTree, work: Float64Array, counts = workerCounts): ParallelProfile {
  let total = 0;
  for (let s = 0; s < tree.count; s++) total += work[s];
  const longest = (way: Float64Array): number => way.reduce((a, b) => Math.max(a, b), 0);
  const sequential = longest(waysToRoot(tree.parent, work));
  const divisible = longest(waysToRoot(tree.parent, divisibleWork(tree)));
  const isParent = new Uint8Array(tree.count);
  for (let s = 0; s < tree.count; s++) if (tree.parent[s] >= 0) isParent[tree.parent[s]] = 1;
  let leaves = 0;
  for (let s = 0; s < tree.count; s++) if (isParent[s] === 0) leaves++;
  const ratio = (path: number): number => (path > 0 ? total / path : 1);
  return {
    work: total,
    sequentialFrontsPath: sequential,
    divisibleFrontsPath: divisible,
    sequentialFrontsSpeedup: ratio(sequential),
    divisibleFrontsSpeedup: Math.max(ratio(divisible), ratio(sequential)),
    largestFronts: largestOf(tree, work, total),
    leaves,
    rows: scheduleRows(tree, work, total, counts),
  };
}

/** Subtrees of less than this share of the work are scheduled as one task each (Geist & Ng 1989). */
const grain = 1 / 20_000;

function scheduleRows(tree: AssemblyTree, work: Float64Array, total: number, counts: readonly number[]): WorkersRow[] {
  const coarse = coarseTree(tree, work, grain * total);
  const path = waysToRoot(coarse.tree.parent, coarse.work).reduce((a, b) => Math.max(a, b), 0);
  // p workers can always leave some of their number idle: a row is never slower than one with fewer
  let best: WorkersRow | null = null;
  return counts.map((p) => {
    const row = rowFor(coarse.tree, coarse.work, total, path, p);
    best = best === null ? row : notSlower(row, best);
    return best;
  });
}

function notSlower(row: WorkersRow, fewer: WorkersRow): WorkersRow {
  const idle = (speedup: number): number => Math.max(0, 1 - speedup / row.workers);
  const whole = row.speedup < fewer.speedup ? { speedup: fewer.speedup, idle: idle(fewer.speedup) } : {};
  const split =
    row.splitSpeedup < fewer.splitSpeedup
      ? {
          splitSpeedup: fewer.splitSpeedup,
          splitIdle: idle(fewer.splitSpeedup),
          splitBound: Math.max(row.splitBound, fewer.splitBound),
        }
      : {};
  return { ...row, ...whole, ...split };
}

/** The part of a tree that is scheduled. */
type TaskTree = Pick<AssemblyTree, 'count' | 'parent' | 'frontOrder' | 'firstColumn'>;

/** Joins every subtree of little work into its root; the largest front of a joined subtree stands for its memory. */
function coarseTree(tree: AssemblyTree, work: Float64Array, least: number): { tree: TaskTree; work: Float64Array } {
  const { count, parent } = tree;
  const below = Float64Array.from(work);
  const order = Int32Array.from(tree.frontOrder);
  for (let s = 0; s < count; s++) {
    const up = parent[s];
    if (up < 0) continue;
    below[up] += below[s];
    if (below[s] < least && order[s] > order[up] && below[up] < least) order[up] = order[s];
  }
  const number = new Int32Array(count).fill(-1);
  let kept = 0;
  for (let s = 0; s < count; s++) {
    const up = parent[s];
    if (below[s] >= least || up < 0 || below[up] >= least) number[s] = kept++;
  }
  const out = {
    count: kept,
    parent: new Int32Array(kept),
    frontOrder: new Int32Array(kept),
    firstColumn: new Int32Array(kept + 1),
  };
  const joined = new Float64Array(kept);
  for (let s = 0; s < count; s++) {
    const k = number[s];
    if (k < 0) continue;
    out.parent[k] = parent[s] < 0 ? -1 : number[parent[s]];
    out.frontOrder[k] = order[s];
    // only differences are used: pivots of the joined root
    out.firstColumn[k + 1] = out.firstColumn[k] + tree.firstColumn[s + 1] - tree.firstColumn[s];
    joined[k] = below[s] < least ? below[s] : work[s];
  }
  return { tree: out, work: joined };
}

function largestOf(tree: AssemblyTree, work: Float64Array, total: number): ParallelProfile['largestFronts'] {
  const most: number[] = [];
  for (let s = 0; s < tree.count; s++) {
    if (most.length === 10 && work[s] <= work[most[9]]) continue;
    let k = most.length;
    while (k > 0 && work[s] > work[most[k - 1]]) k--;
    most.splice(k, 0, s);
    if (most.length > 10) most.pop();
  }
  return most.map((s) => ({ supernode: s, order: tree.frontOrder[s], share: total > 0 ? work[s] / total : 0 }));
}

function rowFor(tree: TaskTree, work: Float64Array, total: number, path: number, p: number): WorkersRow {
  const whole = listSchedule(tree, work, p);
  // fronts near the root whose work is more than a worker's fair share are divided: all workers take part in each
  const divided = new Float64Array(tree.count);
  for (let s = 0; s < tree.count; s++) divided[s] = splits(tree, work, total, s, p) ? work[s] / p : work[s];
  const dividedPath = waysToRoot(tree.parent, divided).reduce((a, b) => Math.max(a, b), 0);
  const split = listSchedule(tree, divided, p, (s) => divided[s] !== work[s]);
  const speed = (span: number): number => (span > 0 ? total / span : 1);
  const idle = (span: number): number => (span > 0 ? Math.max(0, 1 - total / (p * span)) : 0);
  return {
    workers: p,
    bound: path > 0 ? Math.min(p, total / path) : 1,
    speedup: speed(whole.span),
    idle: idle(whole.span),
    splitBound: dividedPath > 0 ? Math.min(p, total / dividedPath) : 1,
    splitSpeedup: speed(split.span),
    splitIdle: idle(split.span),
    memoryPerWorker: whole.memory / p,
  };
}

function splits(tree: TaskTree, work: Float64Array, total: number, s: number, p: number): boolean {
  return p > 1 && tree.frontOrder[s] >= 4 * p && work[s] > total / (4 * p);
}

/**
 * List scheduling of the tree (Graham 1969): a free worker takes the ready front with the longest way to the root. A front that `takesAll`
 * occupies every worker and waits for them.
 */
export function listSchedule(
  tree: TaskTree,
  work: Float64Array,
  workers: number,
  takesAll: (s: number) => boolean = () => false,
): { span: number; memory: number } {
  const { count, parent } = tree;
  const way = waysToRoot(parent, work);
  const waiting = new Int32Array(count);
  for (let s = 0; s < count; s++) if (parent[s] >= 0) waiting[parent[s]]++;
  const ready = new Heap(count, (a, b) => way[a] > way[b] || (way[a] === way[b] && a < b));
  for (let s = 0; s < count; s++) if (waiting[s] === 0) ready.push(s);
  const end = new Float64Array(count);
  const running = new Heap(count, (a, b) => end[a] < end[b] || (end[a] === end[b] && a < b));
  let time = 0;
  let busy = 0;
  let held = 0;
  let memory = 0;
  const block = (s: number): number => (tree.frontOrder[s] - (tree.firstColumn[s + 1] - tree.firstColumn[s])) ** 2;
  for (let done = 0; done < count; ) {
    while (busy < workers && ready.size > 0) {
      const s = ready.first();
      const need = takesAll(s) ? workers : 1;
      if (busy + need > workers) break;
      ready.pop();
      end[s] = time + work[s];
      busy += need;
      held += tree.frontOrder[s] ** 2;
      if (held > memory) memory = held;
      running.push(s);
    }
    const s = running.pop();
    time = end[s];
    busy -= takesAll(s) ? workers : 1;
    held += (parent[s] < 0 ? 0 : block(s)) - tree.frontOrder[s] ** 2;
    done++;
    const up = parent[s];
    if (up >= 0) {
      held -= block(s);
      if (--waiting[up] === 0) ready.push(up);
      else held += block(s);
    }
  }
  return { span: time, memory };
}

/** A binary heap of supernodes. */
class Heap {
  private readonly item: Int32Array;
  private readonly before: (a: number, b: number) => boolean;
  size = 0;

  constructor(capacity: number, before: (a: number, b: number) => boolean) {
    this.item = new Int32Array(capacity);
    this.before = before;
  }

  first(): number {
    return this.item[0];
  }

  push(s: number): void {
    let k = this.size++;
    while (k > 0) {
      const up = (k - 1) >> 1;
      if (!this.before(s, this.item[up])) break;
      this.item[k] = this.item[up];
      k = up;
    }
    this.item[k] = s;
  }

  pop(): number {
    const out = this.item[0];
    const last = this.item[--this.size];
    let k = 0;
    for (;;) {
      let child = 2 * k + 1;
      if (child >= this.size) break;
      if (child + 1 < this.size && this.before(this.item[child + 1], this.item[child])) child++;
      if (!this.before(this.item[child], last)) break;
      this.item[k] = this.item[child];
      k = child;
    }
    if (this.size > 0) this.item[k] = last;
    return out;
  }
}
