import { scaleLog, scalePoint } from 'd3';
import { useStore } from 'zustand';
import type { SweepRow } from '../../engine/trial/sweep.ts';
import { asText, count, exactly, plainNumber, seconds } from '../figures/format.ts';
import { ChartPlate } from '../plot/Plate.tsx';
import { WideTable } from '../plot/WideTable.tsx';
import { besideStore, startSweep } from '../state/proofs.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import type { ProofWish } from '../workers/proofOperations.ts';
import { BesideRun } from './BesideRun.tsx';

const width = 340;
const height = 150;
const margin = { left: 50, right: 50, top: 14, bottom: 34 };

const nameOf = (row: SweepRow): string => (row.threshold === null ? 'static' : String(row.threshold));

/** Backward error before refinement (squares) and fill (rings) over the thresholds. */
function SweepChart({ rows }: { rows: readonly SweepRow[] }) {
  const done = rows.filter((r) => r.failure === null);
  if (done.length < 2) return null;
  const x = scalePoint(done.map(nameOf), [margin.left, width - margin.right]).padding(0.3);
  const errors = done.map((r) => Math.max(1e-18, r.unrefinedBackwardError ?? 1));
  const y = scaleLog([Math.min(...errors) / 3, Math.max(...errors) * 3], [height - margin.bottom, margin.top]);
  const entries = done.map((r) => r.factorEntries ?? 1);
  const fill = scaleLog([Math.min(...entries) / 1.2, Math.max(...entries) * 1.2], [height - margin.bottom, margin.top]);
  const words = done
    .map(
      (r) =>
        `${nameOf(r)}: backward error ${r.unrefinedBackwardError?.toExponential(1)}, ${exactly(r.factorEntries ?? 0)} entries`,
    )
    .join('; ');
  return (
    <ChartPlate title="Thresholds" words={words} width={width} height={height} file="thresholds">
      <path
        d={`M${margin.left} ${margin.top}V${height - margin.bottom}H${width - margin.right}V${margin.top}`}
        className="chart-grid"
        fill="none"
      />
      {[errors.indexOf(Math.min(...errors)), errors.indexOf(Math.max(...errors))].map((k) => (
        <text key={`e${k}`} x={margin.left - 6} y={y(errors[k])} dy="0.32em" textAnchor="end">
          {errors[k].toExponential(0)}
        </text>
      ))}
      {[entries.indexOf(Math.min(...entries)), entries.indexOf(Math.max(...entries))].map((k) => (
        <text key={`f${k}`} x={width - margin.right + 6} y={fill(entries[k])} dy="0.32em">
          {asText(count(entries[k]))}
        </text>
      ))}
      {done.map((r, k) => (
        <g key={nameOf(r)}>
          <rect x={(x(nameOf(r)) ?? 0) - 3.5} y={y(errors[k]) - 3.5} width="7" height="7" className="bar-ink" />
          <circle cx={x(nameOf(r))} cy={fill(entries[k])} r="4" className="chart-ring" />
          <text x={x(nameOf(r))} y={height - 18} textAnchor="middle">
            {nameOf(r)}
          </text>
        </g>
      ))}
      <text x={width / 2} y={height - 3} textAnchor="middle" className="chart-note">
        squares: backward error unrefined (left); rings: entries (right)
      </text>
    </ChartPlate>
  );
}

/** Pivot growth over the thresholds: how much larger than the matrix the factors became. */
function GrowthChart({ rows }: { rows: readonly SweepRow[] }) {
  const done = rows.flatMap((r) => (r.pivotGrowth === null ? [] : [{ name: nameOf(r), growth: r.pivotGrowth }]));
  if (done.length < 2) return null;
  const x = scalePoint(
    done.map((d) => d.name),
    [margin.left, width - margin.right],
  ).padding(0.3);
  const least = Math.min(...done.map((d) => d.growth));
  const most = Math.max(...done.map((d) => d.growth));
  const y = scaleLog([least / 1.5, most * 1.5], [height - margin.bottom, margin.top]);
  const words = done.map((d) => `${d.name}: ${d.growth.toPrecision(3)}`).join('; ');
  return (
    <ChartPlate title="Pivot growth" words={words} width={width} height={height} file="pivot-growth">
      <path
        d={`M${margin.left} ${margin.top}V${height - margin.bottom}H${width - margin.right}`}
        className="chart-axis"
        fill="none"
      />
      {[...new Set([least, most])].map((t) => (
        <text key={t} x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
          {asText(plainNumber(t))}
        </text>
      ))}
      {done.map((d) => (
        <g key={d.name}>
          <rect x={(x(d.name) ?? 0) - 3.5} y={y(d.growth) - 3.5} width="7" height="7" className="bar-ink" />
          <text x={x(d.name)} y={height - 18} textAnchor="middle">
            {d.name}
          </text>
        </g>
      ))}
      <text x={width / 2} y={height - 3} textAnchor="middle" className="chart-note">
        threshold; growth on a logarithmic scale
      </text>
    </ChartPlate>
  );
}

function SweepTable({ rows }: { rows: readonly SweepRow[] }) {
  return (
    <>
      <SweepChart rows={rows} />
      <GrowthChart rows={rows} />
      <WideTable label="Thresholds, one a line">
        <table className="facts-table sweep-table">
          <thead>
            <tr>
              <th scope="col">u</th>
              <th scope="col">entries</th>
              <th scope="col">time</th>
              <th scope="col">growth</th>
              <th scope="col">error</th>
              <th scope="col">moved</th>
              <th scope="col">verdict</th>
            </tr>
          </thead>
          <tbody>
            {rows.map((r) => (
              <tr key={nameOf(r)}>
                <th scope="row">{nameOf(r)}</th>
                {r.failure === null ? (
                  <>
                    <td className="figure" title={exactly(r.factorEntries ?? 0)}>
                      {asText(count(r.factorEntries ?? 0))}
                    </td>
                    <td className="figure">{asText(seconds(r.seconds ?? 0))}</td>
                    <td className="figure">{r.pivotGrowth === null ? '–' : asText(plainNumber(r.pivotGrowth))}</td>
                    <td className="figure">{r.backwardError === null ? '–' : r.backwardError.toExponential(1)}</td>
                    <td className="figure">{exactly(r.delayed + r.offDiagonal + r.twoByTwo + r.perturbed)}</td>
                    <td>{r.verdict}</td>
                  </>
                ) : (
                  <td colSpan={6} className="small">
                    {r.failure}
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      </WideTable>
      <p className="small soft">
        u: pivot threshold. Error: normwise backward error after refinement. Moved: pivots off the diagonal, delayed, of
        order two or replaced. Time: numeric phase, measured here.
      </p>
    </>
  );
}

/** The pivot threshold swept: what safety costs in fill and time. */
export function Sweep({ sheet, trial, wish }: { sheet: Sheet; trial: Trial; wish: ProofWish }) {
  const run = useStore(besideStore, (s) => s[trial.id]?.sweep);
  if (trial.choice.factorization === 'cholesky') return null;
  return (
    <BesideRun
      title="Sweep of the pivot threshold"
      run={run}
      start={
        <button type="button" onClick={() => startSweep(sheet.id, trial.id, wish)}>
          Sweep the threshold
        </button>
      }
      sheet={sheet}
      trial={trial}
      what="sweep"
    >
      {(rows) => <SweepTable rows={rows} />}
    </BesideRun>
  );
}
