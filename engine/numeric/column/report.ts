import { modulus } from '../../matrix/modulus.ts';
import type { PivotPlace, PivotReport } from '../solver.ts';
import type { ColumnFactors, SweepFacts } from './data.ts';

/** The facts of a run in the words of the contract. `plannedRow`: original column -> row of the planned pivot. */
export function pivotReport(
  f: ColumnFactors,
  facts: SweepFacts,
  plannedRow: Int32Array,
  peakBytes: number,
): PivotReport {
  const n = f.size;
  let offDiagonal = 0;
  for (let k = 0; k < n; k++) if (f.rowOrder[k] !== plannedRow[f.columnOrder[k]]) offDiagonal++;
  const { smallest, largest } = extremePivots(f);
  const determinant = facts.perturbed > 0 ? null : determinantOf(f);
  const entries = f.lower.pointer[n] + f.upper.pointer[n] + n;
  return {
    counts: { offDiagonal, delayed: 0, twoByTwo: 0, perturbed: facts.perturbed },
    smallestPivot: smallest,
    largestPivot: largest,
    inertia: null,
    logAbsDeterminant: determinant === null ? null : determinant.logarithm,
    determinantSign: determinant === null ? null : determinant.sign,
    pivotGrowth: n === 0 || facts.largestEntry === 0 ? null : facts.largestUpper / facts.largestEntry,
    factorEntries: entries,
    storedFactorEntries: entries,
    executedOperations: executed(facts, f.complex),
    twoByTwoOperations: 0,
    peakBytes,
    notes: notesOf(f, facts, offDiagonal),
  };
}

/** Real operations: a multiply–subtract is 2 (8 complex), a division 1 (11 complex). */
function executed(facts: SweepFacts, complex: boolean): number {
  return complex ? 8 * facts.updates + 11 * facts.divisions : 2 * facts.updates + facts.divisions;
}

function extremePivots(f: ColumnFactors): { smallest: PivotPlace | null; largest: PivotPlace | null } {
  let low = -1;
  let high = -1;
  let least = Infinity;
  let most = -1;
  for (let k = 0; k < f.size; k++) {
    const m = pivotModulus(f, k);
    if (m < least) {
      least = m;
      low = k;
    }
    if (m > most) {
      most = m;
      high = k;
    }
  }
  const place = (k: number, m: number): PivotPlace | null =>
    k < 0 ? null : { modulus: m, row: f.rowOrder[k], column: f.columnOrder[k] };
  return { smallest: place(low, least), largest: place(high, most) };
}

function pivotModulus(f: ColumnFactors, k: number): number {
  return f.complex ? modulus(f.pivots[2 * k], f.pivots[2 * k + 1]) : Math.abs(f.pivots[k]);
}

/** det A = det P · det Q · Π pivots / (Π R · Π C); the empty determinant is 1. */
function determinantOf(f: ColumnFactors): { logarithm: number; sign: readonly [number, number] } {
  let logarithm = 0;
  let re = parity(f.rowOrder) * parity(f.columnOrder);
  let im = 0;
  for (let k = 0; k < f.size; k++) {
    const m = pivotModulus(f, k);
    logarithm += Math.log(m);
    if (f.rowScaling !== null) logarithm -= Math.log(f.rowScaling[f.rowOrder[k]]);
    if (f.columnScaling !== null) logarithm -= Math.log(f.columnScaling[f.columnOrder[k]]);
    if (!f.complex) {
      if (f.pivots[k] < 0) re = -re;
      continue;
    }
    const c = f.pivots[2 * k] / m;
    const s = f.pivots[2 * k + 1] / m;
    const next = re * c - im * s;
    im = re * s + im * c;
    re = next;
  }
  const length = modulus(re, im);
  return { logarithm, sign: f.complex ? [re / length, im / length] : [re, 0] };
}

/** +1 for an even permutation, −1 for an odd one, by its cycles. */
function parity(order: Int32Array): number {
  const seen = new Uint8Array(order.length);
  let sign = 1;
  for (let i = 0; i < order.length; i++) {
    for (let k = i, length = 0; !seen[k]; k = order[k]) {
      seen[k] = 1;
      if (length++ > 0) sign = -sign;
    }
  }
  return sign;
}

function notesOf(f: ColumnFactors, facts: SweepFacts, offDiagonal: number): string[] {
  const notes: string[] = [];
  const blocks = f.blockStart.length - 1;
  if (blocks > 1) {
    const outside = f.offDiagonal.pointer[f.size];
    notes.push(`${blocks} diagonal blocks; ${outside} entries above them are used as they are`);
  }
  if (offDiagonal > 0) notes.push(`${offDiagonal} pivots were taken off the planned diagonal`);
  if (facts.perturbed > 0) notes.push(`${facts.perturbed} tiny pivots were replaced`);
  return notes;
}
