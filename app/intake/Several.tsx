import { useState } from 'react';
import { useStore } from 'zustand';
import { useShallow } from 'zustand/react/shallow';
import { type Sheet, sheetsStore } from '../state/sheets.ts';
import { compareSheets, complexNumber, layOutSum } from './several.ts';

/** Another open matrix held against this one, or summed with it; shown once there are several. */
export function Several({ sheet }: { sheet: Sheet }) {
  const others = useStore(
    sheetsStore,
    useShallow((s) => s.sheets.filter((other) => other.phase === 'ready' && other.id !== sheet.id)),
  );
  const [told, setTold] = useState<{ readonly of: string; readonly lines: readonly string[] } | null>(null);
  const [words, setWords] = useState<Readonly<Record<string, string>>>({});
  if (others.length === 0) return null;
  const wordOf = (id: string) => words[id] ?? (id === sheet.id ? '1' : '');
  const used = [sheet, ...others].filter(({ id }) => wordOf(id).trim() !== '');
  const terms = used.map(({ id, matrix, name }) => ({
    key: matrix,
    name,
    word: wordOf(id),
    coefficient: complexNumber(wordOf(id)),
  }));
  const ready = terms.length > 1 && terms.every((t) => t.coefficient !== null);
  const sum = () =>
    layOutSum(terms.flatMap(({ coefficient, ...term }) => (coefficient === null ? [] : [{ ...term, coefficient }])));
  return (
    <>
      <h3>With the other matrices</h3>
      <p className="offers">
        {others.map((other) => (
          <button
            key={other.id}
            type="button"
            onClick={() => void compareSheets(sheet, other).then((lines) => setTold({ of: other.name, lines }))}
          >
            Compare with {other.name}
          </button>
        ))}
      </p>
      {told === null ? null : (
        <ul className="notes" role="status" aria-label={`Compared with ${told.of}`}>
          {told.lines.map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
      )}
      <fieldset className="sum-of">
        <legend>Sum of them, coefficients real or complex (1, -0.5, 2+3i); empty: left out</legend>
        {[sheet, ...others].map(({ id, name }) => (
          <label key={id} className="with-unit">
            <input
              type="text"
              className="figure"
              size={10}
              value={wordOf(id)}
              aria-invalid={wordOf(id).trim() !== '' && complexNumber(wordOf(id)) === null}
              onChange={(event) => setWords({ ...words, [id]: event.target.value })}
            />
            <span>× {name}</span>
          </label>
        ))}
        <button type="button" disabled={!ready} onClick={sum}>
          Lay out the sum
        </button>
      </fieldset>
    </>
  );
}
