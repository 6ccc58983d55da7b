/** The portfolio: what it keeps, what it says about the spread, and how a time limit ends it. */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import type { Pattern } from '../../engine/matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../engine/matrix/permutation.ts';
import { Cancelled, noProgress } from '../../engine/matrix/progress.ts';
import { bestOf, type PortfolioMember } from '../../engine/ordering/bestOf.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { natural } from '../../engine/ordering/natural.ts';
import { nestedDissection } from '../../engine/ordering/nestedDissection.ts';
import { grid2d5 } from '../../engine/problems/modelGrids.ts';
import { analyseGraph } from '../../engine/symbolic/analyse.ts';

const measure = (order: NewToOld, pattern: Pattern): number =>
  analyseGraph(graphOf(pattern), order, { postorder: false }).columnCount.reduce((s, c) => s + c * c, 0);

const members: PortfolioMember[] = [
  { name: 'natural', order: natural },
  { name: 'minimum degree', order: minimumDegree },
  { name: 'nested dissection', order: nestedDissection },
];

describe('best of', () => {
  it('keeps the least of all trials, whose order has the value it states', () => {
    const a = grid2d5(25);
    const result = bestOf(a, members, { measure, seeds: [1, 2, 3] }, noProgress);
    expect(result.trials).toHaveLength(9);
    expect(result.value).toBe(Math.min(...result.trials.map((t) => t.value)));
    expect(measure(result.order, a)).toBe(result.value);
    expect(result.spread.map((s) => s.trials)).toEqual([3, 3, 3]);
    expect(result.stopped).toBe(false);
    expect(bestOf(a, members, { measure, seeds: [1, 2, 3] }, noProgress)).toEqual(result);
  });
  it('marks what overlaps with the winner as no difference, and nothing else', () => {
    const fixed = (values: number[]): PortfolioMember => {
      let next = 0;
      return {
        name: values.join(' '),
        order: (p) => ({ order: asNewToOld(new Int32Array(p.columns).fill(values[next++])), notes: [] }),
      };
    };
    const result = bestOf(
      grid2d5(3),
      [fixed([10, 14]), fixed([13, 20]), fixed([15, 16])],
      { measure: (order) => order[0], seeds: [1, 2], relabel: false },
      noProgress,
    );
    expect(result.spread.map((s) => s.noDifference)).toEqual([true, true, false]);
    expect(result.spread[0]).toMatchObject({ least: 10, median: 12, most: 14 });
    expect(result).toMatchObject({ member: 0, seed: 1, value: 10 });
  });
  it('carries relabelled orders back: held-last unknowns stay last in the order given', () => {
    const heldLast = Int32Array.from([5, 200, 17]);
    const { order } = bestOf(grid2d5(20), members.slice(1), { measure, seeds: [1, 2, 3, 4], heldLast }, noProgress);
    expect(order.slice(-3)).toEqual(heldLast);
  });
  it('a time limit drops what is running and keeps what has ended; the first trial always ends', () => {
    let now = 0;
    const clock = (): number => now++;
    const result = bestOf(grid2d5(25), members, { measure, seeds: [1, 2, 3], clock, timeLimit: 2 }, noProgress);
    expect(result.stopped).toBe(true);
    expect(result.trials.length).toBeGreaterThanOrEqual(1);
    expect(result.trials.length).toBeLessThan(9);
    const none = bestOf(grid2d5(5), members, { measure, clock, timeLimit: 0 }, noProgress);
    expect(none.trials).toHaveLength(1);
    expect(none.spread[2]).toMatchObject({ trials: 0, least: null, median: null, most: null });
  });
  it('a cancel passes through, an empty portfolio is refused', () => {
    const stop = (): never => {
      throw new Cancelled();
    };
    expect(() => bestOf(grid2d5(20), members, { measure }, stop)).toThrow(Cancelled);
    expect(() => bestOf(grid2d5(20), [], { measure }, noProgress)).toThrow(/at least one/);
    expect(() => bestOf(grid2d5(20), members, { measure, seeds: [] }, noProgress)).toThrow(/at least one/);
  });
});
