import type { Sheet } from '../state/sheets.ts';
import { Neatline } from './Neatline.tsx';

/** The maps of a sheet. */
export function MapTable({ sheet }: { sheet: Sheet }) {
  return (
    <Neatline>
      <p>{sheet.name}</p>
    </Neatline>
  );
}
