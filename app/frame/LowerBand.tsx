import { useStore } from 'zustand';
import { Plates } from '../intake/Plates.tsx';
import { currentSheet, sheetsStore } from '../state/sheets.ts';
import { Ledger } from '../trials/Ledger.tsx';

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
      {sheet === null ? <Plates /> : <Ledger sheet={sheet} />}
    </section>
  );
}
