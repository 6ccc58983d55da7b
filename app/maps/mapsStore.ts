import { createStore } from 'zustand/vanilla';
import { everything, type Viewport } from './viewport.ts';

/** What all maps of the sheet share: where they look, what they point to, how they shade. Pan, zoom and pointer bypass React. */
export interface MapsState {
  readonly viewport: Viewport;
  /** two original unknowns under the pointer, 0-based, and the pane they were pointed to in; null when nothing is */
  readonly cursor: MapCursor | null;
  readonly shade: 'density' | 'any';
  readonly separators: boolean;
  /** fill path shown in a pane, positions of its order; null for none */
  readonly path: { readonly pane: string; readonly positions: Int32Array; readonly unknowns: Int32Array } | null;
}

export interface MapCursor {
  readonly pane: string;
  /** positions in that pane */
  readonly row: number;
  readonly column: number;
  /** original row and column */
  readonly originalRow: number;
  readonly originalColumn: number;
}

export const mapsStore = createStore<MapsState>()(() => ({
  viewport: everything,
  cursor: null,
  shade: 'density',
  separators: true,
  path: null,
}));

export function setViewport(viewport: Viewport): void {
  mapsStore.setState({ viewport });
}

export function setCursor(cursor: MapCursor | null): void {
  mapsStore.setState({ cursor });
}
