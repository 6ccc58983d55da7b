import { useStore } from 'zustand';
import { BreakEven } from '../forecast/BreakEven.tsx';
import { Bars } from '../plot/Bars.tsx';
import { settingsStore } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import type { FigureName } from '../workers/trialFigures.ts';
import { columns } from './columns.ts';
import { costsOf } from './costs.ts';
import { sayChoice } from './explain.ts';
import { useFigures } from './useFigures.ts';

/** What is compared, in this order. */
const compared: readonly FigureName[] = [
  'factorEntries',
  'operations',
  'peakBytes',
  'criticalPath',
  'largestFront',
  'factorSeconds',
  'totalSeconds',
];

/** The trials side by side, figure by figure. */
export function Comparison({ sheet }: { sheet: Sheet }) {
  const figures = useFigures(sheet);
  const { target, workload } = useStore(settingsStore);
  const limit = target.memoryBytes;
  const trials = sheet.trials.filter((t) => figures.has(t.id));
  const costs = costsOf(trials, target.cores);
  if (trials.length === 0) return <p className="soft">No trial is finished yet.</p>;
  return (
    <div className="comparison">
      <h2 className="unseen">Comparison of the trials</h2>
      {compared.map((name) => {
        const column = columns.find((c) => c.name === name);
        if (column === undefined) return null;
        const bars = trials.flatMap((t) => {
          const all = figures.get(t.id);
          const value = all?.[name].value ?? null;
          if (all === undefined || value === null) return [];
          const fill = name === 'factorEntries' ? all.fillIn.value : null;
          return [{ letter: t.letter, name: sayChoice(t.choice), value, fill }];
        });
        if (bars.length === 0) return null;
        return (
          <Bars
            key={name}
            title={column.head}
            file={`comparison-${name}`}
            bars={bars}
            write={column.write}
            limit={column.againstMemory ? limit : null}
          />
        );
      })}
      {costs.length < 2 ? null : <BreakEven costs={costs} workload={workload} />}
    </div>
  );
}
