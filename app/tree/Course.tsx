import { area, line, scaleLinear } from 'd3';
import { ChartPlate } from '../plot/Plate.tsx';

const width = 340;
const height = 230;
const margin = { left: 58, right: 10, top: 20, bottom: 32 };

interface Series {
  readonly name: string;
  readonly values: Float64Array;
  readonly dashed: boolean;
}

/** Values along a run, from its start to its end, in equal steps; the first series as an area, the others as dashed lines. */
export function Course(props: {
  readonly title: string;
  readonly file: string;
  readonly series: readonly Series[];
  readonly across: string;
  readonly write: (x: number) => string;
  /** ticks are round multiples of it; default 1 */
  readonly unit?: number;
  /** drawn as a dashed line where it is near, told in words where it is not; null for none */
  readonly limit: number | null;
  readonly words: string;
}) {
  const { title, file, series, across, write, unit = 1, limit, words } = props;
  const most = Math.max(1, ...series.map(({ values }) => values.reduce((a, b) => Math.max(a, b), 0)));
  const drawn = limit !== null && limit <= 2 * most ? limit : null;
  const y = scaleLinear([0, Math.max(most, drawn ?? 0) * 1.04], [height - margin.bottom, margin.top]);
  const [low, high] = y.domain();
  const ticks = scaleLinear([low / unit, high / unit], [0, 1])
    .ticks(4)
    .map((t) => t * unit);
  const steps = series[0].values.length;
  const x = scaleLinear([0, steps], [margin.left, width - margin.right]);
  const stair = (values: Float64Array): [number, number][] =>
    Array.from(values, (v, k): [number, number][] => [
      [x(k), y(v)],
      [x(k + 1), y(v)],
    ]).flat();
  const [first, ...others] = series;
  return (
    <ChartPlate title={title} words={words} width={width} height={height} file={file}>
      {ticks.map((t) => (
        <g key={t}>
          <path d={`M${margin.left} ${y(t)}H${width - margin.right}`} className="chart-grid" />
          <text x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
            {write(t)}
          </text>
        </g>
      ))}
      <path
        d={
          area<[number, number]>(
            (p) => p[0],
            y(0),
            (p) => p[1],
          )(stair(first.values)) ?? ''
        }
        className="course-area"
      />
      <path d={line()(stair(first.values)) ?? ''} className="chart-line" />
      {others.map(({ name, values }) => (
        <path key={name} d={line()(stair(values)) ?? ''} className="chart-line chart-line-second" />
      ))}
      {drawn === null ? null : (
        <g>
          <path d={`M${margin.left} ${y(drawn)}H${width - margin.right}`} className="chart-limit" />
          <text x={width - margin.right} y={y(drawn) - 5} textAnchor="end" className="chart-note">
            limit {write(drawn)}
          </text>
        </g>
      )}
      <text x={margin.left} y={12} className="chart-note">
        {series.length === 1
          ? first.name
          : `full: ${first.name}; dashed: ${others.map((s) => s.name).join(', ')}${limit !== null && drawn === null ? `; limit ${write(limit)}` : ''}`}
      </text>
      {x.ticks(5).map((t) => (
        <text key={t} x={x(t)} y={height - 17} textAnchor={t === steps ? 'end' : 'middle'}>
          {Math.round((100 * t) / steps)} %
        </text>
      ))}
      <text x={(margin.left + width - margin.right) / 2} y={height - 3} textAnchor="middle" className="chart-note">
        {across}
      </text>
    </ChartPlate>
  );
}
