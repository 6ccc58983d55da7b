import type { PivotPlace, PivotReport } from '../solver.ts';
import { type Factors, openPanel, scratchLength } from './factors.ts';
import type { FrontRun } from './run.ts';

/** What is gathered over all pivots, one after another. */
interface PivotFacts {
  smallest: PivotPlace | null;
  largest: PivotPlace | null;
  logarithm: number;
  signRe: number;
  signIm: number;
  positive: number;
  negative: number;
  zero: number;
}

/** Facts of a finished run. */
export function reportOf(run: FrontRun, f: Factors): PivotReport {
  const facts = pivotFacts(f);
  const known = run.tally.perturbed === 0 && run.options.schur === 0;
  const sign = known ? determinantSign(f, facts) : null;
  let delayed = 0;
  for (let s = 0; s < f.count; s++) if (run.tree.parent[s] >= 0) delayed += run.delayed[s];
  const entries = countEntries(run, f);
  const symmetric = run.symmetric;
  const definite = symmetric && (f.kernels.width === 1 || run.options.hermitian);
  return {
    counts: {
      offDiagonal: run.tally.offDiagonal,
      delayed,
      twoByTwo: run.tally.twoByTwo,
      perturbed: run.tally.perturbed,
    },
    smallestPivot: facts.smallest,
    largestPivot: facts.largest,
    inertia: known && definite ? [facts.positive, facts.negative, facts.zero] : null,
    logAbsDeterminant: known ? facts.logarithm - logScales(run) : null,
    determinantSign: sign,
    pivotGrowth: growth(run, f),
    factorEntries: delayed === 0 ? entries.planned : entries.nonzero(),
    storedFactorEntries: entries.stored,
    executedOperations: executedOperations(f),
    twoByTwoOperations: twoByTwoOperations(f),
    peakBytes: run.allocator.peakBytes,
    notes: notesOf(run, delayed),
  };
}

function notesOf(run: FrontRun, delayed: number): string[] {
  const notes: string[] = [];
  if (run.stack.growths > 0) {
    notes.push(
      `The stack of contribution blocks grew from ${run.plan.stack} to ${run.stack.highest} entries: ${delayed} pivots were delayed.`,
    );
  }
  if (run.tally.perturbed > 0) {
    notes.push(`${run.tally.perturbed} pivots were too small and were replaced: refine the solution.`);
  }
  return notes;
}

/** Visits all pivots in the order of elimination. */
function pivotFacts(f: Factors): PivotFacts {
  const facts: PivotFacts = {
    smallest: null,
    largest: null,
    logarithm: 0,
    signRe: 1,
    signIm: 0,
    positive: 0,
    negative: 0,
    zero: 0,
  };
  for (let s = 0; s < f.count; s++) {
    for (let k = 0; k < f.eliminated[s]; k++) {
      if (f.options.kind === 'ldlt') k += pivotOfLdlt(f, facts, s, k);
      else pivotOfPanel(f, facts, s, k);
    }
  }
  return facts;
}

function see(f: Factors, facts: PivotFacts, s: number, k: number, modulus: number): void {
  const q = f.listStart[s] + k;
  if (facts.smallest === null || modulus < facts.smallest.modulus) {
    facts.smallest = { modulus, row: f.rowOrder[f.rowList[q]], column: f.columnOrder[f.columnList[q]] };
  }
  if (facts.largest === null || modulus > facts.largest.modulus) {
    facts.largest = { modulus, row: f.rowOrder[f.rowList[q]], column: f.columnOrder[f.columnList[q]] };
  }
}

/** Multiplies the determinant by a factor of modulus `modulus` and the given parts. */
function multiply(facts: PivotFacts, re: number, im: number, modulus: number): void {
  facts.logarithm += Math.log(modulus);
  if (im === 0) {
    if (re < 0) {
      facts.signRe = -facts.signRe;
      facts.signIm = -facts.signIm;
    }
    return;
  }
  const a = facts.signRe;
  const b = facts.signIm;
  facts.signRe = (a * re - b * im) / modulus;
  facts.signIm = (a * im + b * re) / modulus;
}

function count(facts: PivotFacts, value: number): void {
  if (value > 0) facts.positive++;
  else if (value < 0) facts.negative++;
  else facts.zero++;
}

