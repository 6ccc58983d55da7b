/**
 * `npm run bench -- ordering [--relabellings N] [--only NAME,NAME]`: quality and time of the orderings on the model problems of the reference
 * set and on all open matrices of at least 300 rows, each the median over seeded relabellings (5), against compiled general-purpose
 * libraries on the same relabelled files in the same run.
 *
 * FILLCAST_NATIVE names the compiled program (FILE.mtx --orders PREFIX --lu), FILLCAST_MATRICES a folder of further open matrices,
 * FILLCAST_PROBLEMS one with fem2d-100000.mtx. SciPy (python3) gives reverse Cuthill–McKee, multiple minimum degree and LU entries.
 * Times exclude reading and include symmetrisation on both sides.
 */
import { spawnSync } from 'node:child_process';
import { closeSync, existsSync, mkdtempSync, openSync, readFileSync, rmSync, writeFileSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { writeMatrixMarket } from '../../../engine/exchange/writeMatrixMarket.ts';
import { graphOf } from '../../../engine/graph/graph.ts';
import type { Pattern, SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { asNewToOld, type NewToOld } from '../../../engine/matrix/permutation.ts';
import { permute } from '../../../engine/matrix/permute.ts';
import { noProgress } from '../../../engine/matrix/progress.ts';
import { relabellingOf } from '../../../engine/ordering/bestOf.ts';
import { columnMinimumDegree } from '../../../engine/ordering/columnMinimumDegree.ts';
import { minimumDegree } from '../../../engine/ordering/minimumDegree.ts';
import { minimumFill } from '../../../engine/ordering/minimumFill.ts';
import { nestedDissection } from '../../../engine/ordering/nestedDissection.ts';
import { reverseCuthillMcKee } from '../../../engine/ordering/reverseCuthillMcKee.ts';
import { sloan } from '../../../engine/ordering/sloan.ts';
import { modelProblems } from '../../../engine/problems/model.ts';
import { analyseGraph } from '../../../engine/symbolic/analyse.ts';
import { profileOf } from '../../../engine/symbolic/profile.ts';
import { figures, parseMatrixMarket, readableNames, readReference } from '../../support/reference.ts';

interface Problem {
  readonly name: string;
  readonly make: () => SparseMatrix;
}

interface Result {
  readonly seconds: number;
  readonly operations: number;
  readonly entries: number;
  readonly height: number;
  readonly bandwidth: number;
}

const median = (x: readonly number[]): number => [...x].sort((a, b) => a - b)[x.length >> 1];
const geometric = (x: readonly number[]): number => Math.exp(x.reduce((s, v) => s + Math.log(v), 0) / x.length);
const clock = () => performance.now() / 1000;

function problems(): Problem[] {
  const model: [string, number][] = [
    ['grid2d5', 300],
    ['grid2d5', 1000],
    ['grid3d7', 30],
    ['grid3d7', 40],
    ['grid3d7', 60],
    ['elasticity3d', 12],
    ['elasticity3d', 20],
    ['powernet', 100_000],
    ['circuit', 100_000],
    ['kkt', 60_000],
    ['denserow', 250],
  ];
  const list = model.map(([kind, size]) => ({ name: `${kind}-${size}`, make: () => modelProblems[kind](size) }));
  const mesh = join(process.env.FILLCAST_PROBLEMS ?? '', 'fem2d-100000.mtx');
  if (existsSync(mesh))
    list.push({ name: 'fem2d-100000', make: () => parseMatrixMarket(readFileSync(mesh, 'latin1')) });
  for (const name of readableNames()) {
    const f = figures[name];
    if (f.rows === f.columns && f.rows >= 300) list.push({ name, make: () => readReference(name) });
  }
  return list;
}

function costs(pattern: Pattern, order: NewToOld, seconds: number): Result {
  const graph = graphOf(pattern);
  const factor = analyseGraph(graph, order, { postorder: false });
  let operations = 0;
  for (const c of factor.columnCount) operations += c * c;
  const { bandwidth } = profileOf(graph, order);
  return { seconds, operations, entries: factor.factorEntries, height: factor.treeHeight, bandwidth };
}

/**
 * The median time of a few runs, of more on small problems, where compiling as it goes and the switch from one method to the next is
 * otherwise much of the time. The compiled side takes the median of three to five runs, too.
 */
function own(pattern: Pattern, order: (a: Pattern) => NewToOld): Result {
  const runs = pattern.columns > 300_000 ? 2 : pattern.columns > 20_000 ? 3 : 15;
  const times: number[] = [];
  let last: NewToOld | null = null;
  for (let k = 0; k < runs; k++) {
    const t = clock();
    last = order(pattern);
    times.push(clock() - t);
  }
  return costs(pattern, last as NewToOld, runs === 2 ? Math.min(...times) : median(times));
}

const methods: Record<string, (a: Pattern) => NewToOld> = {
  'minimum-degree': (a) => minimumDegree(a, {}, noProgress).order,
  'minimum-fill': (a) => minimumFill(a, {}, noProgress).order,
  'nested-dissection': (a) => nestedDissection(a, {}, noProgress).order,
  'reverse-cuthill-mckee': (a) => reverseCuthillMcKee(a, {}, noProgress).order,
  sloan: (a) => sloan(a, {}, noProgress).order,
};

function readOrder(path: string): NewToOld {
  return asNewToOld(Int32Array.from(readFileSync(path, 'latin1').trim().split('\n'), Number));
}

function writeFile(path: string, a: SparseMatrix): void {
  const file = openSync(path, 'w');
  for (const chunk of writeMatrixMarket(a, { symmetry: 'general', storage: 'full' })) writeSync(file, chunk);
  closeSync(file);
}

/** Both sides on one relabelled matrix: name of a side and method -> result. */
function oneRun(
  a: SparseMatrix,
  folder: string,
): { own: Record<string, Result>; other: Record<string, Result>; column: [number, number, number] | null } {
  const file = join(folder, 'a.mtx');
  // a pattern gets values, so that every library reads it; orderings do not look at them
  const values = a.values ?? new Float64Array(a.rowIndex.length).fill(1);
  writeFile(file, { ...a, field: a.field === 'complex' ? 'complex' : 'real', values });
  const ours: Record<string, Result> = {};
  for (const [name, order] of Object.entries(methods)) ours[name] = own(a, order);
  const t = clock();
  let columnOrder = columnMinimumDegree(a, {}, noProgress).order;
  let columnSeconds = clock() - t;
  const again: number[] = [];
  for (let k = a.columns > 300_000 ? 0 : a.columns > 20_000 ? 3 : 15; k > 0; k--) {
    const start = clock();
    columnOrder = columnMinimumDegree(a, {}, noProgress).order;
    again.push(clock() - start);
  }
  if (again.length > 0) columnSeconds = median(again);
  writeFileSync(join(folder, 'q.txt'), columnOrder.join('\n'));
  const other: Record<string, Result> = {};
  let column: [number, number, number] | null = null;
  let analyze = Number.NaN;
  const native = process.env.FILLCAST_NATIVE;
  if (native !== undefined) {
    const lu = a.columns <= 150_000 && a.rowIndex.length < 2e6 ? ['--lu'] : [];
    const ran = spawnSync(native, [file, '--orders', join(folder, 'o'), ...lu], { encoding: 'utf8', timeout: 400_000 });
    for (const line of ran.stdout.trim().split('\n')) {
      if (line === '') continue;
      const r = JSON.parse(line);
      if (r.figure === 'lu') analyze = r.analyzeSeconds;
      if (r.figure !== 'ordering' || r.ordering === 'natural') continue;
      other[r.ordering] = costs(a, readOrder(join(folder, `o-${r.ordering}.txt`)), r.seconds);
    }
  }
  const python = spawnSync(
    '/usr/bin/python3',
    [join(import.meta.dirname, 'reference.py'), file, join(folder, 'q.txt')],
    {
      encoding: 'utf8',
      timeout: 600_000,
    },
  );
  if (python.status === 0) {
    const r = JSON.parse(python.stdout);
    const rcm = r['reverse-cuthill-mckee'];
    other['reverse-cuthill-mckee'] = {
      seconds: rcm.seconds,
      bandwidth: rcm.bandwidth,
      operations: 0,
      entries: 0,
      height: 0,
    };
    other['multiple-minimum-degree'] = costs(a, readOrder(`${file}.mmd`), r['multiple-minimum-degree'].seconds);
    if (r.column?.own !== undefined) column = [r.column.given, r.column.own, columnSeconds / analyze];
  } else console.log(`  SciPy: ${python.stderr?.trim().split('\n').at(-1) ?? 'not there'}`);
  return { own: ours, other, column };
}

/** name of a ratio -> one value a problem */
const ratios = new Map<string, [string, number][]>();
function note(what: string, problem: string, ratio: number): string {
  if (!Number.isFinite(ratio)) return '';
  ratios.set(what, [...(ratios.get(what) ?? []), [problem, ratio]]);
  return `${what} ${ratio.toFixed(3)}`;
}

function main(): void {
  const argument = (name: string): string | undefined => {
    const at = process.argv.indexOf(name);
    return at < 0 ? undefined : process.argv[at + 1];
  };
  const relabellings = Number(argument('--relabellings') ?? 5);
  const only = argument('--only')?.split(',');
  const folder = mkdtempSync(join(tmpdir(), 'fillcast-ordering-'));
  try {
    for (const { name, make } of problems()) {
      if (only !== undefined && !only.some((o) => name.startsWith(o))) continue;
      const a = make();
      const runs = Array.from({ length: relabellings }, (_, k) => {
        const p = relabellingOf(a.columns, k + 1);
        return oneRun(permute(a, p, p), folder);
      });
      console.log(`${name}: ${a.columns} rows, ${a.rowIndex.length} entries`);
      const of = (side: 'own' | 'other', method: string, what: keyof Result): number => {
        const values = runs.flatMap((r) => (r[side][method] === undefined ? [] : [r[side][method][what]]));
        return values.length === 0 ? Number.NaN : median(values);
      };
      for (const side of ['own', 'other'] as const) {
        for (const method of Object.keys(runs[0][side])) {
          console.log(
            `  ${side.padEnd(5)} ${method.padEnd(24)} ${of(side, method, 'seconds').toFixed(4).padStart(9)} s  entries ${String(of(side, method, 'entries')).padStart(11)}  operations ${of(side, method, 'operations').toExponential(3)}  height ${of(side, method, 'height')}  bandwidth ${of(side, method, 'bandwidth')}`,
          );
        }
      }
      const amd = of('other', 'minimum-degree', 'operations');
      const better = Math.min(amd, of('other', 'multiple-minimum-degree', 'operations'));
      const md = of('own', 'minimum-degree', 'operations');
      const nd = of('own', 'nested-dissection', 'operations');
      const column = runs.flatMap((r) => (r.column === null ? [] : [r.column]));
      console.log(
        `  ${[
          note('minimum degree: operations / approximate', name, md / amd),
          note('minimum degree: operations / better of two', name, md / better),
          note(
            'minimum degree: time',
            name,
            of('own', 'minimum-degree', 'seconds') / of('other', 'minimum-degree', 'seconds'),
          ),
          note('minimum fill: operations / approximate', name, of('own', 'minimum-fill', 'operations') / amd),
          note(
            'minimum fill: time',
            name,
            of('own', 'minimum-fill', 'seconds') / of('other', 'minimum-degree', 'seconds'),
          ),
          note('nested dissection: operations', name, nd / of('other', 'nested-dissection', 'operations')),
          note(
            'nested dissection: time',
            name,
            of('own', 'nested-dissection', 'seconds') / of('other', 'nested-dissection', 'seconds'),
          ),
          note(
            'reverse Cuthill–McKee: bandwidth',
            name,
            of('own', 'reverse-cuthill-mckee', 'bandwidth') / of('other', 'reverse-cuthill-mckee', 'bandwidth'),
          ),
          note(
            'reverse Cuthill–McKee: time',
            name,
            of('own', 'reverse-cuthill-mckee', 'seconds') / of('other', 'reverse-cuthill-mckee', 'seconds'),
          ),
          column.length === 0
            ? ''
            : note('column minimum degree: entries', name, median(column.map((c) => c[0] / c[1]))),
          column.length === 0 ? '' : note('column minimum degree: time', name, median(column.map((c) => c[2]))),
        ]
          .filter((text) => text !== '')
          .join('; ')}`,
      );
    }
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
  console.log('\ngeometric means, and the worst problem');
  for (const [what, values] of ratios) {
    const [worst, ratio] = values.reduce((a, b) => (b[1] > a[1] ? b : a));
    console.log(
      `  ${what.padEnd(46)} ${geometric(values.map((v) => v[1]))
        .toFixed(3)
        .padStart(7)}   worst ${ratio.toFixed(3)} (${worst}), ${values.length} problems`,
    );
  }
}

main();
