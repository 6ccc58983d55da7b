import { type ReactNode, useRef } from 'react';
import { notify } from '../state/notices.ts';
import { savePng, saveSvg } from './save.ts';

/** A chart with its title, a sentence that says the same in words, and its saving as a file. */
export function ChartPlate(props: {
  readonly title: string;
  readonly words: string;
  readonly width: number;
  readonly height: number;
  readonly file: string;
  readonly children: ReactNode;
}) {
  const { title, words, width, height, file, children } = props;
  const svg = useRef<SVGSVGElement>(null);
  return (
    <figure className="chart">
      <figcaption>
        <h2>{title}</h2>
        <span className="chart-save small">
          <button
            type="button"
            className="plain"
            aria-label={`Save ${title} as SVG`}
            onClick={() => svg.current !== null && saveSvg(svg.current, file)}
          >
            SVG
          </button>
          <button
            type="button"
            className="plain"
            aria-label={`Save ${title} as PNG`}
            onClick={() => {
              if (svg.current === null) return;
              savePng(svg.current, file).catch(() =>
                notify('The picture could not be turned into a PNG here; SVG works.', true),
              );
            }}
          >
            PNG
          </button>
        </span>
      </figcaption>
      <svg ref={svg} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`${title}. ${words}`}>
        {children}
      </svg>
    </figure>
  );
}
