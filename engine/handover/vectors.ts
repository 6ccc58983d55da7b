import type { NewToOld } from '../matrix/permutation.ts';
import type { TrialResult } from '../trial/result.ts';
import { chunkedLines } from './lines.ts';

/** A convention as it stands in the file and on the screen: its formula and the first entries, at most five. */
export interface Convention {
  readonly formula: string;
  readonly example: readonly string[];
}

/** The rows of P·R·A·C·Q before any pivoting, new-to-old: the planned pivots of the columns in their order. */
export function plannedRowOrder({ effective, plan }: TrialResult): NewToOld {
  const { plannedRow } = plan;
  return plannedRow === null ? effective : (effective.map((j) => plannedRow[j]) as NewToOld);
}

/** What an order of rows or columns says. */
export function orderConvention(order: Int32Array, side: 'row' | 'column'): Convention {
  const letter = side === 'row' ? 'p' : 'q';
  return {
    formula:
      side === 'row'
        ? 'row order, new-to-old, 1-based: line k (counted from 1) holds p[k], the original row at position k; (P A Q)(k,l) = A(p[k], q[l])'
        : 'column order, new-to-old, 1-based: line l (counted from 1) holds q[l], the original column at position l; (P A Q)(k,l) = A(p[k], q[l])',
    example: Array.from(
      order.subarray(0, 5),
      (i, k) => `${letter}[${k + 1}] = ${i + 1}: position ${k + 1} holds ${side} ${i + 1}`,
    ),
  };
}

/** What a scaling says. */
export function scalingConvention(scaling: Float64Array, side: 'row' | 'column'): Convention {
  const letter = side === 'row' ? 'r' : 'c';
  return {
    formula: `${side} scaling in the original numbering: line i (counted from 1) holds ${letter}[i]; (R A C)(i,j) = r[i] A(i,j) c[j]`,
    example: Array.from(
      scaling.subarray(0, 5),
      (x, i) => `${letter}[${i + 1}] = ${x}: ${side} ${i + 1} is multiplied by it`,
    ),
  };
}

/** Numbers as a Matrix Market array of one column, with the convention in comment lines. */
export function vectorChunks(
  values: Int32Array | Float64Array,
  { formula, example }: Convention,
  title: string,
): Iterable<Uint8Array> {
  const integer = values instanceof Int32Array;
  function* lines(): Generator<string> {
    yield `%%MatrixMarket matrix array ${integer ? 'integer' : 'real'} general`;
    for (const line of [title, formula, ...example]) yield `% ${line.replace(/[^\x20-\x7e]/g, '?')}`;
    yield `${values.length} 1`;
    // integers are orders, which count from 1 here; reals are shortest decimals that read back bit for bit
    for (const x of values) yield String(integer ? x + 1 : x);
  }
  return chunkedLines(lines());
}
