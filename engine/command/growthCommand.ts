import { type FamilyMember, type FigureGrowth, type GrowthStudy, studyGrowth } from '../forecast/growthStudy.ts';
import { Fault } from '../matrix/fault.ts';
import { forecastTrial } from '../trial/forecast.ts';
import { runTrial } from '../trial/run.ts';
import { targetOf } from './forecastOptions.ts';
import { choiceOf, loadContextOf, matrixJson, orderingOf } from './load.ts';
import { jsonText, type Output, shortBytes, shortNumber, shortSeconds, tableText } from './output.ts';
import type { Call } from './parse.ts';

/** `growth FILE FILE …`: how one ordering of a family of matrices grows, and how large n can be. */
export async function growthCommand(call: Call, out: Output): Promise<number> {
  const target = targetOf(call);
  const members: FamilyMember[] = [];
  const matrices: Record<string, unknown>[] = [];
  let ordering = orderingOf(call, 'nested-dissection');
  let factorization = '';
  for (let k = 0; k < call.files.length; k++) {
    const { loaded, context } = await loadContextOf(call, k);
    const choice = choiceOf(call, context, ordering);
    if (factorization !== '' && choice.factorization !== factorization) {
      const text = `${loaded.name}: ${choice.factorization} is advised here and ${factorization} for the matrices before it: say one with --factorization.`;
      throw new Fault('input', 'growth-mixed', text, { file: loaded.name });
    }
    factorization = choice.factorization;
    ordering = choice.ordering;
    const trial = runTrial(context, choice);
    const forecast = forecastTrial(context, trial, target, Number.POSITIVE_INFINITY);
    const { factorEntries, operations } = trial.counts;
    if (forecast === null || factorEntries === null || operations === null) {
      const text = `${loaded.name}: its counts are not defined: ${trial.counts.reasons.factorEntries ?? 'not square'}.`;
      throw new Fault('input', 'growth-undefined', text, { file: loaded.name });
    }
    const time = forecast.time.factorization.value ?? 0;
    members.push({
      name: loaded.name,
      n: context.facts.columns,
      factorEntries,
      operations,
      memory: forecast.peak.bytes,
      time,
    });
    matrices.push(matrixJson(loaded));
  }
  if (new Set(members.map((m) => m.n)).size < 2) {
    throw new Fault('input', 'growth-sizes', 'A growth study needs matrices of at least two different sizes.');
  }
  if (members.some((m) => m.n === 0 || m.operations === 0)) {
    throw new Fault('input', 'growth-empty', 'A growth study needs matrices whose factorization costs something.');
  }
  const dimension = call.text('dimension');
  const study = studyGrowth(
    members,
    ordering === 'nested-dissection' || ordering === 'geometric-dissection',
    dimension === null ? null : dimension === '2' ? 2 : 3,
    { memory: target.memoryBytes, time: call.number('seconds') ?? 3600 },
  );
  if (call.flag('json')) out.line(jsonText({ matrices, ordering, factorization, target, ...study }));
  else out.line(growthText(study, `${factorization}, ${ordering}`));
  return 0;
}

const figureWords = {
  factorEntries: 'factor entries',
  operations: 'operations',
  memory: 'peak memory',
  time: 'factorization, 1 core',
} as const;

function growthText(study: GrowthStudy, what: string): string {
  const { members, growth, reach, notes } = study;
  const local = (g: FigureGrowth, k: number): string => (k === 0 ? '' : g.fit.exponents[k - 1].exponent.toFixed(3));
  const head = ['matrix', 'n', ...growth.flatMap((g) => [figureWords[g.figure], 'exponent'])];
  const rows = members.map((m, k) => [
    m.name,
    m.n.toLocaleString('en-US'),
    shortNumber(m.factorEntries),
    local(growth[0], k),
    shortNumber(m.operations),
    local(growth[1], k),
    shortBytes(m.memory),
    local(growth[2], k),
    shortSeconds(m.time),
    local(growth[3], k),
  ]);
  const lines = [
    `${what}: growth with n`,
    '',
    tableText([head, ...rows]),
    'entries and operations: exact; memory: exact for its layout; seconds: modelled.',
    '',
  ];
  for (const g of growth) {
    const left = g.leftOut === null ? '' : `; the largest size, left out, is predicted within ${percent(g.leftOut)}`;
    const falls = g.falling ? '; local exponents fall' : '';
    lines.push(`${figureWords[g.figure]} ≈ ${formula(g)}, worst distance ${percent(g.fit.worst)}${left}${falls}`);
  }
  lines.push('', ...reach.map((r) => r.sentence), ...notes);
  return lines.join('\n');
}

const percent = (x: number): string => `${(100 * x).toPrecision(2)} %`;

function formula({ fit }: FigureGrowth): string {
  const a = fit.a.toPrecision(3);
  if (fit.law === 'free exponent') return `${a} · n^${fit.b.toFixed(3)}`;
  return `${a} · ${fit.law} ${fit.b < 0 ? '−' : '+'} ${Math.abs(fit.b).toPrecision(3)} · n`;
}
