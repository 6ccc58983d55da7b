import type { Pattern } from '../matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../matrix/permutation.ts';
import { transposePattern } from '../matrix/transpose.ts';

/** A pattern whose vertices are the 1×1 and 2×2 pivots of another one. */
export interface CompressedPattern {
  /** pattern between the pivots; entry where any of their unknowns are joined; with the pivots' own diagonal */
  readonly pattern: Pattern;
  /** unknown -> its vertex in `pattern` */
  readonly vertexOf: Int32Array;
  /** the order of unknowns that an order of vertices stands for: the two of a pair side by side, the smaller number first */
  expand(order: NewToOld): NewToOld;
}

/** The compressed graph on which a saddle point is ordered, so that its 2×2 pivots stay together (Duff & Pralet 2005). */
export function compressPairs(a: Pattern, partner: Int32Array): CompressedPattern {
  const n = a.columns;
  const vertexOf = new Int32Array(n);
  const first = new Int32Array(n);
  let count = 0;
  for (let i = 0; i < n; i++) {
    if (partner[i] < i) vertexOf[i] = vertexOf[partner[i]];
    else {
      first[count] = i;
      vertexOf[i] = count++;
    }
  }
  const columnPointer = new Int32Array(count + 1);
  const rowIndex = new Int32Array(a.columnPointer[n] + count);
  const mark = new Int32Array(count).fill(-1);
  let q = 0;
  for (let c = 0; c < count; c++) {
    mark[c] = c;
    rowIndex[q++] = c;
    const members = partner[first[c]] === first[c] ? [first[c]] : [first[c], partner[first[c]]];
    for (const j of members) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
        const r = vertexOf[a.rowIndex[p]];
        if (mark[r] === c) continue;
        mark[r] = c;
        rowIndex[q++] = r;
      }
    }
    columnPointer[c + 1] = q;
  }
  const unsorted = { rows: count, columns: count, columnPointer, rowIndex: rowIndex.slice(0, q) };
  return {
    pattern: transposePattern(transposePattern(unsorted)),
    vertexOf,
    expand(order) {
      const out = new Int32Array(n);
      let k = 0;
      for (let v = 0; v < count; v++) {
        const i = first[order[v]];
        out[k++] = i;
        if (partner[i] !== i) out[k++] = partner[i];
      }
      return asNewToOld(out);
    },
  };
}
