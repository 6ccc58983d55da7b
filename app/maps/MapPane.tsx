import { useEffect, useId, useRef, useState } from 'react';
import { Neatline } from '../frame/Neatline.tsx';
import type { Pointing } from '../state/view.ts';
import type { Pane } from './contract.ts';
import { listen } from './input.ts';
import { marksOn } from './marks.ts';
import { PaneControl } from './paneControl.ts';
import type { MapImage } from './paneImages.ts';
import { sayMap } from './words.ts';

/** Sides of a frame are no further apart than this, however long the matrix. */
const mostAspect = 3;

/** One map: its frame, its canvas, its stamp. All drawing and pointing goes past React. */
export function MapPane(props: {
  readonly pane: Pane;
  readonly rows: number;
  readonly columns: number;
  readonly pointing: Pointing | null;
  readonly front: boolean;
  /** asks why the entry under the crosshair is there */
  readonly onAsk: () => void;
  /** hears of every new image */
  readonly onDrawn: () => void;
}) {
  const { pane, rows, columns, pointing, front, onAsk, onDrawn } = props;
  const canvas = useRef<HTMLCanvasElement>(null);
  const hand = useRef<HTMLDivElement>(null);
  const control = useRef<PaneControl | null>(null);
  const calls = useRef({ onAsk, onDrawn });
  calls.current = { onAsk, onDrawn };
  const [state, setState] = useState({ words: '', failed: null as string | null, ready: false });
  const help = useId();

  useEffect(() => {
    if (canvas.current === null || hand.current === null) return;
    let seen: { whole: MapImage | null; failed: string | null } = { whole: null, failed: null };
    const told = () => {
      const { whole, failed } = made.images;
      if (whole !== seen.whole || failed !== seen.failed) {
        seen = { whole, failed };
        setState({ words: sayMap(pane.title, rows, columns, whole), failed, ready: whole !== null });
      }
      calls.current.onDrawn();
    };
    const made = new PaneControl(canvas.current, pane, rows, columns, told);
    control.current = made;
    const leave = listen(hand.current, made, () => calls.current.onAsk());
    return () => {
      leave();
      made.end();
      control.current = null;
    };
  }, [pane, rows, columns]);

  // biome-ignore lint/correctness/useExhaustiveDependencies: a new pane has a new control, which starts without marks
  useEffect(() => {
    const made = control.current;
    made?.setMarks(marksOn(made.ground, pointing));
  }, [pointing, pane, rows, columns]);

  const aspect = Math.min(mostAspect, Math.max(1 / mostAspect, columns / Math.max(1, rows)));
  return (
    <figure className={front ? 'map' : 'map map-behind'} style={{ '--aspect': aspect } as React.CSSProperties}>
      <div className="map-room">
        <Neatline className="map-frame">
          <div
            ref={hand}
            className="map-ground"
            // biome-ignore lint/a11y/noNoninteractiveTabindex: a map is worked by keys
            tabIndex={0}
            role="application"
            aria-roledescription="map"
            aria-label={state.words === '' ? `Map of ${pane.title}` : state.words}
            aria-describedby={help}
            aria-keyshortcuts="ArrowUp ArrowDown ArrowLeft ArrowRight + - 0 Enter Escape"
          >
            <canvas ref={canvas} />
          </div>
          {state.ready || state.failed !== null ? null : <p className="map-word soft">being drawn…</p>}
          {state.failed === null ? null : <p className="map-word">{state.failed}</p>}
        </Neatline>
      </div>
      <figcaption>
        {pane.letter === '' ? null : <strong className="stamp">{pane.letter}</strong>}
        <span>{pane.title}</span>
      </figcaption>
      <span id={help} hidden>
        Arrow keys move the crosshair, with Shift ten cells at a time; plus and minus zoom, 0 shows everything, Enter
        asks why fill-in is there, Escape lets go.
      </span>
    </figure>
  );
}
