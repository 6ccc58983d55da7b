import { useState } from 'react';
import { saveFile } from '../plot/save.ts';
import { notify } from '../state/notices.ts';
import type { Sheet } from '../state/sheets.ts';
import { pool } from '../state/vault.ts';

/** The matrix as read, sorted and summed, written out in either format. */
export function SaveMatrix({ sheet }: { sheet: Sheet }) {
  const [format, setFormat] = useState<'matrix-market' | 'rutherford-boeing'>('matrix-market');
  const [half, setHalf] = useState(false);
  const [busy, setBusy] = useState(false);
  const save = async () => {
    setBusy(true);
    const key = sheet.matrix;
    const { reply } = pool.run('matrixFile', { key, format, half }, { lane: 'long', priority: 6, matrices: [key] });
    const written = await reply;
    setBusy(false);
    if (!written.ok) {
      if (written.failure.kind !== 'stopped') notify(written.failure.message, true);
      return;
    }
    const bare = sheet.name.replace(/\.[^.]*$/, '').replace(/[^\w.-]+/g, '-');
    saveFile(`${bare}-clean.${format === 'matrix-market' ? 'mtx' : 'rb'}`, written.value, 'text/plain');
  };
  return (
    <>
      <h3>Save it cleaned</h3>
      <p className="small soft">Sorted, duplicates merged, in the numbering of the file, counted from 1.</p>
      <div className="with-unit save-matrix">
        <label>
          <span className="unseen">Format</span>
          <select value={format} onChange={(event) => setFormat(event.target.value as typeof format)}>
            <option value="matrix-market">Matrix Market</option>
            <option value="rutherford-boeing">Rutherford–Boeing</option>
          </select>
        </label>
        <label>
          <span className="unseen">Entries</span>
          <select value={half ? 'half' : 'full'} onChange={(event) => setHalf(event.target.value === 'half')}>
            <option value="full">all entries</option>
            <option value="half">one triangle</option>
          </select>
        </label>
        <button type="button" disabled={busy} onClick={() => void save()}>
          {busy ? 'Writing…' : 'Save the matrix'}
        </button>
      </div>
    </>
  );
}
