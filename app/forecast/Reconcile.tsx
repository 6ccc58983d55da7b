import { useState } from 'react';
import { asText, count, exactly, percent } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import { settingsStore } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import { pool, resultOf } from '../state/vault.ts';
import { sayChoice } from '../trials/explain.ts';
import type { Reported } from '../workers/operations.ts';
import type { Answer } from '../workers/protocol.ts';

const asked: readonly (readonly [Reported['what'], string])[] = [
  ['entries', 'factor entries it reported'],
  ['operations', 'operations it reported'],
  ['bytes', 'bytes it reported'],
];

/** Figures that another solver reported, against every convention of counting and every finished trial. */
export function Reconcile({ sheet }: { sheet: Sheet }) {
  const [answers, setAnswers] = useState<Answer<'reconcile'> | null>(null);
  const [busy, setBusy] = useState(false);
  const run = async (data: FormData) => {
    const reported = asked.flatMap(([what]) => {
      const value = Number(String(data.get(what) ?? '').replaceAll(/[\s,_]/g, ''));
      return value > 0 ? [{ what, value }] : [];
    });
    const trials = sheet.trials.flatMap((t) => {
      const result = resultOf(t.id);
      if (t.state !== 'done' || result === null) return [];
      return [{ name: `${t.letter} ${sayChoice(t.choice)}`, result, heldLast: Int32Array.from(t.heldLast) }];
    });
    if (reported.length === 0 || trials.length === 0) {
      notify(reported.length === 0 ? 'Enter at least one figure.' : 'No trial is finished yet.');
      return;
    }
    setBusy(true);
    const ask = { key: sheet.matrix, trials, target: settingsStore.getState().target, reported };
    const reply = await pool.run('reconcile', ask, { lane: 'long', priority: 2, matrices: [sheet.matrix] }).reply;
    setBusy(false);
    if (reply.ok) setAnswers(reply.value);
    else notify(reply.failure.message, true);
  };
  return (
    <details className="reconcile">
      <summary>Reconcile with what your solver reported</summary>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void run(new FormData(event.currentTarget));
        }}
      >
        <div className="fields">
          {asked.map(([what, label]) => (
            <label className="field" key={what}>
              <span>{label}</span>
              <input type="text" inputMode="decimal" name={what} placeholder="left out" />
            </label>
          ))}
        </div>
        <button type="submit" disabled={busy}>
          {busy ? 'comparing…' : 'Find the convention'}
        </button>
      </form>
      {answers?.map(({ what, value, explanations }) => (
        <div key={what} role="status">
          <p>
            <strong>{what}</strong> <span className="figure">{exactly(value)}</span>:{' '}
            {explanations.length === 0
              ? 'no convention and none of the finished trials explains it within 0.5 %. Another ordering, another matrix, or pivoting that moved entries.'
              : ''}
          </p>
          {explanations.length === 0 ? null : (
            <table className="facts-table">
              <tbody>
                {explanations.map((e) => (
                  <tr key={`${e.name} ${e.convention}`}>
                    <th scope="row">
                      {e.convention} <span className="small soft">{e.name}</span>
                    </th>
                    <td className="figure" title={exactly(Math.round(e.value))}>
                      {asText(count(Math.round(e.value)))}
                    </td>
                    <td>{e.distance === 0 ? 'exact' : asText(percent(e.distance))}</td>
                  </tr>
                ))}
              </tbody>
            </table>
          )}
        </div>
      ))}
    </details>
  );
}
