/**
 * `npm run bench -- symbolic [KIND SIZE]` (default grid2d5 1000), one thread each:
 *
 *   - tree, postorder and column counts against a compiled count of row subtrees on the same permutations, timed in this run;
 *   - everything that a trial's forecast takes after its ordering (structure, counts, supernodes, storage, time, parallel schedules), for each
 *     ordering and for a random renumbering, with the memory that the process took in all.
 *
 * The compiled reference is the program that the environment variable FILLCAST_NATIVE names (it takes KIND SIZE --orders PREFIX).
 */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { defaultTarget } from '../../../engine/forecast/target.ts';
import { type Graph, graphOf } from '../../../engine/graph/graph.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { asNewToOld, type NewToOld, positionOf } from '../../../engine/matrix/permutation.ts';
import { permute } from '../../../engine/matrix/permute.ts';
import { relabellingOf } from '../../../engine/ordering/bestOf.ts';
import { modelProblems } from '../../../engine/problems/model.ts';
import { columnCounts } from '../../../engine/symbolic/columnCounts.ts';
import { eliminationTree } from '../../../engine/symbolic/eliminationTree.ts';
import { postorder } from '../../../engine/symbolic/postorder.ts';
import type { FactorizationName, OrderingName } from '../../../engine/trial/choice.ts';
import { plainInput, TrialContext } from '../../../engine/trial/context.ts';
import { forecastTrial } from '../../../engine/trial/forecast.ts';
import { defaultChoice } from '../../../engine/trial/rules.ts';
import { runTrial } from '../../../engine/trial/run.ts';

const clock = () => performance.now() / 1000;
const show = (x: number) => x.toFixed(3).padStart(8);

/** Seconds of tree, postorder and counts, least of `runs`, and Σ of the counts. */
function count(graph: Graph, order: NewToOld, runs: number): { first: number; best: number; entries: number } {
  let best = Number.POSITIVE_INFINITY;
  let first = 0;
  let entries = 0;
  for (let run = 0; run < runs; run++) {
    const t = clock();
    const position = positionOf(order);
    const parent = eliminationTree(graph, order, position);
    const counts = columnCounts(graph, order, parent, postorder(parent));
    const s = clock() - t;
    if (run === 0) first = s;
    best = Math.min(best, s);
    entries = counts.reduce((a, b) => a + b, 0);
  }
  return { first, best, entries };
}

function against(kind: string, size: number, graph: Graph): void {
  const native = process.env.FILLCAST_NATIVE;
  if (native === undefined) {
    console.log('no compiled reference: FILLCAST_NATIVE names none');
    return;
  }
  const prefix = join(mkdtempSync(join(tmpdir(), 'bench-')), 'order');
  const ran = spawnSync(native, [kind, String(size), '--orders', prefix], { encoding: 'utf8' });
  for (const line of ran.stdout.trim().split('\n')) {
    const r = JSON.parse(line);
    if (r.figure !== 'ordering') continue;
    const text = readFileSync(`${prefix}-${r.ordering}.txt`, 'utf8').trim();
    const order = asNewToOld(Int32Array.from(text.split('\n'), Number));
    const own = count(graph, order, 5);
    if (own.entries !== r.factorEntries) throw new Error(`counts differ: ${own.entries}, compiled ${r.factorEntries}`);
    console.log(
      `counts in the compiled ${r.ordering}: ${own.entries} entries, ${show(own.best)} s (first ${show(own.first)}), compiled ${show(r.countSeconds)} s, ratio ${(own.best / r.countSeconds).toFixed(2)}`,
    );
  }
}

const [kind = 'grid2d5', sizeText = '1000'] = process.argv.slice(2);
const size = Number(sizeText);
const given = modelProblems[kind](size);
console.log(`${kind} ${size}: ${given.columns} rows, ${given.rowIndex.length} entries`);
against(kind, size, graphOf(given));

const orderings: OrderingName[] = [
  'natural',
  'reverse-cuthill-mckee',
  'sloan',
  'minimum-degree',
  'minimum-fill',
  'nested-dissection',
];
const label = relabellingOf(given.columns, 1);
const relabelled = permute(given, label, label);
const plans: readonly (readonly [string, SparseMatrix, FactorizationName, readonly OrderingName[]])[] = [
  ['as given', given, 'cholesky', orderings],
  ['as given', given, 'lu', ['natural', 'minimum-degree', 'nested-dissection']],
  ['as given', given, 'column-lu', ['natural', 'minimum-degree', 'column-minimum-degree']],
  ['relabelled', relabelled, 'cholesky', ['natural', 'minimum-degree']],
];
for (const [name, matrix, factorization, wanted] of plans) {
  const context = new TrialContext(plainInput(matrix));
  context.graph();
  for (const ordering of wanted) {
    const trial = runTrial(context, defaultChoice(factorization, ordering));
    const t = clock();
    forecastTrial(context, trial, defaultTarget, 2 ** 32);
    const after = trial.seconds.symbolic + clock() - t;
    const entries = trial.counts.factorEntries ?? 0;
    console.log(
      `${`${name}, ${factorization}, ${ordering}`.padEnd(44)} ordering ${show(trial.seconds.ordering)} s, counts ${show(trial.seconds.symbolic)} s, all after ordering ${show(after)} s; factor entries ${entries.toExponential(2)}; peak of the process ${(process.resourceUsage().maxRSS / 2 ** 20).toFixed(2)} GiB`,
    );
  }
}
