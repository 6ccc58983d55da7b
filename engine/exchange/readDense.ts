import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress } from '../matrix/progress.ts';
import type { Dense } from './dense.ts';
import { eachLine, lineText } from './eachLine.ts';
import type { ReadProgress } from './loaded.ts';
import { quoted } from './marketHeader.ts';
import { wordNumber } from './marketWords.ts';
import { readMatrix } from './read.ts';
import { defaultReadOptions, type ReadOptions } from './readOptions.ts';
import { recognise } from './recognise.ts';
import { type ByteSource, firstBytes } from './source.ts';

/** Most doubles a dense block may hold: 1 GiB. */
const mostDoubles = 2 ** 27;

/**
 * Reads right-hand sides: any matrix file (Matrix Market array or coordinate), or plain text with one row a line, a line of column names at most before it.
 * @throws Fault naming the line
 */
export async function readDense(
  source: ByteSource,
  options: ReadOptions = defaultReadOptions,
  progress: ReadProgress = () => noProgress(0, ''),
): Promise<Dense> {
  const { head, whole } = await firstBytes(source, 1 << 14);
  const { kind } = recognise(head, source.name);
  if (kind === 'numbers' || kind === 'coordinate-text' || kind === 'node-dof-table') return plainRows(whole, progress);
  const { matrix } = await readMatrix(whole, options, progress);
  return denseOf(matrix, source.name);
}

function denseOf(a: SparseMatrix, file: string): Dense {
  const width = a.field === 'complex' ? 2 : 1;
  if (a.rows * a.columns * width > mostDoubles) throw tooLarge(file, 1, a.rows * a.columns * width);
  const values = new Float64Array(a.rows * a.columns * width);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const at = (j * a.rows + a.rowIndex[p]) * width;
      for (let w = 0; w < width; w++) values[at + w] = a.values === null ? 1 : a.values[p * width + w];
    }
  }
  return { rows: a.rows, columns: a.columns, field: a.field === 'pattern' ? 'real' : a.field, values };
}

function tooLarge(file: string, line: number, doubles: number): Fault {
  return new Fault(
    'memory',
    'dense-too-large',
    `${file}, line ${line}: dense columns of ${doubles} numbers would need ${8 * doubles} bytes, more than the ${8 * mostDoubles} this program allows.`,
    { file, line },
  );
}

async function plainRows(source: ByteSource, progress: ReadProgress): Promise<Dense> {
  const { name: file } = source;
  let columns = 0;
  let rows = 0;
  let headed = false;
  let byRows = new Float64Array(1024);
  const refuse = (code: string, line: number, text: string) =>
    new Fault('input', code, `${file}, line ${line}: ${text}`, { file, line });
  const lines = await eachLine(source, progress, (bytes, from, to, line) => {
    const text = lineText(bytes, from, to).trim();
    if (text === '' || /^(%|#|\/\/)/.test(text)) return true;
    const words = text.split(/\s*[,;]\s*|\s+/);
    if (rows === 0) {
      // a line of column names may stand first
      if (!headed && words.every((w) => wordNumber(w) === undefined && /[a-z_]/i.test(w))) {
        headed = true;
        return true;
      }
      columns = words.length;
    }
    if (words.length !== columns)
      throw refuse('field-count', line, `expected ${columns} numbers as in the lines before, found ${words.length}.`);
    if ((rows + 1) * columns > mostDoubles) throw tooLarge(file, line, (rows + 1) * columns);
    if ((rows + 1) * columns > byRows.length) {
      const more = new Float64Array(2 * (rows + 1) * columns);
      more.set(byRows);
      byRows = more;
    }
    for (let j = 0; j < columns; j++) {
      const value = wordNumber(words[j]);
      if (value === undefined)
        throw refuse('bad-number', line, `"${quoted(words[j])}" is not a number; expected one like -1.5 or 2.5e-3.`);
      byRows[rows * columns + j] = value;
    }
    rows++;
    return true;
  });
  if (rows === 0) throw refuse('no-entries', Math.max(1, lines), 'no numbers were found.');
  const values = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) values[j * rows + i] = byRows[i * columns + j];
  return { rows, columns, field: 'real', values };
}
