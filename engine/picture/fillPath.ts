import type { Graph } from '../graph/graph.ts';
import type { NewToOld, OldToNew } from '../matrix/permutation.ts';

/** Why a position of the factor holds an entry. Unknowns are original, 0-based. */
export type FillReason =
  /** the matrix has an entry there */
  | { readonly kind: 'original' }
  /** path[0] and the last are the two unknowns; all between were eliminated before both */
  | { readonly kind: 'fill'; readonly path: Int32Array }
  | { readonly kind: 'none' };

/**
 * Fill path theorem (Rose, Tarjan & Lueker 1976): positions k > l of the factor hold an entry if and only if the graph has a
 * path between the two unknowns whose inner vertices all come before l in the order. A shortest such path, by breadth-first search from
 * the earlier unknown; costs at most the edges of the part eliminated before it.
 */
export function fillReason(graph: Graph, order: NewToOld, position: OldToNew, k: number, l: number): FillReason {
  if (k === l) return { kind: 'original' };
  const late = order[Math.max(k, l)];
  const early = order[Math.min(k, l)];
  const limit = Math.min(k, l);
  const from = new Int32Array(graph.order).fill(-1);
  const queue = new Int32Array(graph.order);
  let head = 0;
  let tail = 0;
  queue[tail++] = early;
  from[early] = early;
  while (head < tail) {
    const v = queue[head++];
    for (let p = graph.pointer[v]; p < graph.pointer[v + 1]; p++) {
      const w = graph.neighbour[p];
      if (from[w] >= 0) continue;
      if (w === late)
        return v === early ? { kind: 'original' } : { kind: 'fill', path: walkBack(from, v, early, late) };
      if (position[w] >= limit) continue;
      from[w] = v;
      queue[tail++] = w;
    }
  }
  return { kind: 'none' };
}

function walkBack(from: Int32Array, last: number, early: number, late: number): Int32Array {
  const path = [late];
  for (let v = last; v !== early; v = from[v]) path.push(v);
  path.push(early);
  return Int32Array.from(path);
}
