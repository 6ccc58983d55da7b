import type { DenseKernels } from './kernels.ts';
import type { PivotRule, PivotTally } from './pivoting.ts';
import { sweepUpdate } from './sweep.ts';
import { type DenseWorkspace, panelWidth, updateDepth } from './workspace.ts';

/** A symmetric front under LDLᵀ or LDLᴴ. Its panel is a lower trapezoid with ld = m. */
export interface SymmetricPanel {
  readonly x: Float64Array;
  /** first scalar of the panel */
  readonly base: number;
  /** order of the front */
  readonly m: number;
  /** fully summed columns */
  readonly p: number;
  /** pivot blocks of the run: d the diagonal, e at the first of a pair its subdiagonal (0 elsewhere); column l at [dAt + l] */
  readonly d: Float64Array;
  readonly e: Float64Array;
  readonly dAt: number;
  /** subscripts of the front, reordered with the pivots, from `listAt` on */
  readonly list: Int32Array;
  readonly listAt: number;
}

/**
 * Partial LDLᵀ (Duff & Reid 1983) with threshold pivots of order one and two (Duff, Erisman & Reid 1986): a pivot passes only if the
 * multipliers it causes are ≤ 1/u against every row of the front, contribution rows included. Right-looking in blocks; inside a
 * block a column is brought up to date when it is looked at. Columns that fail go to the end and are tried again as long as others
 * succeed. In place: afterwards columns 0 … result − 1 hold unit-lower L, the rest are reduced.
 * @returns number of columns eliminated.
 */
export function partialLdlt(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: SymmetricPanel,
  rule: PivotRule,
  tally: PivotTally,
  tick: (operations: number) => void,
): number {
  const { m, p } = panel;
  let done = 0;
  let end = p;
  let progress = false;
  while (done < p) {
    const k0 = done;
    const blockEnd = k0 + panelWidth < p ? k0 + panelWidth : p;
    while (done < blockEnd && done < end) {
      const taken = takePivot(kernels, work, panel, rule, tally, k0, done);
      done += taken;
      if (taken > 0) continue;
      if (rule.pivoting !== 'threshold') break;
      end--;
      swapSymmetric(kernels, panel, rule.hermitian, done, end);
    }
    if (done > k0) {
      progress = true;
      trail(kernels, work, panel, rule.hermitian, k0, done, tick);
      tick((done - k0) * (done - k0) * (m - k0));
    }
    if (rule.pivoting !== 'threshold' && done < blockEnd) break;
    if (done < end) continue;
    if (!progress) break;
    progress = false;
    end = p;
  }
  return done;
}

/** start of column j of the trapezoid, such that element (i, j) is at start + i */
function start(panel: SymmetricPanel, j: number): number {
  return panel.base + j * panel.m - ((j * (j + 1)) >> 1);
}

/** Loads column k of the reduced matrix, rows `from` … m − 1, up to date with the pivots k0 … done − 1, into w. */
function loadColumn(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: SymmetricPanel,
  hermitian: boolean,
  w: Float64Array,
  k: number,
  k0: number,
  done: number,
): void {
  const { x, base, m, d, e, dAt } = panel;
  const wide = kernels.width;
  // the part left of the diagonal is a row of the trapezoid
  for (let j = done; j < k; j++) {
    const from = wide * (start(panel, j) + k);
    w[wide * j] = x[from];
    if (wide === 2) w[2 * j + 1] = hermitian ? -x[from + 1] : x[from + 1];
  }
  const own = start(panel, k);
  const stop = wide * m;
  const shift = wide * own;
  for (let i = wide * k; i < stop; i++) w[i] = x[shift + i];
  if (k0 === done) return;
  kernels.pairedCoefficients(work.factors, 0, x, base, m, 1, k0, done, k, d, e, dAt, hermitian);
  kernels.apply(w, 0, x, base, m, 1, k0, done, done, m, work.factors, 0);
}

