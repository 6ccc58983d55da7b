import { type FormEvent, useId, useState } from 'react';

import type { Fact } from '../../engine/survey/fact.ts';
import type { Symmetries } from '../../engine/survey/symmetry.ts';
import { asText, bytes, exactly, seconds } from '../figures/format.ts';
import type { Sheet } from '../state/sheets.ts';
import { measuredSymmetry } from '../workers/measured.ts';
import { ChooseFiles } from './ChooseFiles.tsx';
import { canReadAgain, readAgain } from './receive.ts';
import { SaveMatrix } from './SaveMatrix.tsx';
import { Several } from './Several.tsx';

/** Other readings on offer; each reads the file anew, so that trials begin again. */
function Offers({
  sheet,
  offers,
}: {
  sheet: Sheet;
  offers: readonly { readonly id: string; readonly text: string }[];
}) {
  if (!canReadAgain(sheet.id)) return null;
  return (
    <span className="offers">
      {offers.map(({ id, text }) => (
        <button key={id} type="button" className="small" onClick={() => readAgain(sheet.id, id)}>
          {text}
        </button>
      ))}
    </span>
  );
}

/** Dropping small entries is a step of its own, with its bound said. */
function DropBelow({ sheet }: { sheet: Sheet }) {
  const [bound, setBound] = useState('1e-14');
  const id = useId();
  const good = /^\s*\d*\.?\d+(?:e[+-]?\d+)?\s*$/i.test(bound);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (good) readAgain(sheet.id, `drop-below=${bound.trim()}`);
  };
  return (
    <form className="with-unit" onSubmit={submit}>
      <label htmlFor={id}>Leave out values up to</label>
      <input
        id={id}
        type="text"
        className="figure"
        size={8}
        value={bound}
        aria-invalid={!good}
        onChange={(event) => setBound(event.target.value)}
      />
      <button type="submit" disabled={!good}>
        Read again without them
      </button>
    </form>
  );
}

/** What the file held and what was made of it; nothing is changed without a line here. */
export function ImportPanel({ sheet }: { sheet: Sheet }) {
  const { summary } = sheet;
  if (summary === null) return <p className="soft">Nothing has come in yet.</p>;
  const symmetry = sheet.survey.facts.symmetry as Fact<Symmetries> | undefined;
  const measured = symmetry === undefined ? null : measuredSymmetry(summary.symmetry, symmetry);
  const again = canReadAgain(sheet.id);
  const lines: readonly (readonly [string, string])[] = [
    ['file', summary.name],
    ['format', summary.format],
    ['values', summary.field],
    ['symmetry declared', summary.symmetry],
    ['symmetry measured', measured?.words ?? 'being surveyed'],
    ['entries in the file', exactly(summary.storedEntries)],
    ['entries after expansion', exactly(summary.entries)],
    ['duplicates merged', exactly(summary.duplicates)],
    ['explicit zeros, kept', summary.explicitZeros === null ? 'no values' : exactly(summary.explicitZeros)],
    ['NaN or infinite', exactly(summary.notFinite)],
    ['right-hand sides inside', exactly(summary.rightHandSides)],
    ['labels', summary.labelled ? 'yes' : 'none'],
    ['held in', asText(bytes(summary.heldBytes))],
    ['read in', asText(seconds(summary.seconds))],
  ];
  return (
    <section aria-label="Import summary" className="import">
      <table className="facts-table">
        <tbody>
          {lines.map(([head, text]) => (
            <tr key={head}>
              <th scope="row">{head}</th>
              <td className="figure">{text}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <h3>Notes of the reader</h3>
      {summary.notes.length === 0 && (measured?.nearly ?? null) === null ? (
        <p className="soft">None: the file was read as it stands.</p>
      ) : (
        <ul className="notes">
          {summary.notes.map((note) => (
            <li key={`${note.code} ${note.text}`}>
              {note.text} {note.offers === undefined ? null : <Offers sheet={sheet} offers={note.offers} />}
            </li>
          ))}
          {measured === null || measured.nearly === null ? null : (
            <li>
              {measured.nearly} <Offers sheet={sheet} offers={[{ id: 'symmetrise', text: 'Average the mirrors' }]} />
            </li>
          )}
        </ul>
      )}
      {again && summary.field !== 'pattern' ? <DropBelow sheet={sheet} /> : null}
      <h3>Beside the matrix</h3>
      {sheet.beside.length === 0 ? (
        <p className="soft">Nothing yet.</p>
      ) : (
        <ul className="notes">
          {sheet.beside.map((text) => (
            <li key={text}>{text}</li>
          ))}
        </ul>
      )}
      <p>
        <ChooseFiles label="Add a permutation, right-hand side, labels or coordinates…" />
      </p>
      <SaveMatrix sheet={sheet} />
      <Several sheet={sheet} />
    </section>
  );
}
