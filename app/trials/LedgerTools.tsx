import { useRef } from 'react';
import { notify } from '../state/notices.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { addTrials, sensibleTrials, undo } from '../state/trials.ts';
import { AddTrial } from './AddTrial.tsx';
import { ChooseColumns } from './ChooseColumns.tsx';
import type { Column } from './columns.ts';
import { ledgerAsCsv } from './csv.ts';
import type { Figures } from './order.ts';

/** What can be done with the ledger as a whole. */
export function LedgerTools(props: {
  sheet: Sheet;
  columns: readonly Column[];
  trials: readonly Trial[];
  figures: Figures;
}) {
  const { sheet, columns, trials, figures } = props;
  const adding = useRef<HTMLDialogElement>(null);
  const choosing = useRef<HTMLDialogElement>(null);
  const last = sheet.past[sheet.past.length - 1];
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(ledgerAsCsv(trials, figures, columns));
      notify('The ledger is on the clipboard as CSV, with exact figures.');
    } catch {
      notify(
        'The browser did not let the page write to the clipboard. The handover panel saves the same table as a file.',
        true,
      );
    }
  };
  return (
    <div className="ledger-tools">
      <h2>Trials</h2>
      <button
        type="button"
        disabled={sheet.facts === null}
        onClick={() => {
          const added = addTrials(sheet.id, sensibleTrials(sheet));
          if (added === 0) notify('Every ordering that suits this matrix is in the ledger already.');
        }}
      >
        Run the sensible set
      </button>
      <button type="button" disabled={sheet.facts === null} onClick={() => adding.current?.showModal()}>
        Add a trial…
      </button>
      <span className="ledger-tools-rest">
        <button type="button" className="plain" disabled={last === undefined} onClick={() => undo(sheet.id)}>
          {last === undefined ? 'Undo' : `Undo ${last.did}`}
        </button>
        <button type="button" className="plain" onClick={() => choosing.current?.showModal()}>
          Columns…
        </button>
        <button type="button" className="plain" disabled={trials.length === 0} onClick={() => void copy()}>
          Copy as CSV
        </button>
      </span>
      <AddTrial ref={adding} sheet={sheet} />
      <ChooseColumns ref={choosing} />
    </div>
  );
}
