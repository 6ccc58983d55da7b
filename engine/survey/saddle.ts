import { type Base, notSquare } from './base.ts';
import { type Fact, fact, markList, undefinedFact } from './fact.ts';
import type { MirrorScan } from './mirror.ts';
import type { Ticker } from './ticker.ts';
import { are, counted, plural } from './wording.ts';

export interface SaddlePoint {
  /** true: symmetric pattern, the unknowns with a zero diagonal are not joined among themselves, and are no more than the others */
  readonly saddlePoint: boolean;
  /** unknowns whose diagonal entry is absent or zero */
  readonly zeroDiagonal: number;
  /** nonzeros off the diagonal that join two of them */
  readonly couplings: number;
  /** order of the zero block found: unknowns with a zero diagonal, no two of them joined (all of them, or picked greedily) */
  readonly zeroBlock: number;
  /** n − zeroBlock */
  readonly otherBlock: number;
  /** the zero block is the end of the matrix as numbered */
  readonly last: boolean;
}

/** Looks for the shape [H Bᵀ; B 0] under any numbering. By values where there are some: stored zeros are zeros here. */
export function saddlePointFact(base: Base, scan: MirrorScan | null, ticker: Ticker): Fact<SaddlePoint> {
  if (scan === null) return undefinedFact(notSquare(base.matrix), 'unknowns');
  ticker.begin('saddle point');
  const n = base.matrix.columns;
  const zero = zeroDiagonal(base);
  const couplings = couplingCounts(base, zero, ticker);
  let joined = 0;
  for (let j = 0; j < n; j++) joined += couplings[j];
  const block = joined === 0 ? zero : unjoined(base, zero, couplings, ticker);
  const list: number[] = [];
  let zeros = 0;
  for (let i = 0; i < n; i++) {
    if (zero[i]) zeros++;
    if (block[i]) list.push(i);
  }
  const m = list.length;
  const value: SaddlePoint = {
    saddlePoint: m > 0 && joined === 0 && m <= n - m && scan.mirrored === scan.offDiagonal,
    zeroDiagonal: zeros,
    couplings: joined,
    zeroBlock: m,
    otherBlock: n - m,
    last: m > 0 && list[0] === n - m,
  };
  const marks = m === 0 ? [] : [markList('unknowns of the zero block', 'unknowns', Int32Array.from(list))];
  return fact(value, sentenceOf(value), 'unknowns', 'exact', marks);
}

function zeroDiagonal(base: Base): Uint8Array {
  const { diagonalEntry } = base.positions;
  const zero = new Uint8Array(diagonalEntry.length);
  for (let i = 0; i < zero.length; i++) {
    if (diagonalEntry[i] < 0 || (base.sizes !== null && base.sizes.diagonal[i] === 0)) zero[i] = 1;
  }
  return zero;
}

function isZero(base: Base, p: number): boolean {
  const { values, field } = base.matrix;
  if (values === null) return false;
  return field === 'complex' ? values[2 * p] === 0 && values[2 * p + 1] === 0 : values[p] === 0;
}

/** column -> its off-diagonal nonzeros in rows of `zero`; 0 for columns outside. */
function couplingCounts(base: Base, zero: Uint8Array, ticker: Ticker): Int32Array {
  const { columnPointer, rowIndex } = base.matrix;
  const count = new Int32Array(zero.length);
  for (let j = 0; j < zero.length; j++) {
    if (!zero[j]) continue;
    ticker.add(columnPointer[j + 1] - columnPointer[j]);
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = rowIndex[p];
      if (i !== j && zero[i] && !isZero(base, p)) count[j]++;
    }
  }
  return count;
}

/** A set of unknowns of `zero` no two of which are joined: greedily, least joined first, then by number. */
function unjoined(base: Base, zero: Uint8Array, couplings: Int32Array, ticker: Ticker): Uint8Array {
  const { columnPointer, rowIndex } = base.matrix;
  const n = zero.length;
  const chosen = new Uint8Array(n);
  const blocked = new Uint8Array(n);
  for (const j of byCount(zero, couplings)) {
    let free = !blocked[j];
    ticker.add(columnPointer[j + 1] - columnPointer[j]);
    for (let p = columnPointer[j]; p < columnPointer[j + 1] && free; p++) {
      const i = rowIndex[p];
      if (chosen[i] && !isZero(base, p)) free = false;
    }
    if (!free) continue;
    chosen[j] = 1;
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) if (!isZero(base, p)) blocked[rowIndex[p]] = 1;
  }
  return chosen;
}

/** The flagged indices by increasing count, equal counts by number (counting sort). */
function byCount(flag: Uint8Array, count: Int32Array): Int32Array {
  let most = 0;
  let total = 0;
  for (let i = 0; i < flag.length; i++) {
    if (!flag[i]) continue;
    total++;
    if (count[i] > most) most = count[i];
  }
  const next = new Int32Array(most + 2);
  for (let i = 0; i < flag.length; i++) if (flag[i]) next[count[i] + 1]++;
  for (let c = 0; c <= most; c++) next[c + 1] += next[c];
  const out = new Int32Array(total);
  for (let i = 0; i < flag.length; i++) if (flag[i]) out[next[count[i]]++] = i;
  return out;
}

function sentenceOf(s: SaddlePoint): string {
  if (s.zeroDiagonal === 0) return 'No zero on the diagonal, so no zero block.';
  const block = `a zero block of order ${counted(s.zeroBlock)}`;
  if (s.saddlePoint) {
    return (
      `Saddle-point shape: ${block}${s.last ? ' at the end' : ', scattered in this numbering'}, ` +
      `bordered by ${plural(s.otherBlock, 'unknown')} with a nonzero diagonal. Cholesky is out; LDLᵀ needs 2×2 pivots.`
    );
  }
  const zeros = `${plural(s.zeroDiagonal, 'unknown')} ${s.zeroDiagonal === 1 ? 'has' : 'have'} a zero diagonal`;
  if (s.couplings > 0) {
    return `${zeros}; ${plural(s.couplings, 'nonzero')} ${are(s.couplings)} between them, so ${block} was picked among them.`;
  }
  return s.zeroBlock > s.otherBlock
    ? `${zeros} and form ${block}, larger than the rest: the matrix is singular.`
    : `${zeros} and form ${block}; the pattern is not symmetric.`;
}
