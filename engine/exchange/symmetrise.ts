import { Fault } from '../matrix/fault.ts';
import { modulus } from '../matrix/modulus.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { transpose } from '../matrix/transpose.ts';
import type { ImportNote } from './loaded.ts';

/** A difference above this share of the largest value is no rounding: averaging would make another matrix. */
const mostDifference = 1e-3;

interface Gap {
  readonly largest: number;
  readonly row: number;
  readonly column: number;
}

/**
 * (A + Aᵀ)/2, or (A + Aᴴ)/2 where the complex matrix is nearer to that, on the union of both patterns; the note says by how much
 * the matrix was not symmetric. A pattern is only made symmetric.
 * @throws Fault for a rectangular matrix, or one whose mirrors differ by more than a thousandth of its largest value
 */
export function symmetrised(file: string, a: SparseMatrix, notes: ImportNote[]): SparseMatrix {
  if (a.rows !== a.columns) {
    throw new Fault(
      'input',
      'symmetrise-not-square',
      `${file}, byte 0: a matrix of ${a.rows} × ${a.columns} has no mirror to average with; expected as many rows as columns.`,
      { file, byteOffset: 0 },
    );
  }
  const t = transpose(a);
  const plain = mirrorGap(a, t, 1);
  const conjugate = a.field === 'complex' ? mirrorGap(a, t, -1) : plain;
  const sign = conjugate.gap.largest < plain.gap.largest ? -1 : 1;
  const { gap, largest } = sign === 1 ? plain : conjugate;
  if (!(gap.largest <= mostDifference * largest)) {
    throw new Fault(
      'input',
      'not-nearly-symmetric',
      `${file}: mirror entries differ by up to ${gap.largest}, at (${gap.row + 1}, ${gap.column + 1}), where the largest value is ${largest}; expected a matrix that is symmetric but for rounding. Leave it general.`,
      { file, row: gap.row, column: gap.column },
    );
  }
  const other = sign === 1 ? 'Aᵀ' : 'Aᴴ';
  const share = largest === 0 ? 0 : gap.largest / largest;
  notes.push({
    code: 'symmetrised',
    text: `A was replaced by (A + ${other})/2 on request: mirror entries differed by up to ${gap.largest} (${Number(share.toPrecision(3))} of the largest value)${gap.row < 0 ? '' : `, at (${gap.row + 1}, ${gap.column + 1})`}.`,
  });
  return averaged(a, t, sign);
}

/** Walks the union of two sorted columns; p or q is −1 where the entry is in one of them only. */
function walk(a: SparseMatrix, t: SparseMatrix, see: (i: number, j: number, p: number, q: number) => void): void {
  for (let j = 0; j < a.columns; j++) {
    let p = a.columnPointer[j];
    let q = t.columnPointer[j];
    const pEnd = a.columnPointer[j + 1];
    const qEnd = t.columnPointer[j + 1];
    while (p < pEnd || q < qEnd) {
      const i1 = p < pEnd ? a.rowIndex[p] : a.rows;
      const i2 = q < qEnd ? t.rowIndex[q] : a.rows;
      see(i1 < i2 ? i1 : i2, j, i1 <= i2 ? p : -1, i2 <= i1 ? q : -1);
      if (i1 <= i2) p++;
      if (i2 <= i1) q++;
    }
  }
}

function mirrorGap(a: SparseMatrix, t: SparseMatrix, sign: 1 | -1): { gap: Gap; largest: number } {
  const { values } = a;
  const other = t.values;
  let gap: Gap = { largest: 0, row: -1, column: -1 };
  let largest = 0;
  if (values === null || other === null) return { gap, largest };
  const complex = a.field === 'complex';
  walk(a, t, (i, j, p, q) => {
    const x = p < 0 ? 0 : complex ? values[2 * p] : values[p];
    const xi = p < 0 || !complex ? 0 : values[2 * p + 1];
    const y = q < 0 ? 0 : complex ? other[2 * q] : other[q];
    const yi = q < 0 || !complex ? 0 : sign * other[2 * q + 1];
    const size = modulus(x, xi);
    if (size > largest) largest = size;
    const d = x === y && xi === yi ? 0 : modulus(x - y, xi - yi);
    if (!(d <= gap.largest)) gap = { largest: d, row: i, column: j };
  });
  return { gap, largest };
}

function averaged(a: SparseMatrix, t: SparseMatrix, sign: 1 | -1): SparseMatrix {
  const { values } = a;
  const other = t.values;
  const width = values === null ? 0 : a.field === 'complex' ? 2 : 1;
  const columnPointer = new Int32Array(a.columns + 1);
  const rowIndex = new Int32Array(2 * a.rowIndex.length);
  const out = new Float64Array(rowIndex.length * width);
  let fill = 0;
  walk(a, t, (i, j, p, q) => {
    rowIndex[fill] = i;
    for (let w = 0; w < width; w++) {
      const x = p < 0 || values === null ? 0 : values[p * width + w];
      const y = q < 0 || other === null ? 0 : (w === 1 ? sign : 1) * other[q * width + w];
      out[fill * width + w] = x === y ? x : x / 2 + y / 2;
    }
    columnPointer[j + 1] = ++fill;
  });
  for (let j = 0; j < a.columns; j++)
    if (columnPointer[j + 1] < columnPointer[j]) columnPointer[j + 1] = columnPointer[j];
  return {
    ...a,
    field: a.field === 'integer' ? 'real' : a.field,
    columnPointer,
    rowIndex: rowIndex.slice(0, fill),
    values: values === null ? null : out.slice(0, fill * width),
  };
}
