import { useMemo } from 'react';
import { useStore } from 'zustand';
import { settingsStore } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import { figuresOf } from '../workers/trialFigures.ts';
import type { Figures } from './order.ts';

/** The figures of the finished trials of a sheet, for the target in force. */
export function useFigures({ trials, facts }: Sheet): Figures {
  const { target, workload } = useStore(settingsStore);
  return useMemo(
    () =>
      new Map(
        trials.flatMap(({ id, choice, outcome, forecast, proof }) =>
          outcome === null || facts === null
            ? []
            : [[id, figuresOf(outcome, choice, facts, target, workload, forecast, proof.proof)] as const],
        ),
      ),
    [trials, facts, target, workload],
  );
}
