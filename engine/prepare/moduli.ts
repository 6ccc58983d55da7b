import { Fault } from '../matrix/fault.ts';
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
    const m = wide ? modulus(v[2 * p], v[2 * p + 1]) : Math.abs(v[p]);
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

function modulus(re: number, im: number): number {
  const a = Math.abs(re);
  const b = Math.abs(im);
  const big = a > b ? a : b;
  if (!(big > 0 && big < Infinity)) return big;
  const small = (a > b ? b : a) / big;
  return big * Math.sqrt(1 + small * small);
}
