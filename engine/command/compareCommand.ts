import { Fault } from '../matrix/fault.ts';
import type { OrderingName } from '../trial/choice.ts';
import type { TrialResult } from '../trial/result.ts';
import { advisedFactorization, isSymmetric, suitableOrderings, whyNoForecast } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import { choiceOf, loadContext, matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output, shortBytes, shortNumber, tableText } from './output.ts';
import type { Call } from './parse.ts';

/** `compare FILE`: one trial for each ordering, forecast only. */
export async function compareCommand(call: Call, out: Output): Promise<number> {
  const { loaded, context } = await loadContext(call);
  const base = choiceOf(call, context, 'natural');
  const wanted = call.list('orderings') as readonly OrderingName[] | null;
  const names = wanted ?? suitableOrderings(context.facts, base.factorization);
  const choices = names.map((ordering) => choiceOf(call, context, ordering));
  for (const choice of choices) {
    const why = whyNoForecast(context.facts, choice);
    if (why !== null) throw new Fault('input', 'trial-impossible', `${loaded.name}: ${why}`, { file: loaded.name });
  }
  const notes = loaded.notes.map((note) => note.text);
  const advice = advisedFactorization(context.facts);
  if (call.text('factorization') === null) notes.push(`Advised: ${advice.factorization}, because ${advice.reason}.`);
  else if (base.factorization !== 'lu' && base.factorization !== 'column-lu' && !isSymmetric(context.facts)) {
    notes.push(`The matrix is not symmetric: ${base.factorization} is forecast on the pattern of A + Aᵀ.`);
  }
  const trials = choices.map((choice) => runTrial(context, choice));
  if (call.flag('json')) out.line(jsonText({ matrix: matrixJson(loaded), trials: trials.map(trialJson), notes }));
  else {
    out.line(matrixLine(loaded));
    for (const note of notes) out.line(`  ${note}`);
    out.line('');
    out.line(tableText([heading, ...trials.map(trialRow)]));
    out.line('');
    out.line(kinds(trials));
  }
  return 0;
}

/** A trial as JSON, named as in the house's definitions. */
export function trialJson(trial: TrialResult): Record<string, unknown> {
  const c = trial.counts;
  return {
    ordering: trial.choice.ordering,
    factorization: trial.choice.factorization,
    factorEntries: c.factorEntries,
    lowerEntries: c.lowerEntries,
    upperEntries: c.upperEntries,
    offDiagonalBlockEntries: c.offDiagonalBlockEntries,
    ...(c.expected === null ? {} : { expected: c.expected }),
    ...(c.range === null ? {} : { range: c.range }),
    operations: c.operations,
    treeHeight: c.treeHeight,
    largestFront: c.largestFront,
    factorBytes: c.factorBytes,
    bandwidth: c.bandwidth,
    envelope: c.envelope,
    valueDependent: trial.valueDependent,
    choice: trial.choice,
    notes: trial.notes,
    ...(Object.keys(c.reasons).length === 0 ? {} : { reasons: c.reasons }),
    seconds: trial.seconds,
  };
}

const heading = [
  'ordering',
  'factor entries',
  'range',
  'operations',
  'factor bytes',
  'tree height',
  'largest front',
  'bandwidth',
  'seconds',
];

function trialRow(trial: TrialResult): string[] {
  const c = trial.counts;
  return [
    trial.choice.ordering,
    shortNumber(c.factorEntries),
    c.range === null ? '' : `${shortNumber(c.range.factorEntries[0])} … ${shortNumber(c.range.factorEntries[1])}`,
    shortNumber(c.operations),
    shortBytes(c.factorBytes),
    shortNumber(c.treeHeight),
    shortNumber(c.largestFront),
    shortNumber(c.bandwidth),
    (trial.seconds.ordering + trial.seconds.symbolic).toFixed(2),
  ];
}

function kinds(trials: readonly TrialResult[]): string {
  const ranged = trials.some((t) => t.counts.range !== null);
  const first = `${trials[0]?.choice.factorization ?? ''}: entries, operations and bytes are ${ranged ? 'expected values, the range is a bound' : 'exact'}; seconds are measured here.`;
  return `${first} A forecast is no guarantee under numerical pivoting.`;
}
