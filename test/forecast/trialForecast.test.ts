/** The forecast of a trial on a target: closed forms of dense and banded matrices, widths, complex arithmetic. */
import { describe, expect, it } from 'vitest';
import { defaultTarget } from '../../engine/forecast/target.ts';
import { assemble } from '../../engine/matrix/assemble.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { plainInput, TrialContext } from '../../engine/trial/context.ts';
import { forecastTrial } from '../../engine/trial/forecast.ts';
import { defaultChoice } from '../../engine/trial/rules.ts';
import { runTrial } from '../../engine/trial/run.ts';

/** Band of half width w; w = n − 1 is dense. */
function band(n: number, w: number, complex = false): SparseMatrix {
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  for (let j = 0; j < n; j++) {
    for (let i = Math.max(0, j - w); i <= Math.min(n - 1, j + w); i++) {
      row.push(i);
      column.push(j);
      values.push(i === j ? 4 * w + 1 : 1);
      if (complex) values.push(0);
    }
  }
  return assemble({
    rows: n,
    columns: n,
    field: complex ? 'complex' : 'real',
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: Float64Array.from(values),
  }).matrix;
}

function of(a: SparseMatrix, kind: 'cholesky' | 'ldlt' | 'lu' | 'column-lu', target = defaultTarget) {
  const context = new TrialContext(plainInput(a));
  const trial = runTrial(context, defaultChoice(kind, 'natural'));
  const forecast = forecastTrial(context, trial, target, 2 ** 32);
  if (forecast === null) throw new Error('no forecast');
  return { trial, forecast };
}

describe('dense n', () => {
  const n = 30;
  const a = band(n, n - 1);
  it('a forward and a back substitution together take n² multiplications and divisions (common practice, no source)', () => {
    // counted with additions: each of the n² − n products has one, the n divisions none
    for (const kind of ['lu', 'column-lu'] as const)
      expect(of(a, kind).forecast.operations.solve.value).toBe(2 * n * n - n);
    // Cholesky divides in both sweeps; LDLᵀ by D once
    expect(of(a, 'cholesky').forecast.operations.solve.value).toBe(2 * n * n);
    expect(of(a, 'ldlt').forecast.operations.solve.value).toBe(2 * n * n - n);
  });
  it('a refinement step adds a residual, 2n² operations, and n additions', () => {
    const { solve, refinementStep } = of(a, 'lu').forecast.operations;
    expect((refinementStep.value ?? 0) - (solve.value ?? 0)).toBe(2 * n * n + n);
  });
  it('LU can overwrite A; a band with fill cannot', () => {
    expect(of(a, 'lu').forecast.storage.overwriting.value).not.toBeNull();
    const grid = of(modelProblems.grid2d5(8), 'lu').forecast.storage.overwriting;
    expect([grid.value, grid.reason]).toEqual([null, expect.stringContaining('fill-in does not fit')]);
  });
  it('without fill the range of LU on fronts is one value: the dense one', () => {
    const { range, factorEntries } = of(a, 'lu').trial.counts;
    expect(range?.factorEntries).toEqual([n * n, n * n]);
    expect(factorEntries).toBe(n * n);
  });
});

describe('band of half width w', () => {
  const n = 50;
  const w = 4;
  const a = band(n, w);
  const l = (w + 1) * n - (w * (w + 1)) / 2;
  it('compressed columns and envelope by their closed forms, for every width of scalars and indices', () => {
    for (const scalarBytes of [4, 8] as const) {
      for (const indexBytes of [4, 8] as const) {
        const { storage, peak } = of(a, 'cholesky', { ...defaultTarget, scalarBytes, indexBytes }).forecast;
        expect(storage.compressedColumns.value).toBe((scalarBytes + indexBytes) * l + 8 * (n + 1));
        expect(storage.envelope.value).toBe(scalarBytes * l + 8 * (n + 1));
        expect(peak.inSingle === null).toBe(scalarBytes === 4);
        if (peak.inSingle !== null) expect(peak.inSingle).toBeLessThan(peak.bytes);
      }
    }
  });
  it('complex scalars are twice as wide, and count in real operations: 8 a multiply–add, 2 or 11 a division, 1 a root', () => {
    const c = band(n, w, true);
    const real = of(a, 'cholesky');
    const hermitian = of(c, 'cholesky');
    expect(hermitian.forecast.storage.compressedColumns.value).toBe(20 * l + 8 * (n + 1));
    const multiplyAdds = ((real.trial.counts.operations ?? 0) - l) / 2;
    expect(hermitian.trial.counts.operations).toBe(n + 2 * (l - n) + 8 * multiplyAdds);
    // substitution: l − n multiply–adds and n divisions by a real pivot, twice
    expect(hermitian.forecast.operations.solve.value).toBe(2 * (8 * (l - n) + 2 * n));
    expect(of(c, 'lu').forecast.operations.solve.value).toBe(2 * 8 * (l - n) + 11 * n);
  });
  it('delayed pivots are tabulated for 1, 5 and 20 %, where pivots can be delayed', () => {
    expect(of(a, 'cholesky').forecast.delayed).toBeNull();
    const { delayed, peak } = of(a, 'ldlt').forecast;
    expect(delayed?.map((d) => d.share)).toEqual([0, 0.01, 0.05, 0.2]);
    expect(peak.delayed).toBeGreaterThanOrEqual(peak.bytes);
    for (let k = 1; k < 4; k++) expect(delayed?.[k].bytes).toBeGreaterThanOrEqual(delayed?.[k - 1].bytes ?? 0);
  });
});

describe('parallel table', () => {
  it('more workers are never slower, and never beyond their bounds', () => {
    const context = new TrialContext(plainInput(modelProblems.grid2d5(40)));
    for (const ordering of ['natural', 'minimum-degree', 'nested-dissection'] as const) {
      const trial = runTrial(context, defaultChoice('cholesky', ordering));
      const rows = forecastTrial(context, trial, defaultTarget, 2 ** 32)?.parallel?.rows ?? [];
      expect(rows.map((r) => r.workers)).toEqual([1, 2, 4, 8, 16, 32, 64, 128, 256, 512, 1024]);
      rows.forEach((r, k) => {
        expect(r.speedup).toBeLessThanOrEqual(r.bound * (1 + 1e-12));
        expect(r.splitSpeedup).toBeLessThanOrEqual(r.splitBound * (1 + 1e-12));
        if (k === 0) return;
        expect(r.speedup).toBeGreaterThanOrEqual(rows[k - 1].speedup);
        expect(r.splitSpeedup).toBeGreaterThanOrEqual(rows[k - 1].splitSpeedup);
      });
    }
  });
});
