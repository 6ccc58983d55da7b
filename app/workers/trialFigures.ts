import type { Kind } from '../figures/Figure.tsx';

/** One figure of a trial. Null with a reason where it is not defined. */
export interface TrialFigure {
  readonly value: number | null;
  readonly kind: Kind;
  readonly reason: string | null;
}

/** The figures of a trial that its forecast gives. */
export const figureNames = [
  'factorEntries',
  'fillIn',
  'fillRatio',
  'operations',
  'factorBytes',
  'peakBytes',
  'largestFront',
  'treeHeight',
  'bandwidth',
  'envelope',
  'orderingSeconds',
  'symbolicSeconds',
  'factorSeconds',
  'totalSeconds',
  'mostSpeedup',
] as const;
export type FigureName = (typeof figureNames)[number];
export type TrialFigures = Readonly<Record<FigureName, TrialFigure>>;
