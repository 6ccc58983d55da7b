import { modulus } from '../matrix/modulus.ts';
import { type SparseMatrix, valueWidth } from '../matrix/pattern.ts';
import type { Ticker } from './ticker.ts';

/** What comparing each entry with its mirror gives. Square matrices. */
export interface MirrorScan {
  /** off-diagonal entries looked at */
  readonly offDiagonal: number;
  /** those whose mirror is an entry too */
  readonly mirrored: number;
  /** column -> how many of its off-diagonal entries have their mirror stored */
  readonly mirroredOf: Int32Array;
  /** an entry whose mirror is not stored, row and column; −1 where there is none */
  readonly lone: readonly [number, number];
  /** A − Aᵀ, A − Aᴴ, A + Aᵀ; zero throughout for a pattern with itself mirrored */
  readonly symmetric: Difference;
  readonly hermitian: Difference;
  readonly skew: Difference;
}

/** Largest |difference| among finite ones and where; how many positions differ (a pair of mirrors counts once). */
export interface Difference {
  readonly largest: number;
  readonly at: readonly [number, number];
  readonly differing: number;
}

class Largest {
  largest = 0;
  row = -1;
  column = -1;
  differing = 0;

  see(x: number, i: number, j: number): void {
    if (x === 0) return;
    this.differing++;
    if (x > this.largest && x < Number.POSITIVE_INFINITY) {
      this.largest = x;
      this.row = i;
      this.column = j;
    }
  }

  result(): Difference {
    return { largest: this.largest, at: [this.row, this.column], differing: this.differing };
  }
}

/**
 * Compares every entry with its mirror, without a transpose: columns are visited in increasing order, so the mirror of (i,j)
 * is looked for in column i behind a cursor that only moves forward. Linear. Rows and columns with skip ≠ 0 are left out.
 * A mirror that is not stored counts as zero; a pattern's entries count as ones.
 */
export function scanMirrors(a: SparseMatrix, skip: Uint8Array | null, ticker: Ticker): MirrorScan {
  const { columnPointer, rowIndex, values } = a;
  const n = a.columns;
  const width = valueWidth(a);
  const cursor = columnPointer.slice(0, n);
  const mirroredOf = new Int32Array(n);
  const symmetric = new Largest();
  const hermitian = new Largest();
  const skew = new Largest();
  let offDiagonal = 0;
  let mirrored = 0;
  let lone: readonly [number, number] = [-1, -1];
  for (let j = 0; j < n; j++) {
    if (skip !== null && skip[j] !== 0) continue;
    const end = columnPointer[j + 1];
    for (let p = columnPointer[j]; p < end; p++) {
      const i = rowIndex[p];
      if (skip !== null && skip[i] !== 0) continue;
      if (i === j) {
        if (width === 2 && values !== null) {
          hermitian.see(2 * Math.abs(values[2 * p + 1]), i, i);
          skew.see(2 * modulus(values[2 * p], values[2 * p + 1]), i, i);
        } else skew.see(values === null ? 2 : 2 * Math.abs(values[p]), i, i);
        continue;
      }
      offDiagonal++;
      let q = cursor[i];
      const last = columnPointer[i + 1];
      while (q < last && rowIndex[q] < j) q++;
      cursor[i] = q;
      const found = q < last && rowIndex[q] === j;
      if (found) {
        mirrored++;
        mirroredOf[j]++;
        // a pair is compared once, from below the diagonal
        if (i < j) continue;
      } else if (lone[0] < 0) lone = [i, j];
      if (values === null) {
        if (!found) {
          symmetric.see(1, i, j);
          hermitian.see(1, i, j);
        }
        skew.see(found ? 2 : 1, i, j);
      } else if (width === 1) {
        const x = values[p];
        const y = found ? values[q] : 0;
        const d = x === y ? 0 : Math.abs(x - y);
        symmetric.see(d, i, j);
        hermitian.see(d, i, j);
        skew.see(x === -y ? 0 : Math.abs(x + y), i, j);
      } else {
        const x = values[2 * p];
        const xi = values[2 * p + 1];
        const y = found ? values[2 * q] : 0;
        const yi = found ? values[2 * q + 1] : 0;
        const re = x === y ? 0 : x - y;
        symmetric.see(modulus(re, xi === yi ? 0 : xi - yi), i, j);
        hermitian.see(modulus(re, xi === -yi ? 0 : xi + yi), i, j);
        skew.see(modulus(x === -y ? 0 : x + y, xi === -yi ? 0 : xi + yi), i, j);
      }
    }
    ticker.add(2 * (end - columnPointer[j]));
  }
  return {
    offDiagonal,
    mirrored,
    mirroredOf,
    lone,
    symmetric: symmetric.result(),
    hermitian: hermitian.result(),
    skew: skew.result(),
  };
}
