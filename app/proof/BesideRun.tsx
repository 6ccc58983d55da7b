import type { ReactNode } from 'react';
import { type Beside, type BesideProof, stopBeside } from '../state/proofs.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';

/** A run beside the proof: how to start it, how far it is, what it found or why it failed. */
export function BesideRun<T>(props: {
  readonly title: string;
  readonly run: Beside<T> | undefined;
  readonly start: ReactNode;
  readonly sheet: Sheet;
  readonly trial: Trial;
  readonly what: keyof BesideProof;
  readonly children: (value: T) => ReactNode;
}) {
  const { title, run, start, sheet, trial, what, children } = props;
  return (
    <section className="beside" aria-label={title}>
      <h3>{title}</h3>
      {run?.state === 'running' ? (
        <div className="proof-busy">
          <progress value={run.fraction} max={1} aria-label={title} />
          <span className="small">{run.phase || 'waiting for a free worker'}</span>
          <button type="button" onClick={() => stopBeside(sheet.id, trial.id, what)}>
            Stop
          </button>
        </div>
      ) : (
        <div className="proof-start">{start}</div>
      )}
      {run?.state === 'failed' && run.failure !== null ? (
        <p role={run.failure.kind === 'stopped' ? undefined : 'alert'}>{run.failure.message}</p>
      ) : null}
      {run?.value === undefined || run.value === null ? null : children(run.value)}
    </section>
  );
}
