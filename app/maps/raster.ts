/**
 * From counts to pixels, one pixel a cell. Ink for entries of the matrix; fill-in vermilion under a diagonal hatch whose lines
 * grow with the share of fill, so that the two are told apart without colour. Pure; runs in a worker.
 */
export interface RasterInks {
  /** red, green, blue, 0 to 255 */
  readonly ink: readonly [number, number, number];
  readonly fill: readonly [number, number, number];
}

export interface RasterRequest {
  readonly rows: number;
  readonly columns: number;
  /** cell -> entries of the matrix; rows · columns */
  readonly original: Float64Array;
  /** cell -> fill-in; rows · columns */
  readonly fill: Float64Array;
  /** positions in a cell (mean), the most entries a cell can hold */
  readonly cellArea: number;
  /** "density": shade by the logarithm of the share filled; "any": every cell that holds an entry in full strength */
  readonly shade: 'density' | 'any';
}

/** faintest shade of a cell that holds a single entry: it must be seen among a million rows */
const faintest = 0.42;
/** period of the hatch in cells */
const period = 6;

/** Red, green, blue, alpha for each cell; length 4 · rows · columns. */
export function rasterOf(r: RasterRequest, inks: RasterInks): Uint8ClampedArray<ArrayBuffer> {
  const out = new Uint8ClampedArray(4 * r.rows * r.columns);
  const scale = 1 / Math.log1p(Math.max(1, r.cellArea));
  let at = 0;
  for (let y = 0; y < r.rows; y++) {
    for (let x = 0; x < r.columns; x++, at++) {
      const original = r.original[at];
      const total = original + r.fill[at];
      if (total === 0) continue;
      const strength = r.shade === 'any' ? 1 : faintest + (1 - faintest) * Math.min(1, Math.log1p(total) * scale);
      const share = r.fill[at] / total;
      // width of the vermilion lines: all of a pure-fill cell is vermilion, with its hatch lines at full strength
      const phase = (x + y) % period;
      const inLine = share > 0 && phase < Math.max(1, Math.round(share * (period - 2)));
      const vermilion = share === 1 || inLine;
      const colour = vermilion ? inks.fill : inks.ink;
      const lift = share === 1 && !inLine ? 0.62 : 1;
      const q = 4 * at;
      out[q] = colour[0];
      out[q + 1] = colour[1];
      out[q + 2] = colour[2];
      out[q + 3] = 255 * strength * lift;
    }
  }
  return out;
}
