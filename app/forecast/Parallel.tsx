import { line, scaleLog } from 'd3';
import type { ParallelProfile } from '../../engine/forecast/parallel.ts';
import { asText, count, percent, times } from '../figures/format.ts';
import { ChartPlate } from '../plot/Plate.tsx';

const width = 340;
const height = 190;
const margin = { left: 40, right: 14, top: 12, bottom: 34 };

/** How much faster more workers can get: the bound as a dashed line, a schedule with divided fronts as a full one. Both scales logarithmic. */
export function Parallel({ profile }: { profile: ParallelProfile }) {
  const { rows, largestFronts, leaves, divisibleFrontsSpeedup } = profile;
  const most = rows[rows.length - 1].workers;
  const x = scaleLog([1, most], [margin.left, width - margin.right]).base(2);
  const top = Math.max(2, ...rows.map((r) => Math.max(r.splitBound, r.splitSpeedup)));
  const y = scaleLog([1, top], [height - margin.bottom, margin.top]).base(2);
  const path = (value: (r: (typeof rows)[number]) => number) =>
    line<(typeof rows)[number]>(
      (r) => x(r.workers),
      (r) => y(Math.max(1, value(r))),
    )([...rows]) ?? '';
  const words = rows.map((r) => `${r.workers} workers: ${asText(times(r.splitSpeedup))} faster`).join('; ');
  const ticks = y.ticks(5).filter((t) => Number.isInteger(Math.log2(t)));
  return (
    <>
      <ChartPlate title="More workers" words={words} width={width} height={height} file="parallel-profile">
        {ticks.map((t) => (
          <g key={t}>
            <path d={`M${margin.left} ${y(t)}H${width - margin.right}`} className="chart-grid" />
            <text x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
              {t}×
            </text>
          </g>
        ))}
        {rows.map((r, k) =>
          k % 2 === 0 ? (
            <text key={r.workers} x={x(r.workers)} y={height - 18} textAnchor="middle">
              {r.workers}
            </text>
          ) : null,
        )}
        <text x={(margin.left + width - margin.right) / 2} y={height - 4} textAnchor="middle" className="chart-note">
          workers
        </text>
        <path d={path((r) => r.splitBound)} className="chart-line chart-line-second" />
        <path d={path((r) => r.splitSpeedup)} className="chart-line" />
      </ChartPlate>
      <p className="small soft">
        Full line: a schedule in which large fronts are divided. Dashed: no schedule can pass this. Communication is
        left out.
      </p>
      <p>
        At most {asText(times(divisibleFrontsSpeedup))} faster with any number of workers; {asText(count(leaves))}{' '}
        leaves to start from.{' '}
        {largestFronts.length === 0
          ? ''
          : `The largest front, of order ${asText(count(largestFronts[0].order))}, holds ${asText(percent(largestFronts[0].share))} of the work.`}
      </p>
    </>
  );
}
