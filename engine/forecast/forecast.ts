import { type Arithmetic, type FactorKind, scalarCosts } from '../symbolic/operations.ts';
import type { AssemblyTree } from '../symbolic/types.ts';
import { type DelayedRow, delayedGrowth } from './delayed.ts';
import { type Figure, figure } from './figure.ts';
import { workOfFronts } from './frontWork.ts';
import { type LimitLine, limitLines } from './limits.ts';
import { type ParallelProfile, parallelProfile } from './parallel.ts';
import { type Storage, type StorageQuestion, storageOf } from './storage.ts';
import type { Target } from './target.ts';
import { type TimeForecast, timeOf } from './time.ts';

/** Operations in real ones: additions, multiplications, divisions and square roots counted one each. */
export interface OperationForecast {
  readonly factorization: Figure;
  /** the same with padding, as a run on fronts executes them; no figure for column LU */
  readonly executed: Figure | null;
  /** forward and back substitution for one right-hand side */
  readonly solve: Figure;
  /** a residual, a solve and an addition */
  readonly refinementStep: Figure;
}

/** Bytes at the peak of a run on the target, and what would make them fewer. */
export interface PeakForecast {
  readonly bytes: number;
  /** the same with single-precision scalars; null where they are single already */
  readonly inSingle: number | null;
  /** least memory with factors written out as they are made; null without fronts */
  readonly writtenOut: number | null;
  /** modelled, with a fifth of the pivots delayed; null where none can be */
  readonly delayed: number | null;
}

/** Everything about one trial that depends on the target. */
export interface TrialForecast {
  readonly storage: Storage;
  readonly peak: PeakForecast;
  readonly limits: readonly LimitLine[];
  readonly operations: OperationForecast;
  readonly time: TimeForecast;
  /** null for column LU: its parallelism lies in blocks and right-hand sides, which are not modelled */
  readonly parallel: ParallelProfile | null;
  /** null where no pivot is delayed */
  readonly delayed: readonly DelayedRow[] | null;
}

export interface ForecastQuestion {
  readonly kind: FactorKind;
  readonly pivoting: boolean;
  readonly arithmetic: Arithmetic;
  readonly size: number;
  readonly matrixEntries: number;
  readonly lowerEntries: number;
  readonly upperEntries: number | null;
  /** entries of both factors, one diagonal */
  readonly factorEntries: number;
  /** proven high end of their range; null where pivots cannot move them */
  readonly highestEntries: number | null;
  readonly envelope: number | null;
  readonly operations: number;
  /** null for column LU */
  readonly tree: AssemblyTree | null;
  /** how far the counts are certain */
  readonly countKind: 'exact' | 'bound' | 'modelled';
  readonly target: Target;
  /** bytes a proof in this page would take, and may take */
  readonly pagePeakBytes: number;
  readonly pageMemoryBytes: number;
}

/** Forecast of a trial on a target. Near-linear in supernodes; the factor is not listed. */
export function forecastOf(q: ForecastQuestion): TrialForecast {
  const { target, tree, arithmetic } = q;
  const width = arithmetic === 'real' ? 1 : 2;
  const question = (scalarBytes: number): StorageQuestion => ({
    size: q.size,
    lowerEntries: q.lowerEntries,
    upperEntries: q.upperEntries,
    envelope: q.envelope,
    matrixEntries: q.matrixEntries,
    tree,
    layout: { valueBytes: scalarBytes * width, indexBytes: target.indexBytes, pointerBytes: 8 },
    kind: q.countKind,
  });
  const storage = storageOf(question(target.scalarBytes));
  const single = target.scalarBytes === 4 ? null : storageOf(question(4));
  const peakOf = (s: Storage): number => s.multifrontal.value ?? s.compressedColumns.value ?? 0;
  const valueBytes = target.scalarBytes * width;
  const delayed =
    tree === null || !q.pivoting
      ? null
      : delayedGrowth(q.kind, tree, arithmetic, { valueBytes, indexBytes: target.indexBytes });
  const grown = delayed === null ? null : delayed[delayed.length - 1].bytes - delayed[0].bytes;
  const peak: PeakForecast = {
    bytes: peakOf(storage),
    inSingle: single === null ? null : peakOf(single),
    writtenOut: storage.outOfCore.value,
    delayed: grown === null ? null : peakOf(storage) + grown,
  };
  const work = tree === null ? null : workOfFronts(q.kind, tree, arithmetic);
  return {
    storage,
    peak,
    limits: limitLines({
      largestCount: q.factorEntries,
      highestCount: q.highestEntries,
      peakBytes: peak.bytes,
      delayedBytes: peak.delayed,
      memoryBytes: target.memoryBytes,
      pagePeakBytes: q.pagePeakBytes,
      pageMemoryBytes: q.pageMemoryBytes,
    }),
    operations: operationsOf(q, work),
    time: timeOf({
      tree,
      work,
      operations: q.operations,
      factorBytes: storage.compressedColumns.value ?? 0,
      matrixBytes: q.matrixEntries * (valueBytes + target.indexBytes),
      target,
    }),
    parallel: tree === null || work === null ? null : parallelProfile(tree, work),
    delayed,
  };
}

/** Each off-diagonal entry of a factor costs a multiplication and an addition in a sweep, each diagonal that is not one a division. */
function operationsOf(q: ForecastQuestion, work: Float64Array | null): OperationForecast {
  const { multiplyAdd, divideByPivot } = scalarCosts(q.arithmetic);
  const n = q.size;
  const lower = q.lowerEntries - n;
  const upper = (q.upperEntries ?? q.lowerEntries) - n;
  const divisions = q.kind === 'cholesky' ? 2 * n : n;
  const solve = multiplyAdd * (lower + upper) + divideByPivot * divisions;
  // the residual takes a multiply–add an entry, the correction an addition an unknown
  const step = solve + multiplyAdd * q.matrixEntries + (q.arithmetic === 'real' ? 1 : 2) * n;
  return {
    factorization: figure(q.operations, 'operations', q.countKind),
    executed:
      work === null
        ? null
        : figure(
            work.reduce((a, b) => a + b, 0),
            'operations',
            q.countKind,
          ),
    solve: figure(solve, 'operations', q.countKind),
    refinementStep: figure(step, 'operations', q.countKind),
  };
}
