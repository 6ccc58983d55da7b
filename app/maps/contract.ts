import type { Pointing } from '../state/view.ts';
import type { MatrixKey } from '../workers/protocol.ts';

/** One map on the sheet. */
export interface Pane {
  /** stable while the pane shows the same thing */
  readonly id: string;
  /** the trial's stamp, "A"; empty for the original */
  readonly letter: string;
  /** in words: "as read", "minimum degree, Cholesky" */
  readonly title: string;
  readonly matrix: MatrixKey;
  /** the trial whose order and factor are drawn; null draws the matrix as read */
  readonly trial: string | null;
  /** unknowns kept at the end of the trial's order */
  readonly held: number;
}

/** What the page gives to the maps. Zoom, pan and crosshair are the maps' own, and linked between the panes. */
export interface MapsProps {
  /** of the sheet; names exported pictures */
  readonly name: string;
  /** one to four, of equal scale */
  readonly panes: readonly Pane[];
  readonly rows: number;
  readonly columns: number;
  /** what to mark and go to, in original numbering; null for nothing */
  readonly pointing: Pointing | null;
}
