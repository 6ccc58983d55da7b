import { useStore } from 'zustand';
import type { Pane } from './contract.ts';
import { mapsStore } from './mapsStore.ts';
import { paneControls } from './paneControl.ts';
import { useCalm } from './useCalm.ts';
import { sayScale } from './words.ts';

/** What the signs mean, always there, and how large a dot is. */
export function Legend({ panes, drawn }: { panes: readonly Pane[]; drawn: number }) {
  const outlines = useStore(mapsStore, (s) => s.outlines);
  const viewport = useCalm((s) => s.viewport);
  const trials = panes.some((p) => p.trial !== null);
  const control = paneControls.get(panes[0].id);
  const scale = drawn < 0 || control === undefined ? null : control.cellSize(viewport);
  return (
    <section className="legend small" aria-label="Legend">
      <ul>
        <li>
          <svg viewBox="0 0 14 14" aria-hidden="true">
            <rect x="2" y="2" width="10" height="10" className="legend-ink" />
          </svg>
          entry of the matrix
        </li>
        {trials ? (
          <li>
            <svg viewBox="0 0 32 14" className="legend-pair" aria-hidden="true">
              <defs>
                <pattern
                  id="legend-hatch"
                  width="4"
                  height="4"
                  patternUnits="userSpaceOnUse"
                  patternTransform="rotate(-45)"
                >
                  <rect width="4" height="4" className="fill-ground" />
                  <path d="M0 2H4" className="fill-line" />
                </pattern>
              </defs>
              <rect x="3" y="3" width="8" height="8" className="legend-open" />
              <rect x="18" y="1" width="12" height="12" fill="url(#legend-hatch)" />
            </svg>
            fill-in, single and in dots
          </li>
        ) : null}
        {trials && outlines !== 'none' ? (
          <li>
            <svg viewBox="0 0 14 14" aria-hidden="true">
              <rect x="2" y="2" width="10" height="10" className="legend-outline" />
            </svg>
            {outlines === 'supernodes' ? 'supernodes' : 'separators, blocks, held last'}
          </li>
        ) : null}
      </ul>
      <p className="soft">{scale === null ? '' : sayScale(scale.rows, scale.columns)}</p>
    </section>
  );
}
