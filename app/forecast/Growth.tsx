import { line, scaleLog } from 'd3';
import { useMemo, useState } from 'react';
import { useStore } from 'zustand';
import type { OrderingName } from '../../engine/trial/choice.ts';
import { asText, bytes, count, exactly, percent, seconds, type Written } from '../figures/format.ts';
import { ChartPlate } from '../plot/Plate.tsx';
import { settingsStore } from '../state/settings.ts';
import { type Sheet, sheetsStore } from '../state/sheets.ts';
import { orderings } from '../trials/explain.ts';
import { type FamilyMember, type FigureGrowth, growthAt, studyGrowth } from '../workers/growth.ts';

const width = 360;
const height = 220;
const margin = { left: 62, right: 14, top: 12, bottom: 34 };

const words: Readonly<Record<FigureGrowth['figure'], readonly [string, (x: number) => Written]>> = {
  factorEntries: ['factor entries', count],
  operations: ['operations', count],
  memory: ['peak memory', bytes],
  time: ['factorization, one core', seconds],
};

/** What each open sheet says of an ordering, where its trial is finished and forecast. */
function membersOf(sheets: readonly Sheet[], ordering: OrderingName): FamilyMember[] {
  return sheets.flatMap((sheet) => {
    const trial = sheet.trials.find((t) => t.choice.ordering === ordering && t.outcome !== null && t.forecast !== null);
    if (trial?.outcome == null || trial.forecast === null || sheet.summary === null) return [];
    const { factorEntries, operations } = trial.outcome.counts;
    if (factorEntries === null || operations === null || operations === 0) return [];
    const time = trial.forecast.time.factorization.value ?? 0;
    return [
      {
        name: sheet.name,
        n: sheet.summary.columns,
        factorEntries,
        operations,
        memory: trial.forecast.peak.bytes,
        time,
      },
    ];
  });
}

/** A figure over the number of unknowns with its fit, both scales logarithmic. */
function GrowthChart({ growth, members }: { growth: FigureGrowth; members: readonly FamilyMember[] }) {
  const [name, write] = words[growth.figure];
  const first = members[0].n;
  const last = members[members.length - 1].n * 4;
  const { fit } = growth;
  const x = scaleLog([first, last], [margin.left, width - margin.right]);
  const values = members.map((m) => m[growth.figure]);
  const top = Math.max(...values, growthAt(fit, last));
  const y = scaleLog([Math.min(...values), top], [height - margin.bottom, margin.top]);
  const steps = Array.from({ length: 40 }, (_, k) => first * (last / first) ** (k / 39));
  const said = members.map((m) => `n = ${exactly(m.n)}: ${asText(write(m[growth.figure]))}`).join('; ');
  return (
    <ChartPlate title={`${name} with n`} words={said} width={width} height={height} file={`growth-${growth.figure}`}>
      <path
        d={`M${margin.left} ${margin.top}V${height - margin.bottom}H${width - margin.right}`}
        className="chart-axis"
        fill="none"
      />
      {[y.domain()[0], y.domain()[1]].map((t) => (
        <text key={t} x={margin.left - 6} y={y(t)} dy="0.32em" textAnchor="end">
          {asText(write(t))}
        </text>
      ))}
      <path
        d={
          line<number>(
            (n) => x(n),
            (n) => y(Math.max(y.domain()[0], growthAt(fit, n))),
          )(steps) ?? ''
        }
        className="chart-line chart-line-second"
      />
      {members.map((m) => (
        <rect key={m.name} x={x(m.n) - 3.5} y={y(m[growth.figure]) - 3.5} width="7" height="7" className="bar-ink" />
      ))}
      {[first, members[members.length - 1].n, last].map((n) => (
        <text key={n} x={x(n)} y={height - 19} textAnchor={n === last ? 'end' : 'middle'}>
          {asText(count(Math.round(n)))}
        </text>
      ))}
      <text x={width / 2} y={height - 4} textAnchor="middle" className="chart-note">
        unknowns; dashed: the fit
      </text>
    </ChartPlate>
  );
}

/** Growth over the open sheets as matrices of one family: fits, local exponents, and how large n can be. */
export function Growth() {
  const sheets = useStore(sheetsStore, (s) => s.sheets);
  const target = useStore(settingsStore, (s) => s.target);
  const [ordering, setOrdering] = useState<OrderingName>('nested-dissection');
  const [dimension, setDimension] = useState<2 | 3 | null>(null);
  const [hours, setHours] = useState(1);
  const names = [...new Set(sheets.flatMap((s) => s.trials.map((t) => t.choice.ordering)))];
  const members = useMemo(() => membersOf(sheets, ordering), [sheets, ordering]);
  const sizes = new Set(members.map((m) => m.n)).size;
  const dissection = ordering === 'nested-dissection' || ordering === 'geometric-dissection';
  const study = useMemo(
    () =>
      sizes < 2
        ? null
        : studyGrowth(members, dissection, dimension, { memory: target.memoryBytes, time: hours * 3600 }),
    [members, sizes, dissection, dimension, target, hours],
  );
  return (
    <section className="growth" aria-label="Growth">
      <div className="growth-head">
        <label>
          <span className="small soft">ordering</span>{' '}
          <select value={ordering} onChange={(event) => setOrdering(event.target.value as OrderingName)}>
            {[...new Set([...names, ordering])].map((name) => (
              <option key={name} value={name}>
                {orderings[name].name}
              </option>
            ))}
          </select>
        </label>
        <label>
          <span className="small soft">law</span>{' '}
          <select
            value={dimension ?? ''}
            disabled={!dissection}
            onChange={(event) => setDimension(event.target.value === '' ? null : (Number(event.target.value) as 2 | 3))}
          >
            <option value="">the one that predicts best</option>
            <option value="2">meshes in two dimensions</option>
            <option value="3">meshes in three dimensions</option>
          </select>
        </label>
        <label>
          <span className="small soft">hours for one factorization</span>{' '}
          <input
            type="number"
            min={0.001}
            step="any"
            value={hours}
            onChange={(event) => setHours(Math.max(0.001, Number(event.target.value)))}
          />
        </label>
      </div>
      {study === null ? (
        <p className="soft">
          Open matrices of one family (refinements of one mesh), each with a finished trial of this ordering: two sizes
          give a line, four give confidence. There {sizes === 1 ? 'is one size' : `are ${sizes} sizes`} so far.
        </p>
      ) : (
        <>
          {study.reach.map((r) => (
            <p key={r.what}>{r.sentence}</p>
          ))}
          <table className="facts-table growth-table">
            <thead>
              <tr>
                <th scope="col">figure</th>
                <th scope="col">law</th>
                <th scope="col">local exponents</th>
                <th scope="col">largest size left out</th>
              </tr>
            </thead>
            <tbody>
              {study.growth.map(({ figure, fit, leftOut }) => (
                <tr key={figure}>
                  <th scope="row">{words[figure][0]}</th>
                  <td>{fit.law === 'free exponent' ? `n^${fit.b.toFixed(2)}` : fit.law}</td>
                  <td className="figure">{fit.exponents.map((e) => e.exponent.toFixed(2)).join(', ')}</td>
                  <td>{leftOut === null ? '–' : `predicted within ${asText(percent(leftOut))}`}</td>
                </tr>
              ))}
            </tbody>
          </table>
          <div className="comparison">
            {study.growth.map((g) => (
              <GrowthChart key={g.figure} growth={g} members={study.members} />
            ))}
          </div>
          {study.notes.map((note) => (
            <p key={note} className="small soft">
              {note}
            </p>
          ))}
        </>
      )}
    </section>
  );
}
