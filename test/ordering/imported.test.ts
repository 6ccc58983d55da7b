import { describe, expect, it } from 'vitest';
import { imported, importedBothWays } from '../../engine/ordering/imported.ts';

// 0 → 2 → 1 → 0: not its own inverse
const cycle = Int32Array.from([2, 0, 1, 3]);

describe('an imported permutation', () => {
  it('is read in the direction stated', () => {
    expect([...imported(cycle, 'new-to-old', 4).order]).toEqual([2, 0, 1, 3]);
    expect([...imported(cycle, 'old-to-new', 4).order]).toEqual([1, 2, 0, 3]);
  });
  it('is read both ways where no direction is stated', () => {
    const both = importedBothWays(cycle, 4);
    expect([[...both.newToOld.order], [...both.oldToNew.order], both.same]).toEqual([
      [2, 0, 1, 3],
      [1, 2, 0, 3],
      false,
    ]);
    expect(importedBothWays(Int32Array.from([1, 0]), 2).same).toBe(true);
  });
  it('is copied and keeps held-last unknowns last', () => {
    const { order } = imported(cycle, 'new-to-old', 4, { heldLast: Int32Array.from([0]) });
    expect([...order]).toEqual([2, 1, 3, 0]);
    expect([...cycle]).toEqual([2, 0, 1, 3]);
  });
  it.each([
    [[0, 1], 3, /2 values; this matrix needs 3/],
    [[0, 3, 1], 3, /Value 2 of the permutation/],
    [[0, 1, 1], 3, /Value 3 of the permutation repeats value 2/],
    [[-1, 1, 2], 3, /Value 1 of the permutation/],
  ])('refuses %j', (values, n, message) => {
    expect(() => imported(Int32Array.from(values), 'new-to-old', n)).toThrow(message);
  });
});
