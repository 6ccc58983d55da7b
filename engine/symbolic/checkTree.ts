import { checkPermutation } from '../matrix/check.ts';
import type { AssemblyTree, FrontRows } from './types.ts';

function fail(what: string): never {
  throw new Error(`invariant broken: ${what}`);
}

/** Throws unless `tree` is well formed: sizes, parents after children, fronts that hold their pivots and fit into their parents. */
export function checkAssemblyTree(tree: AssemblyTree): void {
  checkPermutation(tree.order, tree.size, 'tree.order');
  if (tree.firstColumn.length !== tree.count + 1) {
    fail(`tree.firstColumn has length ${tree.firstColumn.length}, expected ${tree.count + 1}`);
  }
  if (tree.firstColumn[0] !== 0 || tree.firstColumn[tree.count] !== tree.size) {
    fail(
      `tree.firstColumn runs from ${tree.firstColumn[0]} to ${tree.firstColumn[tree.count]}, expected 0 to ${tree.size}`,
    );
  }
  for (let s = 0; s < tree.count; s++) {
    const columns = tree.firstColumn[s + 1] - tree.firstColumn[s];
    if (columns < 1) fail(`supernode ${s} has ${columns} columns, expected at least 1`);
    if (tree.frontOrder[s] < columns)
      fail(`tree.frontOrder[${s}] = ${tree.frontOrder[s]}, expected at least ${columns}`);
    const up = tree.parent[s];
    if (up < 0) continue;
    if (!(up > s && up < tree.count)) fail(`tree.parent[${s}] = ${up}, expected ${s + 1} … ${tree.count - 1}`);
    if (tree.frontOrder[s] - columns > tree.frontOrder[up]) {
      fail(`supernode ${s} leaves ${tree.frontOrder[s] - columns} rows, its parent's front has ${tree.frontOrder[up]}`);
    }
  }
}

/** Throws unless `rows` lists each front completely: sorted, own columns first, as many as the tree says, inside the parent's front. */
export function checkFrontRows(tree: AssemblyTree, rows: FrontRows): void {
  const inFront = new Int32Array(tree.size).fill(-1);
  for (let s = tree.count - 1; s >= 0; s--) {
    const start = rows.pointer[s];
    const end = rows.pointer[s + 1];
    if (end - start !== tree.frontOrder[s])
      fail(`front ${s} lists ${end - start} rows, expected ${tree.frontOrder[s]}`);
    for (let k = start; k < end; k++) {
      const expected = tree.firstColumn[s] + (k - start);
      if (expected < tree.firstColumn[s + 1] && rows.row[k] !== expected)
        fail(`front ${s}: row ${rows.row[k]}, expected ${expected}`);
      if (k > start && rows.row[k] <= rows.row[k - 1]) fail(`front ${s}: row ${rows.row[k]} after ${rows.row[k - 1]}`);
    }
  }
  for (let up = 0; up < tree.count; up++) {
    for (let k = rows.pointer[up]; k < rows.pointer[up + 1]; k++) inFront[rows.row[k]] = up;
    for (let s = 0; s < up; s++) {
      if (tree.parent[s] !== up) continue;
      const columns = tree.firstColumn[s + 1] - tree.firstColumn[s];
      for (let k = rows.pointer[s] + columns; k < rows.pointer[s + 1]; k++) {
        if (inFront[rows.row[k]] !== up) fail(`row ${rows.row[k]} of front ${s} is not in its parent's front ${up}`);
      }
    }
  }
}
