import { line, scaleLinear, scaleLog } from 'd3';
import type { CardStep } from '../../engine/numeric/accuracy/card.ts';
import { asText, plainNumber } from '../figures/format.ts';
import { ChartPlate } from '../plot/Plate.tsx';

const width = 340;
const height = 150;
const margin = { left: 50, right: 12, top: 10, bottom: 24 };
/** Below this a double has nothing left to say. */
const floor = 1e-18;

const shown = (x: number | null) => (x === null ? 'not finite' : asText(plainNumber(x)));

/** Backward errors after each step of refinement, on a logarithmic scale: normwise as squares, componentwise as rings. */
export function Refinement({ steps }: { steps: readonly CardStep[] }) {
  const finite = steps.flatMap((s) => [s.backwardError, s.componentwiseBackwardError]).filter((x) => x !== null);
  if (steps.length === 0 || finite.length === 0) return null;
  const at = (x: number | null) => Math.max(floor, x ?? floor);
  const x = scaleLinear([0, Math.max(1, steps.length - 1)], [margin.left, width - margin.right]);
  const most = Math.max(1e-10, ...finite);
  const y = scaleLog([floor, most * 3], [height - margin.bottom, margin.top]);
  const path = (value: (s: CardStep) => number | null) =>
    line<CardStep>(
      (s) => x(s.step),
      (s) => y(at(value(s))),
    )([...steps]) ?? '';
  const words = steps
    .map(
      (s) => `step ${s.step}: ${shown(s.backwardError)} normwise, ${shown(s.componentwiseBackwardError)} componentwise`,
    )
    .join('; ');
  const decades = y.ticks(6).filter((t) => Number.isInteger(Math.log10(t)));
  return (
    <ChartPlate title="Refinement" words={words} width={width} height={height} file="refinement">
      {decades.map((t) => (
        <g key={t}>
          <path d={`M${margin.left} ${y(t)}H${width - margin.right}`} className="chart-grid" />
          <text x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
            {t.toExponential(0)}
          </text>
        </g>
      ))}
      {steps.map((s) => (
        <text key={s.step} x={x(s.step)} y={height - 6} textAnchor="middle">
          {s.step}
        </text>
      ))}
      <path d={path((s) => s.backwardError)} className="chart-line" />
      <path d={path((s) => s.componentwiseBackwardError)} className="chart-line chart-line-second" />
      {steps.map((s) => (
        <g key={s.step}>
          <rect x={x(s.step) - 3} y={y(at(s.backwardError)) - 3} width="6" height="6" className="bar-ink" />
          <circle cx={x(s.step)} cy={y(at(s.componentwiseBackwardError))} r="3.5" className="chart-ring" />
        </g>
      ))}
    </ChartPlate>
  );
}
