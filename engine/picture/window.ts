/**
 * A rectangle of positions, half-open, 0-based, in the order shown: rows rowStart … rowEnd − 1, columns columnStart … columnEnd − 1.
 */
export interface PictureWindow {
  readonly rowStart: number;
  readonly rowEnd: number;
  readonly columnStart: number;
  readonly columnEnd: number;
}

/** Counts of entries in the cells of a window. Cell (r, c) is at r · columns + c. */
export interface DensityMap {
  readonly window: PictureWindow;
  /** cells down */
  readonly rows: number;
  /** cells across */
  readonly columns: number;
  /** cell -> entries of the matrix in it */
  readonly original: Float64Array;
  /** cell -> entries of the factor that are not entries of the matrix; all zero for a matrix */
  readonly fill: Float64Array;
  /** "sampled": a stated work limit was passed and only a share of the rows was counted */
  readonly kind: 'exact' | 'sampled';
}

/** Cells for a window that is drawn on `pixels` of a screen along one side: never more cells than positions. */
export function cellCount(positions: number, pixels: number): number {
  return Math.max(1, Math.min(positions, Math.floor(pixels)));
}

/** First position (relative to the window's start) of cell `cell` when `positions` are cut into `cells`; cell = cells gives the end. */
export function cellStart(cell: number, positions: number, cells: number): number {
  return Math.floor((cell * positions) / cells);
}

/** position (relative to the window's start) -> cell; consistent with `cellStart`. */
export function cellTable(positions: number, cells: number): Int32Array {
  const table = new Int32Array(positions);
  for (let cell = 0; cell < cells; cell++) {
    table.fill(cell, cellStart(cell, positions, cells), cellStart(cell + 1, positions, cells));
  }
  return table;
}

/** The window of everything. */
export function wholeWindow(rows: number, columns: number): PictureWindow {
  return { rowStart: 0, rowEnd: rows, columnStart: 0, columnEnd: columns };
}

/** An empty map over a window. */
export function emptyMap(window: PictureWindow, rows: number, columns: number): DensityMap {
  return {
    window,
    rows,
    columns,
    original: new Float64Array(rows * columns),
    fill: new Float64Array(rows * columns),
    kind: 'exact',
  };
}
