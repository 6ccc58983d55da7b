import { Fault } from '../matrix/fault.ts';
import { magnitudeAt } from '../matrix/modulus.ts';
import { entryCount, type SparseMatrix, valueWidth } from '../matrix/pattern.ts';

/** entry -> modulus. A Fault for a pattern without values or a value that is not finite. */
export function moduliOf(a: SparseMatrix): Float64Array {
  if (a.values === null) {
    throw new Fault(
      'input',
      'values-missing',
      'Scaling and matching by size need values; this matrix is a pattern only.',
    );
  }
  const v = a.values;
  const wide = valueWidth(a) === 2;
  const out = new Float64Array(entryCount(a));
  for (let p = 0; p < out.length; p++) {
    const m = magnitudeAt(v, wide ? 2 : 1, p);
    if (!(m < Infinity)) {
      let column = 0;
      while (a.columnPointer[column + 1] <= p) column++;
      throw new Fault(
        'input',
        'not-finite',
        `The value at row ${a.rowIndex[p] + 1}, column ${column + 1} (1-based) is NaN or infinite; scaling is impossible.`,
        { row: a.rowIndex[p], column },
      );
    }
    out[p] = m;
  }
  return out;
}
