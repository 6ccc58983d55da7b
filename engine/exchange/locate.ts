import { Fault } from '../matrix/fault.ts';
import { eachLine, lineText } from './eachLine.ts';
import type { ByteSource } from './source.ts';

/**
 * Gives a fault that names a row and column, but no line, the line of that entry, by looking through the file once more where that is
 * possible; else it names the first byte. Faults that have a place in the text pass unchanged.
 */
export async function located(fault: Fault, source: ByteSource): Promise<Fault> {
  const { row, column, line, byteOffset } = fault.place;
  if (line !== undefined || byteOffset !== undefined) return fault;
  const found =
    row === undefined || column === undefined || !source.rewindable ? 0 : await lineOf(source, row + 1, column + 1);
  const where = found > 0 ? `line ${found}` : 'byte 0';
  const place = found > 0 ? { ...fault.place, line: found } : { ...fault.place, byteOffset: 0 };
  const message = fault.message.startsWith(`${source.name}: `)
    ? `${source.name}, ${where}: ${fault.message.slice(source.name.length + 2)}`
    : `${source.name}, ${where}: ${fault.message}`;
  return new Fault(fault.kind, fault.code, message, place, fault.repairs);
}

async function lineOf(source: ByteSource, i: number, j: number): Promise<number> {
  let found = 0;
  const wanted = new RegExp(`^\\s*(0*${i}\\s+0*${j}|0*${j}\\s+0*${i})(\\s|$)`);
  let entries = false;
  await eachLine(
    source,
    () => {},
    (bytes, from, to, line) => {
      const text = lineText(bytes, from, Math.min(to, from + 64));
      if (/^\s*(%|$)/.test(text)) return true;
      // the first line without % is the size line
      if (!entries) entries = true;
      else if (wanted.test(text)) found = line;
      return true;
    },
  );
  return found;
}
