import { existsSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { figures, pathOf, readableNames, referencePath } from '../support/reference.ts';
import { runCommand, tempFile } from './runCommand.ts';

const json = async (...words: string[]) => {
  const run = await runCommand('factor', ...words, '--json');
  return { ...run, value: run.out === '' ? null : JSON.parse(run.out) };
};

/** 1-based triplets as a Matrix Market file. */
function triplets(name: string, n: number, entries: readonly (readonly [number, number, number])[]): string {
  const lines = entries.map((e) => e.join(' '));
  return tempFile(
    name,
    `%%MatrixMarket matrix coordinate real general\n${n} ${n} ${entries.length}\n${lines.join('\n')}\n`,
  );
}

describe('factor: against dense LAPACK through NumPy (test/reference/figures.json)', () => {
  const names = readableNames().filter((name) => {
    const f = figures[name];
    return (
      f.field === 'real' &&
      f.rows === f.columns &&
      f.rows <= 500 &&
      typeof f.logAbsDeterminant === 'number' &&
      (f.condition1 ?? 1e99) < 1e13
    );
  });
  it('there are matrices to try', () => expect(names.length).toBeGreaterThan(3));
  it.each(names)('%s: determinant, condition, inertia, verdict', async (name) => {
    const f = figures[name];
    const { status, value } = await json(pathOf(name) as string);
    expect(status).toBe(0);
    expect(value.verdict).not.toBe('red');
    expect(Math.abs(value.logAbsDeterminant - (f.logAbsDeterminant as number))).toBeLessThan(
      1e-6 * Math.abs(f.logAbsDeterminant as number) + 1e-4,
    );
    expect(value.determinantSign).toBe(f.determinantSign);
    // an estimate from below, within a factor of three (Higham 1987)
    expect(value.conditionEstimate).toBeLessThanOrEqual((f.condition1 as number) * 1.001);
    expect(value.conditionEstimate).toBeGreaterThan((f.condition1 as number) / 3);
    if (f.inertia !== undefined && value.inertia !== null) expect(value.inertia).toEqual(f.inertia);
    if (value.factorization !== 'column-lu' && value.pivots.delayed === 0)
      expect(value.peakBytes).toBe(value.forecast.peakBytes);
  });
});

describe('factor: verdicts and statuses', () => {
  // indefinite, its leading entry tiny: without pivoting 1/1e-14 swamps the rest
  const indefinite = triplets('indefinite.mtx', 3, [
    [1, 1, 1e-14],
    [1, 2, 1],
    [2, 1, 1],
    [2, 2, 1],
    [2, 3, 2],
    [3, 2, 2],
    [3, 3, -1],
    [1, 3, 1],
    [3, 1, 1],
  ]);
  it('an indefinite matrix without pivoting and refinement is red, status 4; with threshold pivoting green', async () => {
    const rash = await json(
      indefinite,
      '--ordering',
      'natural',
      '--factorization',
      'ldlt',
      '--pivoting',
      'none',
      '--refine',
      '0',
    );
    expect(rash.status).toBe(4);
    expect(rash.value.verdict).toBe('red');
    const careful = await json(
      indefinite,
      '--ordering',
      'natural',
      '--factorization',
      'ldlt',
      '--pivoting',
      'threshold',
      '--refine',
      '0',
    );
    expect(careful.status).toBe(0);
    expect(careful.value.verdict).toBe('green');
  });
  it('a singular matrix ends with status 3, its rows named, nothing on standard output', async () => {
    const singular = triplets('singular.mtx', 3, [
      [1, 1, 1],
      [1, 2, 2],
      [2, 1, 2],
      [2, 2, 4],
      [3, 3, 1],
    ]);
    const run = await json(singular, '--factorization', 'lu');
    expect(run.status).toBe(3);
    expect(run.out).toBe('');
    expect(run.error).toMatch(/singular/);
    expect(run.error).toMatch(/row/);
  });
  it('not positive definite ends with status 3 and the row', async () => {
    const run = await json(indefinite, '--factorization', 'cholesky', '--ordering', 'natural');
    expect(run.status).toBe(3);
    expect(run.error).toMatch(/row [123]/);
  });
});

describe('factor: more ways of one factorization', () => {
  const stiffness = referencePath('bcsstk01.mtx');
  it('the sweep has a line for every threshold, and 1 only for LU', async () => {
    const lu = await json(referencePath('pores_1.mtx'), '--factorization', 'lu', '--sweep');
    expect(lu.value.sweep.map((r: { threshold: number | null }) => r.threshold)).toEqual([
      1,
      0.5,
      0.1,
      0.01,
      0.001,
      null,
    ]);
    for (const row of lu.value.sweep) expect(row.failure === null).toBe(row.backwardError !== null);
    const ldlt = await json(stiffness, '--factorization', 'ldlt', '--sweep');
    expect(ldlt.value.sweep.map((r: { threshold: number | null }) => r.threshold)).toEqual([
      0.5,
      0.1,
      0.01,
      0.001,
      null,
    ]);
    const none = await runCommand('factor', stiffness, '--factorization', 'cholesky', '--sweep');
    expect(none.status).toBe(2);
  });
  it('single precision halves the factors and is refined to double', async () => {
    const double = await json(stiffness);
    const single = await json(stiffness, '--precision', 'single');
    expect(single.value.peakBytes).toBeLessThan(double.value.peakBytes + 8 * 48 * 48);
    expect(single.value.peakBytes).toBe(single.value.forecast.peakBytes);
    expect(single.value.unrefinedBackwardError).toBeGreaterThan(1e-12);
    expect(single.value.backwardError).toBeLessThan(1e-14);
  });
  it('a transposed solve: x of Aᵀ·x = b, checked by multiplying', async () => {
    // 2×2 by hand: Aᵀ·(1, 2) = (1·1 + 3·2, 2·1 + 4·2) = (7, 10)
    const a = triplets('two.mtx', 2, [
      [1, 1, 1],
      [1, 2, 2],
      [2, 1, 3],
      [2, 2, 4],
    ]);
    const b = tempFile('b.mtx', '%%MatrixMarket matrix array real general\n2 1\n7\n10\n');
    const x = tempFile('x.mtx');
    const run = await json(a, '--factorization', 'lu', '--transposed', '--rhs', b, '--solution-out', x);
    expect(run.status).toBe(0);
    const values = readFileSync(x, 'utf8')
      .split('\n')
      .filter((l) => l !== '' && !l.startsWith('%'))
      .slice(1)
      .map(Number);
    expect(values[0]).toBeCloseTo(1, 12);
    expect(values[1]).toBeCloseTo(2, 12);
  });
  it('several right-hand sides, complex ones for a real matrix', async () => {
    const a = triplets('diag.mtx', 2, [
      [1, 1, 2],
      [2, 2, 4],
    ]);
    const b = tempFile('bc.mtx', '%%MatrixMarket matrix array complex general\n2 2\n2 4\n4 -8\n1 0\n0 1\n');
    const x = tempFile('xc.mtx');
    const run = await json(a, '--rhs', b, '--solution-out', x);
    expect(run.value.rightHandSides.length).toBeGreaterThanOrEqual(4);
    const rows = readFileSync(x, 'utf8')
      .split('\n')
      .filter((l) => l !== '' && !l.startsWith('%'))
      .slice(1);
    const wanted = [1, 2, 1, -2, 0.5, 0, 0, 0.25];
    const found = rows.flatMap((l) => l.split(' ').map(Number));
    for (let k = 0; k < wanted.length; k++) expect(found[k]).toBeCloseTo(wanted[k], 14);
  });
  it('a second matrix on the same pattern keeps the analysis; another pattern is told with its counts', async () => {
    const one = triplets('one.mtx', 3, [
      [1, 1, 4],
      [2, 2, 4],
      [3, 3, 4],
      [1, 2, 1],
      [2, 1, 1],
    ]);
    const same = triplets('same.mtx', 3, [
      [1, 1, 5],
      [2, 2, 6],
      [3, 3, 7],
      [1, 2, 2],
      [2, 1, 2],
    ]);
    const other = triplets('other.mtx', 3, [
      [1, 1, 5],
      [2, 2, 6],
      [3, 3, 7],
      [2, 3, 1],
      [3, 2, 1],
      [1, 3, 1],
      [3, 1, 1],
    ]);
    const kept = await json(one, '--second', same);
    expect(kept.value.samePattern).toBe(true);
    expect(kept.value.reused).toBe(true);
    expect(kept.value.seconds.analysis).toBe(0);
    const fresh = await json(one, '--second', other);
    expect(fresh.value).toMatchObject({
      samePattern: false,
      newPositions: 4,
      gonePositions: 2,
      reused: false,
      verdict: 'green',
    });
    expect(fresh.value.notices[0]).toBe('Same pattern: no; 4 new positions, 2 gone.');
  });
  it('kept pivots that no longer fit: column LU is analysed anew, with a notice', async () => {
    const one = triplets('good.mtx', 2, [
      [1, 1, 1],
      [1, 2, 1],
      [2, 1, 1],
      [2, 2, -1],
    ]);
    const turned = triplets('turned.mtx', 2, [
      [1, 1, 1e-20],
      [1, 2, 1],
      [2, 1, 1],
      [2, 2, 1],
    ]);
    const run = await json(one, '--factorization', 'column-lu', '--second', turned);
    expect(run.status).toBe(0);
    expect(run.value.reused).toBe(false);
    expect(run.value.notices.join(' ')).toContain('analysed anew');
    expect(run.value.verdict).toBe('green');
  });
  it('a Schur complement by hand: tridiagonal (−1, 2, −1) of order 3 onto its last unknown is 2 − 2/3', async () => {
    const a = triplets('tri.mtx', 3, [
      [1, 1, 2],
      [2, 2, 2],
      [3, 3, 2],
      [1, 2, -1],
      [2, 1, -1],
      [2, 3, -1],
      [3, 2, -1],
    ]);
    const path = tempFile('schur.mtx');
    for (const factorization of ['cholesky', 'ldlt', 'lu']) {
      const run = await json(a, '--factorization', factorization, '--held-last', '3', '--schur-out', path);
      expect(run.status).toBe(0);
      expect(run.value.schur).toMatchObject({ size: 1, appended: 0, originalRows: [3] });
      const lines = readFileSync(path, 'utf8').trim().split('\n');
      expect(Number(lines[lines.length - 1])).toBeCloseTo(2 - 2 / 3, 14);
    }
    const none = await runCommand('factor', a, '--schur-out', path);
    expect(none.status).toBe(2);
    expect(none.error).toContain('held last');
    expect(existsSync(path)).toBe(true);
  });
});

describe('factor: a Schur complement onto many unknowns', () => {
  it('is that of dense elimination, held unknowns in the order given', async () => {
    // the five-point grid of 6 × 6 with a random diagonal; held: its last column of points, listed backwards
    const k = 6;
    const n = k * k;
    const entries: [number, number, number][] = [];
    for (let i = 0; i < n; i++) {
      entries.push([i + 1, i + 1, 4 + ((i * 7) % 5) / 10]);
      if ((i + 1) % k !== 0) entries.push([i + 1, i + 2, -1], [i + 2, i + 1, -1]);
      if (i + k < n) entries.push([i + 1, i + k + 1, -1], [i + k + 1, i + 1, -1]);
    }
    const a = Array.from({ length: n }, () => new Array<number>(n).fill(0));
    for (const [i, j, v] of entries) a[i - 1][j - 1] = v;
    const held = [36, 30, 24, 18, 12, 6].map((u) => u - 1);
    const rest = Array.from({ length: n }, (_, i) => i).filter((i) => !held.includes(i));
    for (const p of rest) {
      for (let i = 0; i < n; i++) {
        if (i === p || (rest.includes(i) && rest.indexOf(i) < rest.indexOf(p))) continue;
        const m = a[i][p] / a[p][p];
        for (let j = 0; j < n; j++) a[i][j] -= m * a[p][j];
      }
    }
    const path = tempFile('grid-schur.mtx');
    const file = triplets('grid-part.mtx', n, entries);
    const words = ['--held-last', '36,30,24,18,12,6', '--schur-out', path, '--ordering', 'minimum-degree'];
    for (const factorization of ['cholesky', 'ldlt', 'lu']) {
      const run = await json(file, '--factorization', factorization, ...words);
      expect(run.status).toBe(0);
      const rows: number[] = run.value.schur.originalRows.map((r: number) => r - 1);
      expect([...rows].sort((x, y) => x - y)).toEqual([...held].sort((x, y) => x - y));
      const values = readFileSync(path, 'utf8')
        .split('\n')
        .filter((l) => l !== '' && !l.startsWith('%'))
        .slice(1)
        .map(Number);
      rows.forEach((r, x) => {
        rows.forEach((c, y) => {
          expect(values[y * rows.length + x]).toBeCloseTo(a[r][c], 11);
        });
      });
    }
  });
});
