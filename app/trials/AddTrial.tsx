import { type RefObject, useState } from 'react';
import {
  type Choice,
  type FactorizationName,
  factorizationNames,
  matchingNames,
  type OrderingName,
  orderingNames,
  pivotingNames,
  scalingNames,
} from '../../engine/trial/choice.ts';
import { Term } from '../help/Term.tsx';
import type { TermName } from '../help/terms.ts';
import type { Sheet } from '../state/sheets.ts';
import { choiceKey } from '../state/trial.ts';
import { addTrials } from '../state/trials.ts';
import { advisedFactorization, defaultChoice, whyNoForecast } from '../workers/rules.ts';
import { Details } from './Details.tsx';
import { factorizations, matchings, orderings, pivotings, type Said, scalings } from './explain.ts';
import { parseUnknowns } from './unknowns.ts';

/** One of a few words, with what it means under it. */
function Pick<Name extends string>(props: {
  term: TermName;
  names: readonly Name[];
  said: Readonly<Record<Name, Said>>;
  value: Name;
  onPick: (name: Name) => void;
}) {
  const { term, names, said, value, onPick } = props;
  return (
    <div className="field">
      <span>
        <Term name={term} />
      </span>
      <select value={value} aria-label={term} onChange={(event) => onPick(event.target.value as Name)}>
        {names.map((name) => (
          <option key={name} value={name}>
            {said[name].name}
          </option>
        ))}
      </select>
      <span className="small soft">{said[value].means}</span>
    </div>
  );
}

/** Why a plan cannot be added, or null. */
function refusal(sheet: Sheet, choice: Choice, heldLast: readonly number[]): string | null {
  if (sheet.facts === null) return 'The matrix is still being read.';
  const why = whyNoForecast(sheet.facts, choice);
  if (why !== null) return why;
  const key = choiceKey(choice, heldLast);
  const twin = sheet.trials.find((t) => choiceKey(t.choice, t.heldLast) === key);
  return twin === undefined ? null : `This is trial ${twin.letter} already.`;
}

