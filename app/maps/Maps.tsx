import { useCallback, useEffect, useRef, useState } from 'react';
import { askWhy } from './ask.ts';
import type { MapsProps } from './contract.ts';
import { placeOf } from './ground.ts';
import { MapPane } from './MapPane.tsx';
import { Margin } from './Margin.tsx';
import { mapsStore, resetMaps, setViewport } from './mapsStore.ts';
import { paneControls } from './paneControl.ts';
import { everything } from './viewport.ts';

const ask = () => void askWhy();

/** The maps side by side, with their margin. Where the page is narrow, one at a time. */
export function Maps({ name, panes, rows, columns, pointing }: MapsProps) {
  // the newest map is in front until another is chosen
  const [frontId, setFront] = useState<string | null>(null);
  const [drawn, setDrawn] = useState(0);
  const soon = useRef(0);
  // many images come while the hand moves: the words beside the maps hear of them together
  const onDrawn = useCallback(() => {
    if (soon.current !== 0) return;
    soon.current = window.setTimeout(() => {
      soon.current = 0;
      setDrawn((k) => k + 1);
    }, 120);
  }, []);
  const front = panes.find((p) => p.id === frontId)?.id ?? panes[panes.length - 1].id;
  const { matrix } = panes[0];

  // biome-ignore lint/correctness/useExhaustiveDependencies: the look belongs to the matrix
  useEffect(() => resetMaps, [matrix]);

  // a crosshair in a map that was taken off the sheet goes with it
  useEffect(() => {
    const { cursor } = mapsStore.getState();
    if (cursor !== null && panes.every((p) => p.id !== cursor.pane)) {
      mapsStore.setState({ cursor: null, pinned: false, path: null });
    }
  }, [panes]);

  useEffect(() => {
    const control = paneControls.get(panes[0].id);
    if (pointing === null || pointing.indices.length === 0 || control === undefined) return;
    const [a, b] = pointing.indices;
    const row = pointing.axis === 'columns' ? Math.min(a, rows - 1) : a;
    const column = pointing.axis === 'entries' ? b : Math.min(a, columns - 1);
    setViewport(everything);
    control.point(placeOf(control.ground, row, column), true);
  }, [pointing, panes, rows, columns]);

  return (
    <div className="maps-and-margin">
      {panes.length < 2 ? null : (
        <label className="map-choice small">
          <span>map</span>{' '}
          <select value={front} onChange={(event) => setFront(event.target.value)}>
            {panes.map((pane) => (
              <option key={pane.id} value={pane.id}>
                {pane.letter === '' ? pane.title : `${pane.letter} ${pane.title}`}
              </option>
            ))}
          </select>
        </label>
      )}
      <div className="maps">
        {panes.map((pane) => (
          <MapPane
            key={pane.id}
            pane={pane}
            rows={rows}
            columns={columns}
            pointing={pointing}
            front={pane.id === front}
            onAsk={ask}
            onDrawn={onDrawn}
          />
        ))}
      </div>
      <Margin name={name} panes={panes} rows={rows} columns={columns} drawn={drawn} onAsk={ask} />
    </div>
  );
}
