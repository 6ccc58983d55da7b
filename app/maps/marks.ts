import type { Pointing } from '../state/view.ts';
import { type Ground, placeOf } from './ground.ts';

/** What a fact points to, in positions of one pane. */
export interface MarkedPlaces {
  readonly rows: readonly number[];
  readonly columns: readonly number[];
  /** row, column, row, column … */
  readonly entries: readonly number[];
}

export const noMarks: MarkedPlaces = { rows: [], columns: [], entries: [] };

/** More marks than this would hide the map they point into. */
export const mostMarks = 4000;

/** Where the lines or entries that something points to lie on a ground. */
export function marksOn(ground: Ground, pointing: Pointing | null): MarkedPlaces {
  if (pointing === null) return noMarks;
  const { axis, indices } = pointing;
  if (axis === 'entries') {
    const entries: number[] = [];
    for (let k = 0; k + 1 < indices.length && k < 2 * mostMarks; k += 2) {
      const { row, column } = placeOf(ground, indices[k], indices[k + 1]);
      entries.push(row, column);
    }
    return { ...noMarks, entries };
  }
  const few = Array.from(indices.subarray(0, mostMarks));
  return {
    rows: axis === 'columns' ? [] : few.filter((i) => i < ground.rows).map((i) => ground.rowPosition(i)),
    columns: axis === 'rows' ? [] : few.filter((j) => j < ground.columns).map((j) => ground.columnPosition(j)),
    entries: [],
  };
}
