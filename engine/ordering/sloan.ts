import { type Graph, graphOf } from '../graph/graph.ts';
import { type LevelStructure, levelStructure, levelsInto } from '../graph/levels.ts';
import { pseudoPeripheral } from '../graph/peripheral.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { withHeldLast } from './heldLast.ts';
import type { OrderingOptions, OrderingResult } from './ordering.ts';

export interface SloanOptions extends OrderingOptions {
  /** weight of the distance to the end vertex, a non-negative integer; default 1 (Sloan 1989) */
  readonly distanceWeight?: number;
  /** weight of the growth of the front, a non-negative integer; default 2 (Sloan 1989) */
  readonly growthWeight?: number;
}

/**
 * Profile and wavefront reduction (Sloan 1986, 1989) on the graph of A + Aᵀ; square patterns only. Each component is numbered from one end
 * of a pseudo-diameter (George & Liu 1979): next comes the vertex of highest priority W₁·distance − W₂·(growth of the front).
 * O(edges · log vertices), by a heap.
 */
export function sloan(pattern: Pattern, options: SloanOptions, progress: Progress): OrderingResult {
  const order = sloanOrder(graphOf(pattern), options.distanceWeight ?? 1, options.growthWeight ?? 2, progress);
  return { order: withHeldLast(asNewToOld(order), options.heldLast), notes: [] };
}

// states of a vertex, as the paper has them
const INACTIVE = 0;
const PREACTIVE = 1;
const ACTIVE = 2;
const NUMBERED = 3;

/** Position -> vertex. */
export function sloanOrder(graph: Graph, distanceWeight: number, growthWeight: number, progress: Progress): Int32Array {
  const n = graph.order;
  const order = new Int32Array(n);
  const work = levelStructure(n);
  const state = new Uint8Array(n);
  const heap = new PriorityQueue(n);
  let done = 0;
  for (let v = 0; v < n; v++) {
    if (state[v] === NUMBERED) continue;
    const start = endsOfDiameter(graph, v, work);
    setPriorities(graph, work, heap.priority, distanceWeight, growthWeight);
    done = numberComponent(graph, start, order, done, state, heap, growthWeight, progress);
  }
  return order;
}

/** A start vertex; on return `work` holds the levels from the other end. */
function endsOfDiameter(graph: Graph, v: number, work: LevelStructure): number {
  const end = pseudoPeripheral(graph, v, work);
  let start = work.queue[work.reached - 1];
  // of the last level, the vertex of least degree, smallest number first
  for (let k = work.levelStart[work.levels - 1]; k < work.reached; k++) {
    const u = work.queue[k];
    const difference = degreeOf(graph, u) - degreeOf(graph, start);
    if (difference < 0 || (difference === 0 && u < start)) start = u;
  }
  levelsInto(work, graph, end);
  return start;
}

function degreeOf(graph: Graph, v: number): number {
  return graph.pointer[v + 1] - graph.pointer[v];
}

function setPriorities(graph: Graph, work: LevelStructure, priority: Float64Array, w1: number, w2: number): void {
  for (let l = 0; l < work.levels; l++) {
    for (let k = work.levelStart[l]; k < work.levelStart[l + 1]; k++) {
      const v = work.queue[k];
      priority[v] = w1 * l - w2 * (degreeOf(graph, v) + 1);
    }
  }
}

function numberComponent(
  graph: Graph,
  start: number,
  order: Int32Array,
  done0: number,
  state: Uint8Array,
  heap: PriorityQueue,
  w2: number,
  progress: Progress,
): number {
  const { pointer, neighbour } = graph;
  let done = done0;
  state[start] = PREACTIVE;
  heap.push(start);
  while (heap.size > 0) {
    const v = heap.pop();
    const wasPreactive = state[v] === PREACTIVE;
    state[v] = NUMBERED;
    order[done++] = v;
    if ((done & 0xfff) === 0) progress(done / graph.order, 'Sloan');
    for (let p = pointer[v]; p < pointer[v + 1]; p++) {
      const u = neighbour[p];
      if (wasPreactive && state[u] !== NUMBERED) {
        raise(heap, state, u, w2);
      }
      if (state[u] !== PREACTIVE) continue;
      // u enters the front: its neighbours will cost one less
      state[u] = ACTIVE;
      heap.raise(u, w2);
      for (let q = pointer[u]; q < pointer[u + 1]; q++) {
        const x = neighbour[q];
        if (state[x] !== NUMBERED) raise(heap, state, x, w2);
      }
    }
  }
  return done;
}

/** Priority up by w2; an inactive vertex becomes preactive and enters the queue. */
function raise(heap: PriorityQueue, state: Uint8Array, v: number, w2: number): void {
  if (state[v] === INACTIVE) {
    state[v] = PREACTIVE;
    heap.priority[v] += w2;
    heap.push(v);
  } else heap.raise(v, w2);
}

/** A binary heap of vertices, highest priority first, equal ones by smallest number. */
class PriorityQueue {
  readonly priority: Float64Array;
  size = 0;
  private readonly heap: Int32Array;
  private readonly place: Int32Array;
  constructor(n: number) {
    this.priority = new Float64Array(n);
    this.heap = new Int32Array(n);
    this.place = new Int32Array(n);
  }
  push(v: number): void {
    this.up(v, this.size++);
  }
  pop(): number {
    const top = this.heap[0];
    const last = this.heap[--this.size];
    if (this.size > 0) this.down(last);
    return top;
  }
  raise(v: number, by: number): void {
    this.priority[v] += by;
    this.up(v, this.place[v]);
  }
  private before(u: number, v: number): boolean {
    const difference = this.priority[u] - this.priority[v];
    return difference > 0 || (difference === 0 && u < v);
  }
  private up(v: number, from: number): void {
    let k = from;
    while (k > 0) {
      const parent = (k - 1) >> 1;
      const u = this.heap[parent];
      if (!this.before(v, u)) break;
      this.heap[k] = u;
      this.place[u] = k;
      k = parent;
    }
    this.heap[k] = v;
    this.place[v] = k;
  }
  private down(v: number): void {
    let k = 0;
    for (;;) {
      let child = 2 * k + 1;
      if (child >= this.size) break;
      if (child + 1 < this.size && this.before(this.heap[child + 1], this.heap[child])) child++;
      const u = this.heap[child];
      if (!this.before(u, v)) break;
      this.heap[k] = u;
      this.place[u] = k;
      k = child;
    }
    this.heap[k] = v;
    this.place[v] = k;
  }
}
