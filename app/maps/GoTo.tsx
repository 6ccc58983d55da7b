import { useId, useState } from 'react';
import { exactly } from '../figures/format.ts';
import type { Pane } from './contract.ts';
import { placeOf } from './ground.ts';
import { type PaneControl, paneControls } from './paneControl.ts';

/** Positions in sight after a jump. */
const across = 40;

/** Jumps to a row, a column or a block, by number. */
export function GoTo({ panes, rows, columns }: { panes: readonly Pane[]; rows: number; columns: number }) {
  const [wrong, setWrong] = useState<string | null>(null);
  const id = useId();
  return (
    <>
      <button type="button" popoverTarget={id}>
        go to…
      </button>
      <form
        id={id}
        popover="auto"
        className="goto"
        aria-label="Go to"
        onSubmit={(event) => {
          event.preventDefault();
          const said = jump(new FormData(event.currentTarget), panes, rows, columns);
          setWrong(said);
          if (said === null) event.currentTarget.hidePopover();
        }}
      >
        <label className="field">
          <span>row, original number, from 1</span>
          <input type="number" name="row" min={1} max={rows} />
        </label>
        <label className="field">
          <span>column, the same number if left empty</span>
          <input type="number" name="column" min={1} max={columns} />
        </label>
        <label className="field">
          <span>or block, separator or supernode, by number</span>
          <input type="number" name="part" min={1} />
        </label>
        <label className="field">
          <span>seen in</span>
          <select name="pane" defaultValue={panes[panes.length - 1].id}>
            {panes.map((pane) => (
              <option key={pane.id} value={pane.id}>
                {pane.letter === '' ? pane.title : `${pane.letter} ${pane.title}`}
              </option>
            ))}
          </select>
        </label>
        {wrong === null ? null : <p role="alert">{wrong}</p>}
        <button type="submit" className="lead">
          Go there
        </button>
      </form>
    </>
  );
}

/** Goes there; null, or what is wrong with the numbers. */
function jump(data: FormData, panes: readonly Pane[], rows: number, columns: number): string | null {
  const number = (name: string): number | null => {
    const text = String(data.get(name) ?? '').trim();
    return text === '' ? null : Number(text);
  };
  const control = paneControls.get(String(data.get('pane'))) ?? paneControls.get(panes[0].id);
  if (control === undefined) return 'The map is not drawn yet.';
  const part = number('part');
  if (part !== null) return jumpToPart(control, part);
  const row = number('row') ?? number('column');
  const column = number('column') ?? row;
  if (row === null || column === null) return 'Give a row, a column or a part.';
  if (!Number.isInteger(row) || row < 1 || row > rows) return `Rows are numbered 1 to ${exactly(rows)}.`;
  if (!Number.isInteger(column) || column < 1 || column > columns)
    return `Columns are numbered 1 to ${exactly(columns)}.`;
  const place = placeOf(control.ground, row - 1, column - 1);
  control.point(place, true);
  control.goTo(place, across);
  return null;
}

function jumpToPart(control: PaneControl, part: number): string | null {
  const { outlines } = control;
  if (outlines === null) return 'The matrix as read has no parts; choose the map of a trial.';
  const runs = outlines.blockStart ?? (outlines.separators.length > 0 ? null : outlines.supernodes);
  const all =
    runs === null
      ? outlines.separators
      : Array.from({ length: runs.length - 1 }, (_, k) => ({ start: runs[k], end: runs[k + 1] }));
  if (all.length === 0) return 'This map has no parts.';
  if (!Number.isInteger(part) || part < 1 || part > all.length)
    return `Parts are numbered 1 to ${exactly(all.length)}.`;
  const { start, end } = all[part - 1];
  const middle = (start + end - 1) >> 1;
  control.point({ row: middle, column: middle }, true);
  control.goTo({ row: middle, column: middle }, Math.max(across, 2 * (end - start)));
  return null;
}
