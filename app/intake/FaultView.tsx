import { exactly } from '../figures/format.ts';
import { Neatline } from '../frame/Neatline.tsx';
import type { Sheet } from '../state/sheets.ts';
import type { Failure } from '../workers/protocol.ts';
import { ChooseFiles } from './ChooseFiles.tsx';
import { closeSheet } from './closing.ts';
import { canReadAgain, readAgain } from './receive.ts';

/** Where in the file the trouble is, in figures; the message says it in words. */
function placesOf({ place }: Failure): readonly (readonly [string, string])[] {
  const out: (readonly [string, string])[] = [];
  if (place.member !== undefined) out.push(['member', place.member]);
  if (place.line !== undefined) out.push(['line', exactly(place.line)]);
  if (place.field !== undefined) out.push(['field', exactly(place.field)]);
  if (place.byteOffset !== undefined) out.push(['byte', exactly(place.byteOffset)]);
  if (place.row !== undefined) out.push(['row', exactly(place.row + 1)]);
  if (place.column !== undefined) out.push(['column', exactly(place.column + 1)]);
  return out;
}

/** Why a file could not be read: what happened, where, and what to do next. */
export function FaultView({ sheet }: { sheet: Sheet }) {
  const { failure } = sheet;
  if (failure === null) return null;
  const places = placesOf(failure);
  const again = canReadAgain(sheet.id);
  return (
    <Neatline className="fault">
      <div className="fault-words" role="alert">
        <h2>{sheet.name} was not read</h2>
        {places.length === 0 ? null : (
          <dl className="fault-places">
            {places.map(([head, text]) => (
              <div key={head}>
                <dt>{head}</dt>
                <dd className="figure">{text}</dd>
              </div>
            ))}
          </dl>
        )}
        <p>{failure.message}</p>
        <div className="fault-ways">
          {again
            ? failure.repairs.map(({ id, text }) => (
                <button key={id} type="button" className="lead" onClick={() => readAgain(sheet.id, id)}>
                  {text}
                </button>
              ))
            : null}
          {again && failure.kind !== 'input' ? (
            <button type="button" onClick={() => readAgain(sheet.id)}>
              Try again
            </button>
          ) : null}
          <ChooseFiles label="Choose another file…" />
          <button type="button" onClick={() => closeSheet(sheet.id)}>
            Put away
          </button>
        </div>
      </div>
    </Neatline>
  );
}
