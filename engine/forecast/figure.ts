/** How a number is known. */
export type FigureKind = 'exact' | 'bound' | 'modelled' | 'measured';

/** A number that never stands alone. */
export interface Figure {
  /** null where it is not defined; then `reason` says why */
  readonly value: number | null;
  /** "entries", "bytes", "operations", "seconds", "" */
  readonly unit: string;
  readonly kind: FigureKind;
  readonly reason?: string;
  /** beyond 2⁵³: the last digits are rounded */
  readonly rounded?: boolean;
}

/** A figure; marked rounded where a double no longer counts exactly. */
export function figure(value: number, unit: string, kind: FigureKind): Figure {
  return value > 2 ** 53 ? { value, unit, kind, rounded: true } : { value, unit, kind };
}

/** A figure that is not defined here. */
export function noFigure(unit: string, kind: FigureKind, reason: string): Figure {
  return { value: null, unit, kind, reason };
}
