import { Neatline } from '../frame/Neatline.tsx';
import type { Sheet } from '../state/sheets.ts';
import { closeSheet } from './closing.ts';

/** Why a file could not be read: what happened, where, and what to do next. */
export function FaultView({ sheet }: { sheet: Sheet }) {
  const { failure } = sheet;
  if (failure === null) return null;
  return (
    <Neatline className="fault">
      <div className="fault-words" role="alert">
        <h2>{sheet.name} was not read</h2>
        <p>{failure.message}</p>
        <button type="button" onClick={() => closeSheet(sheet.id)}>
          Put away
        </button>
      </div>
    </Neatline>
  );
}
