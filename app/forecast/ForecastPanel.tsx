import type { Figure } from '../../engine/forecast/figure.ts';
import type { TrialForecast } from '../../engine/forecast/forecast.ts';
import { asText, bytes, count, seconds, times, type Written } from '../figures/format.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { sayChoice } from '../trials/explain.ts';
import { Parallel } from './Parallel.tsx';
import { Reconcile } from './Reconcile.tsx';
import { Spread } from './Spread.tsx';

/** One figure with its kind, or why there is none. */
function Line({ head, figure, write }: { head: string; figure: Figure; write: (x: number) => Written }) {
  const written = figure.value === null ? null : write(figure.value);
  return (
    <tr>
      <th scope="row">{head}</th>
      {written === null ? (
        <td className="soft small">{figure.reason ?? 'not defined'}</td>
      ) : (
        <td>
          <span className="figure" title={written.exact}>
            {asText(written)}
          </span>{' '}
          <span className="kind">{figure.kind}</span>
        </td>
      )}
    </tr>
  );
}

function Shown({ forecast }: { forecast: TrialForecast }) {
  const { limits, storage, operations, time, parallel, delayed } = forecast;
  return (
    <>
      <dl className="limits">
        {limits.map(({ question, passed, sentence }) => (
          <div key={question} className={passed ? 'limit' : 'limit limit-bites'}>
            <dt>{question}</dt>
            <dd>{sentence}</dd>
          </div>
        ))}
      </dl>
      <h3>Memory, by layout</h3>
      <table className="facts-table">
        <tbody>
          <Line head="fronts, with their stack" figure={storage.multifrontal} write={bytes} />
          <Line head="stack alone, at its peak" figure={storage.stack} write={bytes} />
          <Line head="dense panels" figure={storage.panels} write={bytes} />
          <Line head="compressed columns" figure={storage.compressedColumns} write={bytes} />
          <Line head="envelope" figure={storage.envelope} write={bytes} />
          <Line head="written out as made: least" figure={storage.outOfCore} write={bytes} />
          <Line head="traffic when written out" figure={storage.traffic} write={bytes} />
          <Line head="dense matrix" figure={storage.dense} write={bytes} />
          <Line head="saved by overwriting A" figure={storage.overwriting} write={bytes} />
        </tbody>
      </table>
      <h3>Operations</h3>
      <table className="facts-table">
        <tbody>
          <Line head="factorization" figure={operations.factorization} write={count} />
          {operations.executed === null ? null : (
            <Line head="executed, with padding" figure={operations.executed} write={count} />
          )}
          <Line head="solve, one right-hand side" figure={operations.solve} write={count} />
          <Line head="one refinement step" figure={operations.refinementStep} write={count} />
        </tbody>
      </table>
      <h3>Time on one core of your target</h3>
      <table className="facts-table">
        <tbody>
          <Line head="factorization" figure={time.factorization} write={seconds} />
          <Line head="solve, one right-hand side" figure={time.solve} write={seconds} />
          <Line head="one refinement step" figure={time.refinementStep} write={seconds} />
        </tbody>
      </table>
      {parallel === null ? null : (
        <>
          <h3>How parallel it is</h3>
          <Parallel profile={parallel} />
        </>
      )}
      {delayed === null || delayed.length === 0 ? null : (
        <>
          <h3>
            If pivots are delayed <span className="kind">modelled</span>
          </h3>
          <table className="facts-table against">
            <thead>
              <tr>
                <th scope="col">share delayed</th>
                <th scope="col">stored entries</th>
                <th scope="col">operations</th>
                <th scope="col">bytes</th>
              </tr>
            </thead>
            <tbody>
              {delayed.map((row) => (
                <tr key={row.share}>
                  <th scope="row">{asText({ ...times(row.share * 100), unit: '%' })}</th>
                  <td className="figure">{asText(count(row.storedFactorEntries))}</td>
                  <td className="figure">{asText(count(row.operations))}</td>
                  <td className="figure">{asText(bytes(row.bytes))}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </>
      )}
    </>
  );
}

/** How far interchanges may move the count, where that is known. */
function Range({ trial }: { trial: Trial }) {
  const counts = trial.outcome?.counts;
  if (counts === undefined || counts.range === null) return null;
  const lines = [
    ['factor entries', counts.expected?.factorEntries ?? counts.factorEntries, counts.range.factorEntries, count],
    ['operations', counts.operations, counts.range.operations, count],
    ['factor bytes', counts.factorBytes, counts.range.bytes, bytes],
  ] as const;
  return (
    <>
      <h3>Whatever pivots are taken</h3>
      <table className="facts-table against">
        <thead>
          <tr>
            <td />
            <th scope="col">expected</th>
            <th scope="col">at least</th>
            <th scope="col">at most</th>
          </tr>
        </thead>
        <tbody>
          {lines.map(([head, expected, range, write]) => (
            <tr key={head}>
              <th scope="row">{head}</th>
              {[expected, ...range].map((x, k) => (
                // biome-ignore lint/suspicious/noArrayIndexKey: three columns in their order
                <td key={k} className="figure" title={x === null ? '' : write(x).exact}>
                  {x === null ? '–' : asText(write(x))}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      <p className="small soft">
        Least and most are proven for every choice of pivots of this kind; expected is a model.
      </p>
    </>
  );
}

/** The forecast of the chosen trial for the target in force. */
export function ForecastPanel({ sheet }: { sheet: Sheet }) {
  const trial = sheet.trials.find((t) => t.id === sheet.chosen);
  if (trial === undefined) return <p className="soft">Choose a trial in the ledger by pressing its name.</p>;
  return (
    <section className="proof" aria-label="Forecast">
      <p>
        <span className="stamp stamp-still">{trial.letter}</span> {sayChoice(trial.choice)}
      </p>
      <Range trial={trial} />
      {trial.outcome?.notes.map((note) => (
        <p key={note} className="small">
          {note}
        </p>
      ))}
      {trial.forecast === null ? (
        <p className="soft">
          {trial.state === 'done'
            ? 'No forecast for your target yet, or none that is defined for this matrix.'
            : 'The trial is not finished.'}
        </p>
      ) : (
        <Shown forecast={trial.forecast} />
      )}
      <Spread sheet={sheet} />
      <Reconcile sheet={sheet} />
      <p className="caution-note small">
        <strong>Caution.</strong> A forecast is no guarantee once pivots are chosen by size. Seconds are modelled from
        the rates of your target; compare trials by them, and promise nothing.
      </p>
    </section>
  );
}
