/** Seeded random patterns, matrices and orders for tests. The seed belongs in the test's title. */
import { assemble } from '../../engine/matrix/assemble.ts';
import type { Pattern, SparseMatrix } from '../../engine/matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../engine/matrix/permutation.ts';
import { Random } from '../../engine/matrix/random.ts';

export interface RandomOptions {
  readonly rows: number;
  readonly columns: number;
  /** entries drawn (duplicates are summed, so the matrix may hold fewer) */
  readonly entries: number;
  readonly seed: number;
  readonly complex?: boolean;
  /** adds the mirror of each entry (values too) */
  readonly symmetric?: boolean;
  /** adds a full diagonal of this size (absent: no diagonal added) */
  readonly diagonal?: number;
}

/** Values uniform in (−1, 1). */
export function randomMatrix(o: RandomOptions): SparseMatrix {
  const random = new Random(o.seed);
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  const push = (i: number, j: number, re: number, im: number): void => {
    row.push(i);
    column.push(j);
    values.push(re);
    if (o.complex) values.push(im);
  };
  for (let e = 0; e < o.entries; e++) {
    const i = random.below(o.rows);
    const j = random.below(o.columns);
    const re = 2 * random.next() - 1;
    const im = 2 * random.next() - 1;
    push(i, j, re, im);
    if (o.symmetric && i !== j) push(j, i, re, im);
  }
  if (o.diagonal !== undefined) {
    for (let i = 0; i < Math.min(o.rows, o.columns); i++) push(i, i, o.diagonal, 0);
  }
  return assemble({
    rows: o.rows,
    columns: o.columns,
    field: o.complex ? 'complex' : 'real',
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: Float64Array.from(values),
  }).matrix;
}

/** The pattern of `randomMatrix`. */
export function randomPattern(o: RandomOptions): Pattern {
  const { rows, columns, columnPointer, rowIndex } = randomMatrix(o);
  return { rows, columns, columnPointer, rowIndex };
}

/** A random order, new-to-old. */
export function randomOrder(n: number, seed: number): NewToOld {
  const order = new Int32Array(n);
  for (let i = 0; i < n; i++) order[i] = i;
  return asNewToOld(new Random(seed).shuffleInPlace(order));
}
