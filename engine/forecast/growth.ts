/** Growth of a figure with the number of unknowns, over matrices of one family. */

/** The theory's leading term with a linear one; valid for nested dissection only (George 1973; Lipton, Rose & Tarjan 1979). */
export type GrowthLaw = 'n log n' | 'n^(4/3)' | 'n^(3/2)' | 'n^2' | 'free exponent';

export interface GrowthPoint {
  readonly n: number;
  readonly value: number;
}

export interface GrowthFit {
  readonly law: GrowthLaw;
  /** value ≈ a · leading(n) + b · n, or a · n^b for a free exponent */
  readonly a: number;
  readonly b: number;
  /** local exponents between neighbouring sizes */
  readonly exponents: readonly { readonly from: number; readonly to: number; readonly exponent: number }[];
  /** largest relative distance of a point from the fit */
  readonly worst: number;
  /** enough sizes to speak of confidence (four or more) */
  readonly confident: boolean;
}

function leading(law: GrowthLaw, n: number): number {
  if (law === 'n log n') return n * Math.log2(Math.max(2, n));
  if (law === 'n^(4/3)') return n ** (4 / 3);
  if (law === 'n^(3/2)') return n ** 1.5;
  return n * n;
}

/** Value of a fit at n. */
export function growthAt(fit: Pick<GrowthFit, 'law' | 'a' | 'b'>, n: number): number {
  return fit.law === 'free exponent' ? fit.a * n ** fit.b : fit.a * leading(fit.law, n) + fit.b * n;
}

/** Least squares on relative errors; at least two sizes. @throws RangeError with fewer */
export function fitGrowth(points: readonly GrowthPoint[], law: GrowthLaw): GrowthFit {
  const sorted = [...points].sort((x, y) => x.n - y.n);
  if (sorted.length < 2) throw new RangeError(`a growth study needs at least 2 sizes, ${sorted.length} given`);
  const { a, b } = law === 'free exponent' ? powerFit(sorted) : twoTermFit(sorted, law);
  const fit = { law, a, b };
  const exponents = sorted.slice(1).map((p, k) => ({
    from: sorted[k].n,
    to: p.n,
    exponent: Math.log(p.value / sorted[k].value) / Math.log(p.n / sorted[k].n),
  }));
  const worst = Math.max(...sorted.map((p) => Math.abs(growthAt(fit, p.n) / p.value - 1)));
  return { ...fit, exponents, worst, confident: sorted.length >= 4 };
}

function powerFit(points: readonly GrowthPoint[]): { a: number; b: number } {
  const mean = (f: (p: GrowthPoint) => number): number => points.reduce((sum, p) => sum + f(p), 0) / points.length;
  const x = mean((p) => Math.log(p.n));
  const y = mean((p) => Math.log(p.value));
  const b = mean((p) => (Math.log(p.n) - x) * (Math.log(p.value) - y)) / mean((p) => (Math.log(p.n) - x) ** 2);
  return { a: Math.exp(y - b * x), b };
}

function twoTermFit(points: readonly GrowthPoint[], law: GrowthLaw): { a: number; b: number } {
  let s11 = 0;
  let s12 = 0;
  let s22 = 0;
  let t1 = 0;
  let t2 = 0;
  for (const { n, value } of points) {
    const u = leading(law, n) / value;
    const v = n / value;
    s11 += u * u;
    s12 += u * v;
    s22 += v * v;
    t1 += u;
    t2 += v;
  }
  const det = s11 * s22 - s12 * s12;
  return { a: (t1 * s22 - t2 * s12) / det, b: (s11 * t2 - s12 * t1) / det };
}

/** Largest n whose value stays within `limit`, by bisection, and how many times the largest measured size that is. */
export function largestSize(fit: GrowthFit, limit: number, measured: number): { n: number; distance: number } {
  let low = 1;
  let high = 1;
  while (growthAt(fit, high) <= limit && high < 2 ** 52) high *= 2;
  while (high - low > Math.max(1, low * 1e-9)) {
    const middle = Math.floor((low + high) / 2);
    if (growthAt(fit, middle) <= limit) low = middle;
    else high = middle;
  }
  return { n: low, distance: low / measured };
}
