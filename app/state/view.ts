import { createStore } from 'zustand/vanilla';

/** Panels beside the ledger. `trials` is one of them only where the page is narrow. */
export type PanelName = 'trials' | 'survey' | 'forecast' | 'import' | 'proof' | 'handover';

/** What lies on the sheet. */
export type SheetView = 'maps' | 'tree' | 'comparison' | 'growth';

/** Lines or entries that a fact, a pivot or a fault points to; the maps mark them and go there. */
export interface Pointing {
  /** counts up, so that pointing twice to the same place is noticed */
  readonly serial: number;
  /** what they are, in words */
  readonly label: string;
  readonly axis: 'rows' | 'columns' | 'unknowns' | 'entries';
  /** original numbering, 0-based; entries as row, column, row, column … */
  readonly indices: Int32Array;
}

/** Where the user is looking; not kept between visits. */
export interface View {
  readonly panel: PanelName;
  readonly sheetView: SheetView;
  readonly pointing: Pointing | null;
}

export const viewStore = createStore<View>()(() => ({ panel: 'trials', sheetView: 'maps', pointing: null }));

export function openPanel(panel: PanelName): void {
  viewStore.setState({ panel });
}

export function setSheetView(sheetView: SheetView): void {
  viewStore.setState({ sheetView });
}

let serial = 0;

/** Points the maps to something; they come to the front. */
export function pointTo(pointing: Omit<Pointing, 'serial'>): void {
  viewStore.setState({ pointing: { ...pointing, serial: ++serial }, sheetView: 'maps' });
}

export function pointToNothing(): void {
  viewStore.setState({ pointing: null });
}
