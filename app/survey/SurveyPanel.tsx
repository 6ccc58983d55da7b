import type { Mark } from '../../engine/survey/fact.ts';
import type { FactName } from '../../engine/survey/survey.ts';
import { exactly } from '../figures/format.ts';
import { Histogram } from '../plot/Histogram.tsx';
import type { Sheet, SurveyState } from '../state/sheets.ts';
import { runSurvey } from '../state/surveys.ts';
import { pointTo } from '../state/view.ts';
import { factGroups, histogramOf } from './facts.ts';

/** A link from a fact into the maps. */
function MarkLink({ mark }: { mark: Mark }) {
  const { label, axis, indices, count } = mark;
  const told = axis === 'entries' ? indices.length / 2 : indices.length;
  return (
    <button type="button" className="plain small" onClick={() => pointTo({ label, axis, indices })}>
      show {count === 1 ? label : `${told < count ? `the first ${exactly(told)} of ` : ''}${exactly(count)} ${label}`}
    </button>
  );
}

function FactLine({ name, head, survey }: { name: FactName; head: string; survey: SurveyState }) {
  const fact = survey.facts[name];
  if (fact === undefined) return null;
  const histogram = histogramOf(name, fact);
  return (
    <div className={fact.value === null ? 'fact fact-out' : 'fact'}>
      <dt>{head}</dt>
      <dd>
        {fact.sentence}{' '}
        {fact.kind === 'exact' || fact.value === null ? null : <span className="kind">{fact.kind}</span>}
        {fact.marks.length === 0 ? null : (
          <span className="fact-marks">
            {fact.marks.map((mark) => (
              <MarkLink key={mark.label} mark={mark} />
            ))}
          </span>
        )}
        {histogram === null || histogram.columns.length < 2 ? null : <Histogram {...histogram} />}
      </dd>
    </div>
  );
}

/** What is known about the matrix before anything is ordered; facts appear as they become known and point into the maps. */
export function SurveyPanel({ sheet }: { sheet: Sheet }) {
  const { survey } = sheet;
  return (
    <section className="facts" aria-label="Survey" aria-busy={survey.state === 'running'}>
      {survey.state === 'running' ? (
        <p className="facts-busy">
          <progress value={survey.fraction} max={1} aria-label="Surveying" /> {survey.phase}
        </p>
      ) : null}
      {survey.failure === null ? null : (
        <p role="alert">
          {survey.failure.message}{' '}
          <button type="button" className="plain" onClick={() => runSurvey(sheet.id)}>
            Survey again
          </button>
        </p>
      )}
      {factGroups.map(({ title, facts }) =>
        facts.some(([name]) => survey.facts[name] !== undefined) ? (
          <div key={title} className="fact-group">
            <h3>{title}</h3>
            <dl>
              {facts.map(([name, head]) => (
                <FactLine key={name} name={name} head={head} survey={survey} />
              ))}
            </dl>
          </div>
        ) : null,
      )}
      <p className="small soft">Rows and columns counted from 1, in the numbering of the file.</p>
    </section>
  );
}
