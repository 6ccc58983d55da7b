import type { SparseMatrix } from '../matrix/pattern.ts';
import { moduliOf } from './moduli.ts';
import type { Scaling } from './scaling.ts';

/** Smallest and largest of some sizes above zero; null where there is none. */
export interface Range {
  readonly smallest: number;
  readonly largest: number;
}

/** What scaling and matching are meant to mend, as it stands. Plain data. */
export interface Magnitudes {
  /** moduli of entries that are not zero */
  readonly entries: Range | null;
  /** largest modulus of each row */
  readonly rowNorms: Range | null;
  /** largest modulus of each column */
  readonly columnNorms: Range | null;
  /** moduli on the (planned) diagonal that are not zero */
  readonly diagonal: Range | null;
  /** places on the (planned) diagonal that are zero or absent */
  readonly diagonalZeros: number;
  /** columns whose entry on the (planned) diagonal is the largest of its column */
  readonly diagonalDominant: number;
}

/** The same matrix before and after, also when it got worse. */
export interface Effect {
  readonly before: Magnitudes;
  readonly after: Magnitudes;
}

/** Before: A as it is, with its own diagonal. After: R·A·C with the planned rows on the diagonal. */
export function effectOf(a: SparseMatrix, scaling: Scaling | null, rowOf: Int32Array | null): Effect {
  const moduli = moduliOf(a);
  return { before: magnitudes(a, moduli, null, null), after: magnitudes(a, moduli, scaling, rowOf) };
}

function magnitudes(
  a: SparseMatrix,
  moduli: Float64Array,
  scaling: Scaling | null,
  rowOf: Int32Array | null,
): Magnitudes {
  const entries = new RangeOf();
  const diagonal = new RangeOf();
  const columnNorms = new RangeOf();
  const rowNorms = new RangeOf();
  const rowTop = new Float64Array(a.rows);
  let diagonalZeros = 0;
  let diagonalDominant = 0;
  for (let j = 0; j < a.columns; j++) {
    const planned = rowOf === null ? j : rowOf[j];
    let top = 0;
    let own = 0;
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const i = a.rowIndex[p];
      const m = scaling === null ? moduli[p] : moduli[p] * scaling.rowScaling[i] * scaling.columnScaling[j];
      entries.add(m);
      if (m > top) top = m;
      if (m > rowTop[i]) rowTop[i] = m;
      if (i === planned) own = m;
    }
    columnNorms.add(top);
    diagonal.add(own);
    if (own === 0) diagonalZeros++;
    else if (own >= top * (1 - 1e-12)) diagonalDominant++;
  }
  for (let i = 0; i < a.rows; i++) rowNorms.add(rowTop[i]);
  return {
    entries: entries.value(),
    rowNorms: rowNorms.value(),
    columnNorms: columnNorms.value(),
    diagonal: diagonal.value(),
    diagonalZeros,
    diagonalDominant,
  };
}

class RangeOf {
  private smallest = Infinity;
  private largest = 0;

  add(x: number): void {
    if (!(x > 0)) return;
    if (x < this.smallest) this.smallest = x;
    if (x > this.largest) this.largest = x;
  }

  value(): Range | null {
    return this.largest > 0 ? { smallest: this.smallest, largest: this.largest } : null;
  }
}
