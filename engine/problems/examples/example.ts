import type { SparseMatrix } from '../../matrix/pattern.ts';

/** Where the mesh nodes are, for geometric dissection and for drawing separators on the mesh. */
export interface NodeCoordinates {
  /** 1, 2 or 3 */
  readonly dimensions: number;
  /** unknowns of one node; they are numbered one after the other */
  readonly unknownsPerNode: number;
  /** node by node, `dimensions` numbers each, in metres */
  readonly values: Float64Array;
}

export interface WorkedExample {
  /** stable word, used by recipes and tests */
  readonly id: string;
  readonly title: string;
  /** one sentence: what it is and what makes it worth a look */
  readonly sentence: string;
  /** sizes offered, smallest first; the first is the one a newcomer gets */
  readonly sizes: readonly number[];
  /** what `size` counts */
  readonly sizeMeans: string;
  make(size: number): { readonly matrix: SparseMatrix; readonly coordinates: NodeCoordinates | null };
}
