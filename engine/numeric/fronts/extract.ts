import { assemble } from '../../matrix/assemble.ts';
import type { SparseMatrix } from '../../matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../matrix/permutation.ts';
import type { Factors } from './factors.ts';
import type { FactorArray } from './storage.ts';

/**
 * Factors as sparse matrices, in the order of elimination: S·A·S permuted by `rowOrder` = L·Lᴴ or L·D·Lᵀ (`upper` null), or
 * R·A·C permuted by `rowOrder` and `columnOrder` = L·U (`diagonal` null), L unit-lower except for Cholesky.
 */
export interface ExtractedFactors {
  /** new-to-old: pivot t has the original row rowOrder[t] */
  readonly rowOrder: NewToOld;
  /** new-to-old: pivot t has the original column columnOrder[t] */
  readonly columnOrder: NewToOld;
  readonly lower: SparseMatrix;
  /** D of LDLᵀ, block diagonal with blocks of order one and two */
  readonly diagonal: SparseMatrix | null;
  readonly upper: SparseMatrix | null;
}

/** A growing list of entries. */
class Entries {
  readonly row: number[] = [];
  readonly column: number[] = [];
  readonly value: number[] = [];

  constructor(
    private readonly n: number,
    private readonly width: number,
  ) {}

  /** Adds scalar `at` of x; zeros off the diagonal are padding and stay out. */
  add(i: number, j: number, x: FactorArray, at: number, negateImaginary = false): void {
    const w = this.width;
    if (i !== j && x[w * at] === 0 && (w === 1 || x[2 * at + 1] === 0)) return;
    this.row.push(i);
    this.column.push(j);
    this.value.push(x[w * at]);
    if (w === 2) this.value.push(negateImaginary ? -x[2 * at + 1] : x[2 * at + 1]);
  }

  one(i: number): void {
    this.row.push(i);
    this.column.push(i);
    this.value.push(1);
    if (this.width === 2) this.value.push(0);
  }

  matrix(): SparseMatrix {
    return assemble({
      rows: this.n,
      columns: this.n,
      field: this.width === 2 ? 'complex' : 'real',
      row: Int32Array.from(this.row),
      column: Int32Array.from(this.column),
      values: Float64Array.from(this.value),
    }).matrix;
  }
}

/** Extracts L, D, U for export and tests; needs memory for all entries at once. All unknowns must have been eliminated. */
export function extractFactors(f: Factors): ExtractedFactors {
  const n = f.size;
  const rowOrder = new Int32Array(n);
  const columnOrder = new Int32Array(n);
  /** internal row or column -> pivot */
  const rowPivot = new Int32Array(n);
  const columnPivot = new Int32Array(n);
  for (let s = 0; s < f.count; s++) {
    for (let k = 0; k < f.eliminated[s]; k++) {
      const t = f.pivotStart[s] + k;
      const q = f.listStart[s] + k;
      rowPivot[f.rowList[q]] = t;
      columnPivot[f.columnList[q]] = t;
      rowOrder[t] = f.rowOrder[f.rowList[q]];
      columnOrder[t] = f.columnOrder[f.columnList[q]];
    }
  }
  const width = f.kernels.width;
  const lower = new Entries(n, width);
  const diagonal = new Entries(n, width);
  const upper = new Entries(n, width);
  for (let s = 0; s < f.count; s++) {
    if (f.options.kind === 'lu') luFront(f, s, rowPivot, columnPivot, lower, upper);
    else symmetricFront(f, s, rowPivot, lower, diagonal);
  }
  return {
    rowOrder: asNewToOld(rowOrder),
    columnOrder: asNewToOld(columnOrder),
    lower: lower.matrix(),
    diagonal: f.options.kind === 'ldlt' ? diagonal.matrix() : null,
    upper: f.options.kind === 'lu' ? upper.matrix() : null,
  };
}

function symmetricFront(f: Factors, s: number, pivot: Int32Array, lower: Entries, diagonal: Entries): void {
  const x = f.chunks[f.chunkOf[s]];
  const m = f.listStart[s + 1] - f.listStart[s];
  for (let k = 0; k < f.eliminated[s]; k++) {
    const t = f.pivotStart[s] + k;
    const start = f.panelAt[s] + k * m - (k * (k + 1)) / 2;
    for (let i = k; i < m; i++) lower.add(pivot[f.rowList[f.listStart[s] + i]], t, x, start + i);
    if (f.options.kind !== 'ldlt') continue;
    diagonal.add(t, t, f.diagonal, t);
    if (!(f.kernels.modulus(f.subdiagonal, t) > 0)) continue;
    diagonal.add(t + 1, t, f.subdiagonal, t);
    diagonal.add(t, t + 1, f.subdiagonal, t, f.options.hermitian);
  }
}

function luFront(
  f: Factors,
  s: number,
  rowPivot: Int32Array,
  columnPivot: Int32Array,
  lower: Entries,
  upper: Entries,
): void {
  const x = f.chunks[f.chunkOf[s]];
  const at = f.listStart[s];
  const m = f.listStart[s + 1] - at;
  const p = f.eliminated[s];
  const behind = f.panelAt[s] + m * p;
  for (let k = 0; k < p; k++) {
    const t = f.pivotStart[s] + k;
    const start = f.panelAt[s] + k * m;
    lower.one(t);
    for (let i = 0; i <= k; i++) upper.add(f.pivotStart[s] + i, t, x, start + i);
    for (let i = k + 1; i < m; i++) lower.add(rowPivot[f.rowList[at + i]], t, x, start + i);
    for (let j = p; j < m; j++) upper.add(t, columnPivot[f.columnList[at + j]], x, behind + k * (m - p) + j - p);
  }
}
