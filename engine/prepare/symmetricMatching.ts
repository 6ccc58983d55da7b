import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { transpose } from '../matrix/transpose.ts';
import { largeEntryMatching } from './largeEntryMatching.ts';
import { naturalLogarithm } from './logarithm.ts';
import { moduliOf } from './moduli.ts';

/** Symmetric scaling and likely 2×2 pivots of a symmetric or Hermitian matrix. Value-dependent. */
export interface SymmetricMatching {
  /** S, original unknown -> factor: in S·A·S no entry exceeds 1, and matched ones have modulus 1 */
  readonly scaling: Float64Array;
  /** unknown -> the other one of its 2×2 pivot, or itself for a 1×1 pivot */
  readonly partner: Int32Array;
  /** 2×2 pivots chosen */
  readonly pairs: number;
  /** unknowns that stand alone although their diagonal entry is zero or absent */
  readonly zeroSingles: number;
  /** size of the matching behind; fewer than the order: structurally singular */
  readonly size: number;
}

/**
 * Symmetric matching and scaling (Duff & Pralet 2005): S = √(R·C) from the matching of largest product, whose cycles are
 * split into 2×2 pivots of consecutive unknowns and 1×1 pivots, a cycle of even length in the better of its two ways, one of odd
 * length with the 1×1 pivot that leaves the largest product.
 *
 * @throws Fault "not-symmetric" when the moduli of mirrored entries differ by more than a relative 1e-6
 */
export function symmetricMatching(a: SparseMatrix, progress: Progress = noProgress): SymmetricMatching {
  const matching = largeEntryMatching(a, progress);
  const moduli = moduliOf(a);
  refuseUnsymmetric(a, moduli);
  const n = a.columns;
  const scaling = new Float64Array(n);
  for (let i = 0; i < n; i++) scaling[i] = Math.sqrt(matching.rowScaling[i]) * Math.sqrt(matching.columnScaling[i]);
  const size = (i: number, j: number): number => {
    const p = find(a, i, j);
    return p < 0 || moduli[p] === 0 ? Number.NEGATIVE_INFINITY : naturalLogarithm(moduli[p] * scaling[i] * scaling[j]);
  };
  const partner = new Int32Array(n);
  for (let i = 0; i < n; i++) partner[i] = i;
  const seen = new Uint8Array(n);
  for (let i = 0; i < n; i++) {
    if (seen[i]) continue;
    const { members, closed } = chainThrough(i, matching.rowOf, matching.columnOf, seen);
    if (closed) splitCycle(members, size, partner);
    else splitPath(members, partner);
  }
  let pairs = 0;
  let zeroSingles = 0;
  for (let i = 0; i < n; i++) {
    if (partner[i] > i) pairs++;
    if (partner[i] === i && size(i, i) === Number.NEGATIVE_INFINITY) zeroSingles++;
  }
  return { scaling, partner, pairs, zeroSingles, size: matching.size };
}

/** The cycle of j -> rowOf[j] through i; where the matching has gaps, the path through i from its start. */
function chainThrough(
  i: number,
  rowOf: Int32Array,
  columnOf: Int32Array,
  seen: Uint8Array,
): { members: number[]; closed: boolean } {
  let start = i;
  while (columnOf[start] >= 0 && columnOf[start] !== i) start = columnOf[start];
  const closed = columnOf[start] === i;
  if (closed) start = i;
  const members: number[] = [];
  for (let k = start; k >= 0 && !seen[k]; k = rowOf[k]) {
    seen[k] = 1;
    members.push(k);
  }
  return { members, closed };
}

/** Pairs members[t + 1] with members[t + 2] and so on around the cycle, the start chosen for the largest product. */
function splitCycle(members: number[], size: (i: number, j: number) => number, partner: Int32Array): void {
  const length = members.length;
  if (length === 1) return;
  const edge = members.map((m, k) => clipped(size(m, members[(k + 1) % length])));
  let first = 0;
  if (length % 2 === 0) {
    let even = 0;
    let odd = 0;
    for (let k = 0; k < length; k++) k % 2 === 0 ? (even += edge[k]) : (odd += edge[k]);
    first = even >= odd ? 0 : 1;
    for (let k = 0; k < length; k += 2) join(members[(first + k) % length], members[(first + k + 1) % length], partner);
    return;
  }
  // leaving out t takes the edges t+1, t+3, …; going from t to t+2 exchanges edge t+1 for edge t
  let sum = 0;
  for (let k = 1; k < length; k += 2) sum += edge[k];
  let best = Number.NEGATIVE_INFINITY;
  for (let step = 0, t = 0; step < length; step++) {
    // the 2×2 pivots count with the square of their entry off the diagonal
    const total = 2 * sum + clipped(size(members[t], members[t]));
    if (total > best) {
      best = total;
      first = t;
    }
    sum += edge[t] - edge[(t + 1) % length];
    t = (t + 2) % length;
  }
  for (let k = 1; k < length; k += 2) join(members[(first + k) % length], members[(first + k + 1) % length], partner);
}

/** Along a path of a partial matching: pairs from its start, the rest alone. */
function splitPath(members: number[], partner: Int32Array): void {
  for (let k = 0; k + 1 < members.length; k += 2) join(members[k], members[k + 1], partner);
}

function join(i: number, j: number, partner: Int32Array): void {
  partner[i] = j;
  partner[j] = i;
}

/** −∞ would make sums meaningless; −1e6 is less than any product of doubles can be. */
function clipped(x: number): number {
  return Math.max(x, -1e6);
}

/** Entry (i, j), or −1. */
function find(a: SparseMatrix, i: number, j: number): number {
  let low = a.columnPointer[j];
  let high = a.columnPointer[j + 1];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (a.rowIndex[middle] < i) low = middle + 1;
    else high = middle;
  }
  return low < a.columnPointer[j + 1] && a.rowIndex[low] === i ? low : -1;
}

function refuseUnsymmetric(a: SparseMatrix, moduli: Float64Array): void {
  const mirror = transpose(a);
  const t = moduliOf(mirror);
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const same = mirror.columnPointer[j + 1] === a.columnPointer[j + 1] && mirror.rowIndex[p] === a.rowIndex[p];
      if (same && Math.abs(t[p] - moduli[p]) <= 1e-6 * Math.max(t[p], moduli[p])) continue;
      throw new Fault(
        'input',
        'not-symmetric',
        `Symmetric matching needs a symmetric or Hermitian matrix; column ${j + 1} (1-based) has no equal mirror in row ${j + 1}.`,
        { row: a.rowIndex[p], column: j },
      );
    }
  }
}
