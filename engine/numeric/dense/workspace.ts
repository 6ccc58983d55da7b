/** Columns of one block of a panel: inside it the kernels work unpacked, behind it packed. */
export const panelWidth = 32;

/** Depth of one packed update of a contribution block: a group of this depth stays in the first cache level. */
export const updateDepth = 256;

/** Buffers of the dense kernels, made once a run. */
export interface DenseWorkspace {
  /** packed left operand */
  readonly left: Float64Array;
  /** packed right operand (empty when always the same as the left) */
  readonly right: Float64Array;
  /** one updated column of a front (pivoting kinds) */
  readonly first: Float64Array;
  /** a second updated column (partner of a 2×2 pivot) */
  readonly second: Float64Array;
  /** coefficients of one column with respect to a block */
  readonly factors: Float64Array;
}

/** Scalars one packed operand can take when no front is larger than `largestFront` and none has more than `mostPivots` columns. */
export function packedLength(largestFront: number, mostPivots: number): number {
  const depth = mostPivots < updateDepth ? mostPivots : updateDepth;
  return (largestFront + 3) * depth;
}
