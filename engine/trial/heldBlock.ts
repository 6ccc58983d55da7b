import { type Arithmetic, denseOperations, type FactorKind, factorOperations } from '../symbolic/operations.ts';
import type { HeldBlock } from './result.ts';

/**
 * Size and cost of the Schur complement of the unknowns held last.
 * @param lower, upper entries of the columns of L and rows of U with their diagonals; the held ones are the last `held`
 */
export function heldBlockOf(
  kind: FactorKind,
  lower: Int32Array,
  upper: Int32Array,
  held: number,
  arithmetic: Arithmetic,
  valueBytes: number,
): HeldBlock | null {
  if (held === 0) return null;
  const first = lower.length - held;
  let entries = 0;
  for (let k = first; k < lower.length; k++) entries += kind === 'lu' ? lower[k] + upper[k] - 1 : lower[k];
  const denseEntries = kind === 'lu' ? held * held : (held * (held + 1)) / 2;
  return {
    unknowns: held,
    entries,
    denseEntries,
    denseBytes: valueBytes * denseEntries,
    operationsBefore: factorOperations(kind, lower.subarray(0, first), arithmetic, upper.subarray(0, first)),
    operationsOfBlock: factorOperations(kind, lower.subarray(first), arithmetic, upper.subarray(first)),
    denseOperations: denseOperations(kind, held, held, arithmetic),
  };
}
