import type { Graph } from './graph.ts';

/**
 * Workspace and result of one breadth-first search: allocated once, filled by every `levelsInto`.
 * Level l holds the vertices queue[levelStart[l]] … queue[levelStart[l + 1] − 1].
 */
export interface LevelStructure {
  /** vertices in the order they were reached; the first `reached` are valid */
  readonly queue: Int32Array;
  /** level -> its first position in `queue`; valid up to index `levels` */
  readonly levelStart: Int32Array;
  /** vertex -> generation of the last search that reached it */
  readonly mark: Int32Array;
  /** number of the latest search; `mark[v] === generation` means that it reached v */
  generation: number;
  /** number of levels; the eccentricity of the start is one less */
  levels: number;
  /** number of vertices reached */
  reached: number;
}

/** A part of the graph: the vertices v with label[v] === value. */
export interface Part {
  readonly label: Int32Array;
  readonly value: number;
}

/** Workspace for a graph of `order` vertices. */
export function levelStructure(order: number): LevelStructure {
  return {
    queue: new Int32Array(order),
    levelStart: new Int32Array(order + 1),
    mark: new Int32Array(order),
    generation: 0,
    levels: 0,
    reached: 0,
  };
}

/**
 * Level structure rooted at `start` (0-based vertex), inside `part` where one is given (`start` belongs to it).
 * Linear in the edges of what is reached; allocates nothing. Vertices of a level are in the order of their first neighbour
 * in the level before, then by number.
 */
export function levelsInto(out: LevelStructure, graph: Graph, start: number, part: Part | null = null): void {
  const { pointer, neighbour } = graph;
  const { queue, levelStart, mark } = out;
  const g = ++out.generation;
  const label = part === null ? null : part.label;
  const value = part === null ? 0 : part.value;
  queue[0] = start;
  mark[start] = g;
  let tail = 1;
  let head = 0;
  let levels = 0;
  while (head < tail) {
    levelStart[levels++] = head;
    const end = tail;
    for (; head < end; head++) {
      const v = queue[head];
      const last = pointer[v + 1];
      for (let p = pointer[v]; p < last; p++) {
        const w = neighbour[p];
        if (mark[w] === g || (label !== null && label[w] !== value)) continue;
        mark[w] = g;
        queue[tail++] = w;
      }
    }
  }
  levelStart[levels] = tail;
  out.levels = levels;
  out.reached = tail;
}
