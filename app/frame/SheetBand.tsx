import { useStore } from 'zustand';
import { DropArea } from '../intake/DropArea.tsx';
import { FaultView } from '../intake/FaultView.tsx';
import { ReadingView } from '../intake/ReadingView.tsx';
import { currentSheet, sheetsStore } from '../state/sheets.ts';
import { Boundary } from './Boundary.tsx';
import { MapTable } from './MapTable.tsx';

/** The middle band: the drop area, what is coming in, what went wrong, or the maps. */
export function SheetBand() {
  const sheet = useStore(sheetsStore, currentSheet);
  return (
    <main className="sheet-band" id="sheet">
      {sheet === null ? (
        <DropArea />
      ) : sheet.phase === 'reading' ? (
        <ReadingView sheet={sheet} />
      ) : sheet.phase === 'failed' ? (
        <FaultView sheet={sheet} />
      ) : (
        <Boundary key={sheet.id} part="The sheet">
          <MapTable sheet={sheet} />
        </Boundary>
      )}
    </main>
  );
}
