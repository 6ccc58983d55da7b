import { type KeyboardEvent, useState } from 'react';

/** One cell of the ledger takes the focus; arrow keys, Home and End move it. */
export interface GridPlace {
  readonly row: number;
  readonly column: number;
}

const moves: Readonly<Record<string, readonly [number, number]>> = {
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
  Home: [0, Number.NEGATIVE_INFINITY],
  End: [0, Number.POSITIVE_INFINITY],
};

export function useGridKeys(rows: number, columns: number) {
  const [place, setAt] = useState<GridPlace>({ row: 0, column: 0 });
  const clamp = (x: number, n: number) => Math.max(0, Math.min(n - 1, x));
  const at = { row: clamp(place.row, rows), column: clamp(place.column, columns) };
  const onKeyDown = (event: KeyboardEvent<HTMLTableElement>) => {
    const move = moves[event.key];
    const inCell = event.target instanceof HTMLElement && event.target.dataset.cell !== undefined;
    if (move === undefined || !inCell) return;
    event.preventDefault();
    const next = { row: clamp(at.row + move[0], rows), column: clamp(at.column + move[1], columns) };
    setAt(next);
    event.currentTarget.querySelector<HTMLElement>(`[data-cell="${next.row},${next.column}"]`)?.focus();
  };
  return { at, setAt, onKeyDown };
}