/** Tries to eliminate with column k = done. @returns how many columns were eliminated: 0, 1 or 2. */
function takePivot(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: SymmetricPanel,
  rule: PivotRule,
  tally: PivotTally,
  k0: number,
  k: number,
): number {
  const { m, p } = panel;
  const { first, second } = work;
  const u = rule.threshold;
  loadColumn(kernels, work, panel, rule.hermitian, first, k, k0, k);
  if (rule.hermitian && kernels.width === 2) first[2 * k + 1] = 0;
  const own = kernels.modulus(first, k);
  if (rule.pivoting !== 'threshold') {
    if (rule.pivoting === 'static' && !(own >= rule.smallest)) {
      tally.perturbed++;
      raise(kernels, first, k, own, rule.smallest);
    } else if (own === 0) return 0;
    note(tally, kernels.modulus(first, k), modulusAt(kernels, first, kernels.largest(first, 0, k + 1, m)));
    storeOne(kernels, panel, first, k);
    return 1;
  }
  const most = modulusAt(kernels, first, kernels.largest(first, 0, k + 1, m));
  if (own > 0 && own >= u * most) {
    note(tally, own, most);
    storeOne(kernels, panel, first, k);
    return 1;
  }
  const r = kernels.largest(first, 0, k + 1, p);
  if (r < 0 || !(kernels.modulus(first, r) > 0)) return 0;
  loadColumn(kernels, work, panel, rule.hermitian, second, r, k0, k);
  if (rule.hermitian && kernels.width === 2) second[2 * r + 1] = 0;
  const partner = kernels.modulus(second, r);
  const mostOther = largestExcept(kernels, second, k, m, r, -1);
  if (partner > 0 && partner >= u * mostOther) {
    note(tally, partner, mostOther);
    swapSymmetric(kernels, panel, rule.hermitian, k, r);
    swapScalars(kernels.width, second, k, r);
    storeOne(kernels, panel, second, k);
    return 1;
  }
  const f = work.factors;
  if (!kernels.invertPair(f, 0, first, k, first, r, second, r, rule.hermitian)) return 0;
  const most1 = largestExcept(kernels, first, k + 1, m, r, -1);
  const most2 = largestExcept(kernels, second, k + 1, m, r, -1);
  const l1 = kernels.modulus(f, 0) * most1 + kernels.modulus(f, 1) * most2;
  const l2 = kernels.modulus(f, 2) * most1 + kernels.modulus(f, 3) * most2;
  if (!(l1 * u <= 1 && l2 * u <= 1)) return 0;
  swapSymmetric(kernels, panel, rule.hermitian, k + 1, r);
  swapScalars(kernels.width, first, k + 1, r);
  swapScalars(kernels.width, second, k + 1, r);
  storeTwo(kernels, panel, first, second, k, f);
  tally.twoByTwo++;
  note(tally, Math.max(own, partner), Math.max(most, mostOther));
  return 2;
}

function note(tally: PivotTally, a: number, b: number): void {
  if (a > tally.largest) tally.largest = a;
  if (b > tally.largest) tally.largest = b;
}

function modulusAt(kernels: DenseKernels, w: Float64Array, i: number): number {
  return i < 0 ? 0 : kernels.modulus(w, i);
}

/** Largest modulus of w[from … m − 1] without place r. */
function largestExcept(
  kernels: DenseKernels,
  w: Float64Array,
  from: number,
  m: number,
  r: number,
  none: number,
): number {
  const a = modulusAt(kernels, w, r > from ? kernels.largest(w, 0, from, r) : none);
  const b = modulusAt(kernels, w, kernels.largest(w, 0, r + 1, m));
  return a > b || Number.isNaN(a) ? a : b;
}

/** Moves a pivot that is too small out to the given modulus, keeping its sign or direction. */
function raise(kernels: DenseKernels, w: Float64Array, k: number, own: number, smallest: number): void {
  const at = kernels.width * k;
  if (own > 0 && Number.isFinite(smallest / own)) {
    w[at] *= smallest / own;
    if (kernels.width === 2) w[at + 1] *= smallest / own;
    return;
  }
  w[at] = smallest;
  if (kernels.width === 2) w[at + 1] = 0;
}

function storeOne(kernels: DenseKernels, panel: SymmetricPanel, w: Float64Array, k: number): void {
  const { x, d, e, dAt } = panel;
  const wide = kernels.width;
  const s = start(panel, k);
  d[wide * (dAt + k)] = w[wide * k];
  e[wide * (dAt + k)] = 0;
  x[wide * (s + k)] = 1;
  if (wide === 2) {
    d[2 * (dAt + k) + 1] = w[2 * k + 1];
    e[2 * (dAt + k) + 1] = 0;
    x[2 * (s + k) + 1] = 0;
  }
  kernels.divide(x, s, w, 0, k + 1, panel.m, w, k);
}

