/** The command line without a process: outputs, JSON and exit statuses. Figures: test/reference/README.md. */
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { commands } from '../../engine/command/commands.ts';
import { dispatch } from '../../engine/command/dispatch.ts';
import { parseCall } from '../../engine/command/parse.ts';
import { orderFrom, readPermutation } from '../../engine/exchange/readPermutation.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { positionOf } from '../../engine/matrix/permutation.ts';
import { naiveElimination } from '../support/elimination.ts';
import { figures, readReference, referencePath } from '../support/reference.ts';

const folder = mkdtempSync(join(tmpdir(), 'command-'));

async function run(...words: string[]): Promise<{ status: number; out: string; error: string }> {
  let out = '';
  let error = '';
  const status = await dispatch(words, {
    line: (text) => {
      out += `${text}\n`;
    },
    error: (text) => {
      error += `${text}\n`;
    },
    file: async (path, chunks) => writeFileSync(path, Buffer.concat([...chunks])),
  });
  return { status, out, error };
}

function file(name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

describe('survey', () => {
  for (const name of ['bcsstk01', 'utm300', 'cg20', 'virginia_queen']) {
    it(`${name}: JSON equals the outside figures`, async () => {
      const { status, out } = await run('survey', referencePath(`${name}.mtx`), '--json');
      expect(status).toBe(0);
      const { matrix, survey } = JSON.parse(out);
      const f = figures[name];
      expect(matrix).toMatchObject({
        rows: f.rows,
        entries: f.entries,
        storedEntries: f.storedEntries,
        field: f.field,
      });
      for (const key of [
        'lowerBandwidth',
        'upperBandwidth',
        'envelope',
        'components',
        'structuralRank',
        'strongComponents',
        'symmetrisedEntries',
        'diagonalStored',
      ] as const) {
        expect(survey[key], key).toBe(f[key]);
      }
      expect(survey.patternSymmetry).toBeCloseTo(f.patternSymmetry ?? Number.NaN, 12);
    });
  }
});

describe('compare', () => {
  it('a gzip file gives the same trials; natural counts equal the outside figures', async () => {
    const plain = referencePath('lund_a.mtx');
    const packed = file('packed.bin', gzipSync(readFileSync(plain)));
    const words = ['--orderings', 'natural,reverse-cuthill-mckee,minimum-degree', '--json'];
    const a = JSON.parse((await run('compare', plain, ...words)).out);
    const b = JSON.parse((await run('compare', packed, ...words)).out);
    const bare = (x: { trials: { seconds?: unknown }[] }) => x.trials.map(({ seconds: _seconds, ...rest }) => rest);
    expect(bare(a)).toEqual(bare(b));
    const natural = figures.lund_a.orderings?.natural;
    expect(a.trials[0]).toMatchObject({
      ordering: 'natural',
      factorization: 'cholesky',
      factorEntries: natural?.factorEntries,
      operations: natural?.operations,
      treeHeight: natural?.treeHeight,
      bandwidth: natural?.bandwidth,
      envelope: natural?.envelope,
      factorBytes: 12 * (natural?.factorEntries ?? 0) + 8 * (figures.lund_a.rows + 1),
    });
  });

  it('without --orderings every suitable one is there', async () => {
    const { status, out } = await run('compare', referencePath('bcsstk01.mtx'), '--json');
    expect(status).toBe(0);
    const names = JSON.parse(out).trials.map((t: { ordering: string }) => t.ordering);
    expect(names).toEqual(
      expect.arrayContaining([
        'natural',
        'reverse-cuthill-mckee',
        'minimum-degree',
        'minimum-fill',
        'nested-dissection',
      ]),
    );
  });

  it('Cholesky on an unsymmetric matrix is forecast on A + Aᵀ and says so', async () => {
    const { status, out } = await run(
      'compare',
      referencePath('utm300.mtx'),
      '--orderings',
      'natural',
      '--factorization',
      'cholesky',
      '--json',
    );
    expect(status).toBe(0);
    const report = JSON.parse(out);
    expect(report.trials[0].factorEntries).toBe(figures.utm300.orderings?.natural.factorEntries);
    expect(report.notes.join(' ')).toContain('A + Aᵀ');
  });

  it('a rectangular matrix: column structure yes, Cholesky and LU refused with 2', async () => {
    expect((await run('compare', referencePath('lsq.mtx'), '--orderings', 'natural', '--json')).status).toBe(0);
    for (const factorization of ['cholesky', 'lu']) {
      const { status, out, error } = await run('compare', referencePath('lsq.mtx'), '--factorization', factorization);
      expect({ status, out }).toEqual({ status: 2, out: '' });
      expect(error).toContain('1850 × 712');
    }
  });
});

describe('order', () => {
  it('writes a permutation that reproduces the factor entries, while its inverse does not', async () => {
    const path = join(folder, 'order.txt');
    for (const [direction, base] of [
      ['new-to-old', '1'],
      ['old-to-new', '0'],
    ]) {
      const { status } = await run(
        'order',
        referencePath('lund_a.mtx'),
        '--ordering',
        'minimum-degree',
        '--out',
        path,
        '--direction',
        direction,
        '--base',
        base,
      );
      expect(status).toBe(0);
      const read = await readPermutation(bytesSource('p', new Uint8Array(readFileSync(path))), 147);
      expect([read.direction, String(read.base)]).toEqual([direction, base]);
      const order = orderFrom(read, direction as 'new-to-old');
      const a = readReference('lund_a');
      const trial = JSON.parse(
        (await run('compare', referencePath('lund_a.mtx'), '--orderings', 'minimum-degree', '--json')).out,
      ).trials[0];
      expect(naiveElimination(a, order).factorEntries).toBe(trial.factorEntries);
      expect(naiveElimination(a, positionOf(order)).factorEntries).not.toBe(trial.factorEntries);
      // taken back in, it gives the same counts
      const back = JSON.parse(
        (await run('compare', referencePath('lund_a.mtx'), '--orderings', 'imported', '--permutation', path, '--json'))
          .out,
      ).trials[0];
      expect(back.factorEntries).toBe(trial.factorEntries);
    }
  });
});

describe('factor', () => {
  it('bcsstk01: counts as forecast, inertia and condition as dense LAPACK found them', async () => {
    const { status, out } = await run('factor', referencePath('bcsstk01.mtx'), '--json');
    expect(status).toBe(0);
    const r = JSON.parse(out);
    expect(r).toMatchObject({ factorization: 'cholesky', verdict: 'green', inertia: [48, 0, 0] });
    expect(r.factorEntries).toBe(r.forecast.factorEntries);
    expect(r.peakBytes).toBe(r.forecast.peakBytes);
    expect(r.conditionEstimate).toBeGreaterThan((figures.bcsstk01.condition1 ?? 0) / 3);
    expect(r.conditionEstimate).toBeLessThan((figures.bcsstk01.condition1 ?? 0) * 1.0001);
    expect(r.logAbsDeterminant).toBeCloseTo(figures.bcsstk01.logAbsDeterminant ?? 0, 6);
  });

  it('a singular matrix ends with 3 and its rows', async () => {
    const { status, out, error } = await run(
      'factor',
      referencePath('virginia_queen.mtx'),
      '--factorization',
      'column-lu',
    );
    expect({ status, out }).toEqual({ status: 3, out: '' });
    expect(error).toMatch(/singular/);
  });

  it('an indefinite matrix: red without pivoting and refinement, green with threshold pivoting', async () => {
    const text = '%%MatrixMarket matrix coordinate real symmetric\n3 3 5\n1 1 1e-14\n2 1 1\n3 2 1\n2 2 1e-14\n3 3 3\n';
    const path = file('indefinite.mtx', text);
    const plain = await run(
      'factor',
      path,
      '--factorization',
      'ldlt',
      '--ordering',
      'natural',
      '--pivoting',
      'none',
      '--refine',
      '0',
      '--json',
    );
    expect(JSON.parse(plain.out).verdict).not.toBe('green');
    const safe = await run('factor', path, '--factorization', 'ldlt', '--ordering', 'natural', '--json');
    expect([safe.status, JSON.parse(safe.out).verdict]).toEqual([0, 'green']);
  });
});

describe('usage', () => {
  const cases: [string[], number, string][] = [
    [[], 2, 'No command'],
    [['fly'], 2, 'Unknown command'],
    [['help', 'fly'], 2, 'Unknown command "fly"'],
    [['fly', '--help'], 2, 'Unknown command "fly"'],
    [['survey'], 2, 'takes 1 file'],
    [['survey', 'nowhere.mtx'], 2, 'cannot be read'],
    [['compare', referencePath('bcsstk01.mtx'), '--orderings', 'fast'], 2, '"fast" is not known'],
    [['compare', referencePath('bcsstk01.mtx'), '--wrong'], 2, 'Options of "compare"'],
    [['order', referencePath('bcsstk01.mtx')], 2, '--out'],
    [['factor', referencePath('bcsstk01.mtx'), '--threshold', '7'], 2, 'from 1e-12 to 1'],
    [['factor', referencePath('utm300.mtx'), '--factorization', 'cholesky'], 2, 'not symmetric'],
    [['factor', referencePath('lund_a.mtx'), '--memory-limit', '1000'], 3, 'GiB'],
  ];
  for (const [words, status, message] of cases) {
    it(`${words.map((w) => w.split('/').pop()).join(' ')} → ${status}`, async () => {
      const got = await run(...words);
      expect({ status: got.status, out: got.out }).toEqual({ status, out: '' });
      expect(got.error).toContain(message);
    });
  }

  it('help names every command, and explains each with its options and examples', async () => {
    const { status, out } = await run('help');
    expect(status).toBe(0);
    for (const { name, options, examples = [] } of commands) {
      expect(out).toContain(`  ${name} `);
      for (const words of [
        ['help', name],
        [name, '--help'],
      ]) {
        const help = await run(...words);
        expect(help.status).toBe(0);
        for (const option of Object.keys(options)) expect(help.out).toContain(`--${option}`);
        for (const [call] of examples) {
          expect(help.out).toContain(call);
          // every example is a call that the parser takes
          expect(() => parseCall(call.split(' '), commands)).not.toThrow();
        }
      }
    }
  });
});
