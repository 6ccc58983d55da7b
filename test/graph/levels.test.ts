import { describe, expect, test } from 'vitest';
import { connectedComponents } from '../../engine/graph/components.ts';
import { type Graph, graphOf } from '../../engine/graph/graph.ts';
import { levelStructure, levelsInto } from '../../engine/graph/levels.ts';
import { pseudoPeripheral } from '../../engine/graph/peripheral.ts';
import { strongComponents } from '../../engine/graph/strong.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { drawn } from '../support/picture.ts';
import { randomPattern } from '../support/random.ts';
import { figures, readableNames, readReference } from '../support/reference.ts';

/** Distances from every vertex to every other, −1 where there is no path (Floyd 1962, Warshall 1962). */
function distances(n: number, edge: (i: number, j: number) => boolean): number[][] {
  const d = Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, j) => (i === j ? 0 : edge(i, j) ? 1 : Number.POSITIVE_INFINITY)),
  );
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) d[i][j] = Math.min(d[i][j], d[i][k] + d[k][j]);
  }
  return d;
}

function graphDistances(g: Graph): number[][] {
  return distances(g.order, (i, j) => g.neighbour.subarray(g.pointer[i], g.pointer[i + 1]).includes(j));
}

/** Path 0 – 1 – … – (n − 1) as a symmetric pattern without diagonal. */
function pathGraph(n: number): Graph {
  const pointer = new Int32Array(n + 1);
  const neighbour = new Int32Array(Math.max(0, 2 * (n - 1)));
  let q = 0;
  for (let v = 0; v < n; v++) {
    if (v > 0) neighbour[q++] = v - 1;
    if (v < n - 1) neighbour[q++] = v + 1;
    pointer[v + 1] = q;
  }
  return { order: n, pointer, neighbour };
}

function asPattern(g: Graph): Pattern {
  return { rows: g.order, columns: g.order, columnPointer: g.pointer, rowIndex: g.neighbour };
}

describe('level structures', () => {
  test('levels are distances on 100 random graphs (seeds 1 to 100), one workspace for all starts', () => {
    for (let seed = 1; seed <= 100; seed++) {
      const n = 2 + (seed % 12);
      const g = graphOf(randomPattern({ rows: n, columns: n, entries: n, seed }));
      const d = graphDistances(g);
      const work = levelStructure(n);
      for (let s = 0; s < n; s++) {
        levelsInto(work, g, s);
        const level = new Map<number, number>();
        for (let l = 0; l < work.levels; l++) {
          for (let q = work.levelStart[l]; q < work.levelStart[l + 1]; q++) level.set(work.queue[q], l);
        }
        expect(level.size).toBe(work.reached);
        for (let v = 0; v < n; v++) {
          expect(level.get(v) ?? Number.POSITIVE_INFINITY).toBe(d[s][v]);
          expect(work.mark[v] === work.generation).toBe(level.has(v));
        }
      }
    }
  });

  test('a part of the graph is never left', () => {
    const g = pathGraph(10);
    const label = Int32Array.from([0, 0, 1, 1, 1, 1, 0, 1, 1, 1]);
    const work = levelStructure(10);
    levelsInto(work, g, 4, { label, value: 1 });
    expect([...work.queue.subarray(0, work.reached)].sort()).toEqual([2, 3, 4, 5]);
    expect([2, 5]).toContain(pseudoPeripheral(g, 4, work, { label, value: 1 }));
    expect(work.levels).toBe(4);
  });
});

