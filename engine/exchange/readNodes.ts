import { Fault } from '../matrix/fault.ts';
import type { Dense } from './dense.ts';
import type { ReadProgress } from './loaded.ts';
import { readDense } from './readDense.ts';
import type { ByteSource } from './source.ts';

/** Where the nodes of a mesh are. */
export interface Nodes {
  /** 1, 2 or 3 */
  readonly dimensions: number;
  /** node by node, `dimensions` numbers each */
  readonly values: Float64Array;
  /** unknowns of a node, numbered one after the other */
  readonly unknownsPerNode: number;
  /** what was read, in a sentence */
  readonly says: string;
}

/**
 * Reads coordinates of mesh nodes for a matrix of `unknowns` unknowns: one node a line with 1 to 3 numbers, in the order of the unknowns; a line
 * of column names may stand first. A first column that counts the nodes from 0 or 1 tells their order and is no coordinate.
 * @throws Fault stating both lengths, or naming the line
 */
export async function readNodes(source: ByteSource, unknowns: number, progress: ReadProgress): Promise<Nodes> {
  const table = await readDense(source, undefined, progress);
  const { name: file } = source;
  const refuse = (code: string, text: string, line = 1) =>
    new Fault('input', code, `${file}, line ${line}: ${text}`, { file, line });
  const nodes = table.rows;
  const numbers = nodeNumbers(table);
  const dimensions = table.columns - (numbers === null ? 0 : 1);
  if (table.field === 'complex' || dimensions > 3) {
    throw refuse(
      'coordinates-width',
      `${table.columns} numbers a node; expected 1 to 3 coordinates, a node number before them at most.`,
    );
  }
  if (nodes === 0 || unknowns % nodes !== 0) {
    throw refuse(
      'coordinates-length',
      `${nodes} nodes do not divide the ${unknowns} unknowns of the matrix; expected the same number of unknowns for each node.`,
    );
  }
  const first = numbers === null ? 0 : 1;
  const values = new Float64Array(nodes * dimensions);
  for (let k = 0; k < nodes; k++) {
    const at = numbers === null ? k : numbers[k];
    for (let d = 0; d < dimensions; d++) {
      const x = table.values[(first + d) * nodes + k];
      if (x - x !== 0)
        throw refuse(
          'coordinates-not-finite',
          `coordinate ${d + 1} of node ${at + 1} is ${x}; expected a finite number.`,
          k + 1,
        );
      values[at * dimensions + d] = x;
    }
  }
  const unknownsPerNode = unknowns / nodes;
  const says = `${file}: coordinates of ${nodes} nodes in ${dimensions} dimension${dimensions === 1 ? '' : 's'}, ${unknownsPerNode} unknown${unknownsPerNode === 1 ? '' : 's'} each${numbers === null ? '' : '; the first column was taken as node numbers'}.`;
  return { dimensions, values, unknownsPerNode, says };
}

/** node number of each line, 0-based, where the first of three or more columns is a permutation of 0 … or 1 … ; else null */
function nodeNumbers(table: Dense): Int32Array | null {
  const { rows, columns, values } = table;
  if (columns < 3 || rows < 3) return null;
  let low = Number.POSITIVE_INFINITY;
  for (let k = 0; k < rows; k++) low = Math.min(low, values[k]);
  if (low !== 0 && low !== 1) return null;
  const out = new Int32Array(rows);
  const seen = new Uint8Array(rows);
  for (let k = 0; k < rows; k++) {
    const at = values[k] - low;
    if (!Number.isInteger(at) || at >= rows || seen[at] === 1) return null;
    seen[at] = 1;
    out[k] = at;
  }
  return out;
}
