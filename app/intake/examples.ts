import { createStore } from 'zustand/vanilla';
import { notify, say } from '../state/notices.ts';
import { changeSheet, layOut, sheetById } from '../state/sheets.ts';
import { keepMatrix, newMatrixKey, pool } from '../state/vault.ts';
import type { Plate } from '../workers/operations.ts';

/** The worked examples as they get drawn. */
export const platesStore = createStore<{ readonly plates: readonly Plate[] }>()(() => ({ plates: [] }));

let asked = false;

/** Draws the worked examples once; they appear one after the other. */
export function drawPlates(): void {
  if (asked) return;
  asked = true;
  const add = (plate: Plate) => platesStore.setState(({ plates }) => ({ plates: [...plates, plate] }));
  const task = pool.run('plates', { cells: 72 }, { lane: 'quick', hear: ({ early }) => early !== null && add(early) });
  void task.reply.then((reply) => {
    if (reply.ok) platesStore.setState({ plates: reply.value });
    else notify(`The worked examples could not be drawn. ${reply.failure.message}`, true);
  });
}

/** Lays out a worked example. */
export function openExample(plate: Plate, size: number): void {
  const key = newMatrixKey();
  layOut({
    id: key,
    name: plate.title,
    phase: 'reading',
    reading: { fraction: 0, phase: 'making the example', bytesDone: 0, bytesAll: null, since: performance.now() },
    failure: null,
    summary: null,
    matrix: key,
    trials: [],
    shown: [],
    chosen: null,
    past: [],
  });
  const task = pool.run('example', { key, id: plate.id, size }, { lane: 'long', priority: 10, makes: key });
  void task.reply.then((reply) => {
    if (sheetById(key) === null) return;
    if (!reply.ok) {
      changeSheet(key, () => ({ phase: 'failed', failure: reply.failure, reading: null }));
      return;
    }
    const { summary, loaded } = reply.value;
    keepMatrix(key, loaded);
    changeSheet(key, () => ({ phase: 'ready', summary, name: summary.name, reading: null }));
    say(`${summary.name} is ready.`);
  });
}
