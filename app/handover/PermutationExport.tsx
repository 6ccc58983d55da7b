import { useEffect, useState } from 'react';
import type { Direction, PermutationFormat } from '../../engine/exchange/writePermutation.ts';
import { saveFile } from '../plot/save.ts';
import { notify } from '../state/notices.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { pool, resultOf } from '../state/vault.ts';
import { fileNameOf } from './names.ts';

interface Told {
  readonly formula: string;
  readonly example: readonly string[];
  readonly selfInverse: boolean;
}

const directions: Readonly<Record<Direction, string>> = {
  'new-to-old': 'new-to-old: the unknown at each position',
  'old-to-new': 'old-to-new: the position of each unknown',
};

/** The order of a trial as a file, in any convention; the convention stands on the screen as it stands in the file. */
export function PermutationExport({ sheet, trial }: { sheet: Sheet; trial: Trial }) {
  const result = resultOf(trial.id);
  const [which, setWhich] = useState<'effective' | 'requested'>('effective');
  const [direction, setDirection] = useState<Direction>('new-to-old');
  const [base, setBase] = useState<0 | 1>(1);
  const [format, setFormat] = useState<PermutationFormat['format']>('matrix-market-array');
  const [told, setTold] = useState<Told | null>(null);
  const order = result?.[which] ?? null;
  useEffect(() => {
    if (order === null) return;
    const task = pool.run('convention', { order, direction, base }, { lane: 'quick' });
    let current = true;
    void task.reply.then((reply) => current && reply.ok && setTold(reply.value));
    return () => {
      current = false;
      task.stop();
    };
  }, [order, direction, base]);
  if (order === null || result === null) return null;
  const sameOrders = result.requested === result.effective;
  const save = async () => {
    const title = `${sheet.name}, ${trial.choice.ordering}, ${which} order`;
    const reply = await pool.run(
      'permutation',
      { order, format: { direction, base, format, title } },
      { lane: 'quick' },
    ).reply;
    if (!reply.ok) return notify(reply.failure.message, true);
    const ending = format === 'plain' ? 'txt' : 'mtx';
    saveFile(fileNameOf(sheet, trial, `${which}-${direction}-${base}-based`, ending), reply.value, 'text/plain');
  };
  return (
    <fieldset className="handover-part">
      <legend>Permutation</legend>
      <div className="fields">
        {sameOrders ? null : (
          <label className="field field-whole">
            <span>order</span>
            <select value={which} onChange={(event) => setWhich(event.target.value as typeof which)}>
              <option value="effective">effective, after the postorder (counts are its)</option>
              <option value="requested">requested, as the method gave it</option>
            </select>
          </label>
        )}
        <label className="field">
          <span>direction</span>
          <select value={direction} onChange={(event) => setDirection(event.target.value as Direction)}>
            {(Object.keys(directions) as Direction[]).map((d) => (
              <option key={d} value={d}>
                {directions[d]}
              </option>
            ))}
          </select>
        </label>
        <label className="field">
          <span>first index</span>
          <select value={base} onChange={(event) => setBase(event.target.value === '0' ? 0 : 1)}>
            <option value={1}>1</option>
            <option value={0}>0</option>
          </select>
        </label>
        <label className="field field-whole">
          <span>file</span>
          <select value={format} onChange={(event) => setFormat(event.target.value as typeof format)}>
            <option value="matrix-market-array">Matrix Market integer array</option>
            <option value="plain">plain text, one number a line</option>
          </select>
        </label>
      </div>
      {told === null ? null : (
        <div className="convention small">
          <p>{told.formula}</p>
          <pre>{told.example.join('\n')}</pre>
          {told.selfInverse ? (
            <p className="soft">This order is its own inverse: both directions are the same file.</p>
          ) : null}
        </div>
      )}
      <button type="button" className="lead" onClick={() => void save()}>
        Save the permutation
      </button>
    </fieldset>
  );
}
