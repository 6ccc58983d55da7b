import { type Choice, type MeasureName, measureNames, type OrderingTuning } from '../../engine/trial/choice.ts';

const measures: Readonly<Record<MeasureName, string>> = {
  entries: 'factor entries',
  operations: 'operations',
  'peak-memory': 'peak memory',
  'critical-path': 'critical path',
};

/** A number that may be left to the method: empty stands for its own default. */
function Optional(props: {
  readonly label: string;
  readonly help: string;
  readonly value: number | null;
  readonly min: number;
  readonly max: number;
  readonly whole?: boolean;
  readonly onChange: (value: number | null) => void;
}) {
  const { label, help, value, min, max, whole = true, onChange } = props;
  return (
    <label className="field">
      <span>{label}</span>
      <input
        type="number"
        min={min}
        max={max}
        step={whole ? 1 : 'any'}
        value={value ?? ''}
        placeholder="its own"
        onChange={(event) => {
          const text = event.target.value;
          const x = whole ? Math.trunc(Number(text)) : Number(text);
          onChange(text === '' || !Number.isFinite(x) ? null : Math.max(min, Math.min(max, x)));
        }}
      />
      <span className="small soft">{help}</span>
    </label>
  );
}

/** Options of the ordering methods; every one has a default that was measured. */
export function Details(props: {
  readonly plan: Choice;
  readonly change: (part: Partial<Choice>) => void;
  /** "best of several" is among the orderings */
  readonly portfolio: boolean;
}) {
  const { plan, change, portfolio } = props;
  const tune = (part: Partial<OrderingTuning>) => change({ tuning: { ...plan.tuning, ...part } });
  const best = plan.portfolio;
  return (
    <>
      {portfolio ? (
        <fieldset>
          <legend>Best of several</legend>
          <div className="fields">
            <label className="field">
              <span>keeps the one with least</span>
              <select
                value={best.measure}
                onChange={(event) => change({ portfolio: { ...best, measure: event.target.value as MeasureName } })}
              >
                {measureNames.map((name) => (
                  <option key={name} value={name}>
                    {measures[name]}
                  </option>
                ))}
              </select>
              <span className="small soft">Every ordering that suits the matrix takes part.</span>
            </label>
            <label className="field">
              <span>rounds</span>
              <input
                type="number"
                min={1}
                max={100}
                step={1}
                value={best.rounds}
                onChange={(event) =>
                  change({
                    portfolio: { ...best, rounds: Math.max(1, Math.min(100, Math.trunc(Number(event.target.value)))) },
                  })
                }
              />
              <span className="small soft">The first on the numbering as given, the others on relabellings.</span>
            </label>
            <Optional
              label="seconds at most"
              help="Nothing more is started after that; no limit if left empty."
              value={best.timeLimit}
              min={0}
              max={86400}
              whole={false}
              onChange={(timeLimit) => change({ portfolio: { ...best, timeLimit } })}
            />
          </div>
        </fieldset>
      ) : null}
      <details className="add-details">
        <summary>Options of the orderings</summary>
        <div className="fields">
          <Optional
            label="leaf size"
            help="Dissections: pieces of at most so many unknowns go to minimum degree."
            value={plan.tuning.leafSize}
            min={1}
            max={1e9}
            onChange={(leafSize) => tune({ leafSize })}
          />
          <Optional
            label="balance"
            help="Nested dissection: most share of both sides for one of them, 0.5 to 0.9."
            value={plan.tuning.balance}
            min={0.5}
            max={0.9}
            whole={false}
            onChange={(balance) => tune({ balance })}
          />
          <Optional
            label="tries"
            help="Nested dissection: starts for each separator. More is slower and rarely worse."
            value={plan.tuning.tries}
            min={1}
            max={1000}
            onChange={(tries) => tune({ tries })}
          />
          <Optional
            label="dense from"
            help="Rows with more neighbours are set aside and ordered last; otherwise from 10·√n."
            value={plan.tuning.denseThreshold}
            min={1}
            max={1e9}
            onChange={(denseThreshold) => tune({ denseThreshold })}
          />
          <Optional
            label="relabel with seed"
            help="Orders a random renumbering: how much an ordering owes to the numbering of the file."
            value={plan.relabelling}
            min={1}
            max={2147483646}
            onChange={(relabelling) => change({ relabelling })}
          />
        </div>
      </details>
    </>
  );
}
