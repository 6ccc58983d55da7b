/**
 * `npm run bench -- numeric [WHAT] [KIND SIZE]`, one thread each, references measured in the same run:
 *
 *   dense                 rates of the dense kernels alone, by size of front
 *   cholesky grid3d7 40   fronts against a compiled library's simplicial LLᵀ on the same permutation, and the rate against the dense kernel
 *   lu convdiff3d 30      fronts against SciPy's sparse LU: its default, and its supernodal one with diagonal pivots in the same order
 *   complex grid3d7 30    complex against real on the same pattern
 *
 * The compiled reference is the program that the environment variable FILLCAST_NATIVE names (it takes KIND SIZE --numeric --orders PREFIX).
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { graphOf } from '../../../engine/graph/graph.ts';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../../engine/matrix/permutation.ts';
import { noProgress } from '../../../engine/matrix/progress.ts';
import { type FrontFactor, factorizeFronts } from '../../../engine/numeric/fronts/frontFactor.ts';
import type { FrontOptions } from '../../../engine/numeric/fronts/options.ts';
import { nestedDissection } from '../../../engine/ordering/nestedDissection.ts';
import { modelProblems } from '../../../engine/problems/model.ts';
import { analyseGraph } from '../../../engine/symbolic/analyse.ts';
import { assemblyTree } from '../../../engine/symbolic/assemblyTree.ts';
import { frontRows } from '../../../engine/symbolic/frontRows.ts';
import { denseRate, denseTable } from './dense.ts';

const clock = () => performance.now() / 1000;
const folder = mkdtempSync(join(tmpdir(), 'bench-'));

interface Timed {
  readonly seconds: number;
  readonly first: number;
  readonly factor: FrontFactor;
}

/** Analyses once, factorizes `runs` times; the best and the first (not yet compiled) time. */
function time(a: SparseMatrix, order: NewToOld, options: FrontOptions, runs: number): Timed {
  const graph = graphOf(a);
  const t0 = clock();
  const tree = assemblyTree(analyseGraph(graph, order, { postorder: true }));
  const rows = frontRows(tree, graph);
  const t1 = clock();
  let best = Infinity;
  let first = 0;
  let factor: FrontFactor | null = null;
  for (let run = 0; run < runs; run++) {
    const t = clock();
    factor = factorizeFronts(a, tree, rows, options);
    const s = clock() - t;
    if (run === 0) first = s;
    best = Math.min(best, s);
  }
  if (factor === null) throw new Error('no run');
  const x = new Float64Array(a.rows * (factor.complex ? 2 : 1)).fill(1);
  const t2 = clock();
  factor.solveInPlace(x, 1);
  const t3 = clock();
  const r = factor.report;
  console.log(
    `${options.kind}${factor.complex ? ' complex' : ''}: ${tree.count} fronts, numeric ${best.toFixed(3)} s (first ${first.toFixed(3)}), ` +
      `${(r.executedOperations / best / 1e9).toFixed(2)} GFLOP/s over ${r.executedOperations.toExponential(3)} operations; ` +
      `symbolic ${(t1 - t0).toFixed(3)} s, solve ${(t3 - t2).toFixed(3)} s; peak ${(r.peakBytes / 2 ** 20).toFixed(0)} MiB, delayed ${r.counts.delayed}`,
  );
  return { seconds: best, first, factor };
}

function ours(a: SparseMatrix): { order: NewToOld; seconds: number } {
  const t = clock();
  const { order } = nestedDissection(a, {}, noProgress);
  return { order, seconds: clock() - t };
}

function text(a: SparseMatrix): string {
  const lines = ['%%MatrixMarket matrix coordinate real general', `${a.rows} ${a.columns} ${a.rowIndex.length}`];
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      lines.push(`${a.rowIndex[p] + 1} ${j + 1} ${a.values?.[p]}`);
    }
  }
  return `${lines.join('\n')}\n`;
}

