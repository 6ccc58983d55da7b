import { plainSource } from '../../app/unpack/open.ts';
import type { Loaded } from '../exchange/loaded.ts';
import { readRightHandSides } from '../exchange/readRightHandSides.ts';
import { writeDense } from '../exchange/writeDense.ts';
import { Fault } from '../matrix/fault.ts';
import type { TrialContext } from '../trial/context.ts';
import { type Proof, type ProofOptions, runProof } from '../trial/proof.ts';
import type { TrialResult } from '../trial/result.ts';
import { proveSecond } from '../trial/reuse.ts';
import { whyNoProof } from '../trial/rules.ts';
import { runTrial } from '../trial/run.ts';
import { schurOfTrial } from '../trial/schurProof.ts';
import { sweepThresholds } from '../trial/sweep.ts';
import {
  proofJson,
  proofText,
  reuseJson,
  reuseText,
  schurJson,
  schurText,
  sweepJson,
  sweepText,
} from './factorText.ts';
import { pathFile } from './fileSource.ts';
import { choiceOf, loadContext, loadFile, matrixJson, matrixLine, orderingOf } from './load.ts';
import { jsonText, type Output } from './output.ts';
import type { Call } from './parse.ts';

/** `factor FILE`: 0 when done, 4 when the verdict is red. */
export async function factorCommand(call: Call, out: Output): Promise<number> {
  const { loaded, context } = await loadContext(call);
  const choice = choiceOf(call, context, orderingOf(call, 'minimum-degree'));
  const why = whyNoProof(context.facts, choice);
  if (why !== null) throw new Fault('input', 'proof-impossible', `${loaded.name}: ${why}`, { file: loaded.name });
  const options = await optionsOf(call, loaded);
  const trial = runTrial(context, choice);
  const say = (json: Record<string, unknown>, text: string): void => {
    if (call.flag('json')) out.line(jsonText({ matrix: matrixJson(loaded), ...json }));
    else out.line(`${matrixLine(loaded)}\n\n${text}`);
  };
  if (call.flag('sweep')) {
    const rows = sweepThresholds(context, trial, options);
    say(sweepJson(trial, rows), sweepText(trial, rows));
    return 0;
  }
  if (call.text('schur-out') !== null) return schur(call, context, trial, options, say, out);
  const second = call.text('second');
  if (second !== null) {
    const other = await loadFile(call, second);
    const reuse = proveSecond(context, trial, other.matrix, options);
    say(reuseJson(trial, reuse), reuseText(trial, reuse));
    return reuse.card.verdict === 'red' ? 4 : 0;
  }
  const proof = runProof(context, trial, options);
  await writeSolutions(call, loaded, proof, out);
  say(proofJson(trial, proof), proofText(trial, proof));
  return proof.card.verdict === 'red' ? 4 : 0;
}

async function optionsOf(call: Call, loaded: Loaded): Promise<ProofOptions> {
  const rhs = call.text('rhs');
  const refine = call.number('refine');
  const limit = call.number('memory-limit');
  const seed = call.number('seed');
  if (rhs === null && call.text('solution-out') !== null) {
    throw new Fault(
      'input',
      'no-right-hand-side',
      '--solution-out writes the solutions for the right-hand sides of --rhs, and none were given: add --rhs FILE.',
    );
  }
  const read = async (path: string) =>
    readRightHandSides(await plainSource(await pathFile(path)), loaded.matrix.rows, () => {});
  return {
    ...(rhs === null ? {} : { rightHandSides: await read(rhs) }),
    ...(refine === null ? {} : { refine }),
    ...(limit === null ? {} : { memoryLimit: limit }),
    ...(seed === null ? {} : { seed }),
    precision: call.text('precision') === 'single' ? 'single' : 'double',
    transposed: call.flag('transposed'),
  };
}

async function writeSolutions(call: Call, loaded: Loaded, { solutions, card }: Proof, out: Output): Promise<void> {
  const path = call.text('solution-out');
  if (path === null || solutions === null) return;
  const field = solutions.complex ? ('complex' as const) : ('real' as const);
  const comments = [
    `solutions x of ${call.flag('transposed') ? 'A^T' : 'A'} x = b for ${loaded.name}, in the original numbering`,
    `verdict ${card.verdict}, normwise backward error ${card.backwardError ?? 'not finite'}`,
  ];
  await out.file(
    path,
    writeDense({ rows: loaded.matrix.columns, columns: solutions.columns, field, values: solutions.values }, comments),
  );
}

async function schur(
  call: Call,
  context: TrialContext,
  trial: TrialResult,
  options: ProofOptions,
  say: (json: Record<string, unknown>, text: string) => void,
  out: Output,
): Promise<number> {
  const path = call.text('schur-out') as string;
  const failures = call.text('schur-failures') === 'perturb' ? 'perturb' : 'append';
  const run = schurOfTrial(context, trial, failures, options);
  const { complement } = run;
  const { size, complex, values, rows } = complement;
  const comments = [
    `Schur complement onto ${size} unknowns; row and column k belong to the original unknowns (1-based):`,
    Array.from(rows, (r) => r + 1).join(' '),
    ...run.notes,
  ];
  await out.file(
    path,
    writeDense({ rows: size, columns: size, field: complex ? 'complex' : 'real', values }, comments),
  );
  say(schurJson(trial, run, path), schurText(trial, run, path));
  return 0;
}
