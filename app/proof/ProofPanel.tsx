import { useState } from 'react';
import { asText, percent } from '../figures/format.ts';
import { Term } from '../help/Term.tsx';
import { startProof, stopProof, usualWish } from '../state/proofs.ts';
import type { Sheet } from '../state/sheets.ts';
import type { ProofState, ShownProof, Trial } from '../state/trial.ts';
import { resultOf } from '../state/vault.ts';
import { pointTo } from '../state/view.ts';
import { sayChoice } from '../trials/explain.ts';
import { whyNoProof } from '../workers/rules.ts';
import { Accuracy } from './Accuracy.tsx';
import { Against } from './Against.tsx';
import { EffectTable } from './Effect.tsx';
import { HowToSolve } from './HowToSolve.tsx';
import { Refinement } from './Refinement.tsx';
import { Schur } from './Schur.tsx';
import { SecondMatrix } from './SecondMatrix.tsx';
import { Sweep } from './Sweep.tsx';
import { VerdictMark } from './Verdict.tsx';

/** Why a run could not be completed, with a way to the row it names. */
function Failed({ failure }: { failure: NonNullable<ProofState['failure']> }) {
  const { row } = failure.place;
  return (
    <div role="alert" className="proof-failed">
      <p>{failure.message}</p>
      {row === undefined ? null : (
        <button
          type="button"
          className="plain"
          onClick={() => pointTo({ label: `row ${row + 1}`, axis: 'unknowns', indices: Int32Array.of(row) })}
        >
          Show row {row + 1} in the map
        </button>
      )}
    </div>
  );
}

function Shown({ proof }: { proof: ShownProof }) {
  const { card, report } = proof;
  return (
    <>
      <div className="proof-verdict">
        <VerdictMark verdict={card.verdict} />
        <ul>
          {card.reasons.map((reason) => (
            <li key={reason}>{reason}</li>
          ))}
        </ul>
      </div>
      <h3>Forecast against proof</h3>
      <Against proof={proof} />
      <h3>
        Accuracy <span className="kind">measured</span>
      </h3>
      <Accuracy card={card} />
      <Refinement steps={card.refinement} />
      {[...card.cautions, ...report.notes].map((text) => (
        <p key={text} className="small soft">
          {text}
        </p>
      ))}
      <p className="caution-note small">
        <strong>Caution.</strong> A small residual does not validate the model behind the matrix. Seconds in a browser
        are not seconds of your solver. What people’s safety rests on stays under the local codes and licensed practice.
      </p>
    </>
  );
}

/** Proof of one trial. */
function ProofOf({ sheet, trial }: { sheet: Sheet; trial: Trial }) {
  const [wish, setWish] = useState(usualWish);
  const { state, fraction, phase, failure, proof } = trial.proof;
  const why = sheet.facts === null ? null : whyNoProof(sheet.facts, trial.choice);
  const effect = resultOf(trial.id)?.plan.effect ?? null;
  const busy = state === 'waiting' || state === 'running';
  return (
    <section className="proof" aria-label="Proof">
      <p>
        <span className="stamp stamp-still">{trial.letter}</span> {sayChoice(trial.choice)}
      </p>
      {why === null ? null : <p className="soft">{why}</p>}
      {busy ? (
        <div className="proof-busy">
          <progress value={fraction} max={1} aria-label={`Proof of ${trial.letter}`} />
          <span className="small">
            <span className="figure">{asText(percent(Math.floor(fraction * 100) / 100))}</span>{' '}
            {phase || 'waiting for a free worker'}
          </span>
          <button type="button" onClick={() => stopProof(sheet.id, trial.id)}>
            Stop
          </button>
        </div>
      ) : (
        <div className="proof-start">
          <button
            type="button"
            className="lead"
            disabled={why !== null || trial.state !== 'done'}
            onClick={() => startProof(sheet.id, trial.id, wish)}
          >
            {proof === null ? 'Run the proof' : 'Run it again'}
          </button>
        </div>
      )}
      <HowToSolve
        wish={wish}
        change={(part) => setWish((w) => ({ ...w, ...part }))}
        given={sheet.summary?.rightHandSides ?? 0}
        fronts={trial.choice.factorization !== 'column-lu'}
      />
      {state === 'stopped' ? <p>Stopped.</p> : null}
      {failure === null || state === 'stopped' ? null : <Failed failure={failure} />}
      {effect === null ? null : <EffectTable effect={effect} />}
      {proof === null ? null : <Shown proof={proof} />}
      {why !== null || trial.state !== 'done' ? null : (
        <>
          <Sweep sheet={sheet} trial={trial} wish={wish} />
          <SecondMatrix sheet={sheet} trial={trial} wish={wish} />
          <Schur sheet={sheet} trial={trial} wish={wish} />
        </>
      )}
    </section>
  );
}

/** The proof of the chosen trial: a real factorization and solve in this page. */
export function ProofPanel({ sheet }: { sheet: Sheet }) {
  const trial = sheet.trials.find((t) => t.id === sheet.chosen);
  if (trial === undefined) {
    return (
      <p className="soft">
        Choose a trial in the ledger by pressing its name. A <Term name="proof">proof</Term> then factorizes and solves
        here, and is judged by measured errors.
      </p>
    );
  }
  return <ProofOf key={trial.id} sheet={sheet} trial={trial} />;
}
