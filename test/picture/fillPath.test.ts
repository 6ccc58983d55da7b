/** Fill path theorem (Rose, Tarjan & Lueker 1976) against elimination on sets. */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { positionOf } from '../../engine/matrix/permutation.ts';
import { fillReason } from '../../engine/picture/fillPath.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomOrder, randomPattern } from '../support/random.ts';

describe('fillReason', () => {
  for (const seed of [1, 2, 3, 4]) {
    it(`finds a path of eliminated unknowns exactly where elimination fills (seed ${seed})`, () => {
      const n = 24;
      const a = randomPattern({ rows: n, columns: n, entries: 45, seed, symmetric: true, diagonal: 1 });
      const graph = graphOf(a);
      const order = randomOrder(n, seed + 7);
      const position = positionOf(order);
      const { columns } = naiveElimination(a, order);
      let fill = 0;
      for (let l = 0; l < n; l++) {
        for (let k = l + 1; k < n; k++) {
          const reason = fillReason(graph, order, position, k, l);
          expect(reason.kind !== 'none').toBe(columns[l].includes(k));
          const touching = graph.neighbour.subarray(graph.pointer[order[l]], graph.pointer[order[l] + 1]);
          expect(reason.kind === 'original').toBe(touching.includes(order[k]));
          if (reason.kind !== 'fill') continue;
          fill++;
          const { path } = reason;
          expect([path[0], path[path.length - 1]]).toEqual([order[k], order[l]]);
          for (let s = 1; s < path.length; s++) {
            const next = graph.neighbour.subarray(graph.pointer[path[s - 1]], graph.pointer[path[s - 1] + 1]);
            expect(next.includes(path[s])).toBe(true);
            if (s < path.length - 1) expect(position[path[s]]).toBeLessThan(l);
          }
        }
      }
      expect(fill).toBeGreaterThan(0);
    });
  }
});
