/**
 * A small picture language for fixtures: rows of characters, '.' or ' ' for nothing, anything else for an entry.
 *
 *   drawn(`
 *     x.x
 *     .x.
 *     x.x
 *   `)
 */
import type { Pattern } from '../../engine/matrix/pattern.ts';

/** The pattern drawn in `text`. */
export function drawn(text: string): Pattern {
  const lines = text
    .split('\n')
    .map((line) => line.trim())
    .filter((line) => line !== '');
  const rows = lines.length;
  const columns = lines[0]?.length ?? 0;
  const columnPointer = new Int32Array(columns + 1);
  const rowIndex: number[] = [];
  for (let j = 0; j < columns; j++) {
    for (let i = 0; i < rows; i++) if (lines[i][j] !== '.') rowIndex.push(i);
    columnPointer[j + 1] = rowIndex.length;
  }
  return { rows, columns, columnPointer, rowIndex: Int32Array.from(rowIndex) };
}
