import type { Dense } from './dense.ts';
import { chunked, commentLines, numberWord } from './textChunks.ts';

/** Matrix Market array text (NISTIR 5935): column by column, one entry a line, values that read back bit for bit. */
export function writeDense(d: Dense, comments: readonly string[] = []): Generator<Uint8Array> {
  return chunked(denseLines(d, comments));
}

function* denseLines(d: Dense, comments: readonly string[]): Generator<string> {
  yield `%%MatrixMarket matrix array ${d.field} general`;
  yield* commentLines(comments);
  yield `${d.rows} ${d.columns}`;
  const width = d.field === 'complex' ? 2 : 1;
  for (let k = 0; k < d.values.length; k += width) {
    yield width === 1 ? numberWord(d.values[k]) : `${numberWord(d.values[k])} ${numberWord(d.values[k + 1])}`;
  }
}
