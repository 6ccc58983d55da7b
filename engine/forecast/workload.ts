import type { Workload } from './target.ts';

/** Modelled seconds of one trial, for a workload. */
export interface TrialCost {
  /** "nested-dissection" or a stamp; used in sentences */
  readonly name: string;
  readonly factorEntries: number;
  /** ordering and analysis, once */
  readonly analysis: number;
  readonly factorization: number;
  readonly solve: number;
  readonly refinementStep: number;
}

export interface WorkloadLine {
  readonly name: string;
  /** seconds for the whole workload */
  readonly total: number;
  readonly best: boolean;
}

/** Where one trial overtakes another. */
export interface BreakEven {
  readonly better: string;
  readonly than: string;
  readonly by: 'factorizations' | 'right-hand sides';
  /** from this many on */
  readonly from: number;
  readonly sentence: string;
}

/** Seconds of the whole workload. */
export function workloadSeconds(c: TrialCost, w: Workload): number {
  const perSide = c.solve + w.refinementSteps * c.refinementStep;
  return c.analysis + w.factorizations * (c.factorization + w.rightHandSides * perSide);
}

/** Costs for a workload, which is best, and every break-even of the best against the others. */
export function compareWorkload(
  costs: readonly TrialCost[],
  w: Workload,
): { lines: readonly WorkloadLine[]; breakEvens: readonly BreakEven[]; remark: string | null } {
  const totals = costs.map((c) => workloadSeconds(c, w));
  const least = Math.min(...totals);
  const best = totals.indexOf(least);
  const lines = costs.map((c, k) => ({ name: c.name, total: totals[k], best: k === best }));
  const breakEvens: BreakEven[] = [];
  for (let a = 0; a < costs.length; a++) {
    for (let b = 0; b < costs.length; b++) {
      if (a === b) continue;
      const found = [byFactorizations(costs[a], costs[b], w), byRightHandSides(costs[a], costs[b], w)];
      for (const f of found) if (f !== null) breakEvens.push(f);
    }
  }
  return { lines, breakEvens, remark: costs.length > 1 ? fillRemark(costs, best) : null };
}

function fillRemark(costs: readonly TrialCost[], best: number): string | null {
  let thinnest = 0;
  for (let k = 1; k < costs.length; k++) if (costs[k].factorEntries < costs[thinnest].factorEntries) thinnest = k;
  if (thinnest === best) return null;
  return `Least fill is not least time: ${costs[thinnest].name} has the least fill, ${costs[best].name} is the fastest for this workload.`;
}

/** `a` costs more to analyse and less for each factorization: the count from which it pays. */
function byFactorizations(a: TrialCost, b: TrialCost, w: Workload): BreakEven | null {
  const each = (c: TrialCost): number =>
    c.factorization + w.rightHandSides * (c.solve + w.refinementSteps * c.refinementStep);
  const from = crossing(a.analysis - b.analysis, each(b) - each(a));
  if (from === null) return null;
  return {
    better: a.name,
    than: b.name,
    by: 'factorizations',
    from,
    sentence: `${a.name} pays against ${b.name} from ${from.toLocaleString('en-US')} factorizations on.`,
  };
}

function byRightHandSides(a: TrialCost, b: TrialCost, w: Workload): BreakEven | null {
  const fixed = (c: TrialCost): number => c.analysis + w.factorizations * c.factorization;
  const side = (c: TrialCost): number => w.factorizations * (c.solve + w.refinementSteps * c.refinementStep);
  const from = crossing(fixed(a) - fixed(b), side(b) - side(a));
  if (from === null) return null;
  return {
    better: a.name,
    than: b.name,
    by: 'right-hand sides',
    from,
    sentence: `With ${from.toLocaleString('en-US')} or more right-hand sides for each factorization, ${a.name} is better than ${b.name}.`,
  };
}

/** First whole count at which an extra cost is earned back by a saving each time; null if never or at once. */
function crossing(extra: number, saving: number): number | null {
  if (!(extra > 0 && saving > 0)) return null;
  const from = Math.floor(extra / saving) + 1;
  return from > 1 && from <= 1e9 ? from : null;
}
