import { useState } from 'react';
import { useStore } from 'zustand';
import { asText, seconds } from '../figures/format.ts';
import { besideStore, startReuse } from '../state/proofs.ts';
import { type Sheet, sheetsStore } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import type { ProofWish } from '../workers/proofOperations.ts';
import { BesideRun } from './BesideRun.tsx';
import { VerdictMark } from './Verdict.tsx';

/** Another open matrix factorized on the analysis of this trial: a second time step, new values on the same pattern. */
export function SecondMatrix({ sheet, trial, wish }: { sheet: Sheet; trial: Trial; wish: ProofWish }) {
  const run = useStore(besideStore, (s) => s[trial.id]?.reuse);
  const sheets = useStore(sheetsStore, (s) => s.sheets);
  const others = sheets.filter((s) => s.id !== sheet.id && s.phase === 'ready');
  const [picked, setPicked] = useState<string | null>(null);
  const other = others.find((s) => s.id === picked) ?? others[0];
  return (
    <BesideRun
      title="New values on the same analysis"
      run={run}
      start={
        other === undefined ? (
          <p className="small soft">
            Open a second matrix, of another time step or with other values: it can then be factorized here without
            repeating the analysis.
          </p>
        ) : (
          <>
            <label className="small">
              matrix{' '}
              <select value={other.id} onChange={(event) => setPicked(event.target.value)}>
                {others.map((s) => (
                  <option key={s.id} value={s.id}>
                    {s.name}
                  </option>
                ))}
              </select>
            </label>
            <button type="button" onClick={() => startReuse(sheet.id, trial.id, other.id, wish)}>
              Factorize it
            </button>
          </>
        )
      }
      sheet={sheet}
      trial={trial}
      what="reuse"
    >
      {({ notices, card, seconds: took, reused }) => (
        <>
          <p className="small soft">{run?.name}</p>
          {notices.map((notice) => (
            <p key={notice}>{notice}</p>
          ))}
          <div className="proof-verdict">
            <VerdictMark verdict={card.verdict} />
            <ul>
              {card.reasons.map((reason) => (
                <li key={reason}>{reason}</li>
              ))}
            </ul>
          </div>
          <p className="small">
            Numeric phase: first matrix {asText(seconds(took.first))}, second {asText(seconds(took.second))}
            {reused ? ', no analysis' : `, after a new analysis of ${asText(seconds(took.analysis))}`}{' '}
            <span className="kind">measured</span>
          </p>
        </>
      )}
    </BesideRun>
  );
}