/** A pivot of Cholesky (the square of its root) or LU, on the diagonal of its panel. */
function pivotOfPanel(f: Factors, facts: PivotFacts, s: number, k: number): void {
  const m = f.listStart[s + 1] - f.listStart[s];
  const w = f.kernels.width;
  const shrink = f.options.kind === 'lu' ? 0 : (k * (k + 1)) / 2;
  const at = w * (f.panelAt[s] + k * m - shrink + k);
  const x = f.chunks[f.chunkOf[s]];
  let re = x[at];
  let im = w === 2 ? x[at + 1] : 0;
  if (f.options.kind === 'cholesky') {
    re *= re;
    im = 0;
  }
  const modulus = im === 0 ? Math.abs(re) : Math.hypot(re, im);
  see(f, facts, s, k, modulus);
  multiply(facts, re, im, modulus);
  count(facts, re);
}

/** A pivot of order one or two of LDLᵀ. @returns columns it takes beyond the first. */
function pivotOfLdlt(f: Factors, facts: PivotFacts, s: number, k: number): number {
  const t = f.pivotStart[s] + k;
  const w = f.kernels.width;
  const { diagonal: d, subdiagonal: e } = f;
  const re = d[w * t];
  const im = w === 2 ? d[w * t + 1] : 0;
  if (!(f.kernels.modulus(e, t) > 0)) {
    const modulus = im === 0 ? Math.abs(re) : Math.hypot(re, im);
    see(f, facts, s, k, modulus);
    multiply(facts, re, im, modulus);
    count(facts, re);
    return 0;
  }
  const er = e[w * t];
  const ei = w === 2 ? e[w * t + 1] : 0;
  const cr = d[w * (t + 1)];
  const ci = w === 2 ? d[w * (t + 1) + 1] : 0;
  if (w === 1 || f.options.hermitian) {
    // eigenvalues of a real symmetric or Hermitian block of order two
    const middle = (re + cr) / 2;
    const radius = Math.hypot((re - cr) / 2, er, ei);
    const big = middle >= 0 ? middle + radius : middle - radius;
    const small = (re * cr) / big - (er * er + ei * ei) / big;
    for (const value of [big, small]) {
      see(f, facts, s, k, Math.abs(value));
      multiply(facts, value, 0, Math.abs(value));
      count(facts, value);
    }
    return 1;
  }
  const detRe = re * cr - im * ci - (er * er - ei * ei);
  const detIm = re * ci + im * cr - 2 * er * ei;
  const modulus = Math.hypot(detRe, detIm);
  see(f, facts, s, k, Math.sqrt(modulus));
  multiply(facts, detRe, detIm, modulus);
  return 1;
}

function logScales(run: FrontRun): number {
  const { rowScale, columnScale } = run.options;
  let sum = 0;
  if (rowScale !== null) for (const r of rowScale) sum += Math.log(Math.abs(r));
  if (columnScale !== null) for (const c of columnScale) sum += Math.log(Math.abs(c));
  return sum;
}

/** Sign of the determinant: of the pivots, of the scalings, and the parity of the map from pivot rows to pivot columns. */
function determinantSign(f: Factors, facts: PivotFacts): readonly [number, number] {
  let sign = 1;
  if (f.options.kind === 'lu') {
    const to = new Int32Array(f.size);
    for (let s = 0; s < f.count; s++) {
      for (let q = f.listStart[s]; q < f.listStart[s] + f.eliminated[s]; q++) {
        to[f.rowOrder[f.rowList[q]]] = f.columnOrder[f.columnList[q]];
      }
    }
    sign = parity(to);
    for (const scale of [f.options.rowScale, f.options.columnScale]) {
      if (scale !== null) for (const v of scale) if (v < 0) sign = -sign;
    }
  }
  return [sign * facts.signRe, facts.signIm === 0 ? 0 : sign * facts.signIm];
}

/** +1 for an even permutation, −1 for an odd one; `p` is overwritten. */
function parity(p: Int32Array): number {
  let sign = 1;
  for (let i = 0; i < p.length; i++) {
    while (p[i] !== i) {
      const j = p[i];
      p[i] = p[j];
      p[j] = j;
      sign = -sign;
    }
  }
  return sign;
}

