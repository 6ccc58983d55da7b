import { modulus } from '../../matrix/modulus.ts';

/** A linear operator known only by its action, n numbers in, n numbers out, in place; interleaved when complex. */
export interface Operator {
  readonly size: number;
  readonly complex: boolean;
  /** x ← B·x */
  apply(x: Float64Array): void;
  /** x ← Bᴴ·x */
  applyAdjoint(x: Float64Array): void;
}

/**
 * Estimates ‖B‖₁ from below: Hager 1984 in the form of Higham 1988, with the extra vector of alternating signs that guards
 * against the known counterexamples. At most five sweeps, so about eleven products; almost always within a factor of three.
 * NaN if a product is not finite. Ties go to the smallest index, nothing is random.
 */
export function estimateOneNorm(b: Operator): number {
  const n = b.size;
  if (n === 0) return 0;
  const width = b.complex ? 2 : 1;
  const x = new Float64Array(n * width);
  const sign = new Float64Array(n * width);
  for (let i = 0; i < n; i++) x[i * width] = 1 / n;
  b.apply(x);
  let estimate = sumOfModuli(x, b.complex);
  if (n === 1 || !(estimate < Infinity)) return n === 1 ? estimate : Number.NaN;
  let previous = -1;
  for (let sweep = 0; sweep < 5; sweep++) {
    const changed = signsInto(x, sign, b.complex);
    // the same signs would only repeat the last step
    if (!changed && sweep > 0) break;
    x.set(sign);
    b.applyAdjoint(x);
    const j = indexOfLargest(x, b.complex);
    if (j === previous) break;
    previous = j;
    x.fill(0);
    x[j * width] = 1;
    b.apply(x);
    const next = sumOfModuli(x, b.complex);
    if (!(next < Infinity)) return Number.NaN;
    if (next <= estimate) break;
    estimate = next;
  }
  for (let i = 0; i < n; i++) {
    x[i * width] = (i % 2 === 0 ? 1 : -1) * (1 + i / (n - 1));
    if (b.complex) x[i * width + 1] = 0;
  }
  b.apply(x);
  const alternating = (2 * sumOfModuli(x, b.complex)) / (3 * n);
  if (!(alternating < Infinity)) return Number.NaN;
  return Math.max(estimate, alternating);
}

function sumOfModuli(x: Float64Array, complex: boolean): number {
  let sum = 0;
  if (complex) for (let p = 0; p < x.length; p += 2) sum += modulus(x[p], x[p + 1]);
  else for (let p = 0; p < x.length; p++) sum += Math.abs(x[p]);
  return sum;
}

/** sign ← x/|x| (1 where x is 0); whether anything changed. */
function signsInto(x: Float64Array, sign: Float64Array, complex: boolean): boolean {
  let changed = false;
  if (!complex) {
    for (let i = 0; i < x.length; i++) {
      const s = x[i] < 0 ? -1 : 1;
      if (s !== sign[i]) changed = true;
      sign[i] = s;
    }
    return changed;
  }
  for (let p = 0; p < x.length; p += 2) {
    const m = modulus(x[p], x[p + 1]);
    const re = m > 0 ? x[p] / m : 1;
    const im = m > 0 ? x[p + 1] / m : 0;
    if (re !== sign[p] || im !== sign[p + 1]) changed = true;
    sign[p] = re;
    sign[p + 1] = im;
  }
  return changed;
}

function indexOfLargest(x: Float64Array, complex: boolean): number {
  const width = complex ? 2 : 1;
  let at = 0;
  let largest = -1;
  for (let i = 0; i * width < x.length; i++) {
    const m = complex ? modulus(x[2 * i], x[2 * i + 1]) : Math.abs(x[i]);
    if (m > largest) {
      largest = m;
      at = i;
    }
  }
  return at;
}
