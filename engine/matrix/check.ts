import { type Pattern, type SparseMatrix, valueWidth } from './pattern.ts';

/**
 * Invariant checkers: they name the structure, the field, the index, the value and the allowed range.
 * Called in tests and at the borders where data come from outside a thread.
 */

function fail(what: string): never {
  throw new Error(`invariant broken: ${what}`);
}

/** Throws unless `a` is a well-formed pattern: pointers monotone and ending at the entry count, rows in range, sorted, unique. */
export function checkPattern(a: Pattern, name = 'pattern'): void {
  if (!(Number.isInteger(a.rows) && a.rows >= 0)) fail(`${name}.rows = ${a.rows}, expected an integer ≥ 0`);
  if (!(Number.isInteger(a.columns) && a.columns >= 0)) fail(`${name}.columns = ${a.columns}, expected an integer ≥ 0`);
  if (a.columnPointer.length !== a.columns + 1) {
    fail(`${name}.columnPointer has length ${a.columnPointer.length}, expected ${a.columns + 1}`);
  }
  if (a.columnPointer[0] !== 0) fail(`${name}.columnPointer[0] = ${a.columnPointer[0]}, expected 0`);
  if (a.columnPointer[a.columns] !== a.rowIndex.length) {
    fail(`${name}.columnPointer[${a.columns}] = ${a.columnPointer[a.columns]}, expected ${a.rowIndex.length}`);
  }
  for (let j = 0; j < a.columns; j++) {
    const start = a.columnPointer[j];
    const end = a.columnPointer[j + 1];
    if (end < start) fail(`${name}.columnPointer[${j + 1}] = ${end}, expected at least ${start}`);
    for (let p = start; p < end; p++) {
      const i = a.rowIndex[p];
      if (!(i >= 0 && i < a.rows)) fail(`${name}.rowIndex[${p}] = ${i}, expected 0 … ${a.rows - 1}`);
      if (p > start && i <= a.rowIndex[p - 1]) {
        fail(`${name}.rowIndex[${p}] = ${i} in column ${j}, expected more than ${a.rowIndex[p - 1]}`);
      }
    }
  }
}

/** Throws unless `a` is a well-formed matrix: its pattern, and as many values as its field needs. */
export function checkMatrix(a: SparseMatrix, name = 'matrix'): void {
  checkPattern(a, name);
  if ((a.field === 'pattern') !== (a.values === null)) {
    fail(`${name}.values is ${a.values === null ? 'null' : 'present'} for field "${a.field}"`);
  }
  const expected = a.rowIndex.length * valueWidth(a);
  if (a.values !== null && a.values.length !== expected) {
    fail(`${name}.values has length ${a.values.length}, expected ${expected}`);
  }
}

/** Throws unless `p` holds each of 0 … n − 1 once (either direction). */
export function checkPermutation(p: Int32Array, n: number, name = 'permutation'): void {
  if (p.length !== n) fail(`${name} has length ${p.length}, expected ${n}`);
  const seen = new Uint8Array(n);
  for (let k = 0; k < n; k++) {
    const i = p[k];
    if (!(i >= 0 && i < n)) fail(`${name}[${k}] = ${i}, expected 0 … ${n - 1}`);
    if (seen[i]) fail(`${name}[${k}] = ${i}, which appears twice`);
    seen[i] = 1;
  }
}
