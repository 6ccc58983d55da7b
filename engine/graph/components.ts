import type { Pattern } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { requireSquare } from './square.ts';

/** A partition of the vertices 0 … n − 1 into numbered classes. */
export interface Classes {
  /** number of classes */
  readonly count: number;
  /** vertex -> class */
  readonly of: Int32Array;
  /** class -> number of its vertices */
  readonly size: Int32Array;
}

/**
 * Connected components of the graph of A + Aᵀ, numbered by their smallest vertex. Square patterns only.
 * Union by smaller index with path halving (Tarjan & van Leeuwen 1984), so nothing but one array of length n is formed;
 * a `Graph` is a pattern too: pass `{ rows: order, columns: order, columnPointer: pointer, rowIndex: neighbour }`.
 */
export function connectedComponents(a: Pattern, progress: Progress = noProgress): Classes {
  const n = requireSquare(a, 'Connected components');
  const { columnPointer, rowIndex } = a;
  const root = new Int32Array(n);
  for (let v = 0; v < n; v++) root[v] = v;
  for (let j = 0; j < n; j++) {
    if ((j & 0xffff) === 0) progress(j / n, 'components');
    let s = j;
    const end = columnPointer[j + 1];
    for (let p = columnPointer[j]; p < end; p++) {
      let r = rowIndex[p];
      while (root[r] !== r) r = root[r] = root[root[r]];
      while (root[s] !== s) s = root[s] = root[root[s]];
      if (r < s) root[s] = r;
      else root[r] = s;
    }
  }
  return numbered(root);
}

/** Classes of a union-find forest in which every root is the smallest vertex of its tree and no parent exceeds its child. */
function numbered(root: Int32Array): Classes {
  const n = root.length;
  const of = new Int32Array(n);
  let count = 0;
  for (let v = 0; v < n; v++) of[v] = root[v] === v ? count++ : of[root[v]];
  return { count, of, size: sizes(of, count) };
}

/** class -> number of its vertices. */
export function sizes(of: Int32Array, count: number): Int32Array {
  const size = new Int32Array(count);
  for (let v = 0; v < of.length; v++) size[of[v]]++;
  return size;
}
