import { trialCost } from '../forecast/cost.ts';
import type { TrialForecast } from '../forecast/forecast.ts';
import type { Target, Workload } from '../forecast/target.ts';
import { workloadSeconds } from '../forecast/workload.ts';
import { countKindOf } from '../trial/forecast.ts';
import type { TrialResult } from '../trial/result.ts';
import type { TableRow } from './csv.ts';

/** Figures of a comparison without a page, in their order. */
export const tableFigures = [
  'factorEntries',
  'operations',
  'factorBytes',
  'peakBytes',
  'largestFront',
  'treeHeight',
  'bandwidth',
  'envelope',
  'factorSeconds',
  'totalSeconds',
] as const;

/** One finished trial as a line of a comparison; seconds are modelled for the target and the workload. */
export function tableRow(
  name: string,
  heldLast: number,
  result: TrialResult,
  forecast: TrialForecast | null,
  target: Target,
  workload: Workload,
): TableRow {
  const { counts, seconds, choice } = result;
  const kind = countKindOf(result);
  const cost =
    forecast === null
      ? null
      : trialCost(forecast, target.cores, seconds.ordering + seconds.symbolic, counts.factorEntries ?? 0, name);
  return {
    name,
    choice,
    heldLast,
    figures: {
      factorEntries: { value: counts.factorEntries, kind },
      operations: { value: counts.operations, kind },
      factorBytes: { value: counts.factorBytes, kind },
      peakBytes: { value: forecast?.peak.bytes ?? null, kind },
      largestFront: { value: counts.largestFront, kind },
      treeHeight: { value: counts.treeHeight, kind },
      bandwidth: { value: counts.bandwidth, kind: 'exact' },
      envelope: { value: counts.envelope, kind: 'exact' },
      factorSeconds: { value: cost?.factorization ?? null, kind: 'modelled' },
      totalSeconds: { value: cost === null ? null : workloadSeconds(cost, workload), kind: 'modelled' },
    },
  };
}
