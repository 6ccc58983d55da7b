import { useEffect, useState } from 'react';
import { pool } from '../state/vault.ts';
import type { Spot } from '../workers/mapOperations.ts';
import type { CellFacts } from './draw.ts';
import type { MapCursor } from './mapsStore.ts';
import { type PaneControl, paneControls } from './paneControl.ts';
import { useCalm } from './useCalm.ts';

/** What the crosshair stands on. */
export interface Reading {
  readonly cursor: MapCursor;
  readonly control: PaneControl;
  readonly facts: CellFacts | null;
  /** a single position: what stands there; null until known, and for a cell of several positions */
  readonly spot: Spot | null;
  /** positions of the supernode that holds the column, start and end; null where columns are not grouped */
  readonly supernode: readonly [number, number] | null;
}

/** Waits so long before it asks what stands under a moving pointer, in milliseconds. */
const restBeforeAsking = 60;

/** Follows the crosshair. `drawn` counts up with every new image, so that a cell known only now is read too. */
export function useReading(drawn: number): Reading | null {
  const cursor = useCalm((s) => s.cursor);
  const [asked, setAsked] = useState<{ cursor: MapCursor; spot: Spot } | null>(null);
  const control = cursor === null ? undefined : paneControls.get(cursor.pane);
  const single = cursor !== null && control !== undefined && isSingle(control.facts(cursor));

  // biome-ignore lint/correctness/useExhaustiveDependencies: `drawn` stands for the images
  useEffect(() => {
    if (cursor === null || control === undefined || !single) return;
    const { pane } = control;
    let task: { stop(): void } | null = null;
    const timer = setTimeout(() => {
      const running = pool.run(
        'spot',
        { key: pane.matrix, trial: pane.trial, row: cursor.row, column: cursor.column },
        { lane: 'quick', matrices: [pane.matrix], priority: 1 },
      );
      task = running;
      void running.reply.then((reply) => {
        if (reply.ok && reply.value !== null) setAsked({ cursor, spot: reply.value });
      });
    }, restBeforeAsking);
    return () => {
      clearTimeout(timer);
      task?.stop();
    };
  }, [cursor, control, single, drawn]);

  if (cursor === null || control === undefined) return null;
  return {
    cursor,
    control,
    facts: control.facts(cursor),
    spot: single && asked?.cursor === cursor ? asked.spot : null,
    supernode: supernodeOf(control, cursor),
  };
}

function isSingle(facts: CellFacts | null): boolean {
  return facts !== null && facts.rowEnd - facts.rowStart === 1 && facts.columnEnd - facts.columnStart === 1;
}

function supernodeOf(control: PaneControl, cursor: MapCursor): readonly [number, number] | null {
  const start = control.outlines?.supernodes ?? null;
  if (start === null) return null;
  const column = Math.min(cursor.row, cursor.column);
  let low = 0;
  let high = start.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (start[middle] <= column) low = middle;
    else high = middle - 1;
  }
  return [start[low], start[low + 1]];
}
