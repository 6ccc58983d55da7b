import { createStore } from 'zustand/vanilla';
import { everything, type Viewport } from './viewport.ts';

/** What all maps of the sheet share: where they look, what they point to, how they shade. Pan, zoom and pointer bypass React. */
export interface MapsState {
  readonly viewport: Viewport;
  /** where the crosshair stands, and the pane it was set in; null for nowhere */
  readonly cursor: MapCursor | null;
  /** the crosshair stays where it is until it is let go */
  readonly pinned: boolean;
  readonly shade: 'density' | 'any';
  readonly outlines: Outlines;
  /** zoomed maps show the same places of their orders, or the surroundings of the entry that is held */
  readonly linked: 'places' | 'entry';
  /** fill path shown in a pane; null for none */
  readonly path: ShownPath | null;
}

/** What is outlined along the diagonal. `parts`: separators, diagonal blocks, unknowns held last. */
export type Outlines = 'none' | 'parts' | 'supernodes';

export interface ShownPath {
  readonly pane: string;
  /** positions of that pane's order, ends first and last */
  readonly positions: Int32Array;
  /** original unknowns, 0-based */
  readonly unknowns: Int32Array;
}

export interface MapCursor {
  readonly pane: string;
  /** positions in that pane */
  readonly row: number;
  readonly column: number;
  /** original row and column, 0-based */
  readonly originalRow: number;
  readonly originalColumn: number;
  /** moved by keys: what it stands on is then read out */
  readonly byKeys: boolean;
}

export const mapsStore = createStore<MapsState>()(() => ({
  viewport: everything,
  cursor: null,
  pinned: false,
  shade: 'density',
  outlines: 'parts',
  linked: 'places',
  path: null,
}));

export function setViewport(viewport: Viewport): void {
  mapsStore.setState({ viewport });
}

/** Moves the crosshair; a path shown for another place goes away. */
export function setCursor(cursor: MapCursor | null, pinned = false): void {
  mapsStore.setState({ cursor, pinned, path: null });
}

/** Another matrix, or other maps: everything in sight, nothing pointed to. */
export function resetMaps(): void {
  mapsStore.setState({ viewport: everything, cursor: null, pinned: false, path: null });
}
