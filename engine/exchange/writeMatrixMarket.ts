import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import { checkMirrors } from './mirrors.ts';
import { chunked, commentLines, numberWord } from './textChunks.ts';

export interface MarketFormat {
  /** what the matrix is; `half` storage needs it to be exactly so */
  readonly symmetry: Symmetry;
  /** lower triangle under the symmetric banner, or all entries under a general one */
  readonly storage: 'half' | 'full';
  readonly comments?: readonly string[];
}

/**
 * Matrix Market coordinate text (NISTIR 5935), 1-based, column by column, values as shortest decimals that read back bit for bit.
 * @throws Fault if half storage is asked for and the matrix is not exactly of that symmetry
 */
export function writeMatrixMarket(a: SparseMatrix, f: MarketFormat): Generator<Uint8Array> {
  const half = f.storage === 'half' && f.symmetry !== 'general';
  if (half) checkMirrors(a, f.symmetry);
  return chunked(marketLines(a, half ? f.symmetry : 'general', f.comments ?? []));
}

function* marketLines(a: SparseMatrix, symmetry: Symmetry, comments: readonly string[]): Generator<string> {
  const half = symmetry !== 'general';
  let count = a.rowIndex.length;
  if (half) {
    count = 0;
    for (let j = 0; j < a.columns; j++) {
      for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) if (a.rowIndex[p] >= j) count++;
    }
  }
  yield `%%MatrixMarket matrix coordinate ${a.field} ${symmetry}`;
  yield* commentLines(['indices count from 1', ...comments]);
  yield `${a.rows} ${a.columns} ${count}`;
  const { values } = a;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      if (half && i < j) continue;
      if (values === null) yield `${i + 1} ${j + 1}`;
      else if (a.field !== 'complex') yield `${i + 1} ${j + 1} ${numberWord(values[p])}`;
      else yield `${i + 1} ${j + 1} ${numberWord(values[2 * p])} ${numberWord(values[2 * p + 1])}`;
    }
  }
}
