import { useState } from 'react';
import { asText, count, exactly } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import type { Sheet } from '../state/sheets.ts';
import { follow, stopTask } from '../state/tasks.ts';
import { pool, resultOf } from '../state/vault.ts';
import type { Answer } from '../workers/protocol.ts';

const runs = 5;

/** How far each trial's fill hangs on seeds and on the numbering of the file, and which differences are none. */
export function Spread({ sheet }: { sheet: Sheet }) {
  const [fraction, setFraction] = useState<number | null>(null);
  const [shown, setShown] = useState<readonly (Answer<'spread'>[number] & { readonly letter: string })[] | null>(null);
  const run = async () => {
    const done = sheet.trials.flatMap((t) => {
      const result = resultOf(t.id);
      return t.state !== 'done' || result === null || t.outcome?.counts.factorEntries == null ? [] : [{ t, result }];
    });
    if (done.length === 0) {
      notify('No trial with counts is finished yet.');
      return;
    }
    setFraction(0);
    const trials = done.map(({ t, result }) => ({ result, heldLast: Int32Array.from(t.heldLast) }));
    const task = pool.run(
      'spread',
      { key: sheet.matrix, trials, runs },
      { lane: 'long', matrices: [sheet.matrix], hear: (heard) => setFraction(heard.fraction) },
    );
    follow(sheet.id, 'spread', task);
    const reply = await task.reply;
    setFraction(null);
    if (reply.ok) setShown(reply.value.map((s, k) => ({ ...s, letter: done[k].t.letter })));
    else if (reply.failure.kind !== 'stopped') notify(reply.failure.message, true);
  };
  return (
    <details className="reconcile">
      <summary>Which differences are real?</summary>
      <p className="small soft">
        Runs every finished trial again on {runs - 1} seeded renumberings. Where the runs of two trials overlap, their
        difference is none.
      </p>
      {fraction === null ? (
        <button type="button" onClick={() => void run()}>
          Run the spread
        </button>
      ) : (
        <div className="proof-busy">
          <progress value={fraction} max={1} aria-label="Spread" />
          <button type="button" onClick={() => stopTask(sheet.id, 'spread')}>
            Stop
          </button>
        </div>
      )}
      {shown === null ? null : (
        <table className="facts-table against">
          <caption className="small soft">factor entries over {runs} numberings</caption>
          <thead>
            <tr>
              <th scope="col">trial</th>
              <th scope="col">least</th>
              <th scope="col">median</th>
              <th scope="col">most</th>
              <th scope="col">against the best</th>
            </tr>
          </thead>
          <tbody>
            {shown.map((s) => (
              <tr key={s.letter}>
                <th scope="row">{s.letter}</th>
                {(['least', 'median', 'most'] as const).map((name) => (
                  <td key={name} className="figure" title={exactly(s.factorEntries?.[name] ?? 0)}>
                    {s.factorEntries === null ? '–' : asText(count(s.factorEntries[name]))}
                  </td>
                ))}
                <td>{s.noDifference ? 'no difference' : s.runs === 1 ? 'has but one run' : ''}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </details>
  );
}
