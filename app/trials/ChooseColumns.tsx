import type { RefObject } from 'react';
import { useStore } from 'zustand';
import { terms } from '../help/terms.ts';
import { setSettings, settingsStore } from '../state/settings.ts';
import { chosenColumns, columns } from './columns.ts';

/** Which columns the ledger shows. */
export function ChooseColumns({ ref }: { ref: RefObject<HTMLDialogElement | null> }) {
  const names = useStore(settingsStore, (s) => s.columns);
  const shown = chosenColumns(names).map((c) => c.name);
  const toggle = (name: (typeof shown)[number]) => {
    const next = shown.includes(name) ? shown.filter((n) => n !== name) : [...shown, name];
    if (next.length > 0) setSettings({ columns: next });
  };
  return (
    <dialog ref={ref} aria-labelledby="columns-title" closedby="any">
      <div className="dialog-head">
        <h2 id="columns-title">Columns of the ledger</h2>
        <button type="button" onClick={() => ref.current?.close()}>
          Done
        </button>
      </div>
      <ul className="column-list">
        {columns.map(({ name, head, term }) => (
          <li key={name}>
            <label>
              <input type="checkbox" checked={shown.includes(name)} onChange={() => toggle(name)} />
              <span>
                {head} <span className="small soft">{terms[term]}</span>
              </span>
            </label>
          </li>
        ))}
      </ul>
      <div className="dialog-foot">
        <button type="button" onClick={() => setSettings({ columns: [] })}>
          The usual ones
        </button>
      </div>
    </dialog>
  );
}
