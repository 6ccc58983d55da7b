import { blockTriangularForm } from '../graph/blockTriangular.ts';
import { coarseDecomposition } from '../graph/coarse.ts';
import { type Classes, connectedComponents } from '../graph/components.ts';
import { strongComponents } from '../graph/strong.ts';
import { type Matching, maximumTransversal } from '../graph/transversal.ts';
import type { Pattern } from '../matrix/pattern.ts';
import { transposePattern } from '../matrix/transpose.ts';
import { type Base, notSquare } from './base.ts';
import { type Fact, fact, markList, markWhere, undefinedFact } from './fact.ts';
import type { Ticker } from './ticker.ts';
import { counted, lines, plural } from './wording.ts';

export interface StructuralRank {
  /** largest number of entries no two of which share a row or column; stored zeros count as entries */
  readonly structuralRank: number;
  /** min(rows, columns) − structuralRank */
  readonly deficiency: number;
  /** sizes of the coarse parts (Dulmage & Mendelsohn) */
  readonly underdetermined: { readonly rows: number; readonly columns: number };
  readonly wellDetermined: { readonly rows: number; readonly columns: number };
  readonly overdetermined: { readonly rows: number; readonly columns: number };
}

/** The pattern of Aᵀ, formed once and only when asked for: A itself where the pattern is symmetric. */
export function transposeOf(base: Base, patternSymmetric: boolean, ticker: Ticker): () => Pattern {
  let formed: Pattern | null = patternSymmetric ? base.matrix : null;
  return () => {
    formed ??= transposePattern(base.matrix, ticker.pass);
    return formed;
  };
}

export function matchingOf(base: Base, transposed: () => Pattern, ticker: Ticker): Matching {
  ticker.begin('matching');
  return maximumTransversal(base.matrix, ticker.pass, transposed);
}

export function structuralRankFact(base: Base, matching: Matching, transposed: () => Pattern): Fact<StructuralRank> {
  const { rows, columns } = base.matrix;
  const deficiency = Math.min(rows, columns) - matching.size;
  const none = { rows: 0, columns: 0 };
  if (rows === columns && deficiency === 0) {
    const value = {
      structuralRank: rows,
      deficiency,
      underdetermined: none,
      wellDetermined: { rows, columns },
      overdetermined: none,
    };
    return fact(value, `Structural rank ${counted(rows)}: full.`, 'rows');
  }
  const coarse = coarseDecomposition(base.matrix, matching, transposed);
  const size = (part: { rows: Int32Array; columns: Int32Array }): { rows: number; columns: number } => ({
    rows: part.rows.length,
    columns: part.columns.length,
  });
  const value: StructuralRank = {
    structuralRank: matching.size,
    deficiency,
    underdetermined: size(coarse.underdetermined),
    wellDetermined: size(coarse.wellDetermined),
    overdetermined: size(coarse.overdetermined),
  };
  const { underdetermined: under, overdetermined: over } = coarse;
  const parts = [
    over.rows.length > 0 &&
      `${plural(over.rows.length, 'row has', 'rows have')} entries in only ${plural(over.columns.length, 'column')} (too many equations: ${lines('row', over.rows, over.rows.length)})`,
    under.columns.length > 0 &&
      `${plural(under.columns.length, 'column has', 'columns have')} entries in only ${plural(under.rows.length, 'row')} (too few equations: ${lines('column', under.columns, under.columns.length)})`,
  ].filter((part) => part !== false);
  const sentence =
    deficiency === 0
      ? `Structural rank ${counted(matching.size)}: full for this shape; ${parts.join('; ')}.`
      : `Structural rank ${counted(matching.size)} of ${counted(Math.min(rows, columns))}: singular whatever the values; ${parts.join('; ')}.`;
  const marks = [
    markWhere('rows without a partner in the matching', 'rows', unpaired(matching.columnOf)),
    markWhere('columns without a partner in the matching', 'columns', unpaired(matching.rowOf)),
    markList('rows of the overdetermined part', 'rows', over.rows),
    markList('columns of the overdetermined part', 'columns', over.columns),
    markList('rows of the underdetermined part', 'rows', under.rows),
    markList('columns of the underdetermined part', 'columns', under.columns),
  ];
  return fact(value, sentence, 'rows', 'exact', marks);
}

function unpaired(partner: Int32Array): Uint8Array {
  const flag = new Uint8Array(partner.length);
  for (let i = 0; i < flag.length; i++) if (partner[i] < 0) flag[i] = 1;
  return flag;
}

