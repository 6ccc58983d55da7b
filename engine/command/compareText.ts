import type { Advice } from '../forecast/advice.ts';
import { trialCost } from '../forecast/cost.ts';
import type { Figure } from '../forecast/figure.ts';
import type { Storage } from '../forecast/storage.ts';
import type { Target, Workload } from '../forecast/target.ts';
import { type BreakEven, workloadSeconds } from '../forecast/workload.ts';
import { countKindOf } from '../trial/forecast.ts';
import { shortBytes, shortNumber, shortSeconds, tableText } from './output.ts';
import type { ComparedTrial } from './trialJson.ts';

/** The comparison as text: counts, memory, time, parallelism, break-evens, advice; each table says how its numbers are known. */
export function compareText(
  trials: readonly ComparedTrial[],
  target: Target,
  workload: Workload,
  breakEvens: readonly BreakEven[],
  advice: Advice,
): string {
  const out: string[] = [...countsTable(trials)];
  const seen = trials.filter((t) => t.forecast !== null);
  if (seen.length > 0) {
    out.push('', ...memoryTable(seen, target), '', ...timeTable(seen, target, workload));
    if (seen.some((t) => t.forecast?.parallel !== null)) out.push('', ...parallelTable(seen, advice.best));
    if (seen.some((t) => t.forecast?.delayed !== null)) out.push('', ...delayedTable(seen));
  }
  if (trials.some((t) => t.result.heldBlock !== null)) out.push('');
  for (const t of trials) {
    const { heldBlock } = t.result;
    if (heldBlock === null) continue;
    out.push(
      `${t.name}: the Schur complement of the ${heldBlock.unknowns} unknowns held last has ${shortNumber(heldBlock.entries)} entries in its factors (dense ${shortNumber(heldBlock.denseEntries)}, ${shortBytes(heldBlock.denseBytes)}); forming it takes ${shortNumber(heldBlock.operationsBefore)} operations, factorizing it ${shortNumber(heldBlock.operationsOfBlock)} (dense ${shortNumber(heldBlock.denseOperations)}).`,
    );
  }
  for (const t of trials) for (const note of t.result.notes) out.push(`${t.name}: ${note}`);
  for (const t of trials)
    for (const [key, why] of Object.entries(t.result.counts.reasons)) out.push(`${t.name}, ${key}: ${why}`);
  const paying = breakEvens
    .filter((b) => b.better === advice.best || b.than === advice.best)
    .slice(0, 8)
    .map((b) => b.sentence);
  if (paying.length > 0) out.push('', 'Break-evens (modelled)', ...paying.map((s) => `  ${s}`));
  out.push(
    '',
    advice.sentence,
    ...advice.reasons.map((r) => `  ${r}`),
    ...advice.cautions.map((c) => `  Caution: ${c}`),
  );
  return out.join('\n');
}

function countsTable(trials: readonly ComparedTrial[]): string[] {
  const ranged = trials.some((t) => t.result.counts.range !== null && t.result.choice.pivoting === 'threshold');
  const spread = trials.some((t) => t.spread !== null);
  const head = ['ordering', 'factor entries'];
  if (ranged) head.push('proven range');
  head.push('operations', 'factor bytes', 'tree height', 'largest front', 'bandwidth', 'seconds');
  if (spread) head.push('operations over the spread', '');
  const rows = trials.map(({ name, result, spread: s }) => {
    const c = result.counts;
    const row = [name, shortNumber(c.factorEntries)];
    if (ranged) {
      row.push(
        c.range === null ? '–' : `${shortNumber(c.range.factorEntries[0])} … ${shortNumber(c.range.factorEntries[1])}`,
      );
    }
    row.push(
      shortNumber(c.operations),
      shortBytes(c.factorBytes),
      shortNumber(c.treeHeight),
      shortNumber(c.largestFront),
      shortNumber(c.bandwidth),
      (result.seconds.ordering + result.seconds.symbolic).toFixed(2),
    );
    if (spread) {
      const o = s?.operations ?? null;
      row.push(o === null ? '–' : `${shortNumber(o.least)} … ${shortNumber(o.median)} … ${shortNumber(o.most)}`);
      row.push(s?.noDifference.operations ? 'no difference' : '');
    }
    return row;
  });
  const kinds = [...new Set(trials.map((t) => countKindOf(t.result)))];
  const how = trials.some((t) => t.result.counts.expected !== null && t.result.choice.pivoting === 'threshold')
    ? `entries, operations and bytes: ${kinds.join(', ')}, expected values until pivoting moves them; the range is a bound`
    : `entries, operations and bytes: ${kinds.join(', ')}`;
  return [tableText([head, ...rows]), `${how}; seconds: measured here, ordering and analysis.`];
}

const layouts: readonly (readonly [keyof Storage, string])[] = [
  ['multifrontal', 'fronts with their stack'],
  ['stack', 'stack alone'],
  ['panels', 'supernodal panels'],
  ['compressedColumns', 'compressed columns'],
  ['envelope', 'envelope (skyline)'],
  ['outOfCore', 'factors written out: least'],
  ['traffic', 'traffic when written out'],
  ['dense', 'dense matrix'],
  ['overwriting', 'saved by overwriting A'],
];

