import type { PeakForecast } from './forecast.ts';
import { inUnit } from './limits.ts';
import type { Target, Workload } from './target.ts';
import { compareWorkload, type TrialCost, workloadSeconds } from './workload.ts';

/** One trial as advice sees it. */
export interface AdviceTrial {
  /** how it is called in sentences */
  readonly name: string;
  readonly cost: TrialCost;
  readonly peak: PeakForecast;
  /** whether the count of entries stays below 2³¹ */
  readonly countsFit: boolean;
  /** whether pivots are chosen by size, so that fill can grow */
  readonly pivoted: boolean;
  readonly valueDependent: boolean;
}

export interface AdviceQuestion {
  /** "Cholesky" */
  readonly factorization: string;
  /** why it is taken, a sentence */
  readonly reason: string;
  /** what the choice of factorization still rests on, as sentences: definiteness not yet proven, zero diagonals, … */
  readonly doubts: readonly string[];
  readonly trials: readonly AdviceTrial[];
  readonly target: Target;
  readonly workload: Workload;
}

/** One sentence, its reasons, and what could go wrong. */
export interface Advice {
  readonly sentence: string;
  /** name of the trial advised; null where none fits or none is known */
  readonly best: string | null;
  readonly reasons: readonly string[];
  readonly cautions: readonly string[];
  /** where nothing fits: the nearest change after which something would */
  readonly change: string | null;
}

/** Seconds as people say them. */
function duration(seconds: number): string {
  if (seconds < 1e-3) return `${Number((seconds * 1e6).toPrecision(2))} µs`;
  // through a number: 330 and not 3.3e+2
  if (seconds < 1) return `${Number((seconds * 1e3).toPrecision(2))} ms`;
  if (seconds < 120) return `${Number(seconds.toPrecision(2))} s`;
  return seconds < 7200 ? `${(seconds / 60).toPrecision(2)} min` : `${(seconds / 3600).toPrecision(2)} h`;
}

/** Which trial is best for a target and a workload among those that fit it, and why. Seconds are modelled. */
export function adviseOn(q: AdviceQuestion): Advice {
  const { trials, target, workload } = q;
  const why = q.reason;
  if (trials.length === 0) {
    return {
      sentence: why,
      best: null,
      reasons: [why],
      cautions: q.doubts,
      change: null,
    };
  }
  const fitting = trials.filter((t) => t.peak.bytes <= target.memoryBytes);
  if (fitting.length === 0) return nothingFits(q, why);
  const seconds = (t: AdviceTrial): number => workloadSeconds(t.cost, workload);
  const best = fitting.reduce((a, b) => (seconds(b) < seconds(a) ? b : a));
  const sentence = `Use ${q.factorization} with ${best.name}: of ${counted(fitting.length, 'trial')} that fit${fitting.length === 1 ? 's' : ''} ${inUnit(target.memoryBytes)} it is the fastest for ${workloadWords(workload)}, ${duration(seconds(best))} on ${counted(target.cores, 'core')}, and needs ${inUnit(best.peak.bytes)}.`;
  return {
    sentence,
    best: best.name,
    reasons: [why, ...comparisons(q, fitting, best)],
    cautions: [...q.doubts, ...cautionsOf(best, target)],
    change: null,
  };
}

function counted(n: number, word: string): string {
  return `${n.toLocaleString('en-US')} ${word}${n === 1 ? '' : 's'}`;
}

function workloadWords(w: Workload): string {
  const steps = w.refinementSteps === 0 ? '' : `, ${counted(w.refinementSteps, 'refinement step')} each`;
  return `${counted(w.factorizations, 'factorization')} with ${counted(w.rightHandSides, 'right-hand side')}${w.factorizations === 1 ? '' : ' each'}${steps}`;
}

function comparisons(q: AdviceQuestion, fitting: readonly AdviceTrial[], best: AdviceTrial): string[] {
  const { workload, trials } = q;
  const out: string[] = [];
  const seconds = (t: AdviceTrial): number => workloadSeconds(t.cost, workload);
  const rivals = fitting.filter((t) => t !== best).sort((a, b) => seconds(a) - seconds(b));
  if (rivals.length > 0) {
    const times = seconds(rivals[0]) / seconds(best);
    out.push(
      times < 1.05
        ? `${rivals[0].name} is within 5 % of it: no difference by this model.`
        : `The next, ${rivals[0].name}, takes ${times.toPrecision(2)} times as long.`,
    );
  }
  const { remark, breakEvens } = compareWorkload(
    fitting.map((t) => t.cost),
    workload,
  );
  if (remark !== null) out.push(remark);
  const next = breakEvens
    .filter(
      (b) =>
        b.than === best.cost.name &&
        b.from > (b.by === 'factorizations' ? workload.factorizations : workload.rightHandSides),
    )
    .sort((a, b) => a.from - b.from);
  if (next.length > 0) out.push(next[0].sentence);
  const left = trials.length - fitting.length;
  if (left > 0) out.push(`${counted(left, 'trial')} would not fit the memory.`);
  return out;
}

function cautionsOf(best: AdviceTrial, target: Target): string[] {
  const out: string[] = [];
  if (!best.countsFit) out.push('Its count of entries passes 2³¹ − 1: the solver must hold 64-bit pointers.');
  if (best.pivoted) {
    out.push('Pivots are chosen by size: fill, memory and time can pass the forecast, and only a run shows it.');
    if (best.peak.delayed !== null && best.peak.delayed > target.memoryBytes) {
      out.push(
        `With a fifth of the pivots delayed it would need ${inUnit(best.peak.delayed)} (modelled) and would not fit.`,
      );
    }
  }
  if (best.valueDependent)
    out.push('Its figures rest on these values: others on the same pattern can give other ones.');
  out.push('Seconds are modelled from the rates of the target.');
  return out;
}

/** The changes that would help, each with the fastest trial that fits then; the first of them is the nearest. */
function nothingFits(q: AdviceQuestion, why: string): Advice {
  const { trials, target, workload } = q;
  const limit = target.memoryBytes;
  const seconds = (t: AdviceTrial): number => workloadSeconds(t.cost, workload);
  const fastest = (bytesOf: (t: AdviceTrial) => number | null): { name: string; bytes: number } | null => {
    let best: AdviceTrial | null = null;
    for (const t of trials) {
      const bytes = bytesOf(t);
      if (bytes !== null && bytes <= limit && (best === null || seconds(t) < seconds(best))) best = t;
    }
    return best === null ? null : { name: best.name, bytes: bytesOf(best) ?? 0 };
  };
  const smallest = trials.reduce((a, b) => (b.peak.bytes < a.peak.bytes ? b : a));
  const single = fastest((t) => t.peak.inSingle);
  const out = fastest((t) => t.peak.writtenOut);
  const changes = [
    single === null
      ? null
      : `in single precision, refined in double, ${single.name} would fit with ${inUnit(single.bytes)}`,
    out === null ? null : `with its factors written out as they are made, ${out.name} would need ${inUnit(out.bytes)}`,
    `${smallest.name} would fit a machine with ${inUnit(smallest.peak.bytes)}`,
  ].filter((c) => c !== null);
  return {
    sentence: `Nothing fits ${inUnit(limit)}: the smallest, ${smallest.name}, needs ${inUnit(smallest.peak.bytes)}; ${changes[0]}.`,
    best: null,
    reasons: [why, ...changes.map((c) => `${c[0].toUpperCase()}${c.slice(1)}.`)],
    cautions: [...q.doubts, ...cautionsOf(smallest, target)],
    change: changes[0],
  };
}