function storeTwo(
  kernels: DenseKernels,
  panel: SymmetricPanel,
  w: Float64Array,
  v: Float64Array,
  k: number,
  inverse: Float64Array,
): void {
  const { x, m, d, e, dAt } = panel;
  const wide = kernels.width;
  const s = start(panel, k);
  const t = start(panel, k + 1);
  for (let c = 0; c < wide; c++) {
    d[wide * (dAt + k) + c] = w[wide * k + c];
    d[wide * (dAt + k + 1) + c] = v[wide * (k + 1) + c];
    e[wide * (dAt + k) + c] = w[wide * (k + 1) + c];
    e[wide * (dAt + k + 1) + c] = 0;
    x[wide * (s + k) + c] = c === 0 ? 1 : 0;
    x[wide * (t + k + 1) + c] = c === 0 ? 1 : 0;
    // kept for `pairedCoefficients` of later columns only through e; in L itself this place is zero
    x[wide * (s + k + 1) + c] = 0;
  }
  const stop = wide * m;
  for (let i = wide * (k + 2); i < stop; i++) {
    x[wide * s + i] = w[i];
    x[wide * t + i] = v[i];
  }
  kernels.combine(x, s, t, k + 2, m, inverse, 0);
}

/** Brings the remaining fully summed columns up to date with the pivots k0 … done − 1. */
function trail(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: SymmetricPanel,
  hermitian: boolean,
  k0: number,
  done: number,
  tick: (operations: number) => void,
): void {
  const { x, base, m, p, d, e, dAt } = panel;
  if (done === p) return;
  const depth = done - k0;
  const { left, right } = work;
  kernels.pack(left, 0, x, base, m, 1, k0, done, done, m, false);
  const groups = Math.ceil((p - done) / kernels.group);
  kernels.scaleGroups(right, left, groups, depth, d, e, dAt + k0, hermitian);
  sweepUpdate(kernels, x, base, m, 1, done, m, done, p, true, left, right, depth, tick);
}

/**
 * C := C − L·D·Lᵀ (or L·D·Lᴴ) on the lower triangle of the contribution block, L being rows i0 … m − 1 of the `done` columns eliminated.
 * @param c packed lower triangle whose column 0 belongs to panel row i0, addressed by (cBase, cLd, 1).
 */
export function updateFromLdlt(
  kernels: DenseKernels,
  work: DenseWorkspace,
  panel: SymmetricPanel,
  hermitian: boolean,
  done: number,
  i0: number,
  c: Float64Array,
  cBase: number,
  cLd: number,
  tick: (operations: number) => void,
): void {
  const { x, base, m, d, e, dAt } = panel;
  const { left, right } = work;
  const size = m - i0;
  const groups = Math.ceil(size / kernels.group);
  for (let k0 = 0, k1 = 0; k0 < done; k0 = k1) {
    k1 = k0 + updateDepth < done ? k0 + updateDepth : done;
    if (k1 < done && kernels.modulus(e, dAt + k1 - 1) > 0) k1--; // a pair stays together
    const depth = k1 - k0;
    kernels.pack(left, 0, x, base, m, 1, k0, k1, i0, m, false);
    kernels.scaleGroups(right, left, groups, depth, d, e, dAt + k0, hermitian);
    sweepUpdate(kernels, c, cBase, cLd, 1, 0, size, 0, size, true, left, right, depth, tick);
  }
}

/** Exchanges scalars a and b of w. */
export function swapScalars(width: number, w: Float64Array, a: number, b: number): void {
  for (let c = 0; c < width; c++) {
    const t = w[width * a + c];
    w[width * a + c] = w[width * b + c];
    w[width * b + c] = t;
  }
}

/** Exchanges unknowns a ≤ b of the front: its rows in eliminated columns, its rows and columns in the reduced ones, its subscripts. */
function swapSymmetric(kernels: DenseKernels, panel: SymmetricPanel, hermitian: boolean, a: number, b: number): void {
  if (a === b) return;
  const { x, m, list, listAt } = panel;
  const width = kernels.width;
  const subscript = list[listAt + a];
  list[listAt + a] = list[listAt + b];
  list[listAt + b] = subscript;
  let s = panel.base;
  for (let j = 0; j < a; j++) {
    swapScalars(width, x, s + a, s + b);
    s += m - j - 1;
  }
  const sa = start(panel, a);
  const sb = start(panel, b);
  swapScalars(width, x, sa + a, sb + b);
  for (let j = a + 1; j < b; j++) {
    const mirror = start(panel, j) + b;
    swapScalars(width, x, sa + j, mirror);
    if (!hermitian || width === 1) continue;
    x[2 * (sa + j) + 1] = -x[2 * (sa + j) + 1];
    x[2 * mirror + 1] = -x[2 * mirror + 1];
  }
  if (hermitian && width === 2) x[2 * (sa + b) + 1] = -x[2 * (sa + b) + 1];
  for (let i = b + 1; i < m; i++) swapScalars(width, x, sa + i, sb + i);
}
