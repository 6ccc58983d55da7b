import { useStore } from 'zustand';
import { exactly } from '../figures/format.ts';
import type { Spot } from '../workers/mapOperations.ts';
import { mapsStore } from './mapsStore.ts';
import { useCalm } from './useCalm.ts';
import { type Reading, useReading } from './useReading.ts';
import { sayCell, sayPath, saySpot, span } from './words.ts';

/** What lies under the crosshair, in the margin of the sheet: always in the same place. */
export function ReadingOf({ drawn, onAsk }: { drawn: number; onAsk: () => void }) {
  const reading = useReading(drawn);
  const pinned = useCalm((s) => s.pinned);
  const path = useStore(mapsStore, (s) => s.path);
  if (reading === null) {
    return (
      <section className="reading" aria-label="Under the crosshair">
        <h2>Under the crosshair</h2>
        <p className="small soft">
          Point into a map, or move there with Tab and the arrow keys. A click holds the place.
        </p>
      </section>
    );
  }
  const { cursor, control, spot } = reading;
  const filled = spot?.kind === 'fill' && spot.row !== spot.column;
  return (
    <section className="reading" aria-label="Under the crosshair">
      <h2>
        Under the crosshair <span className="soft small">{pinned ? 'held' : ''}</span>
      </h2>
      <ReadingTable reading={reading} />
      {filled && path === null ? (
        <button type="button" onClick={onAsk}>
          Why is this fill-in here?
        </button>
      ) : null}
      {path === null || path.pane !== control.pane.id ? null : <p className="small">{sayPath(path.unknowns)}</p>}
      <p className="unseen" role="status">
        {cursor.byKeys ? said(reading) : ''}
      </p>
    </section>
  );
}

function ReadingTable({ reading }: { reading: Reading }) {
  const { cursor, control, facts, spot, supernode } = reading;
  const moved = control.pane.trial !== null;
  const one = facts !== null && facts.rowEnd - facts.rowStart === 1 && facts.columnEnd - facts.columnStart === 1;
  return (
    <dl className="reading-list small">
      <div>
        <dt>row, column</dt>
        <dd className="figure">
          {exactly(cursor.originalRow + 1)}, {exactly(cursor.originalColumn + 1)}
        </dd>
      </div>
      {labelled(spot)}
      {moved ? (
        <div>
          <dt>placed at</dt>
          <dd className="figure">
            {exactly(cursor.row + 1)}, {exactly(cursor.column + 1)}
          </dd>
        </div>
      ) : null}
      {facts === null ? null : one ? (
        <div>
          <dt>holds</dt>
          <dd>{spot === null ? sayCell(facts) : saySpot(spot)}</dd>
        </div>
      ) : (
        <>
          <div>
            <dt>{moved ? 'dot: places' : 'dot: rows, columns'}</dt>
            <dd className="figure">
              {span(facts.rowStart, facts.rowEnd)}, {span(facts.columnStart, facts.columnEnd)}
            </dd>
          </div>
          <div>
            <dt>entries</dt>
            <dd>{sayCell(facts)}</dd>
          </div>
        </>
      )}
      {supernode === null || supernode[1] - supernode[0] < 2 ? null : (
        <div>
          <dt>supernode</dt>
          <dd className="figure">places {span(supernode[0], supernode[1])}</dd>
        </div>
      )}
    </dl>
  );
}

function labelled(spot: Spot | null) {
  if (spot === null || (spot.rowLabel === null && spot.columnLabel === null)) return null;
  return (
    <div>
      <dt>labels</dt>
      <dd>
        {spot.rowLabel ?? '–'}, {spot.columnLabel ?? '–'}
      </dd>
    </div>
  );
}

function said({ cursor, facts, spot }: Reading): string {
  const where = `Row ${exactly(cursor.originalRow + 1)}, column ${exactly(cursor.originalColumn + 1)}`;
  if (spot !== null) return `${where}: ${saySpot(spot)}.`;
  return facts === null ? `${where}.` : `${where}: ${sayCell(facts)}.`;
}
