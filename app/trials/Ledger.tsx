import { useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { asText, bytes } from '../figures/format.ts';
import { settingsStore } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import { AdviceLine } from './AdviceLine.tsx';
import { adviceOn } from './advice.ts';
import { type Column, chosenColumns } from './columns.ts';
import { LedgerHead } from './LedgerHead.tsx';
import { LedgerRow } from './LedgerRow.tsx';
import { LedgerTools } from './LedgerTools.tsx';
import { type Order, rangeOf, sortTrials } from './order.ts';
import { useFigures } from './useFigures.ts';
import { useGridKeys } from './useGridKeys.ts';

/** What the reading line under the ledger says about the figure in hand. */
export interface Reading {
  readonly trial: string;
  readonly column: Column;
  readonly text: string;
}

/** The ledger: one line a trial, figures in columns, and under it the exact reading of the figure in hand. */
export function Ledger({ sheet }: { sheet: Sheet }) {
  const settings = useStore(settingsStore);
  const { columns: names } = settings;
  const limit = settings.target.memoryBytes;
  const [order, setOrder] = useState<Order>({ by: null, falling: false });
  const [reading, setReading] = useState<Reading | null>(null);
  const columns = useMemo(() => chosenColumns(names), [names]);
  const figures = useFigures(sheet);
  const trials = useMemo(() => sortTrials(sheet.trials, figures, order), [sheet.trials, figures, order]);
  const ranges = useMemo(() => columns.map((c) => rangeOf([...figures.values()], c, limit)), [figures, columns, limit]);
  const { facts, trials: all } = sheet;
  const { target, workload } = settings;
  const advice = useMemo(
    () => (facts === null ? null : adviceOn(facts, all, { target, workload })),
    [facts, all, target, workload],
  );
  const keys = useGridKeys(trials.length, columns.length);
  return (
    <div className="ledger">
      <LedgerTools sheet={sheet} columns={columns} trials={trials} figures={figures} />
      {advice === null ? null : <AdviceLine advice={advice} />}
      <div className="ledger-scroll">
        {/* biome-ignore lint/a11y/noNoninteractiveElementToInteractiveRole: a table whose cells take the focus is a grid */}
        <table role="grid" aria-label="Trials" className="ledger-table" onKeyDown={keys.onKeyDown}>
          <LedgerHead columns={columns} order={order} onOrder={setOrder} />
          <tbody>
            {trials.map((trial, row) => (
              <LedgerRow
                key={trial.id}
                sheet={sheet}
                trial={trial}
                figures={figures.get(trial.id) ?? null}
                columns={columns}
                ranges={ranges}
                row={row}
                focusAt={keys.at}
                onFocusAt={keys.setAt}
                onRead={setReading}
              />
            ))}
          </tbody>
        </table>
        {trials.length === 0 ? (
          <p className="ledger-empty soft">No trial yet. Run the sensible set, or add one of your own.</p>
        ) : null}
      </div>
      <p className="ledger-reading small">
        {reading === null ? (
          <span className="soft">
            Exact figures appear here as you move over the ledger or through it with the arrow keys. Dashed: your limit
            of {asText(bytes(limit))}.
          </span>
        ) : (
          <>
            <strong>
              {reading.trial} {reading.column.head}
            </strong>{' '}
            <span className="figure">{reading.text}</span>
          </>
        )}
      </p>
    </div>
  );
}
