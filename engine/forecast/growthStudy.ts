import { fitGrowth, type GrowthFit, type GrowthLaw, growthAt, largestSize } from './growth.ts';

/** Relative distance up to which a law of the theory is taken to fit. */
const fitsWithin = 0.1;

/** One matrix of a family, with what one ordering of it costs. */
export interface FamilyMember {
  readonly name: string;
  readonly n: number;
  readonly factorEntries: number;
  readonly operations: number;
  /** bytes at the peak on the target */
  readonly memory: number;
  /** seconds of one factorization on the target, modelled */
  readonly time: number;
}

export const grownFigures = ['factorEntries', 'operations', 'memory', 'time'] as const;
export type GrownFigure = (typeof grownFigures)[number];

/** How one figure grows. */
export interface FigureGrowth {
  readonly figure: GrownFigure;
  /**
   * the law of the theory that predicts the largest size best from the others, a free exponent where none comes within 10 %; with fewer than
   * three sizes the law that fits best
   */
  readonly fit: GrowthFit;
  /** every law tried */
  readonly fits: readonly GrowthFit[];
  /** the largest size left out: its relative distance from the prediction; null with fewer than three sizes */
  readonly leftOut: number | null;
  /** local exponents fall from size to size, as they do towards the theory from above */
  readonly falling: boolean;
}

/** Largest n within a limit, and how far beyond the largest size that was counted. */
export interface Reach {
  readonly what: 'memory' | 'time';
  /** bytes or seconds */
  readonly limit: number;
  readonly n: number;
  readonly distance: number;
  readonly sentence: string;
}

export interface GrowthStudy {
  readonly members: readonly FamilyMember[];
  readonly growth: readonly FigureGrowth[];
  readonly reach: readonly Reach[];
  readonly notes: readonly string[];
}

/** Laws of a figure; the theory holds for dissections of meshes in 2 or 3 dimensions (George 1973; Lipton, Rose & Tarjan 1979). */
function lawsOf(figure: GrownFigure, dissection: boolean, dimension: 2 | 3 | null): readonly GrowthLaw[] {
  if (!dissection) return ['free exponent'];
  const space = figure === 'factorEntries' || figure === 'memory';
  const two: GrowthLaw = space ? 'n log n' : 'n^(3/2)';
  const three: GrowthLaw = space ? 'n^(4/3)' : 'n^2';
  if (dimension !== null) return [dimension === 2 ? two : three, 'free exponent'];
  return [two, three, 'free exponent'];
}

/**
 * Growth of a family of matrices under one ordering, and how large n can be.
 * @param members at least two sizes
 * @param dissection whether the ordering is a dissection, for which the theory's laws hold
 * @param limits bytes and seconds
 * @throws RangeError with fewer than two different sizes
 */
export function studyGrowth(
  members: readonly FamilyMember[],
  dissection: boolean,
  dimension: 2 | 3 | null,
  limits: { readonly memory: number; readonly time: number },
): GrowthStudy {
  const sorted = [...members].sort((x, y) => x.n - y.n);
  const largest = sorted[sorted.length - 1];
  const growth = grownFigures.map((figure) => growthOf(sorted, figure, lawsOf(figure, dissection, dimension)));
  const reach = (['memory', 'time'] as const).map((what) => {
    const { fit } = growth.find((g) => g.figure === what) as FigureGrowth;
    const limit = limits[what];
    const { n, distance } = largestSize(fit, limit, largest.n);
    return { what, limit, n, distance, sentence: reachSentence(what, limit, n, distance) };
  });
  const notes: string[] = [];
  if (sorted.length < 4) {
    notes.push(`${sorted.length} sizes: from four up the fits can be trusted to say more than a direction.`);
  }
  if (!dissection) notes.push('The laws of the theory hold for dissections only: free exponents here.');
  return { members: sorted, growth, reach, notes };
}

function growthOf(members: readonly FamilyMember[], figure: GrownFigure, laws: readonly GrowthLaw[]): FigureGrowth {
  const points = members.map((m) => ({ n: m.n, value: m[figure] }));
  const last = points[points.length - 1];
  const fits = laws.map((law) => fitGrowth(points, law)).filter((f) => f.law === 'free exponent' || f.a > 0);
  // a law without a positive leading term predicts nothing
  const leftOut = (law: GrowthLaw): number | null => {
    if (points.length < 3) return null;
    const without = fitGrowth(points.slice(0, -1), law);
    if (law !== 'free exponent' && !(without.a > 0)) return Number.POSITIVE_INFINITY;
    return Math.abs(growthAt(without, last.n) / last.value - 1);
  };
  const score = (fit: GrowthFit): number => leftOut(fit.law) ?? fit.worst;
  const best = (some: readonly GrowthFit[]): GrowthFit => some.reduce((a, b) => (score(b) < score(a) ? b : a));
  // far away the theory is the better guide: a free exponent stands in only where the theory's laws do not fit
  const theory = fits.filter((f) => f.law !== 'free exponent' && score(f) <= fitsWithin);
  const fit = best(theory.length > 0 ? theory : fits);
  const { exponents } = fit;
  return {
    figure,
    fit,
    fits,
    leftOut: leftOut(fit.law),
    falling: exponents.length > 1 && exponents.every((e, k) => k === 0 || e.exponent <= exponents[k - 1].exponent),
  };
}

function reachSentence(what: 'memory' | 'time', limit: number, n: number, distance: number): string {
  const room = what === 'memory' ? `${(limit / 2 ** 30).toPrecision(3)} GiB` : `${limit.toLocaleString('en-US')} s`;
  const far =
    distance <= 1
      ? 'within the sizes counted'
      : `${Number(distance.toPrecision(2)).toLocaleString('en-US')} times the largest size counted${distance > 10 ? ': a long way to extrapolate' : ''}`;
  return `In ${room}, n can be up to about ${Number(n.toPrecision(3)).toLocaleString('en-US')}, ${far}.`;
}
