import type { Pattern } from '../matrix/pattern.ts';
import type { Progress } from '../matrix/progress.ts';
import { type MinimumDegreeOptions, orderWithDenseLast } from './minimumDegree.ts';
import { minimumFillOfGraph } from './minimumFillOfGraph.ts';
import type { OrderingResult } from './ordering.ts';

/**
 * Approximate minimum fill (Rothberg & Eisenstat 1998; Ng & Raghavan 1999) on the graph of A + Aᵀ; square patterns only. Options, dense
 * rows and held-last unknowns as in `minimumDegree`. Usually fewer operations than minimum degree, for somewhat more time.
 */
export function minimumFill(pattern: Pattern, options: MinimumDegreeOptions, progress: Progress): OrderingResult {
  return orderWithDenseLast(pattern, options, (graph, start) => minimumFillOfGraph(graph, start, progress).order);
}