/** LU: max|U| / max|R·A·C|; LDLᵀ: largest entry of a pivot column of a reduced matrix; Cholesky: 1, since entries never grow. */
function growth(run: FrontRun, f: Factors): number | null {
  if (run.largestEntry === 0) return null;
  if (f.options.kind === 'cholesky') return 1;
  if (f.options.kind === 'ldlt') return Math.max(1, run.tally.largest / run.largestEntry);
  let most = 0;
  const scratch = new Float64Array(scratchLength(f));
  const view = { x: scratch, base: 0 };
  const { kernels } = f;
  for (let s = 0; s < f.count; s++) {
    const m = f.listStart[s + 1] - f.listStart[s];
    const p = f.eliminated[s];
    openPanel(f, s, view, scratch);
    const { x, base } = view;
    for (let k = 0; k < p; k++) {
      const behind = base + m * p + k * (m - p);
      const a = kernels.modulus(x, base + k * m + kernels.largest(x, base + k * m, 0, k + 1));
      const i = kernels.largest(x, behind, 0, m - p);
      const b = i < 0 ? 0 : kernels.modulus(x, behind + i);
      if (a > most) most = a;
      if (b > most) most = b;
    }
  }
  return most / run.largestEntry;
}

function countEntries(run: FrontRun, f: Factors): { planned: number; stored: number; nonzero: () => number } {
  const symmetric = run.symmetric;
  let stored = 0;
  for (let s = 0; s < f.count; s++) {
    const m = f.listStart[s + 1] - f.listStart[s];
    const p = f.eliminated[s];
    stored += symmetric ? p * m - (p * (p - 1)) / 2 : p * (2 * m - p);
  }
  const planned = symmetric ? run.tree.factorEntries : 2 * run.tree.factorEntries - run.size;
  const nonzero = (): number => {
    let sum = 0;
    const w = f.kernels.width;
    for (let s = 0; s < f.count; s++) {
      const m = f.listStart[s + 1] - f.listStart[s];
      const p = f.eliminated[s];
      const length = symmetric ? p * m - (p * (p - 1)) / 2 : p * (2 * m - p);
      const x = f.chunks[f.chunkOf[s]];
      for (let q = f.panelAt[s]; q < f.panelAt[s] + length; q++) {
        if (x[w * q] !== 0 || (w === 2 && x[2 * q + 1] !== 0)) sum++;
      }
    }
    return sum;
  };
  return { planned: run.options.schur > 0 ? nonzero() : planned, stored, nonzero };
}

/** Costs of scalar operations in real ones: multiplication, addition, division by a pivot. */
function costs(f: Factors): { multiply: number; add: number; divide: number } {
  if (f.kernels.width === 1) return { multiply: 1, add: 1, divide: 1 };
  return { multiply: 6, add: 2, divide: f.options.hermitian ? 2 : 11 };
}

/** Operations of all fronts from their sizes, padding included. */
function executedOperations(f: Factors): number {
  const { multiply: times, add, divide } = costs(f);
  let sum = 0;
  for (let s = 0; s < f.count; s++) {
    const m = f.listStart[s + 1] - f.listStart[s];
    for (let k = 0; k < f.eliminated[s]; k++) {
      const l = m - k - 1;
      if (f.options.kind === 'lu') sum += l * (divide + (times + add) * l);
      else sum += (f.options.kind === 'cholesky' ? 1 : 0) + l * divide + ((times + add) * l * (l + 1)) / 2;
    }
  }
  return sum;
}

/** What pivots of order two cost beyond two of order one: the inverse, and twice as many products for each row below. */
function twoByTwoOperations(f: Factors): number {
  if (f.options.kind !== 'ldlt') return 0;
  const { multiply: times, add, divide } = costs(f);
  let sum = 0;
  for (let s = 0; s < f.count; s++) {
    const m = f.listStart[s + 1] - f.listStart[s];
    for (let k = 0; k < f.eliminated[s]; k++) {
      if (!(f.kernels.modulus(f.subdiagonal, f.pivotStart[s] + k) > 0)) continue;
      const below = m - k - 2;
      sum += below * (4 * times + 2 * add - 2 * divide) + times + 2 * divide;
    }
  }
  return sum;
}
