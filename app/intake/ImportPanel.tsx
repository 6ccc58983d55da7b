import { asText, bytes, exactly, seconds } from '../figures/format.ts';
import type { Sheet } from '../state/sheets.ts';
import { ChooseFiles } from './ChooseFiles.tsx';

/** What the file held and what was made of it; nothing is changed without a line here. */
export function ImportPanel({ sheet }: { sheet: Sheet }) {
  const { summary } = sheet;
  if (summary === null) return <p className="soft">Nothing has come in yet.</p>;
  const lines: readonly (readonly [string, string])[] = [
    ['file', summary.name],
    ['format', summary.format],
    ['declared', `${summary.field}, ${summary.symmetry}`],
    ['entries in the file', exactly(summary.storedEntries)],
    ['entries after expansion', exactly(summary.entries)],
    ['summed into another one', exactly(summary.duplicates)],
    ['explicit zeros, kept', summary.explicitZeros === null ? 'no values' : exactly(summary.explicitZeros)],
    ['not finite', exactly(summary.notFinite)],
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
      {sheet.beside.length === 0 ? null : (
        <>
          <h3>Beside the matrix</h3>
          <ul className="notes">
            {sheet.beside.map((text) => (
              <li key={text}>{text}</li>
            ))}
          </ul>
        </>
      )}
      <p>
        <ChooseFiles label="Add a permutation, right-hand side, labels or coordinates…" />
      </p>
      <h3>Notes of the reader</h3>
      {summary.notes.length === 0 ? (
        <p className="soft">None: the file was read as it stands.</p>
      ) : (
        <ul className="notes">
          {summary.notes.map((note) => (
            <li key={`${note.code} ${note.text}`}>{note.text}</li>
          ))}
        </ul>
      )}
    </section>
  );
}
