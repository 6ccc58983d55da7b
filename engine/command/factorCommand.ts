import { plainSource } from '../../app/unpack/open.ts';
import { readRightHandSides } from '../exchange/readRightHandSides.ts';
import { Fault } from '../matrix/fault.ts';
import { type Proof, type ProofOptions, runProof } from '../trial/proof.ts';
import type { TrialResult } from '../trial/result.ts';
import { whyNoProof } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import { pathFile } from './fileSource.ts';
import { choiceOf, loadContext, matrixJson, matrixLine, orderingOf } from './load.ts';
import { jsonText, type Output, shortBytes, shortNumber, tableText } from './output.ts';
import type { Call } from './parse.ts';

/** `factor FILE`: 0 when done, 4 when the verdict is red. */
export async function factorCommand(call: Call, out: Output): Promise<number> {
  const { loaded, context } = await loadContext(call);
  const choice = choiceOf(call, context, orderingOf(call, 'minimum-degree'));
  const why = whyNoProof(context.facts, choice);
  if (why !== null) throw new Fault('input', 'proof-impossible', `${loaded.name}: ${why}`, { file: loaded.name });
  const rhs = call.text('rhs');
  const refine = call.number('refine');
  const limit = call.number('memory-limit');
  const options: ProofOptions = {
    ...(rhs === null
      ? {}
      : {
          rightHandSides: await readRightHandSides(
            await plainSource(await pathFile(rhs)),
            loaded.matrix.rows,
            () => {},
          ),
        }),
    ...(refine === null ? {} : { refine }),
    ...(limit === null ? {} : { memoryLimit: limit }),
  };
  const trial = runTrial(context, choice);
  const proof = runProof(context, trial, options);
  if (call.flag('json')) out.line(jsonText({ matrix: matrixJson(loaded), ...proofJson(trial, proof) }));
  else {
    out.line(matrixLine(loaded));
    out.line('');
    out.line(proofText(trial, proof));
  }
  return proof.card.verdict === 'red' ? 4 : 0;
}

/** The run as JSON. */
export function proofJson(trial: TrialResult, proof: Proof): Record<string, unknown> {
  const { card, report } = proof;
  const complex = card.determinantSign !== null && card.determinantSign[1] !== 0;
  return {
    ordering: trial.choice.ordering,
    factorization: trial.choice.factorization,
    factorEntries: report.factorEntries,
    operations: proof.operations,
    storedFactorEntries: report.storedFactorEntries,
    executedOperations: report.executedOperations,
    peakBytes: report.peakBytes,
    forecast: proof.forecast,
    seconds: proof.seconds,
    backwardError: card.backwardError,
    unrefinedBackwardError: card.unrefinedBackwardError,
    componentwiseBackwardError: card.componentwiseBackwardError,
    refinement: card.refinement,
    rightHandSides: card.rightHandSides,
    conditionEstimate: card.conditionEstimate,
    forwardErrorEstimate: card.forwardErrorEstimate,
    trustedDigits: card.trustedDigits,
    pivotGrowth: card.pivotGrowth,
    pivots: card.pivots,
    smallestPivot: card.smallestPivot,
    largestPivot: card.largestPivot,
    inertia: card.inertia,
    logAbsDeterminant: card.logAbsDeterminant,
    determinantSign: complex ? card.determinantSign : (card.determinantSign?.[0] ?? null),
    verdict: card.verdict,
    reasons: card.reasons,
    missing: card.missing,
    cautions: card.cautions,
    choice: trial.choice,
    valueDependent: trial.valueDependent,
    notes: [...trial.notes, ...report.notes],
  };
}

function proofText(trial: TrialResult, proof: Proof): string {
  const { card, report, forecast, seconds } = proof;
  const figure = (x: number | null): string => (x === null ? '–' : x.toExponential(2));
  const side = tableText([
    ['', 'forecast', 'measured'],
    ['factor entries', shortNumber(forecast.factorEntries), shortNumber(report.factorEntries)],
    ['operations', shortNumber(forecast.operations), shortNumber(proof.operations)],
    ['peak bytes', shortBytes(forecast.peakBytes), shortBytes(report.peakBytes)],
  ]);
  const lines = [
    `${trial.choice.factorization} in the ordering ${trial.choice.ordering}, pivoting ${trial.choice.pivoting}`,
    '',
    side,
    '',
    `seconds, measured: ordering ${seconds.ordering.toFixed(3)}, symbolic ${seconds.symbolic.toFixed(3)}, numeric ${seconds.numeric.toFixed(3)}, solve ${seconds.solve.toFixed(3)}`,
    `backward error: normwise ${figure(card.backwardError)} (${figure(card.unrefinedBackwardError)} before refinement), componentwise ${figure(card.componentwiseBackwardError)}`,
    `condition estimate (1-norm, from below): ${figure(card.conditionEstimate)}; pivot growth ${figure(card.pivotGrowth)}`,
    `pivots: ${card.pivots.offDiagonal} off the diagonal, ${card.pivots.delayed} delayed, ${card.pivots.twoByTwo} of order two, ${card.pivots.perturbed} perturbed`,
  ];
  if (card.inertia !== null) lines.push(`inertia (+, −, 0): ${card.inertia.join(', ')}`);
  lines.push(card.trustedDigits === null ? 'trusted digits: –' : `about ${card.trustedDigits} digits can be trusted`);
  lines.push('', `verdict: ${card.verdict}`);
  for (const reason of card.reasons) lines.push(`  ${reason}`);
  for (const caution of card.cautions) lines.push(`  ${caution}`);
  return lines.join('\n');
}
