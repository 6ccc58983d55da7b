import { useEffect } from 'react';
import { useStore } from 'zustand';
import { DropTarget } from '../intake/DropTarget.tsx';
import { followTarget } from '../state/forecasts.ts';
import { followTheme, settingsStore } from '../state/settings.ts';
import { currentSheet, sheetsStore } from '../state/sheets.ts';
import { pool } from '../state/vault.ts';
import { LowerBand } from './LowerBand.tsx';
import { Notices } from './Notices.tsx';
import { QuestionDialog } from './QuestionDialog.tsx';
import { SheetBand } from './SheetBand.tsx';
import { TopLine } from './TopLine.tsx';

/** The page: three bands that never scroll away from each other, and a drop target under everything. */
export function App() {
  const share = useStore(settingsStore, (s) => s.ledgerShare);
  const sheet = useStore(sheetsStore, currentSheet);
  useEffect(followTheme, []);
  useEffect(followTarget, []);
  useEffect(() => pool.warm(), []);
  useEffect(() => {
    document.title = sheet === null ? 'Fillcast' : `${sheet.name} – Fillcast`;
  }, [sheet]);
  return (
    <DropTarget>
      <div className="app" style={{ '--ledger-share': share } as React.CSSProperties}>
        <a className="skip" href="#lower">
          Skip to the {sheet === null ? 'worked examples' : 'trials'}
        </a>
        <TopLine />
        <SheetBand />
        <LowerBand />
      </div>
      <Notices />
      <QuestionDialog />
    </DropTarget>
  );
}
