import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { checkPattern, checkPermutation } from '../../engine/matrix/check.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { compressGraph, contractGroups, expandOrder, leadersOf } from '../../engine/ordering/compress.ts';
import { minimumDegreeOfGraph } from '../../engine/ordering/minimumDegreeOfGraph.ts';
import { ABSENT, FREE, HALO } from '../../engine/ordering/minimumDegreeStart.ts';
import { Workspace } from '../../engine/ordering/minimumDegreeWorkspace.ts';
import { randomPattern } from '../support/random.ts';
import { fromEdges, grid, twoCliques } from './graphs.ts';

describe('compression of indistinguishable vertices (Ashcraft 1995)', () => {
  it('finds the twins of a grid whose vertices were tripled, and nothing in the grid itself', () => {
    const g = graphOf(grid(7));
    const edges: [number, number][] = [];
    for (let i = 0; i < 49; i++) {
      edges.push([3 * i, 3 * i + 1], [3 * i, 3 * i + 2], [3 * i + 1, 3 * i + 2]);
      for (let p = g.pointer[i]; p < g.pointer[i + 1]; p++) {
        for (let k = 0; k < 9; k++) edges.push([3 * i + (k % 3), 3 * g.neighbour[p] + Math.floor(k / 3)]);
      }
    }
    const c = compressGraph(graphOf(fromEdges(147, edges)));
    expect(c.graph).toEqual(g);
    expect([...c.weight]).toEqual(Array.from({ length: 49 }, () => 3));
    const order = expandOrder(
      c,
      Int32Array.from({ length: 49 }, (_, k) => 48 - k),
    );
    checkPermutation(order, 147);
    expect([...order.slice(0, 4)]).toEqual([144, 145, 146, 141]);
    expect(leadersOf(g).merged).toBe(0);
  });
  it('does not merge across roles', () => {
    const g = graphOf(twoCliques(5));
    const role = new Uint8Array(10);
    role[1] = HALO;
    expect(leadersOf(g).merged).toBe(6);
    expect(leadersOf(g, role).merged).toBe(5);
  });
  it('contracts any groups to a sorted graph without loops, seed 4', () => {
    const g = graphOf(randomPattern({ rows: 60, columns: 60, entries: 200, seed: 4 }));
    const c = contractGroups(
      g,
      Int32Array.from({ length: 60 }, (_, v) => v % 13),
      13,
    );
    checkPattern({ rows: 13, columns: 13, columnPointer: c.graph.pointer, rowIndex: c.graph.neighbour });
    for (let v = 0; v < 13; v++) {
      expect(c.graph.neighbour.slice(c.graph.pointer[v], c.graph.pointer[v + 1])).not.toContain(v);
    }
  });
});

describe('minimum degree with roles and a shared workspace', () => {
  it('orders free vertices only, the same with a fresh and a used workspace, seeds 1 … 10', () => {
    const workspace = new Workspace();
    for (let seed = 1; seed <= 10; seed++) {
      const g = graphOf(randomPattern({ rows: 50, columns: 50, entries: 120, seed }));
      const role = Uint8Array.from({ length: 50 }, (_, v) => (v % 7 === 0 ? HALO : v % 11 === 0 ? ABSENT : FREE));
      const { order } = minimumDegreeOfGraph(g, { role, workspace }, noProgress);
      expect([...order].sort((i, j) => i - j)).toEqual([...role.keys()].filter((v) => role[v] === FREE));
      expect(minimumDegreeOfGraph(g, { role }, noProgress).order).toEqual(order);
    }
  });
  it('counts halo vertices in degrees: the end of a path next to a halo clique waits', () => {
    // 0 – 1 – 2 with 2 joined to halo vertices 3, 4, 5
    const g = graphOf(
      fromEdges(6, [
        [0, 1],
        [1, 2],
        [2, 3],
        [2, 4],
        [2, 5],
      ]),
    );
    const { order } = minimumDegreeOfGraph(g, { role: Uint8Array.from([0, 0, 0, 1, 1, 1]) }, noProgress);
    expect([...order]).toEqual([0, 1, 2]);
  });
});
