import { positionOf } from '../../engine/matrix/permutation.ts';
import { fundamentalSupernodes } from '../../engine/symbolic/supernodes.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { MapOutlines, Span } from './mapOperations.ts';

/** What can be outlined on the maps of a trial, in positions of its effective order. */
export function outlinesOf(trial: TrialResult): MapOutlines {
  const { parent, columnCount, plan, choice } = trial;
  const blockStart = plan.blockStart === null || plan.blockStart.length <= 2 ? null : plan.blockStart;
  const supernodes =
    choice.factorization === 'column-lu' || parent === null || columnCount === null
      ? null
      : fundamentalSupernodes(parent, columnCount);
  return { separators: separatorsOf(trial), blockStart, supernodes };
}

/** A postorder keeps a separator together when its unknowns follow each other in the tree; the others are left out. */
function separatorsOf({ separators, requested, effective }: TrialResult): Span[] {
  if (separators.length === 0) return [];
  const position = positionOf(effective);
  const out: Span[] = [];
  for (const { start, end, level } of separators) {
    let first = effective.length;
    let last = -1;
    for (let k = start; k < end; k++) {
      const at = position[requested[k]];
      if (at < first) first = at;
      if (at > last) last = at;
    }
    if (last - first + 1 === end - start) out.push({ start: first, end: last + 1, level });
  }
  return out;
}
