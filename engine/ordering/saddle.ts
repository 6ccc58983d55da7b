import { type Graph, graphOf } from '../graph/graph.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { contractGroups, expandOrder } from './compress.ts';
import { heldFlags } from './heldLast.ts';
import type { OrderingMethod, OrderingOptions, OrderingResult } from './ordering.ts';

export interface SaddleOptions extends OrderingOptions {
  /**
   * unknown -> its partner, itself where it has none; symmetric (partner[partner[i]] = i). Default: `structuralPairs`.
   * Pairs chosen by magnitude make the result value-dependent.
   */
  readonly partner?: Int32Array;
}

/**
 * An order for symmetric indefinite matrices whose zero diagonals will need 2×2 pivots (Duff & Pralet 2005): each zero or absent diagonal is
 * paired with a neighbour, the graph with pairs merged is ordered by `method`, and the two of a pair stay next to each other.
 * Held-last unknowns are never paired. `zeroDiagonal`: unknown -> 1 where the diagonal entry is absent or zero.
 */
export function saddle(
  pattern: Pattern,
  zeroDiagonal: Uint8Array,
  method: OrderingMethod,
  options: SaddleOptions,
  progress: Progress,
): OrderingResult {
  const graph = graphOf(pattern);
  const n = graph.order;
  const held = heldFlags(n, options.heldLast);
  const partner = options.partner ?? structuralPairs(graph, zeroDiagonal, held);
  const groupOf = new Int32Array(n);
  let groups = 0;
  let pairs = 0;
  for (let i = 0; i < n; i++) {
    const j = held !== null && (held[i] === 1 || held[partner[i]] === 1) ? i : partner[i];
    groupOf[i] = j < i ? groupOf[j] : groups++;
    if (j < i) pairs++;
  }
  const compressed = contractGroups(graph, groupOf, groups);
  const square: Pattern = {
    rows: groups,
    columns: groups,
    columnPointer: compressed.graph.pointer,
    rowIndex: compressed.graph.neighbour,
  };
  const { partner: _, heldLast, ...rest } = options;
  const inner = method(
    square,
    heldLast === undefined ? rest : { ...rest, heldLast: heldLast.map((i) => groupOf[i]) },
    progress,
  );
  const order = asNewToOld(expandOrder(compressed, inner.order));
  return { order, notes: [...inner.notes, ...pairNotes(pairs, zeroDiagonal, partner)] };
}

function pairNotes(pairs: number, zeroDiagonal: Uint8Array, partner: Int32Array): string[] {
  let alone = 0;
  for (let i = 0; i < partner.length; i++) if (zeroDiagonal[i] === 1 && partner[i] === i) alone++;
  const notes = [`${pairs.toLocaleString('en')} pairs of unknowns kept together for 2×2 pivots`];
  if (alone > 0) notes.push(`${alone.toLocaleString('en')} zero diagonals found no partner`);
  return notes;
}

/**
 * A pairing by structure: the zero diagonals of fewest neighbours first, each with its free neighbour of fewest neighbours whose diagonal is
 * not zero; failing that, with a free one whose diagonal is zero too. Maximal, not maximum: unpaired zero diagonals can still become
 * pivots once their neighbours are eliminated. Linear in edges.
 */
export function structuralPairs(graph: Graph, zeroDiagonal: Uint8Array, held: Uint8Array | null): Int32Array {
  const { order: n, pointer, neighbour } = graph;
  const partner = new Int32Array(n).fill(-1);
  const zeros: number[] = [];
  for (let i = 0; i < n; i++) if (zeroDiagonal[i] === 1 && (held === null || held[i] === 0)) zeros.push(i);
  const degree = (i: number): number => pointer[i + 1] - pointer[i];
  zeros.sort((i, j) => degree(i) - degree(j) || i - j);
  for (const wanted of [0, 1]) {
    for (const i of zeros) {
      if (partner[i] >= 0) continue;
      let best = -1;
      for (let q = pointer[i]; q < pointer[i + 1]; q++) {
        const j = neighbour[q];
        if (partner[j] >= 0 || zeroDiagonal[j] !== wanted || (held !== null && held[j] === 1)) continue;
        if (best < 0 || degree(j) < degree(best)) best = j;
      }
      if (best < 0) continue;
      partner[i] = best;
      partner[best] = i;
    }
  }
  for (let i = 0; i < n; i++) if (partner[i] < 0) partner[i] = i;
  return partner;
}
