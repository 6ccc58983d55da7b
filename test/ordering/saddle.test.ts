import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { checkPermutation } from '../../engine/matrix/check.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { saddle, structuralPairs } from '../../engine/ordering/saddle.ts';
import { fromEdges, grid } from './graphs.ts';

/** A grid of 36 unknowns with ten constraints of three unknowns each, whose diagonals are zero. */
const base = grid(6);
const edges: [number, number][] = [];
for (let j = 0; j < 36; j++) {
  for (let p = base.columnPointer[j]; p < base.columnPointer[j + 1]; p++)
    if (base.rowIndex[p] < j) edges.push([j, base.rowIndex[p]]);
}
for (let c = 0; c < 10; c++) for (const i of [3 * c, 3 * c + 1, (3 * c + 14) % 36]) edges.push([36 + c, i]);
const a = fromEdges(46, edges);
const zero = new Uint8Array(46).fill(1, 36);

describe('saddle points (Duff & Pralet 2005)', () => {
  it('pairs every zero diagonal with a neighbour, symmetrically', () => {
    const partner = structuralPairs(graphOf(a), zero, null);
    for (let i = 0; i < 46; i++) expect(partner[partner[i]]).toBe(i);
    for (let c = 36; c < 46; c++) {
      expect(partner[c]).toBeLessThan(36);
      const column = [...a.rowIndex.slice(a.columnPointer[c], a.columnPointer[c + 1])];
      expect(column).toContain(partner[c]);
    }
  });
  it('keeps pairs next to each other, and held-last unknowns last and unpaired', () => {
    const partner = structuralPairs(graphOf(a), zero, null);
    const { order, notes } = saddle(a, zero, minimumDegree, {}, noProgress);
    checkPermutation(order, 46);
    const position = new Map([...order].map((i, k) => [i, k]));
    for (let c = 36; c < 46; c++) expect(Math.abs(Number(position.get(c)) - Number(position.get(partner[c])))).toBe(1);
    expect(notes).toContain('10 pairs of unknowns kept together for 2×2 pivots');
    const held = saddle(a, zero, minimumDegree, { heldLast: Int32Array.from([40, 2]) }, noProgress).order;
    checkPermutation(held, 46);
    expect([...held.slice(44)]).toEqual([40, 2]);
  });
  it('takes given pairs', () => {
    const partner = Int32Array.from({ length: 46 }, (_, i) => i);
    partner[36] = 14;
    partner[14] = 36;
    const { order } = saddle(a, zero, minimumDegree, { partner }, noProgress);
    expect(Math.abs(order.indexOf(36) - order.indexOf(14))).toBe(1);
  });
});
