import { useEffect, useRef } from 'react';
import { Neatline } from '../frame/Neatline.tsx';
import { pool } from '../state/vault.ts';
import type { MapsProps, Pane } from './contract.ts';

const cells = 320;

function MapOf({ pane }: { pane: Pane }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const task = pool.run('density', { key: pane.matrix, cells }, { lane: 'quick', matrices: [pane.matrix] });
    void task.reply.then((reply) => {
      const context = canvas.current?.getContext('2d');
      if (!reply.ok || context === null || context === undefined) return;
      const { rows, columns, original } = reply.value;
      context.canvas.width = columns;
      context.canvas.height = rows;
      const image = context.createImageData(columns, rows);
      let most = 1;
      for (const d of original) most = Math.max(most, d);
      for (let c = 0; c < original.length; c++) {
        if (original[c] > 0) image.data[4 * c + 3] = 255 * (0.4 + 0.6 * (Math.log1p(original[c]) / Math.log1p(most)));
      }
      context.putImageData(image, 0, 0);
    });
    return () => task.stop();
  }, [pane]);
  return (
    <figure className="map">
      <Neatline className="map-frame">
        <canvas ref={canvas} aria-label={`Pattern ${pane.title}`} role="img" />
      </Neatline>
      <figcaption className="small">
        {pane.letter === '' ? null : <strong>{pane.letter} </strong>}
        {pane.title}
      </figcaption>
    </figure>
  );
}

/** The maps side by side. */
export function Maps({ panes }: MapsProps) {
  return (
    <div className="maps">
      {panes.map((pane) => (
        <MapOf key={pane.id} pane={pane} />
      ))}
    </div>
  );
}
