import * as write from '../figures/format.ts';
import type { TermName } from '../help/terms.ts';
import type { FigureName } from '../workers/trialFigures.ts';

/** A column of figures in the ledger. */
export interface Column {
  readonly name: FigureName;
  readonly head: string;
  readonly term: TermName;
  readonly write: (x: number) => write.Written;
  /** whether the smallest figure is the best, the largest, or no figure is better than another */
  readonly best: 'least' | 'most' | null;
  /** held against the memory of the target */
  readonly againstMemory: boolean;
  /** shown until the user chooses otherwise */
  readonly usual: boolean;
}

const column = (
  name: FigureName,
  head: string,
  term: TermName,
  writeAs: Column['write'],
  usual = false,
  best: Column['best'] = 'least',
  againstMemory = false,
): Column => ({ name, head, term, write: writeAs, best, againstMemory, usual });

/** All columns that can be shown, in their order. */
export const columns: readonly Column[] = [
  column('factorEntries', 'factor entries', 'factor entries', write.count, true),
  column('fillIn', 'fill-in', 'fill-in', write.count),
  column('fillRatio', 'fill ratio', 'fill ratio', write.times, true),
  column('operations', 'operations', 'operations', write.count, true),
  column('factorBytes', 'factors', 'factor bytes', write.bytes, false, 'least', true),
  column('peakBytes', 'peak memory', 'peak bytes', write.bytes, true, 'least', true),
  column('largestFront', 'largest front', 'largest front', write.count, true),
  column('treeHeight', 'tree height', 'tree height', write.count),
  column('bandwidth', 'bandwidth', 'bandwidth', write.count),
  column('envelope', 'envelope', 'envelope', write.count),
  column('orderingSeconds', 'ordering', 'ordering time', write.seconds, true),
  column('symbolicSeconds', 'analysis', 'ordering time', write.seconds),
  column('factorSeconds', 'factorization', 'forecast time', write.seconds, true),
  column('totalSeconds', 'whole workload', 'total time', write.seconds, true),
  column('mostSpeedup', 'at most faster', 'at most faster', write.times, false, 'most'),
  column('criticalPath', 'critical path', 'critical path', write.count),
  column('provenSeconds', 'proven time', 'proof', write.seconds),
  column('backwardError', 'backward error', 'backward error', write.plainNumber),
];

/** The columns a user has chosen, or the usual ones. */
export function chosenColumns(names: readonly string[]): readonly Column[] {
  return names.length === 0 ? columns.filter((c) => c.usual) : columns.filter((c) => names.includes(c.name));
}
