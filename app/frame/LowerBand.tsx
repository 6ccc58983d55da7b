import { Suspense, useEffect } from 'react';
import { useStore } from 'zustand';
import { ImportPanel } from '../intake/ImportPanel.tsx';
import { Plates } from '../intake/Plates.tsx';
import { currentSheet, type Sheet, sheetsStore } from '../state/sheets.ts';
import { openPanel, type PanelName, viewStore } from '../state/view.ts';
import { SurveyPanel } from '../survey/SurveyPanel.tsx';
import { Ledger } from '../trials/Ledger.tsx';
import { Boundary } from './Boundary.tsx';
import { ForecastPanel, fetchAhead, HandoverPanel, ProofPanel } from './later.ts';
import { Splitter } from './Splitter.tsx';
import { Tabs } from './Tabs.tsx';
import { useWide } from './useWide.ts';

const panels: readonly { name: PanelName; label: string }[] = [
  { name: 'survey', label: 'Survey' },
  { name: 'forecast', label: 'Forecast' },
  { name: 'proof', label: 'Proof' },
  { name: 'handover', label: 'Handover' },
  { name: 'import', label: 'Import' },
];
const withTrials: typeof panels = [{ name: 'trials', label: 'Trials' }, ...panels];

function Panel({ name, sheet }: { name: PanelName; sheet: Sheet }) {
  switch (name) {
    case 'import':
      return <ImportPanel sheet={sheet} />;
    case 'forecast':
      return <ForecastPanel sheet={sheet} />;
    case 'handover':
      return <HandoverPanel sheet={sheet} />;
    case 'proof':
      return <ProofPanel sheet={sheet} />;
    case 'trials':
      return <Ledger sheet={sheet} />;
    default:
      return <SurveyPanel sheet={sheet} />;
  }
}

/** The ledger with the panels beside it; where the page is narrow, one of them at a time. */
function Work({ sheet }: { sheet: Sheet }) {
  const wide = useWide();
  useEffect(fetchAhead, []);
  const asked = useStore(viewStore, (v) => v.panel);
  const name = wide && asked === 'trials' ? 'survey' : asked;
  return (
    <div className="work">
      {wide ? (
        <Boundary part="The ledger">
          <Ledger sheet={sheet} />
        </Boundary>
      ) : null}
      <Tabs
        id="panels"
        label="Panels"
        tabs={wide ? panels : withTrials}
        chosen={name}
        onChoose={openPanel}
        className={name === 'trials' ? 'tabs-bare' : ''}
      >
        <Boundary key={`${sheet.id} ${name}`} part="This panel">
          <Suspense fallback={<p className="soft">being opened…</p>}>
            <Panel name={name} sheet={sheet} />
          </Suspense>
        </Boundary>
      </Tabs>
    </div>
  );
}

/** The lower band: the worked examples while nothing is open, else the ledger of trials with the panels beside it. */
export function LowerBand() {
  const sheet = useStore(sheetsStore, currentSheet);
  return (
    <section
      className="lower-band"
      id="lower"
      tabIndex={-1}
      aria-label={sheet === null ? 'Worked examples' : 'Trials and panels'}
    >
      <Splitter />
      <div className="lower-content">{sheet === null ? <Plates /> : <Work sheet={sheet} />}</div>
    </section>
  );
}
