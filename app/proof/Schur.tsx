import { useState } from 'react';
import { useStore } from 'zustand';
import { asText, exactly, plainNumber, seconds } from '../figures/format.ts';
import { fileNameOf } from '../handover/names.ts';
import { saveFile } from '../plot/save.ts';
import { WideTable } from '../plot/WideTable.tsx';
import { besideStore, startSchur } from '../state/proofs.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import type { ProofWish, SchurAnswer } from '../workers/proofOperations.ts';
import { BesideRun } from './BesideRun.tsx';

function Corner({ answer }: { answer: SchurAnswer }) {
  const { corner, complex, rows } = answer;
  const at = (r: number, c: number): string => {
    const k = (c * corner.size + r) * (complex ? 2 : 1);
    const re = asText(plainNumber(corner.values[k]));
    if (!complex) return re;
    const im = corner.values[k + 1];
    return `${re} ${im < 0 ? '−' : '+'} ${asText(plainNumber(Math.abs(im)))}i`;
  };
  const places = Array.from({ length: corner.size }, (_, k) => k);
  return (
    <WideTable label="Corner of the Schur complement">
      <table className="facts-table">
        <caption className="small soft">
          {corner.size < answer.size
            ? `The first ${corner.size} of ${exactly(answer.size)} rows and columns`
            : 'All of it'}
          , by original unknown, from 1
        </caption>
        <thead>
          <tr>
            <td />
            {places.map((c) => (
              <th scope="col" key={c}>
                {exactly(rows[c] + 1)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {places.map((r) => (
            <tr key={r}>
              <th scope="row">{exactly(rows[r] + 1)}</th>
              {places.map((c) => (
                <td key={c} className="figure">
                  {at(r, c)}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </WideTable>
  );
}

/** The Schur complement onto the unknowns that the trial holds last. */
export function Schur({ sheet, trial, wish }: { sheet: Sheet; trial: Trial; wish: ProofWish }) {
  const run = useStore(besideStore, (s) => s[trial.id]?.schur);
  const [failures, setFailures] = useState<'append' | 'perturb'>('append');
  if (trial.heldLast.length === 0 || trial.choice.factorization === 'column-lu') return null;
  return (
    <BesideRun
      title="Schur complement"
      run={run}
      start={
        <>
          <label className="small">
            pivots that fail at its boundary{' '}
            <select value={failures} onChange={(event) => setFailures(event.target.value as 'append' | 'perturb')}>
              <option value="append">are appended to it</option>
              <option value="perturb">are replaced</option>
            </select>
          </label>
          <button type="button" onClick={() => startSchur(sheet.id, trial.id, failures, wish)}>
            Compute it, {exactly(trial.heldLast.length)} unknowns
          </button>
        </>
      }
      sheet={sheet}
      trial={trial}
      what="schur"
    >
      {(answer) => (
        <>
          {answer.notes.map((note) => (
            <p key={note}>{note}</p>
          ))}
          <Corner answer={answer} />
          <p className="small">
            Made in {asText(seconds(answer.seconds))} <span className="kind">measured</span>{' '}
            <button
              type="button"
              className="plain"
              onClick={() => saveFile(fileNameOf(sheet, trial, 'schur', 'mtx'), answer.file, 'text/plain')}
            >
              save it as Matrix Market
            </button>
          </p>
        </>
      )}
    </BesideRun>
  );
}
