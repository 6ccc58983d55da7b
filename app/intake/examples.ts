import { createStore } from 'zustand/vanilla';
import { notify } from '../state/notices.ts';
import { freshSheet, layOut } from '../state/sheets.ts';
import { follow } from '../state/tasks.ts';
import { newMatrixKey, pool } from '../state/vault.ts';
import type { Plate } from '../workers/operations.ts';
import { settle } from './settle.ts';

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
  layOut(freshSheet(key, plate.title, 'making the example', null));
  const task = pool.run('example', { key, id: plate.id, size }, { lane: 'long', priority: 10, makes: key });
  follow(key, 'read', task);
  void task.reply.then((reply) => settle(key, reply));
}