export interface Components {
  readonly count: number;
  /** vertices of the largest one */
  readonly largest: number;
  /** components of a single vertex */
  readonly singletons: number;
}

function classesFact(classes: Classes, one: string, many: string): Fact<Components> {
  let largest = 0;
  let biggest = -1;
  let singletons = 0;
  for (let c = 0; c < classes.count; c++) {
    if (classes.size[c] === 1) singletons++;
    if (classes.size[c] > largest) {
      largest = classes.size[c];
      biggest = c;
    }
  }
  const outside = new Uint8Array(classes.of.length);
  if (classes.count > 1) for (let v = 0; v < outside.length; v++) if (classes.of[v] !== biggest) outside[v] = 1;
  const sentence =
    classes.count === 0
      ? `No ${many}.`
      : classes.count === 1
        ? `One ${one}.`
        : `${counted(classes.count)} ${many}; the largest has ${plural(largest, 'unknown')}${singletons === 0 ? '' : `, ${counted(singletons)} ${singletons === 1 ? 'has' : 'have'} one`}.`;
  return fact({ count: classes.count, largest, singletons }, sentence, many, 'exact', [
    markWhere('unknowns outside the largest', 'unknowns', outside),
  ]);
}

export function componentsOf(base: Base, ticker: Ticker): Classes {
  ticker.begin('components');
  return connectedComponents(base.matrix, ticker.pass);
}

export function componentsFact(classes: Classes): Fact<Components> {
  return classesFact(classes, 'connected component of A + Aᵀ', 'connected components of A + Aᵀ');
}

/** With a symmetric pattern every strong component is a connected one, and the other way round. */
export function strongOf(base: Base, connected: Classes, patternSymmetric: boolean, ticker: Ticker): Classes {
  ticker.begin('strong components');
  return patternSymmetric ? connected : strongComponents(base.matrix, null, ticker.pass);
}

export function strongComponentsFact(classes: Classes): Fact<Components> {
  return classesFact(classes, 'strong component of the directed graph', 'strong components of the directed graph');
}

export interface BlockForm {
  /** number of diagonal blocks of the block triangular form */
  readonly blocks: number;
  readonly largest: number;
  /** blocks of one row */
  readonly singletons: number;
  /** sizes of the blocks that are largest, at most ten, decreasing */
  readonly largestSizes: readonly number[];
}

export function blockFormFact(
  base: Base,
  matching: Matching | null,
  strong: Classes | null,
  ticker: Ticker,
): Fact<BlockForm> {
  if (matching === null || strong === null) return undefinedFact(notSquare(base.matrix), 'blocks');
  const n = base.matrix.columns;
  if (matching.size < n) {
    return undefinedFact(
      `The structural rank is ${matching.size} of ${n}: without a zero-free diagonal the blocks are not unique; see the coarse parts.`,
      'blocks',
    );
  }
  ticker.begin('block triangular form');
  const size = blockSizes(base, matching, strong, ticker);
  const blocks = size.length;
  const sorted = size.slice().sort().reverse();
  let singletons = 0;
  for (let b = 0; b < blocks; b++) if (size[b] === 1) singletons++;
  const largest = blocks === 0 ? 0 : sorted[0];
  const sentence =
    blocks <= 1
      ? 'The block triangular form is one block: nothing splits off.'
      : `Block triangular form: ${counted(blocks)} diagonal blocks, the largest of ${plural(largest, 'row')}${singletons === 0 ? '' : `, ${counted(singletons)} of one row`}.`;
  return fact({ blocks, largest, singletons, largestSizes: Array.from(sorted.subarray(0, 10)) }, sentence, 'blocks');
}

function blockSizes(base: Base, matching: Matching, strong: Classes, ticker: Ticker): Int32Array {
  // with the matching on the diagonal as it stands, the blocks are the strong components of A itself
  if (matching.rowOf.every((i, j) => i === j)) return strong.size;
  // only the sizes are asked for: no need to form the orders
  if (matching.size === base.matrix.columns) return strongComponents(base.matrix, matching.columnOf, ticker.pass).size;
  const { blocks, blockStart } = blockTriangularForm(base.matrix, ticker.pass, matching);
  const size = new Int32Array(blocks);
  for (let b = 0; b < blocks; b++) size[b] = blockStart[b + 1] - blockStart[b];
  return size;
}
