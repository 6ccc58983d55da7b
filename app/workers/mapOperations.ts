import type { DensityMap, PictureWindow } from '../../engine/picture/window.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { RasterInks } from '../maps/raster.ts';
import type { MatrixKey } from './protocol.ts';

/** A window of a map, counted and coloured; or the word that the trial's map has to be laid first. */
export type MapAnswer =
  | { readonly laid: false }
  | { readonly laid: true; readonly counts: DensityMap; readonly pixels: Uint8ClampedArray<ArrayBuffer> };

/** Positions start … end − 1 of an order; level 0 is the first separator. */
export interface Span {
  readonly start: number;
  readonly end: number;
  readonly level: number;
}

/** What can be outlined along the diagonal of a trial's maps. */
export interface MapOutlines {
  readonly separators: readonly Span[];
  /** block -> first position, one more at the end; null for one block */
  readonly blockStart: Int32Array | null;
  /** fundamental supernode -> first position, one more at the end; null where columns are not grouped */
  readonly supernodes: Int32Array | null;
}

/** What stands at one position. Original numbers, 0-based. */
export interface Spot {
  readonly row: number;
  readonly column: number;
  readonly rowLabel: string | null;
  readonly columnLabel: string | null;
  /** one number, or real and imaginary part; null where there is no entry or no values */
  readonly value: readonly number[] | null;
  readonly kind: 'original' | 'fill' | 'none';
}

/** The path of eliminated unknowns that made an entry; unknowns original, positions in the order; ends first and last. */
export interface FillPath {
  readonly unknowns: Int32Array;
  readonly positions: Int32Array;
}

/** What the maps ask of the worker that draws. */
export interface MapOperations {
  /** hands over the order of a trial, once, before its maps */
  layMap: { ask: { key: MatrixKey; trial: string; result: TrialResult }; answer: MapOutlines; early: never };
  /** a window of the matrix as read (trial null) or of a trial's factor */
  map: {
    ask: {
      key: MatrixKey;
      trial: string | null;
      window: PictureWindow;
      cellRows: number;
      cellColumns: number;
      shade: 'density' | 'any';
      inks: RasterInks;
    };
    answer: MapAnswer;
    early: never;
  };
  /** what stands at one position; null where the map has to be laid first */
  spot: {
    ask: { key: MatrixKey; trial: string | null; row: number; column: number };
    answer: Spot | null;
    early: never;
  };
  /** why an entry of the factor is there; null where the matrix has it, or none */
  whyFill: {
    ask: { key: MatrixKey; trial: string; row: number; column: number };
    answer: FillPath | null;
    early: never;
  };
}
