import { useEffect, useMemo } from 'react';
import { useStore } from 'zustand';
import { asText, count, exactly } from '../figures/format.ts';
import type { Plate } from '../workers/operations.ts';
import { drawPlates, openExample, platesStore } from './examples.ts';

/** Opacity of a cell with at least one entry: a lone entry must still be seen. */
const faintest = 0.4;

/** The raster as a mask: ink shows through where there are entries, in whatever colour ink has now. */
function maskOf({ cells, density }: Plate): string {
  const canvas = document.createElement('canvas');
  canvas.width = cells;
  canvas.height = cells;
  const context = canvas.getContext('2d');
  if (context === null) return '';
  const image = context.createImageData(cells, cells);
  let most = 1;
  for (const d of density) most = Math.max(most, d);
  const full = Math.log1p(most);
  for (let c = 0; c < density.length; c++) {
    if (density[c] > 0) image.data[4 * c + 3] = 255 * (faintest + (1 - faintest) * (Math.log1p(density[c]) / full));
  }
  context.putImageData(image, 0, 0);
  return `url(${canvas.toDataURL()})`;
}

function PlateCard({ plate }: { plate: Plate }) {
  const mask = useMemo(() => maskOf(plate), [plate]);
  const { title, sentence, sizes, sizeMeans, rows, entries, field } = plate;
  return (
    <li className="plate">
      <button
        type="button"
        className="plate-map"
        aria-label={`Open ${title}, ${exactly(sizes[0])} ${sizeMeans}`}
        onClick={() => openExample(plate, sizes[0])}
      >
        <span style={{ maskImage: mask }} />
      </button>
      <div>
        <h3>{title}</h3>
        <p className="small">{sentence}</p>
        <p className="small soft">
          <span className="figure">
            n {asText(count(rows))}, {asText(count(entries))} entries
          </span>
          {field === 'complex' ? ', complex' : ''}
        </p>
        <p className="small plate-sizes">
          {sizes.map((size) => (
            <button key={size} type="button" className="plain figure" onClick={() => openExample(plate, size)}>
              <span className="unseen">Open {title} with </span>
              {exactly(size)}
            </button>
          ))}{' '}
          <span className="soft">{sizeMeans}</span>
        </p>
      </div>
    </li>
  );
}

/** The worked examples, each with its pattern drawn from the real matrix. */
export function Plates() {
  const plates = useStore(platesStore, (s) => s.plates);
  useEffect(drawPlates, []);
  return (
    <div className="plates">
      <div className="plates-head">
        <h2>Or open a worked example</h2>
        <p className="small soft">Made on the spot, invented, and no design of anything.</p>
      </div>
      <ul aria-busy={plates.length === 0}>
        {plates.map((plate) => (
          <PlateCard key={plate.id} plate={plate} />
        ))}
      </ul>
    </div>
  );
}
