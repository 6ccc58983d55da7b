import type { Loaded } from '../../engine/exchange/loaded.ts';
import type { MatrixKey } from './protocol.ts';
import type { ImportSummary } from './summary.ts';

/** A worked example drawn small: how full each cell of a coarse raster is. */
export interface Plate {
  readonly id: string;
  readonly title: string;
  readonly sentence: string;
  readonly sizes: readonly number[];
  readonly sizeMeans: string;
  readonly rows: number;
  readonly columns: number;
  readonly entries: number;
  readonly field: string;
  /** cells along an edge of the raster */
  readonly cells: number;
  /** entries in each cell, row by row from the top; length cells² */
  readonly density: Uint32Array;
}

/** A matrix that has come in: what the page says about it, and the arrays that it passes on without looking into them. */
export interface Arrival {
  readonly summary: ImportSummary;
  readonly loaded: Loaded;
}

/** Every operation of a worker: what it asks, what it answers, what it can say early. */
export interface Operations {
  /** the worked examples, drawn from their smallest size */
  plates: { ask: { cells: number }; answer: readonly Plate[]; early: Plate };
  /** a worked example made on the spot */
  example: { ask: { key: MatrixKey; id: string; size: number }; answer: Arrival; early: never };
}
