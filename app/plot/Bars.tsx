import { scaleBand, scaleLinear } from 'd3';
import { asText, type Written } from '../figures/format.ts';
import { ChartPlate } from './Plate.tsx';

export interface Bar {
  readonly letter: string;
  readonly name: string;
  readonly value: number;
  /** the share of `value` that is fill-in, drawn in the colour and hatch of fill; null if the figure knows no fill */
  readonly fill: number | null;
}

const width = 360;
const rowHeight = 26;
const left = 26;
const right = 74;
const top = 18;

/** Horizontal bars, one a trial, from zero; a dashed line with its figure at the limit. */
export function Bars(props: {
  readonly title: string;
  readonly file: string;
  readonly bars: readonly Bar[];
  readonly write: (x: number) => Written;
  readonly limit: number | null;
}) {
  const { title, file, bars, write, limit } = props;
  const most = Math.max(...bars.map((b) => b.value), 0);
  // a limit far beyond the bars would flatten them all: it is then said in words only
  const drawn = limit !== null && limit <= 3 * most ? limit : null;
  const height = top + rowHeight * bars.length + 6;
  const x = scaleLinear([0, Math.max(most, drawn ?? 0, Number.MIN_VALUE)], [left, width - right]);
  const y = scaleBand(
    bars.map((b) => b.letter),
    [top, height - 6],
  ).padding(0.28);
  const words = bars.map((b) => `${b.letter}, ${b.name}: ${asText(write(b.value))}`).join('; ');
  return (
    <ChartPlate title={title} words={`${words}.`} width={width} height={height} file={file}>
      <defs>
        <pattern id={`hatch-${file}`} width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(-45)">
          <rect width="6" height="6" className="fill-ground" />
          <path d="M0 3H6" className="fill-line" />
        </pattern>
      </defs>
      {bars.map(({ letter, value, fill }) => {
        const at = y(letter) ?? 0;
        const split = fill === null ? x(value) : x(value - fill);
        const written = write(value);
        return (
          <g key={letter}>
            <text x={4} y={at + y.bandwidth() / 2} dy="0.35em" className="chart-letter">
              {letter}
            </text>
            <rect x={left} y={at} width={Math.max(1, split - left)} height={y.bandwidth()} className="bar-ink" />
            {fill === null ? null : (
              <rect
                x={split}
                y={at}
                width={Math.max(0, x(value) - split)}
                height={y.bandwidth()}
                fill={`url(#hatch-${file})`}
                className="bar-fill"
              />
            )}
            <text x={x(value) + 6} y={at + y.bandwidth() / 2} dy="0.35em" className="chart-figure">
              {asText(written)}
              <title>{written.exact}</title>
            </text>
          </g>
        );
      })}
      <path d={`M${left - 0.5} ${top}V${height - 4}`} className="chart-axis" />
      {limit === null ? null : drawn === null ? (
        <text x={width - 4} y={11} textAnchor="end" className="chart-note">
          limit {asText(write(limit))}, off the chart
        </text>
      ) : (
        <>
          <path d={`M${x(drawn)} ${top - 4}V${height}`} className="chart-limit" />
          <text x={x(drawn)} y={11} textAnchor="middle" className="chart-note">
            limit {asText(write(drawn))}
          </text>
        </>
      )}
    </ChartPlate>
  );
}
