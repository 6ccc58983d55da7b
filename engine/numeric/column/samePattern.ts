import type { Pattern } from '../../matrix/pattern.ts';

/** How a second pattern differs from a first. */
export interface PatternDifference {
  readonly same: boolean;
  /** entries of the second that the first lacks */
  readonly added: number;
  /** entries of the first that the second lacks */
  readonly gone: number;
  /** first differing place, 0-based, or null */
  readonly first: { readonly row: number; readonly column: number } | null;
}

/** Compares two patterns entry by entry; different shapes count every entry beyond the common part as a difference. */
export function comparePatterns(a: Pattern, b: Pattern): PatternDifference {
  let added = 0;
  let gone = 0;
  let first: PatternDifference['first'] = null;
  const columns = Math.max(a.columns, b.columns);
  for (let j = 0; j < columns; j++) {
    let p = j < a.columns ? a.columnPointer[j] : 0;
    let q = j < b.columns ? b.columnPointer[j] : 0;
    const pEnd = j < a.columns ? a.columnPointer[j + 1] : 0;
    const qEnd = j < b.columns ? b.columnPointer[j + 1] : 0;
    while (p < pEnd || q < qEnd) {
      const i = p < pEnd ? a.rowIndex[p] : Infinity;
      const l = q < qEnd ? b.rowIndex[q] : Infinity;
      if (i <= l) p++;
      if (l <= i) q++;
      if (i === l) continue;
      if (i < l) gone++;
      else added++;
      first ??= { row: Math.min(i, l), column: j };
    }
  }
  return { same: added + gone === 0 && a.rows === b.rows && a.columns === b.columns, added, gone, first };
}
