import { describe, expect, it } from 'vitest';
import { blockTriangularForm } from '../../engine/graph/blockTriangular.ts';
import { checkPermutation } from '../../engine/matrix/check.ts';
import { asNewToOld } from '../../engine/matrix/permutation.ts';
import { permutePattern } from '../../engine/matrix/permute.ts';
import { noProgress } from '../../engine/matrix/progress.ts';
import { byBlocks } from '../../engine/ordering/byBlocks.ts';
import { columnMinimumDegree } from '../../engine/ordering/columnMinimumDegree.ts';
import { minimumDegree } from '../../engine/ordering/minimumDegree.ts';
import { randomMatrix } from '../support/random.ts';

describe('block by block', () => {
  for (const seed of [1, 2, 3]) {
    for (const columnsOnly of [false, true]) {
      it(`keeps the form, the diagonal${columnsOnly ? ' aside' : ' too'}, seed ${seed}`, () => {
        const a = randomMatrix({ rows: 120, columns: 120, entries: 190, seed, diagonal: 1 });
        const form = blockTriangularForm(a);
        const method = columnsOnly ? columnMinimumDegree : minimumDegree;
        const { rowOrder, columnOrder } = byBlocks(a, form, method, {}, noProgress, columnsOnly);
        checkPermutation(rowOrder, 120);
        checkPermutation(columnOrder, 120);
        const b = permutePattern(a, asNewToOld(rowOrder), asNewToOld(columnOrder));
        const blockOf = new Int32Array(120);
        for (let k = 0; k < form.blocks; k++) blockOf.fill(k, form.blockStart[k], form.blockStart[k + 1]);
        for (let l = 0; l < 120; l++) {
          const rows = [...b.rowIndex.slice(b.columnPointer[l], b.columnPointer[l + 1])];
          for (const k of rows) expect(blockOf[k]).toBeLessThanOrEqual(blockOf[l]);
          if (!columnsOnly) expect(rows).toContain(l);
        }
      });
    }
  }
});
