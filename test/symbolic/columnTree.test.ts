/** The elimination tree of AᵀA without AᵀA: against elimination on sets of the product, and what its postorder leaves as it is. */
import { describe, expect, it } from 'vitest';
import { asNewToOld, composeOrders } from '../../engine/matrix/permutation.ts';
import { columnTree } from '../../engine/symbolic/columnTree.ts';
import { luCounts } from '../../engine/symbolic/luCounts.ts';
import { postorder } from '../../engine/symbolic/postorder.ts';
import { rowMergeBound } from '../../engine/symbolic/rowMerge.ts';
import { naiveElimination } from '../support/elimination.ts';
import { productPattern } from '../support/product.ts';
import { randomOrder, randomPattern } from '../support/random.ts';

describe('column tree', () => {
  for (let seed = 1; seed <= 30; seed++) {
    it(`is the elimination tree of AᵀA, tall, wide or square (seed ${seed})`, () => {
      const columns = 2 + (seed % 19);
      const rows = Math.max(1, columns + ((seed * 7) % 11) - 5);
      const a = randomPattern({ rows, columns, entries: Math.floor(rows * (0.5 + (seed % 4))), seed });
      const order = randomOrder(columns, seed + 40);
      expect([...columnTree(a, order)]).toEqual(naiveElimination(productPattern(a), order).parent);
    });
    it(`its postorder leaves the row-merge bound and the count without interchanges as they are (seed ${seed})`, () => {
      const n = 3 + 2 * (seed % 23);
      const a = randomPattern({ rows: n, columns: n, entries: 2 * n, seed, diagonal: 1 });
      const order = randomOrder(n, seed);
      const post = asNewToOld(postorder(columnTree(a, order)));
      const other = composeOrders(order, post);
      const before = rowMergeBound(a, order);
      const after = rowMergeBound(a, other);
      expect([...after.lower]).toEqual([...post].map((k) => before.lower[k]));
      expect([...after.upper]).toEqual([...post].map((k) => before.upper[k]));
      const limit = Number.POSITIVE_INFINITY;
      expect(luCounts(a, other, limit)?.lowerEntries).toBe(luCounts(a, order, limit)?.lowerEntries);
      expect(luCounts(a, other, limit)?.upperEntries).toBe(luCounts(a, order, limit)?.upperEntries);
    });
  }
});
