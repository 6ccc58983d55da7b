import { factorBytes } from '../../engine/trial/bytes.ts';
import type { Choice } from '../../engine/trial/choice.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { MatrixFacts } from '../../engine/trial/rules.ts';
import type { Kind } from '../figures/Figure.tsx';

/** The plain part of a finished trial: all that the ledger needs. */
export interface TrialOutcome extends Pick<TrialResult, 'counts' | 'seconds' | 'valueDependent' | 'notes'> {
  /** entries of the matrix that the factors replace: its lower triangle for Cholesky and LDLᵀ (of A + Aᵀ), all of it for LU */
  readonly replaced: number;
}

/** Widths of the target code. */
export interface TargetWidths {
  readonly indexBytes: number;
  readonly scalarBytes: number;
}

/** One figure of a trial. Null with a reason where it is not defined. */
export interface TrialFigure {
  readonly value: number | null;
  readonly kind: Kind;
  readonly reason: string | null;
}

/** The figures of a trial, in the order of the ledger. */
export type FigureName =
  | 'factorEntries'
  | 'fillIn'
  | 'fillRatio'
  | 'operations'
  | 'factorBytes'
  | 'largestFront'
  | 'treeHeight'
  | 'bandwidth'
  | 'envelope'
  | 'orderingSeconds'
  | 'symbolicSeconds';
export type TrialFigures = Readonly<Record<FigureName, TrialFigure>>;

/** The figures of a trial for a target. Plain arithmetic on counts. */
export function figuresOf(
  { counts, seconds, valueDependent, replaced }: TrialOutcome,
  { factorization, pivoting }: Choice,
  { columns, complex }: MatrixFacts,
  { indexBytes, scalarBytes }: TargetWidths,
): TrialFigures {
  // row interchanges and delayed pivots move entries: the counts are then those of an undisturbed run
  const undisturbed =
    pivoting === 'threshold' ? 'Holds while pivoting moves no rows; it can only be known by a run.' : null;
  const kind: Kind = valueDependent ? 'value-dependent' : undisturbed === null ? 'exact' : 'modelled';
  const figure = (name: string, value: number | null, as: Kind = kind): TrialFigure => ({
    value,
    kind: as,
    reason: value === null ? (counts.reasons[name] ?? 'Not defined for this trial.') : as === kind ? undisturbed : null,
  });
  const { factorEntries, lowerEntries, upperEntries } = counts;
  const widths = { value: complex ? 2 * scalarBytes : scalarBytes, index: indexBytes, pointer: 8 };
  const bytes =
    lowerEntries === null
      ? null
      : factorBytes(factorization, columns, lowerEntries, upperEntries ?? lowerEntries, widths);
  return {
    factorEntries: figure('factorEntries', factorEntries),
    fillIn: figure('factorEntries', factorEntries === null ? null : factorEntries - replaced),
    fillRatio: figure('factorEntries', factorEntries === null || replaced === 0 ? null : factorEntries / replaced),
    operations: figure('operations', counts.operations),
    factorBytes: figure('factorBytes', bytes),
    largestFront: figure('largestFront', counts.largestFront),
    treeHeight: figure('treeHeight', counts.treeHeight),
    bandwidth: figure('bandwidth', counts.bandwidth, 'exact'),
    envelope: figure('envelope', counts.envelope, 'exact'),
    orderingSeconds: figure('orderingSeconds', seconds.ordering, 'measured'),
    symbolicSeconds: figure('symbolicSeconds', seconds.symbolic, 'measured'),
  };
}
