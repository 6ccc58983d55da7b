import { createStore } from 'zustand/vanilla';
import type { Failure, MatrixKey } from '../workers/protocol.ts';
import type { ImportSummary } from '../workers/summary.ts';
import type { Trial, TrialId } from './trial.ts';

export type SheetId = string;

/** How far reading has come. */
export interface ReadingState {
  readonly fraction: number;
  readonly phase: string;
  readonly bytesDone: number;
  readonly bytesAll: number | null;
  /** clock reading at the start, milliseconds */
  readonly since: number;
}

/** One matrix laid out on the table. A sheet is being read, or failed with a reason, or holds a matrix. */
export interface Sheet {
  readonly id: SheetId;
  readonly name: string;
  readonly phase: 'reading' | 'failed' | 'ready';
  readonly reading: ReadingState | null;
  readonly failure: Failure | null;
  readonly summary: ImportSummary | null;
  readonly matrix: MatrixKey;
  readonly trials: readonly Trial[];
  /** trials whose maps are on the sheet, in order; at most three beside the original */
  readonly shown: readonly TrialId[];
  /** the trial that proof and handover speak of */
  readonly chosen: TrialId | null;
  /** earlier lists of trials with what was done to them, newest last */
  readonly past: readonly { readonly did: string; readonly trials: readonly Trial[] }[];
}

export interface Sheets {
  readonly sheets: readonly Sheet[];
  readonly current: SheetId | null;
}

export const sheetsStore = createStore<Sheets>()(() => ({ sheets: [], current: null }));

/** The sheet in front, or null. */
export function currentSheet(state: Sheets): Sheet | null {
  return state.sheets.find((s) => s.id === state.current) ?? null;
}

/** The sheet of that id, or null once it is closed. */
export function sheetById(id: SheetId): Sheet | null {
  return sheetsStore.getState().sheets.find((s) => s.id === id) ?? null;
}

/** Changes a sheet; a sheet that has been closed in the meantime stays closed. */
export function changeSheet(id: SheetId, change: (sheet: Sheet) => Partial<Sheet>): void {
  sheetsStore.setState(({ sheets }) => ({ sheets: sheets.map((s) => (s.id === id ? { ...s, ...change(s) } : s)) }));
}

/** Brings a sheet to the front. */
export function bringToFront(id: SheetId): void {
  sheetsStore.setState({ current: id });
}

/** Lays a new sheet on top. */
export function layOut(sheet: Sheet): void {
  sheetsStore.setState(({ sheets }) => ({ sheets: [...sheets, sheet], current: sheet.id }));
}

/** Takes a sheet away; the one before it comes to the front. */
export function takeAway(id: SheetId): void {
  sheetsStore.setState(({ sheets, current }) => {
    const left = sheets.filter((s) => s.id !== id);
    return { sheets: left, current: current === id ? (left[left.length - 1]?.id ?? null) : current };
  });
}
