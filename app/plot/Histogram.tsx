import { scaleBand, scaleSymlog } from 'd3';
import { useRef } from 'react';
import { exactly } from '../figures/format.ts';
import { notify } from '../state/notices.ts';
import { savePng, saveSvg } from './save.ts';

const width = 340;
const height = 84;
const foot = 18;

/** A small bar chart; heights on a logarithmic scale, so that a lone line beside a million stays visible. The table under it says the same. */
export function Histogram(props: { of: string; columns: readonly { label: string; height: number }[] }) {
  const { of, columns } = props;
  const svg = useRef<SVGSVGElement>(null);
  const file = of.toLowerCase().replace(/[^a-z]+/g, '-');
  const most = Math.max(1, ...columns.map((c) => c.height));
  const x = scaleBand(
    columns.map((c) => c.label),
    [0, width],
  ).paddingInner(0.18);
  const y = scaleSymlog([0, most], [height - foot, 4]).constant(0.5);
  const every = Math.max(1, Math.ceil(columns.length / 9));
  return (
    <details className="histogram">
      <summary>
        <svg ref={svg} viewBox={`0 0 ${width} ${height}`} aria-hidden="true" focusable="false">
          <path d={`M0 ${height - foot + 0.5}H${width}`} stroke="currentColor" />
          {columns.map((c, k) => (
            <g key={c.label}>
              <rect
                x={x(c.label)}
                width={x.bandwidth()}
                y={y(c.height)}
                height={height - foot - y(c.height)}
                fill="currentColor"
              >
                <title>{`${c.label}: ${exactly(c.height)}`}</title>
              </rect>
              {k % every === 0 ? (
                <text x={(x(c.label) ?? 0) + x.bandwidth() / 2} y={height - 4} textAnchor="middle">
                  {c.label}
                </text>
              ) : null}
            </g>
          ))}
        </svg>
        <span className="small soft">{of}, heights on a logarithmic scale; press for the table</span>
      </summary>
      <table className="small">
        <tbody>
          {columns.map((c) => (
            <tr key={c.label}>
              <th scope="row">{c.label}</th>
              <td className="figure">{exactly(c.height)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="small">
        save as{' '}
        <button
          type="button"
          className="plain"
          aria-label={`Save ${of} as SVG`}
          onClick={() => svg.current !== null && saveSvg(svg.current, file)}
        >
          SVG
        </button>{' '}
        <button
          type="button"
          className="plain"
          aria-label={`Save ${of} as PNG`}
          onClick={() => {
            if (svg.current === null) return;
            savePng(svg.current, file).catch(() => notify('The picture could not be turned into a PNG here.', true));
          }}
        >
          PNG
        </button>
      </p>
    </details>
  );
}
