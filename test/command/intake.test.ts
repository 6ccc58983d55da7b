/** Reading on the command line: the import summary, readings that are asked for, files beside a matrix, conversion, sums, differences. */
import { existsSync, mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { dispatch } from '../../engine/command/dispatch.ts';
import { naiveElimination } from '../support/elimination.ts';
import { readReference, referencePath } from '../support/reference.ts';

const folder = mkdtempSync(join(tmpdir(), 'intake-'));

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

function file(name: string, content: string): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

const head = (field = 'real', symmetry = 'general') => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;

describe('the import summary', () => {
  it('counts what was in the file, says what was measured, and how to read it otherwise (needs 33, 34, 35)', async () => {
    const path = file('near.mtx', `${head()}2 2 6\n1 1 4\n2 1 1\n1 2 1.0000000000000002\n2 2 3\n2 2 1\n1 1 0\n`);
    const { import: summary, notes } = JSON.parse((await run('survey', path, '--json')).out);
    expect(summary).toMatchObject({
      storedEntries: 6,
      entries: 4,
      duplicates: 2,
      explicitZeros: 0,
      declaredSymmetry: 'general',
      measuredSymmetry: 'symmetric up to 5.55e-17 of the largest value',
    });
    expect(summary.notes[0]).toMatchObject({ code: 'duplicates-summed', read: ['keep-last-duplicate'] });
    expect(notes.at(-1)).toMatch(/^Declared general, and symmetric up to 5.55e-17.*row 2, column 1/);
    const text = (await run('survey', path)).out;
    expect(text).toMatch('6 entries in the file, 4 after expansion; 2 duplicates, 0 explicit zeros');
    expect(text).toMatch('--read keep-last-duplicate: ');
    expect(text).toMatch('--read symmetrise');
    const made = JSON.parse((await run('survey', path, '--json', '--read', 'symmetrise')).out);
    expect([made.import.measuredSymmetry, made.survey.valueSymmetric]).toEqual(['symmetric exactly', true]);
  });

  it('an ask is an option: the refusal names the word, the word reads the file (needs 7, 15, 37)', async () => {
    const zeroBased = file('zero.mtx', `${head()}2 2 2\n0 0 1\n1 1 2\n`);
    // an index equal to neither end but 0: looks 0-based
    const refused = await run('survey', zeroBased);
    expect([refused.status, refused.error]).toEqual([
      2,
      expect.stringMatching(/line 3: .*\n {2}--read read-as-0-based: /),
    ]);
    expect((await run('survey', zeroBased, '--read', 'read-as-0-based')).status).toBe(0);
    const pattern = file('p.mtx', `${head('pattern', 'symmetric')}2 2 3\n1 1\n2 1\n2 2\n`);
    expect((await run('factor', pattern, '--factorization', 'cholesky')).status).toBe(2);
    const made = await run('factor', pattern, '--factorization', 'cholesky', '--read', 'synthetic-values');
    expect([made.status, made.out]).toEqual([0, expect.stringContaining('p.mtx (synthetic values)')]);
  });
});

describe('packed files', () => {
  it('gzip of one and of several members; damaged and cut ones are refused with a byte (needs 41)', async () => {
    const plain = readFileSync(referencePath('bcsstk01.mtx'));
    const packed = gzipSync(plain);
    const write = (name: string, bytes: Uint8Array) => {
      const path = join(folder, name);
      writeFileSync(path, bytes);
      return path;
    };
    const two = Buffer.concat([gzipSync(plain.subarray(0, 5000)), gzipSync(plain.subarray(5000))]);
    for (const bytes of [packed, two]) {
      const { difference } = JSON.parse(
        (await run('difference', referencePath('bcsstk01.mtx'), write('k.mtx.gz', bytes), '--json')).out,
      );
      expect(difference).toMatchObject({ samePattern: true, values: { changed: 0 } });
    }
    const wrong = Buffer.from(packed);
    for (let k = 300; k < 320; k++) wrong[k] ^= 255;
    for (const bytes of [packed.subarray(0, 900), wrong]) {
      const { status, error } = await run('survey', write('bad.gz', bytes));
      expect([status, error]).toEqual([2, expect.stringMatching(/byte \d+|line \d+/)]);
    }
  });
});

describe('files beside a matrix', () => {
  it('a permutation valid both ways: both are forecast, the user says (needs 52)', async () => {
    const pattern = readReference('bcsstk01');
    // a rotation is not its own inverse
    const n = pattern.columns;
    const order = Int32Array.from({ length: n }, (_, k) => (k * 7 + 3) % n);
    const inverse = new Int32Array(n);
    for (let k = 0; k < n; k++) inverse[order[k]] = k;
    const path = file('p.txt', `${Array.from(order, (i) => i + 1).join('\n')}\n`);
    const refused = await run('order', referencePath('bcsstk01.mtx'), '--permutation', path, '--out', '/dev/null');
    expect(refused.status).toBe(2);
    const there = naiveElimination(pattern, order).factorEntries;
    const back = naiveElimination(pattern, inverse).factorEntries;
    expect(refused.error).toMatch(
      `--permutation-direction new-to-old: line k holds the unknown at position k; ${there}`,
    );
    expect(refused.error).toMatch(
      `--permutation-direction old-to-new: line i holds the position of unknown i; ${back}`,
    );
    // a comparison shows both, and the lower fill as a hint
    const both = await run(
      'compare',
      referencePath('bcsstk01.mtx'),
      '--orderings',
      'imported',
      '--permutation',
      path,
      '--json',
    );
    const { trials, notes } = JSON.parse(both.out);
    expect(trials.map((t: { factorEntries: number }) => t.factorEntries)).toEqual([there, back]);
    expect(trials.map((t: { permutationDirection: string }) => t.permutationDirection)).toEqual([
      'new-to-old',
      'old-to-new',
    ]);
    expect(notes.join(' ')).toContain('only a hint');
  });

  it('two vectors: named with the option (needs 52); right-hand side of the wrong length (needs 54)', async () => {
    const matrix = file('d.mtx', `${head()}3 3 3\n1 1 1\n2 2 2\n3 3 4\n`);
    const two = file('two.txt', '2 3\n3 1\n1 2\n');
    const refused = await run('compare', matrix, '--permutation', two);
    expect(refused.error).toMatch(/line 2: the file holds 6 numbers.*\n {2}--permutation-vector 1: /);
    const words = ['--permutation-vector', '1', '--permutation-direction', 'new-to-old', '--orderings', 'imported'];
    expect((await run('compare', matrix, '--permutation', two, ...words)).status).toBe(0);
    const rhs = await run('factor', matrix, '--rhs', file('b.txt', '1\n2\n'));
    expect([rhs.status, rhs.error]).toEqual([2, expect.stringMatching(/2 rows and 1 columns, the matrix has 3 rows/)]);
    const plain = await run('factor', matrix, '--json', '--rhs', file('b3.txt', 'load\n1\n2\n4\n'));
    expect([plain.status, JSON.parse(plain.out).rightHandSides.length]).toEqual([0, 4]);
  });

  it('coordinates open geometric dissection', async () => {
    const k = 8;
    const at = (i: number, j: number) => i * k + j + 1;
    const lines: string[] = [];
    const nodes: string[] = [];
    for (let i = 0; i < k; i++) {
      for (let j = 0; j < k; j++) {
        nodes.push(`${i} ${j}`);
        lines.push(`${at(i, j)} ${at(i, j)} 4`);
        if (i > 0) lines.push(`${at(i, j)} ${at(i - 1, j)} -1`);
        if (j > 0) lines.push(`${at(i, j)} ${at(i, j - 1)} -1`);
      }
    }
    const matrix = file(
      'grid.mtx',
      `${head('real', 'symmetric')}${k * k} ${k * k} ${lines.length}\n${lines.join('\n')}\n`,
    );
    const coordinates = ['--coordinates', file('xy.txt', nodes.join('\n')), '--orderings', 'geometric-dissection'];
    expect((await run('compare', matrix, ...coordinates)).status).toBe(0);
    const wrong = await run('compare', matrix, '--coordinates', file('short.txt', '0 0\n1 0\n2 0\n'));
    expect([wrong.status, wrong.error]).toEqual([2, expect.stringMatching(/3 nodes do not divide the 64 unknowns/)]);
  });
});

describe('convert, combine, difference', () => {
  const k = file('k.mtx', `${head('real', 'symmetric')}2 2 3\n1 1 4\n2 1 -1\n2 2 4\n`);
  const m = file('m.mtx', `${head()}2 2 2\n2 2 2\n1 1 1\n`);

  it('what is written reads back to the same matrix; half only where it is exact', async () => {
    for (const format of ['matrix-market', 'rutherford-boeing']) {
      for (const storage of ['full', 'half']) {
        const path = join(folder, `out-${format}-${storage}`);
        const { status } = await run(
          'convert',
          referencePath('bcsstk01.rsa'),
          '--out',
          path,
          '--format',
          format,
          '--storage',
          storage,
        );
        expect(status).toBe(0);
        expect(
          JSON.parse((await run('difference', referencePath('bcsstk01.mtx'), path, '--json')).out).difference,
        ).toMatchObject({
          samePattern: true,
          values: { changed: 0 },
        });
      }
    }
    const path = join(folder, 'never');
    const refused = await run('convert', referencePath('utm300.mtx'), '--out', path, '--storage', 'half');
    expect([refused.status, existsSync(path)]).toEqual([2, false]);
  });

  it('K − ω²M + iωC by hand', async () => {
    const path = join(folder, 'sum.mtx');
    expect((await run('combine', k, m, '--coefficients=1,-0.5+2i', '--out', path)).status).toBe(0);
    expect(readFileSync(path, 'latin1').replace(/^%.*\n/gm, '')).toBe(
      '2 2 4\n1 1 3.5 2\n2 1 -1 0\n1 2 -1 0\n2 2 3 4\n',
    );
    expect((await run('combine', k, m, '--coefficients', '1', '--out', path)).status).toBe(2);
    expect((await run('combine', k, '--coefficients', '1j', '--out', path)).error).toMatch('"1j" is no number');
  });

  it('a second matrix of another pattern: new and missing positions (needs 53)', async () => {
    const { out } = await run('difference', k, m);
    expect(out).toMatch('Not the same pattern: 2 positions in both, 0 new, 2 gone. m.mtx needs a fresh analysis.');
    expect(out).toMatch('First gone (row, column): (2, 1) (1, 2)');
    expect((await run('difference', k, k)).out).toMatch('An analysis of k.mtx holds');
  });
});
