import { workOfFronts } from '../forecast/frontWork.ts';
import { waysToRoot } from '../forecast/parallel.ts';
import { storageOf } from '../forecast/storage.ts';
import type { Graph } from '../graph/graph.ts';
import type { Pattern } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import { transposePattern } from '../matrix/transpose.ts';
import { analyse, analyseGraph } from '../symbolic/analyse.ts';
import { assemblyTree } from '../symbolic/assemblyTree.ts';
import { type LuCounts, luCounts } from '../symbolic/luCounts.ts';
import { type Arithmetic, type FactorKind, factorOperations } from '../symbolic/operations.ts';
import { rowMergeBound } from '../symbolic/rowMerge.ts';
import type { SymbolicFactor } from '../symbolic/types.ts';
import type { MeasureName } from './choice.ts';

/** Steps of search and entries held beyond which the exact count without interchanges is given up: about two seconds. */
const countWorkLimit = 1e8;

/**
 * Exact counts of an LU with pivots on the diagonal, or null beyond the work limit. Where the pattern is its own mirror they are those of the
 * symmetric factor, without a limit.
 */
export function diagonalPivotCounts(
  pattern: Pattern,
  order: NewToOld,
  symmetrised: Pick<SymbolicFactor, 'columnCount' | 'factorEntries'>,
): LuCounts | null {
  if (!isMirrored(pattern)) return luCounts(pattern, order, countWorkLimit);
  const { columnCount, factorEntries } = symmetrised;
  return { lower: columnCount, upper: columnCount, lowerEntries: factorEntries, upperEntries: factorEntries };
}

/** Whether the pattern equals its transpose; rows sorted. */
function isMirrored(a: Pattern): boolean {
  const t = transposePattern(a);
  for (let j = 0; j <= a.columns; j++) if (a.columnPointer[j] !== t.columnPointer[j]) return false;
  for (let p = 0; p < a.rowIndex.length; p++) if (a.rowIndex[p] !== t.rowIndex[p]) return false;
  return true;
}

/**
 * Value of an order for fronts: factor entries, operations, bytes at the peak of a multifrontal run (8-byte scalars, 16 complex; 4-byte
 * indices), or operations on the longest way from a leaf to a root, fronts undivided. Near-linear in edges.
 */
export function frontMeasure(
  measure: MeasureName,
  kind: FactorKind,
  graph: Graph,
  order: NewToOld,
  held: number,
  arithmetic: Arithmetic,
): number {
  const symbolic = analyseGraph(graph, order, { postorder: false, heldLast: held });
  if (measure === 'entries') return symbolic.factorEntries;
  if (measure === 'operations') return factorOperations(kind, symbolic.columnCount, arithmetic);
  const tree = assemblyTree(symbolic, { held, blocks: kind === 'lu' ? 'square' : 'packed' });
  if (measure === 'critical-path') {
    return waysToRoot(tree.parent, workOfFronts(kind, tree, arithmetic)).reduce((a, b) => Math.max(a, b), 0);
  }
  const peak = storageOf({
    size: graph.order,
    lowerEntries: symbolic.factorEntries,
    upperEntries: kind === 'lu' ? symbolic.factorEntries : null,
    envelope: null,
    matrixEntries: graph.neighbour.length + graph.order,
    tree,
    layout: { valueBytes: arithmetic === 'real' ? 8 : 16, indexBytes: 4, pointerBytes: 8 },
    kind: 'exact',
  }).multifrontal.value;
  return peak ?? symbolic.factorEntries;
}

/**
 * Value of a column order: operations or entries without interchanges, those of the row-merge bound where that count passes its work limit
 * or the matrix is not square (there: of U). Peak memory goes with entries.
 */
export function columnMeasure(
  measure: MeasureName,
  pattern: Pattern,
  order: NewToOld,
  square: boolean,
  arithmetic: Arithmetic,
): number {
  const counts = square ? diagonalPivotCounts(pattern, order, analyse(pattern, order, { postorder: false })) : null;
  const { lower, upper, lowerEntries, upperEntries } = counts ?? rowMergeBound(pattern, order);
  if (!square) return upperEntries;
  return measure === 'operations'
    ? factorOperations('lu', lower, arithmetic, upper)
    : lowerEntries + upperEntries - pattern.columns;
}
