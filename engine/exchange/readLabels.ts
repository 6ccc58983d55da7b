import { Fault } from '../matrix/fault.ts';
import { eachLine } from './eachLine.ts';
import type { ByteSource } from './source.ts';

/**
 * Reads labels of n unknowns: one a line, in the order of the file's rows, UTF-8; blanks around them are left out, empty lines count.
 * @throws Fault naming the line if there are more or fewer
 */
export async function readLabels(source: ByteSource, n: number): Promise<readonly string[]> {
  const decoder = new TextDecoder();
  const labels: string[] = [];
  const lines = await eachLine(
    source,
    () => {},
    (bytes, from, to) => {
      labels.push(decoder.decode(bytes.subarray(from, to)).trim());
      return true;
    },
  );
  while (labels.length > n && labels[labels.length - 1] === '') labels.pop();
  if (labels.length === n) return labels;
  const line = labels.length > n ? n + 1 : Math.max(1, lines);
  throw new Fault(
    'input',
    'label-count',
    `${source.name}, line ${line}: the file holds ${labels.length} labels; expected one line for each of the ${n} unknowns.`,
    { file: source.name, line },
  );
}
