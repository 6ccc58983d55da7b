/**
 * What part of the ground all maps show, in shares of its rows and columns (0 to 1), so that maps of different matrices can be
 * linked too. Pure arithmetic.
 */
export interface Viewport {
  readonly top: number;
  readonly left: number;
  /** share of the rows shown, above 0 and at most 1 */
  readonly height: number;
  /** share of the columns shown */
  readonly width: number;
}

export const everything: Viewport = { top: 0, left: 0, height: 1, width: 1 };

/** Keeps a viewport inside the ground and no smaller than `least` (share) on a side. */
export function clampViewport(v: Viewport, least: number): Viewport {
  const height = Math.min(1, Math.max(least, v.height));
  const width = Math.min(1, Math.max(least, v.width));
  return {
    height,
    width,
    top: Math.min(1 - height, Math.max(0, v.top)),
    left: Math.min(1 - width, Math.max(0, v.left)),
  };
}

/** Zooms by `factor` (above 1 = closer) so that the point at shares (x, y) of the pane keeps its place. */
export function zoomAt(v: Viewport, factor: number, x: number, y: number, least: number): Viewport {
  const height = Math.min(1, Math.max(least, v.height / factor));
  const width = Math.min(1, Math.max(least, v.width / factor));
  return clampViewport(
    { height, width, top: v.top + y * (v.height - height), left: v.left + x * (v.width - width) },
    least,
  );
}

/** Moves by shares of the pane. */
export function panBy(v: Viewport, dx: number, dy: number, least: number): Viewport {
  return clampViewport({ ...v, left: v.left + dx * v.width, top: v.top + dy * v.height }, least);
}

/** Brings (row, column), shares of the ground, to the middle. */
export function centreOn(v: Viewport, row: number, column: number, least: number): Viewport {
  return clampViewport({ ...v, top: row - v.height / 2, left: column - v.width / 2 }, least);
}

/** The positions a viewport covers on a side of n positions: half-open, never empty for n > 0. */
export function positionsOf(start: number, share: number, n: number): readonly [number, number] {
  const from = Math.min(Math.max(0, n - 1), Math.max(0, Math.floor(start * n + 1e-9)));
  const to = Math.min(n, Math.max(from + 1, Math.ceil((start + share) * n - 1e-9)));
  return [from, to];
}