function cholesky(kind: string, size: number): void {
  const a = modelProblems[kind](size);
  const own = ours(a);
  console.log(`our nested dissection: ${own.seconds.toFixed(2)} s`);
  const runs = a.rows > 50000 && kind.includes('3d') ? 2 : 5;
  const t = time(a, own.order, { kind: 'cholesky', pivoting: 'none' }, runs);
  const kernel = denseRate();
  const rate = t.factor.report.executedOperations / t.seconds;
  console.log(
    `dense kernel alone now: ${(kernel / 1e9).toFixed(2)} GFLOP/s; whole numeric phase at ${((100 * rate) / kernel).toFixed(0)} % of it`,
  );
  const native = process.env.FILLCAST_NATIVE;
  if (native === undefined) {
    console.log('no compiled reference: FILLCAST_NATIVE names none');
    return;
  }
  const ran = spawnSync(native, [kind, String(size), '--numeric', '--orders', join(folder, 'order')], {
    encoding: 'utf8',
  });
  const line = ran.stdout.split('\n').find((l) => l.includes('"nested-dissection"'));
  if (line === undefined) throw new Error('the compiled reference said nothing');
  const reference = JSON.parse(line);
  const order = readOrder(join(folder, 'order-nested-dissection.txt'));
  console.log('on the permutation of the compiled reference:');
  const same = time(a, order, { kind: 'cholesky', pivoting: 'none' }, runs);
  console.log(
    `compiled simplicial LLᵀ on it: ${reference.choleskySeconds.toFixed(3)} s; ours is ${(reference.choleskySeconds / same.seconds).toFixed(2)} × as fast`,
  );
}

function readOrder(path: string): NewToOld {
  return asNewToOld(Int32Array.from(readFileSync(path, 'latin1').trim().split('\n'), Number));
}

const scripted = `
import json, sys, time, numpy as np, scipy.io, scipy.sparse.linalg as sl
a = scipy.io.mmread(sys.argv[1]).tocsc(); p = np.loadtxt(sys.argv[2], dtype=int); ap = a[p][:, p].tocsc()
best = 1e9
for _ in range(2):
    t = time.perf_counter(); lu = sl.splu(ap, permc_spec="NATURAL", diag_pivot_thresh=0, options=dict(SymmetricMode=True)); best = min(best, time.perf_counter() - t)
t = time.perf_counter(); default = sl.splu(a); d = time.perf_counter() - t
print(json.dumps(dict(given=best, default=d, entries=int(lu.L.nnz + lu.U.nnz - a.shape[0]), defaultEntries=int(default.L.nnz + default.U.nnz - a.shape[0]))))
`;

function lu(kind: string, size: number): void {
  const a = modelProblems[kind](size);
  const own = ours(a);
  console.log(`our nested dissection: ${own.seconds.toFixed(2)} s`);
  const t = time(a, own.order, { kind: 'lu', pivoting: 'threshold' }, 3);
  const none = time(a, own.order, { kind: 'lu', pivoting: 'none' }, 3);
  writeFileSync(join(folder, 'a.mtx'), text(a));
  writeFileSync(join(folder, 'order.txt'), Array.from(own.order).join('\n'));
  const python = existsSync('/usr/bin/python3') ? '/usr/bin/python3' : 'python3';
  const env = { ...process.env, OPENBLAS_NUM_THREADS: '1' };
  const ran = spawnSync(python, ['-c', scripted, join(folder, 'a.mtx'), join(folder, 'order.txt')], {
    encoding: 'utf8',
    env,
  });
  if (ran.status !== 0) {
    console.log('no reference: python3 with SciPy is not here or failed');
    return;
  }
  const r = JSON.parse(ran.stdout);
  console.log(
    `SciPy default ${r.default.toFixed(2)} s: ours (ordering and numeric) is ${(r.default / (own.seconds + t.first)).toFixed(2)} × as fast; ` +
      `its supernodal LU in the same order ${r.given.toFixed(2)} s: ours takes ${(Math.min(t.seconds, none.seconds) / r.given).toFixed(2)} of it`,
  );
}

function complex(kind: string, size: number): void {
  const a = modelProblems[kind](size);
  const values = new Float64Array(2 * a.rowIndex.length);
  for (let p = 0; p < a.rowIndex.length; p++) values[2 * p] = a.values?.[p] ?? 0;
  const c: SparseMatrix = { ...a, field: 'complex', values };
  const { order } = ours(a);
  for (const options of [
    { kind: 'cholesky', pivoting: 'none' },
    { kind: 'ldlt', pivoting: 'threshold' },
    { kind: 'lu', pivoting: 'threshold' },
  ] as const) {
    const real = time(a, order, options, 3).seconds;
    const wide = time(c, order, options, 3).seconds;
    console.log(`complex takes ${(wide / real).toFixed(2)} of real`);
  }
}

const [what = 'dense', kind, size] = process.argv.slice(2);
if (what === 'dense') denseTable();
else if (what === 'cholesky') cholesky(kind ?? 'grid3d7', Number(size ?? 40));
else if (what === 'lu') lu(kind ?? 'convdiff3d', Number(size ?? 30));
else if (what === 'complex') complex(kind ?? 'grid3d7', Number(size ?? 30));
else console.error('Which? dense, cholesky, lu, complex');