describe('pseudo-peripheral vertex (George & Liu 1979)', () => {
  test('an end of a path of a million vertices, from its middle', () => {
    const n = 1_000_000;
    const g = pathGraph(n);
    const work = levelStructure(n);
    const end = pseudoPeripheral(g, n / 2, work);
    expect([0, n - 1]).toContain(end);
    expect(work.levels).toBe(n);
  });

  test('a leaf of a star; an isolated vertex is its own', () => {
    const star = graphOf(drawn('xxxxx\nx....\nx....\nx....\nx....'));
    const work = levelStructure(5);
    expect(pseudoPeripheral(star, 0, work)).not.toBe(0);
    expect(work.levels).toBe(3);
    const lone = graphOf(drawn('x..\n..x\n.x.'));
    expect(pseudoPeripheral(lone, 0, levelStructure(3))).toBe(0);
  });

  test('eccentricity never below that of the start, the work arrays hold the returned root (seeds 1 to 200)', () => {
    for (let seed = 1; seed <= 200; seed++) {
      const n = 3 + (seed % 15);
      const g = graphOf(randomPattern({ rows: n, columns: n, entries: n + 4, seed }));
      const d = graphDistances(g).map((row) => row.map((x) => (Number.isFinite(x) ? x : 0)));
      const work = levelStructure(n);
      const root = pseudoPeripheral(g, 0, work);
      expect(work.queue[0]).toBe(root);
      expect(work.levels).toBe(Math.max(...d[root]) + 1);
      expect(Math.max(...d[root])).toBeGreaterThanOrEqual(Math.max(...d[0]));
    }
  });
});

describe('components', () => {
  test('connected and strong components equal mutual reachability on 300 random patterns (seeds 1 to 300)', () => {
    for (let seed = 1; seed <= 300; seed++) {
      const n = 1 + (seed % 13);
      const a = randomPattern({ rows: n, columns: n, entries: Math.floor(n * (0.4 + (seed % 4) * 0.4)), seed });
      const entry = (i: number, j: number): boolean =>
        a.rowIndex.subarray(a.columnPointer[j], a.columnPointer[j + 1]).includes(i);
      const both = distances(n, (i, j) => entry(i, j) || entry(j, i));
      const directed = distances(n, (i, j) => entry(j, i));
      const connected = connectedComponents(a);
      const strong = strongComponents(a);
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          expect(connected.of[i] === connected.of[j]).toBe(Number.isFinite(both[i][j]));
          const mutual = Number.isFinite(directed[i][j]) && Number.isFinite(directed[j][i]);
          expect(strong.of[i] === strong.of[j]).toBe(mutual);
          // an edge leads to the same or a lower class
          if (entry(i, j)) expect(strong.of[i]).toBeLessThanOrEqual(strong.of[j]);
        }
      }
      expect([...connected.size].reduce((x, y) => x + y, 0)).toBe(n);
      expect([...strong.size].reduce((x, y) => x + y, 0)).toBe(n);
    }
  });

  test('components are numbered by their smallest vertex', () => {
    expect([...connectedComponents(drawn('x..x\n.xx.\n.xx.\nx..x')).of]).toEqual([0, 1, 1, 0]);
  });

  test('numbers of components of the reference matrices (SciPy)', () => {
    for (const name of readableNames()) {
      const expected = figures[name];
      if (expected.components === undefined) continue;
      const a = readReference(name);
      expect(connectedComponents(a).count, name).toBe(expected.components);
      expect(strongComponents(a).count, name).toBe(expected.strongComponents);
    }
  });

  test('a directed cycle and a directed path of a million vertices', () => {
    const n = 1_000_000;
    const columnPointer = new Int32Array(n + 1);
    const rowIndex = new Int32Array(n);
    for (let j = 0; j < n; j++) {
      rowIndex[j] = (j + 1) % n;
      columnPointer[j + 1] = j + 1;
    }
    const cycle: Pattern = { rows: n, columns: n, columnPointer, rowIndex };
    expect(strongComponents(cycle).count).toBe(1);
    const open: Pattern = {
      ...cycle,
      columnPointer: columnPointer.slice().fill(n - 1, n),
      rowIndex: rowIndex.slice(0, n - 1),
    };
    expect(strongComponents(open).count).toBe(n);
    expect(connectedComponents(open).count).toBe(1);
    expect(connectedComponents(asPattern(pathGraph(n))).count).toBe(1);
  });

  test('empty, one by one, no entries', () => {
    const none: Pattern = { rows: 0, columns: 0, columnPointer: new Int32Array(1), rowIndex: new Int32Array(0) };
    expect(connectedComponents(none).count).toBe(0);
    expect(strongComponents(none).count).toBe(0);
    const apart: Pattern = { rows: 3, columns: 3, columnPointer: new Int32Array(4), rowIndex: new Int32Array(0) };
    expect(connectedComponents(apart).count).toBe(3);
    expect(strongComponents(apart).count).toBe(3);
  });
});
