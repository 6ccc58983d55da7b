/**
 * `npm run bench -- column [KIND SIZE | FILE.mtx] [THRESHOLD]`: ordering and column LU on block triangular form, against a scripting
 * library's compiled sparse LU (SciPy) on the same matrix, one thread each, in one run. Default: circuit 100000, threshold 0.1.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { blockTriangularForm } from '../../../engine/graph/blockTriangular.ts';
import type { Pattern, SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { noProgress } from '../../../engine/matrix/progress.ts';
import { accuracyCard } from '../../../engine/numeric/accuracy/card.ts';
import { factorizeColumns } from '../../../engine/numeric/column/columnFactor.ts';
import { columnPlan } from '../../../engine/numeric/column/columnPlan.ts';
import { refactorizeColumns } from '../../../engine/numeric/column/refactorize.ts';
import { minimumDegree } from '../../../engine/ordering/minimumDegree.ts';
import { modelProblems } from '../../../engine/problems/model.ts';
import { parseMatrixMarket } from '../../support/reference.ts';

const reference = `
import json, sys, time, scipy.io, scipy.sparse.linalg as sl
a = scipy.io.mmread(sys.argv[1]).tocsc()
b = a @ __import__("numpy").ones(a.shape[0])
for name in ("COLAMD", "MMD_AT_PLUS_A"):
    best = 1e9
    for _ in range(2):
        t = time.perf_counter(); lu = sl.splu(a, permc_spec=name); best = min(best, time.perf_counter() - t)
    t = time.perf_counter(); x = lu.solve(b); s = time.perf_counter() - t
    print(json.dumps(dict(name=name, seconds=best, solve=s, entries=int(lu.L.nnz + lu.U.nnz - a.shape[0]))), flush=True)
`;

function text(a: SparseMatrix): string {
  const lines = ['%%MatrixMarket matrix coordinate real general', `${a.rows} ${a.columns} ${a.rowIndex.length}`];
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      lines.push(`${a.rowIndex[p] + 1} ${j + 1} ${a.values?.[p]}`);
    }
  }
  return `${lines.join('\n')}\n`;
}

/** The matrix and a file that holds it. */
function subject(): { matrix: SparseMatrix; file: string; threshold: number } {
  const [first = 'circuit', second = '100000', third] = process.argv.slice(2);
  if (first.endsWith('.mtx')) {
    return {
      matrix: parseMatrixMarket(readFileSync(first, 'latin1')),
      file: first,
      threshold: Number(process.argv[3] ?? 0.1),
    };
  }
  const matrix = modelProblems[first](Number(second));
  const folder = join(tmpdir(), 'problems');
  const file = join(folder, `${first}-${second}.mtx`);
  if (!existsSync(file)) {
    mkdirSync(folder, { recursive: true });
    writeFileSync(file, text(matrix));
  }
  return { matrix, file, threshold: Number(third ?? 0.1) };
}

const clock = () => performance.now() / 1000;
const show = (x: number) => x.toFixed(3).padStart(8);

const { matrix, file, threshold } = subject();
console.log(`${file}: ${matrix.columns} unknowns, ${matrix.rowIndex.length} entries, threshold ${threshold}`);
const order = (block: Pattern) => minimumDegree(block, {}, noProgress).order;
let best = Infinity;
for (let run = 1; run <= 4; run++) {
  const t0 = clock();
  const form = blockTriangularForm(matrix);
  const t1 = clock();
  const plan = columnPlan(matrix, order, form);
  const t2 = clock();
  const factor = factorizeColumns(matrix, plan.columnOrder, { ...plan, threshold });
  const t3 = clock();
  const x = new Float64Array(matrix.columns).fill(1);
  factor.solveInPlace(x, 1);
  const t4 = clock();
  best = Math.min(best, t3 - t0);
  console.log(
    `run ${run}: blocks ${show(t1 - t0)} s, ordering ${show(t2 - t1)} s, numeric ${show(t3 - t2)} s, all ${show(t3 - t0)} s; solve ${show(t4 - t3)} s`,
  );
  if (run < 4) continue;
  const { report } = factor;
  const blocks = plan.blockStart.length - 1;
  console.log(
    `${blocks} blocks, factor entries ${report.factorEntries}, above the blocks ${factor.offDiagonalBlockEntries}, ` +
      `operations ${report.executedOperations}, off-diagonal pivots ${report.counts.offDiagonal}, growth ${report.pivotGrowth}, peak ${report.peakBytes} bytes`,
  );
  const t5 = clock();
  refactorizeColumns(factor, matrix, matrix);
  const t6 = clock();
  const card = accuracyCard(matrix, factor);
  const t7 = clock();
  console.log(
    `refactorization ${show(t6 - t5)} s; accuracy card ${show(t7 - t6)} s: ${card.verdict}, ${card.reasons[0]}`,
  );
}
const python = existsSync('/usr/bin/python3') ? '/usr/bin/python3' : 'python3';
const one = { ...process.env, OPENBLAS_NUM_THREADS: '1' };
const ran = spawnSync(python, ['-c', reference, file], { encoding: 'utf8', env: one });
if (ran.status !== 0) {
  console.log('no reference: python3 with SciPy is not here or failed');
} else {
  for (const line of ran.stdout.trim().split('\n')) {
    const r = JSON.parse(line);
    console.log(
      `reference ${r.name}: ${show(r.seconds)} s, entries ${r.entries}, solve ${show(r.solve)} s; ours takes ${(best / r.seconds).toFixed(2)} of it`,
    );
  }
}
