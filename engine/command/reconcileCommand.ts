import { type Explanation, explainedWithin, type OwnCounts, reconcile } from '../forecast/reconcile.ts';
import { Fault } from '../matrix/fault.ts';
import type { OrderingName } from '../trial/choice.ts';
import { ownCountsOf } from '../trial/ownCounts.ts';
import { suitableOrderings, whyNoForecast } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import { targetOf } from './forecastOptions.ts';
import { choiceOf, loadContext, matrixJson, matrixLine } from './load.ts';
import { jsonText, type Output, tableText } from './output.ts';
import type { Call } from './parse.ts';

/** `reconcile FILE --entries N --operations N --memory N`: which ordering and convention explain what another solver reported. */
export async function reconcileCommand(call: Call, out: Output): Promise<number> {
  const reported = [
    ['entries', call.number('entries')],
    ['operations', call.number('operations')],
    ['bytes', call.number('memory')],
  ] as const;
  if (reported.every(([, value]) => value === null)) {
    throw new Fault(
      'input',
      'usage',
      '"reconcile" needs a reported figure: --entries N, --operations N or --memory BYTES.',
    );
  }
  const { loaded, context } = await loadContext(call);
  const base = choiceOf(call, context, 'natural');
  const wanted = call.list('orderings') as readonly OrderingName[] | null;
  const names = wanted ?? suitableOrderings(context.facts, base.factorization);
  const own: OwnCounts[] = [];
  for (const ordering of names) {
    const choice = { ...base, ordering };
    const why = whyNoForecast(context.facts, choice);
    if (why !== null) throw new Fault('input', 'trial-impossible', `${loaded.name}: ${why}`, { file: loaded.name });
    own.push(ownCountsOf(context, runTrial(context, choice), targetOf(call)));
  }
  const answers = reported.flatMap(([what, value]) =>
    value === null ? [] : [{ what, reported: value, explanations: reconcile(what, value, own) }],
  );
  if (call.flag('json')) {
    out.line(
      jsonText({ matrix: matrixJson(loaded), factorization: base.factorization, within: explainedWithin, answers }),
    );
    return 0;
  }
  out.line(matrixLine(loaded));
  for (const { what, reported: value, explanations } of answers) {
    out.line('');
    out.line(answerText(what, value, explanations));
  }
  return 0;
}

function answerText(what: string, reported: number, explanations: readonly Explanation[]): string {
  const said = `${what} reported: ${reported.toLocaleString('en-US')}`;
  if (explanations.length === 0) {
    return `${said}\nNo convention of counting and none of the orderings compared explains it within ${100 * explainedWithin} %: another ordering, another matrix, or pivoting that moved entries.`;
  }
  const rows = explanations
    .slice(0, 12)
    .map((e) => [e.convention, e.name, Math.round(e.value).toLocaleString('en-US'), distance(e.distance)]);
  return `${said}\n${tableText([['convention', 'ordering', 'ours', 'distance'], ...rows])}`;
}

function distance(x: number): string {
  return x === 0 ? 'exact' : `${(100 * x).toPrecision(2)} %`;
}
