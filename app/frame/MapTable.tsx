import { Suspense } from 'react';
import { useStore } from 'zustand';
import type { Pane } from '../maps/contract.ts';
import { Maps } from '../maps/Maps.tsx';
import type { Sheet } from '../state/sheets.ts';
import { type SheetView, setSheetView, viewStore } from '../state/view.ts';
import { sayChoice } from '../trials/explain.ts';
import { Comparison, Growth, TreeView } from './later.ts';
import { Tabs } from './Tabs.tsx';
import { useStable } from './useStable.ts';

const views: readonly { name: SheetView; label: string }[] = [
  { name: 'maps', label: 'Maps' },
  { name: 'tree', label: 'Tree' },
  { name: 'comparison', label: 'Comparison' },
  { name: 'growth', label: 'Growth' },
];

/** The maps that a sheet shows now: the original first, then the trials put on the sheet. */
function panesOf({ matrix, shown, trials }: Sheet): readonly Pane[] {
  const original: Pane = { id: matrix, letter: '', title: 'as read', matrix, trial: null, held: 0 };
  return [
    original,
    ...shown.flatMap((id) => {
      const trial = trials.find((t) => t.id === id);
      if (trial === undefined || trial.state !== 'done') return [];
      return [
        { id, letter: trial.letter, title: sayChoice(trial.choice), matrix, trial: id, held: trial.heldLast.length },
      ];
    }),
  ];
}

/** What lies on the sheet once a matrix is there. */
export function MapTable({ sheet }: { sheet: Sheet }) {
  const pointing = useStore(viewStore, (v) => v.pointing);
  const view = useStore(viewStore, (v) => v.sheetView);
  const panes = useStable(panesOf(sheet));
  if (sheet.summary === null) return null;
  return (
    <Tabs
      id="sheet-view"
      label="What lies on the sheet"
      tabs={views}
      chosen={view}
      onChoose={setSheetView}
      className="sheet-tabs"
    >
      <Suspense fallback={<p className="soft">being opened…</p>}>
        {view === 'comparison' ? (
          <Comparison sheet={sheet} />
        ) : view === 'growth' ? (
          <Growth />
        ) : view === 'tree' ? (
          <TreeView sheet={sheet} />
        ) : (
          <Maps
            name={sheet.name}
            panes={panes}
            rows={sheet.summary.rows}
            columns={sheet.summary.columns}
            pointing={pointing}
          />
        )}
      </Suspense>
    </Tabs>
  );
}
