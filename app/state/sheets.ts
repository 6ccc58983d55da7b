import { createStore } from 'zustand/vanilla';
import type { Fact } from '../../engine/survey/fact.ts';
import type { FactName } from '../../engine/survey/survey.ts';
import type { Failure, MatrixKey } from '../workers/protocol.ts';
import type { MatrixFacts } from '../workers/rules.ts';
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

/** How far the survey is, and what it has found. */
export interface SurveyState {
  readonly state: 'waiting' | 'running' | 'done' | 'failed';
  readonly fraction: number;
  readonly phase: string;
  readonly failure: Failure | null;
  readonly facts: { readonly [Name in FactName]?: Fact<unknown> };
}

/** One matrix laid out on the table. A sheet is being read, or failed with a reason, or holds a matrix. */
export interface Sheet {
  readonly id: SheetId;
  readonly name: string;
  readonly phase: 'reading' | 'failed' | 'ready';
  readonly reading: ReadingState | null;
  readonly failure: Failure | null;
  readonly summary: ImportSummary | null;
  /** what decides which trials suit; null until the matrix is there */
  readonly facts: MatrixFacts | null;
  readonly survey: SurveyState;
  readonly matrix: MatrixKey;
  /** what came beside the matrix, in words */
  readonly beside: readonly string[];
  /** stamps given away so far */
  readonly stamps: number;
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

/** A sheet on which nothing has come in yet. */
export function freshSheet(id: SheetId, name: string, phase: string, bytesAll: number | null): Sheet {
  return {
    id,
    name,
    phase: 'reading',
    reading: { fraction: 0, phase, bytesDone: 0, bytesAll, since: performance.now() },
    failure: null,
    summary: null,
    facts: null,
    survey: { state: 'waiting', fraction: 0, phase: '', failure: null, facts: {} },
    matrix: id,
    beside: [],
    stamps: 0,
    trials: [],
    shown: [],
    chosen: null,
    past: [],
  };
}

/** Brings a sheet to the front. */
export function bringToFront(id: SheetId | null): void {
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
