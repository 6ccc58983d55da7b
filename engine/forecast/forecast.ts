import type { FactorKind } from '../symbolic/operations.ts';
import type { AssemblyTree } from '../symbolic/types.ts';
import { type DelayedRow, delayedGrowth } from './delayed.ts';
import { workOfFronts } from './frontWork.ts';
import { type LimitLine, limitLines } from './limits.ts';
import { type ParallelProfile, parallelProfile } from './parallel.ts';
import { type Storage, storageOf } from './storage.ts';
import type { Target } from './target.ts';
import { type TimeForecast, timeOf } from './time.ts';

/** Everything about one trial that depends on the target. */
export interface TrialForecast {
  readonly storage: Storage;
  readonly limits: readonly LimitLine[];
  readonly time: TimeForecast;
  /** null for column LU: its parallelism lies in blocks and right-hand sides, which are not modelled */
  readonly parallel: ParallelProfile | null;
  /** null where no pivot is delayed */
  readonly delayed: readonly DelayedRow[] | null;
}

export interface ForecastQuestion {
  readonly kind: FactorKind;
  readonly pivoting: boolean;
  readonly complex: boolean;
  readonly size: number;
  readonly matrixEntries: number;
  readonly lowerEntries: number;
  readonly upperEntries: number | null;
  /** high end of the range of the factor entries, or the exact count */
  readonly highestEntries: number;
  readonly envelope: number | null;
  readonly operations: number;
  /** null for column LU */
  readonly tree: AssemblyTree | null;
  readonly countKind: 'exact' | 'bound';
  readonly target: Target;
  /** bytes a proof in this page would take, and may take */
  readonly pagePeakBytes: number;
  readonly pageMemoryBytes: number;
}

/** Forecast of a trial on a target. Near-linear in supernodes; the factor is not listed. */
export function forecastOf(q: ForecastQuestion): TrialForecast {
  const { target, tree } = q;
  const valueBytes = target.scalarBytes * (q.complex ? 2 : 1);
  const storage = storageOf({
    size: q.size,
    lowerEntries: q.lowerEntries,
    upperEntries: q.upperEntries,
    envelope: q.envelope,
    matrixEntries: q.matrixEntries,
    tree,
    layout: { valueBytes, indexBytes: target.indexBytes, pointerBytes: 8 },
    kind: q.countKind,
  });
  const work = tree === null ? null : workOfFronts(q.kind, tree);
  // complex fronts: a multiply–add is eight real operations instead of two
  if (work !== null && q.complex) for (let s = 0; s < work.length; s++) work[s] *= 4;
  const factorBytes = storage.compressedColumns.value ?? 0;
  const peak = storage.multifrontal.value ?? factorBytes;
  return {
    storage,
    limits: limitLines({
      largestCount: q.highestEntries,
      peakBytes: peak,
      memoryBytes: target.memoryBytes,
      pagePeakBytes: q.pagePeakBytes,
      pageMemoryBytes: q.pageMemoryBytes,
    }),
    time: timeOf({
      tree,
      work,
      operations: q.operations,
      factorBytes,
      matrixBytes: q.matrixEntries * (valueBytes + target.indexBytes),
      target,
    }),
    parallel: tree === null || work === null ? null : parallelProfile(tree, work),
    delayed: tree === null || !q.pivoting ? null : delayedGrowth(q.kind, tree),
  };
}
