import { Fault } from './fault.ts';
import { type Field, type SparseMatrix, valueWidth } from './pattern.ts';

/** One summand: a complex coefficient [real part, imaginary part] and its matrix. */
export interface Term {
  readonly coefficient: readonly [number, number];
  readonly matrix: SparseMatrix;
}

/**
 * Σ coefficient · matrix on the union of the patterns (stiffness, mass and damping at a frequency: K − ω²M + iωC). A position of
 * any summand is an entry of the result, whatever the values: a coefficient or a sum of zero leaves a stored zero. The result
 * is complex when a coefficient has an imaginary part or a matrix is complex, else real. Summed in the order of the terms.
 * Throws a `Fault` without terms, for different shapes, a pattern without values, or a coefficient that is not finite.
 */
export function combine(terms: readonly Term[]): SparseMatrix {
  check(terms);
  const complex = terms.some((t) => t.coefficient[1] !== 0 || t.matrix.field === 'complex');
  const { rows, columns } = terms[0].matrix;
  const width = complex ? 2 : 1;
  const { columnPointer, rowIndex } = union(terms);
  const values = new Float64Array(rowIndex.length * width);
  // row -> its entry in the current column of the result
  const entryOf = new Int32Array(rows);
  for (let j = 0; j < columns; j++) {
    for (let q = columnPointer[j]; q < columnPointer[j + 1]; q++) entryOf[rowIndex[q]] = q;
    for (const term of terms) addColumn(term, j, entryOf, values, complex);
  }
  const field: Field = complex ? 'complex' : 'real';
  return { rows, columns, columnPointer, rowIndex, field, values };
}

function check(terms: readonly Term[]): void {
  if (terms.length === 0) throw new Fault('input', 'no-terms', 'A combination needs at least one matrix.');
  const { rows, columns } = terms[0].matrix;
  terms.forEach(({ matrix, coefficient }, k) => {
    const which = `Matrix ${k + 1} of the combination`;
    if (matrix.rows !== rows || matrix.columns !== columns) {
      const size = `${matrix.rows} rows and ${matrix.columns} columns`;
      const text = `${which} has ${size}; the first has ${rows} rows and ${columns} columns. All must have the same size.`;
      throw new Fault('input', 'different-shapes', text);
    }
    if (matrix.values === null) {
      throw new Fault(
        'input',
        'no-values',
        `${which} is a pattern without values; only matrices with values can be summed.`,
      );
    }
    if (!(Number.isFinite(coefficient[0]) && Number.isFinite(coefficient[1]))) {
      const text = `The coefficient of matrix ${k + 1} is ${coefficient[0]} + ${coefficient[1]}i; it must be finite.`;
      throw new Fault('input', 'coefficient-not-finite', text);
    }
  });
}

/** Union of the patterns, sorted: the columns of all terms merged pairwise, term after term. */
function union(terms: readonly Term[]): { columnPointer: Int32Array; rowIndex: Int32Array } {
  let columnPointer = terms[0].matrix.columnPointer;
  let rowIndex = terms[0].matrix.rowIndex;
  for (let k = 1; k < terms.length; k++) {
    const b = terms[k].matrix;
    const pointer = new Int32Array(b.columns + 1);
    const index = new Int32Array(rowIndex.length + b.rowIndex.length);
    let out = 0;
    for (let j = 0; j < b.columns; j++) {
      let p = columnPointer[j];
      let q = b.columnPointer[j];
      const pEnd = columnPointer[j + 1];
      const qEnd = b.columnPointer[j + 1];
      while (p < pEnd || q < qEnd) {
        const i1 = p < pEnd ? rowIndex[p] : b.rows;
        const i2 = q < qEnd ? b.rowIndex[q] : b.rows;
        index[out++] = i1 < i2 ? i1 : i2;
        if (i1 <= i2) p++;
        if (i2 <= i1) q++;
      }
      pointer[j + 1] = out;
    }
    columnPointer = pointer;
    rowIndex = index.slice(0, out);
  }
  // the result owns its arrays, also with a single term
  return terms.length === 1
    ? { columnPointer: columnPointer.slice(), rowIndex: rowIndex.slice() }
    : { columnPointer, rowIndex };
}

/** Adds coefficient · (column j) into `values`; zero parts of the coefficient are skipped, so that they never meet an infinity. */
function addColumn(term: Term, j: number, entryOf: Int32Array, values: Float64Array, complex: boolean): void {
  const { matrix } = term;
  const [re, im] = term.coefficient;
  const { columnPointer, rowIndex, values: from } = matrix;
  if (from === null) return;
  const width = valueWidth(matrix);
  const end = columnPointer[j + 1];
  for (let p = columnPointer[j]; p < end; p++) {
    const q = entryOf[rowIndex[p]];
    const x = from[width * p];
    if (!complex) {
      if (re !== 0) values[q] += re * x;
      continue;
    }
    const y = width === 2 ? from[2 * p + 1] : 0;
    if (re !== 0) {
      values[2 * q] += re * x;
      values[2 * q + 1] += re * y;
    }
    if (im !== 0) {
      values[2 * q] -= im * y;
      values[2 * q + 1] += im * x;
    }
  }
}