/** Composes one or more trials: orderings to try, and one way of factorizing for all of them. */
export function AddTrial({ ref, sheet }: { ref: RefObject<HTMLDialogElement | null>; sheet: Sheet }) {
  const advised = sheet.facts === null ? null : advisedFactorization(sheet.facts);
  const [picked, setPicked] = useState<FactorizationName | null>(null);
  const factorization = picked ?? advised?.factorization ?? 'cholesky';
  const [asked, setTried] = useState<readonly OrderingName[] | null>(null);
  const [changes, setChanges] = useState<Partial<Choice>>({});
  const [held, setHeld] = useState('');
  const plan = defaultChoice(factorization, 'natural', changes);
  const unknowns = parseUnknowns(held, sheet.summary?.columns ?? 0);
  const heldLast = unknowns.ok ? unknowns.list : [];
  const reasons = new Map(orderingNames.map((o) => [o, refusal(sheet, { ...plan, ordering: o }, heldLast)] as const));
  const free = orderingNames.find((o) => reasons.get(o) === null);
  const tried = asked ?? (free === undefined ? [] : [free]);
  const good = tried.filter((o) => reasons.get(o) === null);
  const change = (more: Partial<Choice>) => setChanges((c) => ({ ...c, ...more }));
  const ready = good.length > 0 && unknowns.ok;
  return (
    <dialog ref={ref} aria-labelledby="add-title" className="add-trial" closedby="any">
      <form
        method="dialog"
        onSubmit={() => {
          if (ready)
            addTrials(
              sheet.id,
              good.map((ordering) => ({ choice: { ...plan, ordering }, heldLast })),
            );
        }}
      >
        <div className="dialog-head">
          <h2 id="add-title">Add a trial</h2>
          <button type="button" onClick={() => ref.current?.close()}>
            Cancel
          </button>
        </div>
        <fieldset>
          <legend>Factorization</legend>
          <div className="choices">
            {factorizationNames.map((name) => (
              <label key={name} className="choice">
                <input
                  type="radio"
                  name="factorization"
                  checked={factorization === name}
                  onChange={() => {
                    setPicked(name);
                    setChanges({});
                  }}
                />
                <span>
                  {factorizations[name].name}
                  <span className="small soft"> {factorizations[name].means}</span>
                  {advised?.factorization === name ? <em className="small"> Advised: {advised.reason}.</em> : null}
                </span>
              </label>
            ))}
          </div>
        </fieldset>
        <fieldset>
          <legend>Orderings to try</legend>
          <div className="choices">
            {orderingNames.map((name) => {
              const why = reasons.get(name) ?? null;
              return (
                <label key={name} className={`choice ${why === null ? '' : 'choice-out'}`}>
                  <input
                    type="checkbox"
                    disabled={why !== null}
                    checked={why === null && tried.includes(name)}
                    onChange={() => setTried(tried.includes(name) ? tried.filter((o) => o !== name) : [...tried, name])}
                  />
                  <span>
                    {orderings[name].name}
                    <span className="small soft"> {why ?? orderings[name].means}</span>
                  </span>
                </label>
              );
            })}
          </div>
        </fieldset>
        <fieldset>
          <legend>Pivots, values, details</legend>
          <div className="fields">
            <Pick
              term="pivoting"
              names={pivotingNames}
              said={pivotings}
              value={plan.pivoting}
              onPick={(pivoting) => change({ pivoting })}
            />
            <label className="field">
              <span>threshold u</span>
              <input
                type="number"
                min={0}
                max={1}
                step="any"
                disabled={plan.pivoting !== 'threshold'}
                value={plan.threshold}
                onChange={(event) => change({ threshold: Number(event.target.value) })}
              />
              <span className="small soft">Larger is safer and fills more; LDLᵀ allows at most 0.5.</span>
            </label>
            <Pick
              term="scaling"
              names={scalingNames}
              said={scalings}
              value={plan.scaling}
              onPick={(scaling) => change(scaling === 'matching' ? { scaling, matching: 'large-entry' } : { scaling })}
            />
            <Pick
              term="matching"
              names={matchingNames}
              said={matchings}
              value={plan.matching}
              onPick={(matching) => change({ matching })}
            />
            <label className="field">
              <span>unknowns held last</span>
              <input
                type="text"
                value={held}
                placeholder="none"
                aria-invalid={!unknowns.ok}
                onChange={(event) => setHeld(event.target.value)}
              />
              <span className="small soft">
                {unknowns.ok ? 'Counted from 1, as in 7, 20-31. They form the Schur complement.' : unknowns.why}
              </span>
            </label>
            <label className="field">
              <span>seed</span>
              <input
                type="number"
                step={1}
                value={plan.seed}
                onChange={(event) => change({ seed: Math.trunc(Number(event.target.value)) })}
              />
              <span className="small soft">Start of the random choices of a dissection.</span>
            </label>
            <label className="choice">
              <input
                type="checkbox"
                checked={plan.blocks}
                onChange={(event) => change({ blocks: event.target.checked })}
              />
              <span>
                block triangular form first
                <span className="small soft">
                  {' '}
                  Only the diagonal blocks are factorized; of a symmetric matrix, component after component.
                </span>
              </span>
            </label>
          </div>
        </fieldset>
        <Details plan={plan} change={change} portfolio={tried.includes('best-of')} />
        <div className="dialog-foot">
          <p className="small soft" aria-live="polite">
            {ready ? '' : tried.length === 0 ? 'Choose at least one ordering.' : (reasons.get(tried[0]) ?? '')}
          </p>
          <button type="submit" className="lead" disabled={!ready}>
            {good.length > 1 ? `Add ${good.length} trials` : 'Add the trial'}
          </button>
        </div>
      </form>
    </dialog>
  );
}
