/** A `Solver` over a general-purpose dense library (ml-matrix), and exact arithmetic for residuals: oracles for the tests of this room. */
import { inverse, LuDecomposition, Matrix } from 'ml-matrix';
import { assemble } from '../../../engine/matrix/assemble.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import type { PivotReport, Solver } from '../../../engine/numeric/solver.ts';

/** A report with nothing to say. */
export const plainReport: PivotReport = {
  counts: { offDiagonal: 0, delayed: 0, twoByTwo: 0, perturbed: 0 },
  smallestPivot: null,
  largestPivot: null,
  inertia: null,
  logAbsDeterminant: null,
  determinantSign: null,
  pivotGrowth: null,
  factorEntries: 0,
  storedFactorEntries: 0,
  executedOperations: 0,
  twoByTwoOperations: 0,
  peakBytes: 0,
  notes: [],
};

/** Rows of a real dense matrix as a sparse one; exact zeros are left out. */
export function sparseOf(rows: readonly (readonly number[])[]): SparseMatrix {
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  rows.forEach((line, i) => {
    line.forEach((value, j) => {
      if (value === 0) return;
      row.push(i);
      column.push(j);
      values.push(value);
    });
  });
  return assemble({
    rows: rows.length,
    columns: rows[0]?.length ?? 0,
    field: 'real',
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: Float64Array.from(values),
  }).matrix;
}

/**
 * Dense real rows of a matrix; a complex one becomes its real form of twice the order, re −im / im re for each entry,
 * which acts on interleaved vectors.
 */
export function denseOf(a: SparseMatrix): number[][] {
  const w = a.field === 'complex' ? 2 : 1;
  const rows = Array.from({ length: a.rows * w }, () => new Array<number>(a.columns * w).fill(0));
  const v = a.values ?? new Float64Array(0);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      if (w === 1) rows[i][j] = v[p];
      else {
        rows[2 * i][2 * j] = v[2 * p];
        rows[2 * i][2 * j + 1] = -v[2 * p + 1];
        rows[2 * i + 1][2 * j] = v[2 * p + 1];
        rows[2 * i + 1][2 * j + 1] = v[2 * p];
      }
    }
  }
  return rows;
}

/** Solves through a dense LU of A and of Aᵀ. */
export function denseSolver(a: SparseMatrix): Solver {
  const complex = a.field === 'complex';
  const dense = new Matrix(denseOf(a));
  const lu = new LuDecomposition(dense);
  const n = dense.rows;
  const transposedDense = denseOf(a);
  // transposed, not conjugated: the real form of Aᵀ has the blocks moved, not transposed inside
  const moved = Array.from({ length: n }, () => new Array<number>(n).fill(0));
  const w = complex ? 2 : 1;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      moved[Math.floor(j / w) * w + (i % w)][Math.floor(i / w) * w + (j % w)] = transposedDense[i][j];
    }
  }
  const luTransposed = new LuDecomposition(new Matrix(moved));
  const run = (f: LuDecomposition) => (x: Float64Array, columns: number) => {
    for (let c = 0; c < columns; c++) {
      const part = x.subarray(c * n, (c + 1) * n);
      part.set(f.solve(Matrix.columnVector(Array.from(part))).to1DArray());
    }
  };
  return {
    size: a.columns,
    complex,
    report: plainReport,
    solveInPlace: run(lu),
    solveTransposedInPlace: run(luTransposed),
  };
}

/** ‖A‖₁·‖A⁻¹‖₁ of a real matrix through the dense library's inverse. */
export function denseCondition(a: SparseMatrix): number {
  const dense = new Matrix(denseOf(a));
  const one = (m: Matrix) =>
    Math.max(...Array.from({ length: m.columns }, (_, j) => sum(m.getColumn(j).map(Math.abs))));
  return one(dense) * one(inverse(dense));
}

function sum(x: readonly number[]): number {
  return x.reduce((s, v) => s + v, 0);
}

/** A finite double as an exact rational m·2⁻¹⁰⁷⁴ with an integer m. */
function exactInteger(x: number): bigint {
  const bits = new DataView(new ArrayBuffer(8));
  bits.setFloat64(0, x);
  const raw = bits.getBigUint64(0);
  const exponent = Number((raw >> 52n) & 0x7ffn);
  const fraction = raw & 0xfffffffffffffn;
  const magnitude = exponent === 0 ? fraction : (fraction | 0x10000000000000n) << BigInt(exponent - 1);
  return raw >> 63n === 1n ? -magnitude : magnitude;
}

/**
 * b − A·x of real data in exact integer arithmetic, rounded at the end: shares nothing with the code under test.
 * Every double is an integer times 2⁻¹⁰⁷⁴, so products are integers times 2⁻²¹⁴⁸.
 */
export function exactResidual(a: SparseMatrix, x: Float64Array, b: Float64Array): Float64Array {
  const total = Array.from({ length: a.rows }, (_, i) => exactInteger(b[i]) << 1074n);
  const v = a.values ?? new Float64Array(0);
  for (let j = 0; j < a.columns; j++) {
    const xj = exactInteger(x[j]);
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) total[a.rowIndex[p]] -= exactInteger(v[p]) * xj;
  }
  return Float64Array.from(total, (t) => roundFrom(t));
}

/** t·2⁻²¹⁴⁸ to within one unit of the 60th bit. */
function roundFrom(t: bigint): number {
  const magnitude = t < 0n ? -t : t;
  const bits = magnitude.toString(2).length;
  const drop = bits > 60 ? bits - 60 : 0;
  let value = Number(magnitude >> BigInt(drop));
  let exponent = drop - 2148;
  // a single factor of 2 to a very negative power would underflow too early
  while (exponent < -1000) {
    value *= 2 ** -1000;
    exponent += 1000;
  }
  value *= 2 ** exponent;
  return t < 0n ? -value : value;
}

/** The Hilbert matrix of order n times the least common multiple of 1 … 2n − 1, so that every entry is an exact integer (n ≤ 10). */
export function integerHilbert(n: number): SparseMatrix {
  let multiple = 1;
  for (let k = 2; k < 2 * n; k++) {
    let g = k;
    let r = multiple;
    while (r > 0) [g, r] = [r, g % r];
    multiple = (multiple / g) * k;
  }
  return sparseOf(Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => multiple / (i + j + 1))));
}

/**
 * 1-norm condition number of the Hilbert matrix of order n, exactly: its inverse has the integer entries
 * (−1)^(i+j) (i+j−1) C(n+i−1, n−j) C(n+j−1, n−i) C(i+j−2, i−1)² (closed form; Choi 1983, Tricks or treats with the Hilbert matrix).
 */
export function hilbertCondition(n: number): number {
  const choose = (m: number, k: number): bigint => {
    let c = 1n;
    for (let t = 1; t <= k; t++) c = (c * BigInt(m - k + t)) / BigInt(t);
    return c;
  };
  let inverseNorm = 0n;
  for (let j = 1; j <= n; j++) {
    let column = 0n;
    for (let i = 1; i <= n; i++) {
      column +=
        BigInt(i + j - 1) * choose(n + i - 1, n - j) * choose(n + j - 1, n - i) * choose(i + j - 2, i - 1) ** 2n;
    }
    if (column > inverseNorm) inverseNorm = column;
  }
  let norm = 0;
  for (let i = 1; i <= n; i++) norm += 1 / i;
  return norm * Number(inverseNorm);
}
