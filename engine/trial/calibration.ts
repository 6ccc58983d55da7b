import { calibrate, modelErrors, type Sample, sampleSeconds } from '../forecast/calibrate.ts';
import { workOfFronts } from '../forecast/frontWork.ts';
import type { Target } from '../forecast/target.ts';
import { graphOf } from '../graph/graph.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { factorizeFronts } from '../numeric/fronts/frontFactor.ts';
import { nestedDissection } from '../ordering/nestedDissection.ts';
import { modelProblems } from '../problems/model.ts';
import { analyseGraph } from '../symbolic/analyse.ts';
import { assemblyTree } from '../symbolic/assemblyTree.ts';
import { frontRows } from '../symbolic/frontRows.ts';

/** One model problem that was run. */
export interface CalibrationRun {
  readonly problem: string;
  readonly operations: number;
  /** measured seconds of the factorization, and of one forward and back substitution */
  readonly seconds: number;
  readonly solveSeconds: number;
  /** seconds of the factorization by the calibrated model */
  readonly modelled: number;
}

/** This machine, one core, in the terms of a target. */
export interface Calibration {
  /** `target` with the rates found here */
  readonly target: Target;
  readonly runs: readonly CalibrationRun[];
  /** largest distance of the model from a run: 0.2 means within a factor of 1.2 */
  readonly modelError: number;
}

/** Small fronts, large fronts, and between: a mesh in two dimensions, in three, and a denser one. */
const problems: readonly (readonly [string, number])[] = [
  ['grid2d5', 60],
  ['grid2d5', 200],
  ['grid3d7', 12],
  ['grid3d7', 18],
  ['grid3d7', 24],
  ['elasticity3d', 8],
];

/** Rounds over all problems: at least so many, and more while they have taken less than so many seconds. */
export interface CalibrationEffort {
  readonly leastRounds: number;
  readonly enoughSeconds: number;
}

const usualEffort: CalibrationEffort = { leastRounds: 3, enoughSeconds: 3 };

/**
 * Factorizes model problems (Cholesky on fronts, nested dissection) and fits rates and bandwidth to what they took: a few seconds. The least
 * time of several rounds counts, so that it is compiled code, undisturbed, that is measured.
 */
export function calibrateHere(
  target: Target,
  progress: Progress = noProgress,
  effort: CalibrationEffort = usualEffort,
): Calibration {
  const { leastRounds, enoughSeconds } = effort;
  const prepared = problems.map(([kind, size]) => prepareRun(kind, size));
  const least = prepared.map(() => ({ seconds: Number.POSITIVE_INFINITY, solve: Number.POSITIVE_INFINITY }));
  const start = clock();
  for (let round = 0; round < mostRounds; round++) {
    const spent = clock() - start;
    if (round >= leastRounds && spent >= enoughSeconds) break;
    prepared.forEach((one, k) => {
      const fraction = Math.max(round / leastRounds, spent / enoughSeconds);
      progress(Math.min(0.99, fraction), `calibration: ${problems[k].join(' ')}`);
      const { seconds, solve } = one.run();
      least[k].seconds = Math.min(least[k].seconds, seconds);
      least[k].solve = Math.min(least[k].solve, solve);
    });
  }
  const samples: Sample[] = prepared.map((one, k) => ({ ...one.work, seconds: least[k].seconds }));
  const solves = prepared.map((one, k) => ({ bytes: one.bytes, seconds: least[k].solve }));
  // the last substitutions read factors that no cache holds
  const bandwidth = Math.min(...solves.slice(-2).map((s) => s.bytes / s.seconds));
  const found = { ...calibrate(samples, target), bandwidth };
  return {
    target: found,
    runs: samples.map((s, k) => ({
      problem: `${problems[k][0]} ${problems[k][1]}`,
      operations: s.operations,
      seconds: s.seconds,
      solveSeconds: solves[k].seconds,
      modelled: sampleSeconds(s, found),
    })),
    modelError: Math.max(...modelErrors(samples, found)),
  };
}

const clock = (): number => performance.now() / 1000;

/** most rounds, however quick they are */
const mostRounds = 30;

interface PreparedRun {
  readonly work: Omit<Sample, 'seconds'>;
  /** bytes that one forward and back substitution reads */
  readonly bytes: number;
  run(): { readonly seconds: number; readonly solve: number };
}

function prepareRun(kind: string, size: number): PreparedRun {
  const a = modelProblems[kind](size);
  const graph = graphOf(a);
  const { order } = nestedDissection(a, {}, noProgress);
  const tree = assemblyTree(analyseGraph(graph, order, { postorder: true }));
  const rows = frontRows(tree, graph);
  const work = workOfFronts('cholesky', tree);
  const byOrder = new Map<number, number>();
  let operations = 0;
  for (let s = 0; s < tree.count; s++) {
    operations += work[s];
    byOrder.set(tree.frontOrder[s], (byOrder.get(tree.frontOrder[s]) ?? 0) + work[s]);
  }
  const fronts = [...byOrder].map(([m, ops]) => ({ order: m, operations: ops }));
  const frontOrder = fronts.reduce((sum, f) => sum + f.order * f.operations, 0) / operations;
  return {
    work: { operations, frontOrder, fronts },
    // compressed columns, as the model of a substitution reads them once forward and once back
    bytes: 2 * 12 * tree.factorEntries,
    run() {
      const t0 = clock();
      const factor = factorizeFronts(a, tree, rows, { kind: 'cholesky', pivoting: 'none' });
      const t1 = clock();
      factor.solveInPlace(new Float64Array(a.columns).fill(1), 1);
      return { seconds: t1 - t0, solve: clock() - t1 };
    },
  };
}