function memoryTable(trials: readonly ComparedTrial[], target: Target): string[] {
  const cell = (f: Figure | undefined): string => (f === undefined ? '–' : shortBytes(f.value));
  const rows = layouts.map(([key, word]) => [word, ...trials.map((t) => cell(t.forecast?.storage[key]))]);
  const limit = (k: number, yes: string, no: string): string[] =>
    trials.map((t) => (t.forecast?.limits[k].passed ? yes : no));
  rows.push(['counts exceed 2³¹ − 1', ...limit(0, 'no', 'YES')]);
  rows.push([`fits ${shortBytes(target.memoryBytes)}`, ...limit(1, 'yes', 'NO')]);
  rows.push(['the page can run it', ...limit(2, 'yes', 'NO')]);
  const kinds = [...new Set(trials.map((t) => t.forecast?.storage.compressedColumns.kind))].join(', ');
  const widths = `${target.scalarBytes * 8}-bit scalars, ${target.indexBytes * 8}-bit indices`;
  return [
    tableText([['memory by layout', ...trials.map((t) => t.name)], ...rows]),
    `bytes: ${kinds} for ${widths}, 64-bit pointers; traffic modelled, written out a bound.`,
  ];
}

function timeTable(trials: readonly ComparedTrial[], target: Target, workload: Workload): string[] {
  const rows = trials.map((t) => {
    const { forecast, result } = t;
    if (forecast === null) return [t.name];
    const { ordering, symbolic } = result.seconds;
    const cost = trialCost(forecast, target.cores, ordering + symbolic, result.counts.factorEntries ?? 0, t.name);
    return [
      t.name,
      shortSeconds(cost.analysis),
      shortSeconds(forecast.time.factorization.value),
      shortSeconds(cost.factorization),
      shortSeconds(cost.solve),
      shortSeconds(cost.refinementStep),
      shortSeconds(workloadSeconds(cost, workload)),
    ];
  });
  const head = [
    'time',
    'analysis',
    'factorization, 1 core',
    `on ${target.cores}`,
    'solve',
    'refinement step',
    'workload',
  ];
  return [
    tableText([head, ...rows]),
    `analysis measured here, all else modelled; workload: ${workload.factorizations} × (factorization + ${workload.rightHandSides} × (solve + ${workload.refinementSteps} × refinement step)).`,
  ];
}

function parallelTable(trials: readonly ComparedTrial[], best: string | null): string[] {
  const rows = trials.flatMap((t) => {
    const p = t.forecast?.parallel ?? null;
    return p === null ? [] : [{ name: t.name, p }];
  });
  const counts = rows[0].p.rows.map((r) => r.workers);
  const speedups = rows.map(({ name, p }) => [
    name,
    ...p.rows.map((r) => Math.max(r.speedup, r.splitSpeedup).toPrecision(3)),
    p.sequentialFrontsSpeedup.toPrecision(3),
    p.divisibleFrontsSpeedup.toPrecision(3),
    `${Math.round(100 * (p.largestFronts[0]?.share ?? 0))} %`,
  ]);
  const head = [
    'speed-up with workers',
    ...counts.map(String),
    'bound, fronts whole',
    'fronts divisible',
    'in the largest front',
  ];
  const out = [
    tableText([head, ...speedups]),
    'list schedules, the better of fronts whole and large fronts divided: modelled, communication ignored; bounds: work over critical path.',
  ];
  const shown = rows.find((r) => r.name === best);
  if (shown === undefined) return out;
  const percent = (x: number): string => `${Math.round(100 * x)} %`;
  const detail = shown.p.rows.map((r) => [
    String(r.workers),
    r.bound.toPrecision(3),
    r.speedup.toPrecision(3),
    percent(r.idle),
    r.splitBound.toPrecision(3),
    r.splitSpeedup.toPrecision(3),
    percent(r.splitIdle),
    shortNumber(Math.round(r.memoryPerWorker)),
  ]);
  const columns = ['workers', 'bound', 'fronts whole', 'idle', 'bound', 'divided', 'idle', 'scalars a worker, peak'];
  return [...out, '', shown.name, tableText([columns, ...detail])];
}

function delayedTable(trials: readonly ComparedTrial[]): string[] {
  const with_ = trials.filter((t) => t.forecast?.delayed != null);
  const shares = with_[0].forecast?.delayed?.map((d) => d.share) ?? [];
  const rows = shares.map((share, k) => [
    `${100 * share} %`,
    ...with_.map((t) => {
      const d = t.forecast?.delayed?.[k];
      return d === undefined
        ? '–'
        : `${shortNumber(d.storedFactorEntries)}, ${shortNumber(d.operations)}, ${shortBytes(d.bytes)}`;
    }),
  ]);
  return [
    tableText([['pivots delayed', ...with_.map((t) => t.name)], ...rows]),
    'entries stored with padding, operations, bytes of the panels; modelled.',
  ];
}
