import { entryCount, type Pattern } from '../../engine/matrix/pattern.ts';
import { TrialContext } from '../../engine/trial/context.ts';
import { runTrial } from '../../engine/trial/run.ts';
import type { Job } from './jobs.ts';
import type { MatrixKey } from './protocol.ts';
import type { Shelf } from './shelf.ts';

/** The context of a matrix with these unknowns held last; kept, so that trials share what they have in common. */
export function contextOf(shelf: Shelf, key: MatrixKey, heldLast: Int32Array): TrialContext {
  return shelf.derive(key, `context ${heldLast.join(' ')}`, ({ loaded, coordinates, imported }) => {
    const held = heldLast.length === 0 ? null : heldLast;
    return new TrialContext({ matrix: loaded.matrix, coordinates, imported, heldLast: held });
  });
}

export const trial: Job<'trial'> = ({ key, choice, heldLast }, { shelf, progress }) => {
  const context = contextOf(shelf, key, heldLast);
  const result = runTrial(context, choice, progress);
  const { matrix } = context.input;
  const symmetric = choice.factorization === 'cholesky' || choice.factorization === 'ldlt';
  const replaced = symmetric ? context.graph().neighbour.length / 2 + storedDiagonal(matrix) : entryCount(matrix);
  const { counts, seconds, valueDependent, notes } = result;
  return { outcome: { counts, seconds, valueDependent, notes, replaced }, result };
};

/** Diagonal positions that are entries. */
function storedDiagonal(a: Pattern): number {
  let stored = 0;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) if (a.rowIndex[p] === j) stored++;
  }
  return stored;
}
