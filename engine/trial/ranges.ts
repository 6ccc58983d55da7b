import { connectedComponents } from '../graph/components.ts';
import type { Graph } from '../graph/graph.ts';
import { type Arithmetic, denseOperations, scalarCosts } from '../symbolic/operations.ts';
import { factorBytes, type Widths } from './bytes.ts';
import type { DiagonalBlocks } from './diagonalBlocks.ts';
import type { PivotedFigures, Range } from './result.ts';

/** Bytes of LU or LDLᵀ factors in compressed columns, from their entries. */
function bytesOf(kind: 'ldlt' | 'lu', n: number, entries: number, widths: Widths): number {
  return kind === 'lu' ? factorBytes('lu', n, entries, n, widths) : factorBytes('ldlt', n, entries, 0, widths);
}

/** A range with nothing between its ends. */
export function pointRange(x: PivotedFigures<number>): PivotedFigures<Range> {
  return {
    factorEntries: [x.factorEntries, x.factorEntries],
    operations: [x.operations, x.operations],
    bytes: [x.bytes, x.bytes],
  };
}

/**
 * Range of a factorization on fronts, proven for any delayed pivots. Low: every entry of the matrix keeps its place in the factors (barring
 * cancellation); operations are convex in the lengths of columns, so that an even spread of these entries needs fewest (Jensen's
 * inequality; two columns of a 2×2 pivot count as eliminated together). High: every connected component full.
 * @param inside entries of the matrix in the fronts, diagonals added; for LDLᵀ of its lower triangle
 */
export function frontRange(
  kind: 'ldlt' | 'lu',
  graph: Graph,
  inside: number,
  arithmetic: Arithmetic,
  widths: Widths,
): PivotedFigures<Range> {
  const n = graph.order;
  const { count, of, size } = connectedComponents({
    rows: n,
    columns: n,
    columnPointer: graph.pointer,
    rowIndex: graph.neighbour,
  });
  const edges = new Float64Array(count);
  for (let i = 0; i < n; i++) edges[of[i]] += (graph.pointer[i + 1] - graph.pointer[i]) / 2;
  const costs = scalarCosts(arithmetic);
  const least = (l: number): number =>
    kind === 'lu'
      ? l * (costs.divideByPivot + costs.multiplyAdd * l)
      : Math.max(0, (costs.multiplyAdd * (l * l - 0.25)) / 2);
  let entries = 0;
  let low = 0;
  let high = 0;
  for (let c = 0; c < count; c++) {
    const m = size[c];
    entries += kind === 'lu' ? m * m : (m * (m + 1)) / 2;
    low += m * least(edges[c] / m);
    high += denseOperations(kind, m, m, arithmetic);
  }
  return {
    factorEntries: [inside, entries],
    operations: [Math.floor(low), high],
    bytes: [bytesOf(kind, n, inside, widths), bytesOf(kind, n, entries, widths)],
  };
}

/**
 * Low end of column LU under any row interchanges. Entries: those of the diagonal blocks. Operations: in a strong Hall block every column
 * of L and every row of U but the last has an entry off the diagonal (otherwise the columns it depends on would fill as many rows as there
 * are columns, which strong Hall forbids); what is left is spread where it costs least. Several blocks taken as one: no proven operations.
 * @param strongHall whether each of the blocks is strong Hall, as those of a block triangular form are
 */
export function columnLow(
  blocks: DiagonalBlocks,
  strongHall: boolean,
  arithmetic: Arithmetic,
  widths: Widths,
): PivotedFigures<number> {
  const { pattern, blockOf } = blocks;
  const n = pattern.columns;
  const off = new Float64Array(blocks.blocks);
  const size = new Int32Array(blocks.blocks);
  for (let j = 0; j < n; j++) {
    size[blockOf[j]]++;
    off[blockOf[j]] += pattern.columnPointer[j + 1] - pattern.columnPointer[j] - 1;
  }
  const { divideByPivot: divide, multiplyAdd } = scalarCosts(arithmetic);
  let operations = 0;
  for (let b = 0; b < blocks.blocks && strongHall; b++) {
    const steps = size[b] - 1;
    operations += steps * (divide + multiplyAdd) + multiplyAdd * Math.max(0, off[b] - 2 * steps);
  }
  return { factorEntries: blocks.inside, operations, bytes: bytesOf('lu', n, blocks.inside, widths) };
}
