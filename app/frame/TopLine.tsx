import { useRef } from 'react';
import { useStore } from 'zustand';
import { asText, bytes, count, exactly, rate } from '../figures/format.ts';
import { closeSheet } from '../intake/closing.ts';
import { settingsStore } from '../state/settings.ts';
import { bringToFront, currentSheet, sheetsStore } from '../state/sheets.ts';
import type { MatrixFacts } from '../workers/rules.ts';
import { Mark } from './Mark.tsx';
import { SettingsDialog } from './SettingsDialog.tsx';

/** What the matrix is, in the words of the trade, as measured and not as declared. */
function natureOf(facts: MatrixFacts): string {
  const field = facts.complex ? 'complex' : facts.hasValues ? 'real' : 'pattern';
  if (facts.rows !== facts.columns) return `${field}, rectangular`;
  if (facts.complex && facts.hermitian) return 'complex hermitian';
  if (facts.hasValues && facts.valueSymmetric) return `${field} symmetric`;
  if (facts.patternSymmetric) return facts.hasValues ? `${field}, symmetric in pattern` : 'symmetric pattern';
  return `${field}, unsymmetric`;
}

/** The title block: which matrix, and for which machine and work everything on the page is reckoned. */
export function TopLine() {
  const sheets = useStore(sheetsStore, (s) => s.sheets);
  const sheet = useStore(sheetsStore, currentSheet);
  const { target, workload } = useStore(settingsStore);
  const dialog = useRef<HTMLDialogElement>(null);
  const summary = sheet?.summary ?? null;
  return (
    <>
      <header className="topline">
        <h1 className="topline-name">
          <Mark />
          Fillcast
        </h1>
        <div className="topline-matrix">
          {sheets.length > 1 || (sheet === null && sheets.length > 0) ? (
            <label>
              <span className="unseen">Matrix in front</span>
              <select
                value={sheet?.id ?? ''}
                onChange={(event) => bringToFront(event.target.value === '' ? null : event.target.value)}
              >
                {sheet === null ? <option value="">an empty sheet</option> : null}
                {sheets.map((s) => (
                  <option key={s.id} value={s.id}>
                    {s.name}
                  </option>
                ))}
              </select>
            </label>
          ) : (
            <strong>{sheet?.name}</strong>
          )}
          {sheet === null ? (
            <p className="soft">A survey, a forecast and a proof for your sparse matrix</p>
          ) : (
            <>
              {summary === null ? null : (
                <span className="topline-facts">
                  <span className="figure">
                    {exactly(summary.rows)} × {exactly(summary.columns)}
                  </span>
                  <span className="figure" title={`${exactly(summary.entries)} entries`}>
                    {asText(count(summary.entries))} entries
                  </span>
                  {sheet.facts === null ? null : <span>{natureOf(sheet.facts)}</span>}
                </span>
              )}
              <button type="button" className="plain small" onClick={() => closeSheet(sheet.id)}>
                {sheet.phase === 'reading' ? 'stop' : 'put away'}
                <span className="unseen"> {sheet.name}</span>
              </button>
              <button type="button" className="plain small" onClick={() => bringToFront(null)}>
                open another
              </button>
            </>
          )}
        </div>
        <button type="button" className="topline-setting" onClick={() => dialog.current?.showModal()}>
          <span className="small soft">target</span>
          <span className="figure">
            {asText(bytes(target.memoryBytes))}
            <span className="wide-only">
              {' '}
              · {asText(rate(target.largeRate))} · {target.cores} {target.cores === 1 ? 'core' : 'cores'}
            </span>
          </span>
        </button>
        <button type="button" className="topline-setting" onClick={() => dialog.current?.showModal()}>
          <span className="small soft">workload</span>
          <span className="figure">
            {exactly(workload.factorizations)} × {exactly(workload.rightHandSides)}
            <span className="wide-only small"> factorizations × right-hand sides</span>
          </span>
        </button>
      </header>
      <SettingsDialog ref={dialog} />
    </>
  );
}
