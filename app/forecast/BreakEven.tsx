import { line, scaleLog } from 'd3';
import { asText, count, seconds } from '../figures/format.ts';
import { ChartPlate } from '../plot/Plate.tsx';
import type { Workload } from '../workers/target.ts';
import { type TrialCost, workloadSeconds } from '../workers/workload.ts';

const width = 360;
const height = 210;
const margin = { left: 58, right: 26, top: 14, bottom: 36 };
const counts = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10000];

/** Seconds of the whole workload over the number of factorizations, one line a trial; where lines cross, another trial becomes the better one. */
export function BreakEven({ costs, workload }: { costs: readonly TrialCost[]; workload: Workload }) {
  const at = (cost: TrialCost, factorizations: number) => workloadSeconds(cost, { ...workload, factorizations });
  const all = costs.flatMap((c) => [at(c, 1), at(c, counts[counts.length - 1])]).filter((s) => s > 0);
  if (all.length === 0) return null;
  const x = scaleLog([1, counts[counts.length - 1]], [margin.left, width - margin.right]);
  const y = scaleLog([Math.min(...all), Math.max(...all)], [height - margin.bottom, margin.top]);
  const words = costs
    .map(
      (c) =>
        `${c.name}: ${asText(seconds(at(c, 1)))} for one, ${asText(seconds(at(c, 1000)))} for 1,000 factorizations`,
    )
    .join('; ');
  const now = Math.max(1, Math.min(counts[counts.length - 1], workload.factorizations));
  return (
    <ChartPlate title="whole workload by factorizations" words={words} width={width} height={height} file="break-even">
      {y
        .ticks(5)
        .filter((t) => Number.isInteger(Math.log10(t)))
        .map((t) => (
          <g key={t}>
            <path d={`M${margin.left} ${y(t)}H${width - margin.right}`} className="chart-grid" />
            <text x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
              {asText(seconds(t))}
            </text>
          </g>
        ))}
      {[1, 10, 100, 1000, 10000].map((k) => (
        <text key={k} x={x(k)} y={height - 20} textAnchor="middle">
          {asText(count(k))}
        </text>
      ))}
      <text x={(margin.left + width - margin.right) / 2} y={height - 4} textAnchor="middle" className="chart-note">
        factorizations with this pattern
      </text>
      <path d={`M${x(now)} ${margin.top}V${height - margin.bottom}`} className="chart-limit" />
      {costs.map((c) => (
        <g key={c.name}>
          <path
            d={
              line<number>(
                (k) => x(k),
                (k) => y(at(c, k)),
              )(counts) ?? ''
            }
            className="chart-line"
          />
          <text
            x={width - margin.right + 5}
            y={y(at(c, counts[counts.length - 1]))}
            dy="0.35em"
            className="chart-letter"
          >
            {c.name}
          </text>
        </g>
      ))}
    </ChartPlate>
  );
}
