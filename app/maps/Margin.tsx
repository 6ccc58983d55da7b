import { useState } from 'react';
import { useStore } from 'zustand';
import { notify } from '../state/notices.ts';
import type { Pane } from './contract.ts';
import { GoTo } from './GoTo.tsx';
import { Legend } from './Legend.tsx';
import { mapsStore, type Outlines, setViewport } from './mapsStore.ts';
import { paneControls } from './paneControl.ts';
import { saveMaps } from './picture.ts';
import { ReadingOf } from './Reading.tsx';
import { everything, zoomAt } from './viewport.ts';

/** The margin of the sheet: scale, legend, what lies under the crosshair, and the tools of the maps. */
export function Margin(props: {
  readonly name: string;
  readonly panes: readonly Pane[];
  readonly rows: number;
  readonly columns: number;
  readonly drawn: number;
  readonly onAsk: () => void;
}) {
  const { name, panes, rows, columns, drawn, onAsk } = props;
  const shade = useStore(mapsStore, (s) => s.shade);
  const linked = useStore(mapsStore, (s) => s.linked);
  const outlines = useStore(mapsStore, (s) => s.outlines);
  const [saving, setSaving] = useState(false);
  const zoom = (factor: number) => {
    const least = paneControls.get(panes[0].id)?.least ?? 1;
    setViewport(zoomAt(mapsStore.getState().viewport, factor, 0.5, 0.5, least));
  };
  const save = (form: 'svg' | 'png') => {
    setSaving(true);
    saveMaps(name, form)
      .catch(() => notify('The maps could not be turned into a picture here.', true))
      .finally(() => setSaving(false));
  };
  const trials = panes.some((p) => p.trial !== null);
  return (
    <aside className="margin" aria-label="Margin of the maps">
      <fieldset className="map-tools">
        <legend className="unseen">Zoom</legend>
        <button type="button" onClick={() => zoom(2)} aria-label="Closer">
          +
        </button>
        <button type="button" onClick={() => zoom(0.5)} aria-label="Further away">
          −
        </button>
        <button type="button" onClick={() => setViewport(everything)}>
          whole
        </button>
        <GoTo panes={panes} rows={rows} columns={columns} />
      </fieldset>
      <ReadingOf drawn={drawn} onAsk={onAsk} />
      <Legend panes={panes} drawn={drawn} />
      <div className="map-settings small">
        <label>
          <span>dots</span>
          <select
            value={shade}
            onChange={(event) => mapsStore.setState({ shade: event.target.value as 'density' | 'any' })}
          >
            <option value="density">darker with more entries</option>
            <option value="any">full for any entry</option>
          </select>
        </label>
        {panes.length > 1 ? (
          <label>
            <span>linked by</span>
            <select
              value={linked}
              onChange={(event) => mapsStore.setState({ linked: event.target.value as 'places' | 'entry' })}
            >
              <option value="places">places in the order</option>
              <option value="entry">the entry held</option>
            </select>
          </label>
        ) : null}
        {trials ? (
          <label>
            <span>outlines</span>
            <select
              value={outlines}
              onChange={(event) => mapsStore.setState({ outlines: event.target.value as Outlines })}
            >
              <option value="parts">separators, blocks</option>
              <option value="supernodes">supernodes</option>
              <option value="none">none</option>
            </select>
          </label>
        ) : null}
        <span>
          save as{' '}
          <button
            type="button"
            className="plain"
            disabled={saving}
            onClick={() => save('svg')}
            aria-label="Save the maps as SVG"
          >
            SVG
          </button>{' '}
          <button
            type="button"
            className="plain"
            disabled={saving}
            onClick={() => save('png')}
            aria-label="Save the maps as PNG"
          >
            PNG
          </button>
        </span>
      </div>
    </aside>
  );
}
