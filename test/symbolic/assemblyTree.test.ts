/** Supernodes, amalgamation and fronts against elimination on sets. */
import { describe, expect, it } from 'vitest';
import { graphOf } from '../../engine/graph/graph.ts';
import { noAmalgamation, usualAmalgamation } from '../../engine/symbolic/amalgamate.ts';
import { analyse } from '../../engine/symbolic/analyse.ts';
import { assemblyTree } from '../../engine/symbolic/assemblyTree.ts';
import { checkAssemblyTree, checkFrontRows } from '../../engine/symbolic/checkTree.ts';
import { frontRows } from '../../engine/symbolic/frontRows.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomOrder, randomPattern } from '../support/random.ts';

describe('assembly tree', () => {
  for (let seed = 1; seed <= 30; seed++) {
    it(`random pattern (seed ${seed}): without padding the fronts are the columns of L, with padding they hold them`, () => {
      const n = 5 + seed;
      const a = randomPattern({ rows: n, columns: n, entries: 2 * n, seed });
      const factor = analyse(a, randomOrder(n, seed + 50), { postorder: seed % 2 === 0 });
      for (const amalgamation of [noAmalgamation, usualAmalgamation]) {
        const tree = assemblyTree(factor, { amalgamation });
        checkAssemblyTree(tree);
        const rows = frontRows(tree, graphOf(a));
        checkFrontRows(tree, rows);
        const { columns, factorEntries } = naiveElimination(a, tree.order);
        expect(factorEntries).toBe(factor.factorEntries);
        for (let s = 0; s < tree.count; s++) {
          const front = Array.from(rows.row.subarray(rows.pointer[s], rows.pointer[s + 1]));
          for (let j = tree.firstColumn[s]; j < tree.firstColumn[s + 1]; j++) {
            const tail = front.slice(j - tree.firstColumn[s]);
            if (amalgamation === noAmalgamation) expect(columns[j]).toEqual(tail);
            else for (const i of columns[j]) expect(tail).toContain(i);
          }
        }
        if (amalgamation === noAmalgamation) expect(tree.storedFactorEntries).toBe(factorEntries);
        else expect(tree.storedFactorEntries).toBeGreaterThanOrEqual(factorEntries);
      }
    });
  }

  it('held-last unknowns form one final supernode that is not joined and not moved', () => {
    const n = 40;
    const a = randomPattern({ rows: n, columns: n, entries: 90, seed: 3 });
    const order = randomOrder(n, 8);
    const factor = analyse(a, order, { postorder: true, heldLast: 5 });
    const tree = assemblyTree(factor, { held: 5 });
    checkAssemblyTree(tree);
    checkFrontRows(tree, frontRows(tree, graphOf(a)));
    expect(tree.firstColumn[tree.count - 1]).toBe(n - 5);
    expect(Array.from(tree.order.subarray(n - 5))).toEqual(Array.from(order.subarray(n - 5)));
  });

  it('the checkers fail on broken trees', () => {
    const a = randomPattern({ rows: 20, columns: 20, entries: 60, seed: 4 });
    const tree = assemblyTree(analyse(a, randomOrder(20, 1), { postorder: true }));
    const parent = tree.parent.slice();
    parent[0] = 0;
    expect(() => checkAssemblyTree({ ...tree, parent })).toThrow('tree.parent[0]');
    const rows = frontRows(tree, graphOf(a));
    const row = rows.row.slice();
    row[rows.pointer[tree.count] - 1] = 0;
    expect(() => checkFrontRows(tree, { ...rows, row })).toThrow('front');
  });

  it('empty matrix', () => {
    const empty = { rows: 0, columns: 0, columnPointer: new Int32Array(1), rowIndex: new Int32Array(0) };
    const tree = assemblyTree(analyse(empty, randomOrder(0, 1), { postorder: true }));
    checkAssemblyTree(tree);
    expect(tree.count).toBe(0);
  });
});
