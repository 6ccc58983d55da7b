/**
 * The files of a handover, read back and held against the matrix itself: orders both ways, permuted matrix, factors by multiplying them
 * out, structure by elimination on sets, the sheet by its published schema, the script by running it where SciPy is installed.
 */
import { execFileSync, spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readMatrix } from '../../engine/exchange/read.ts';
import { defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { orderFrom, readPermutation } from '../../engine/exchange/readPermutation.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { runCommand, tempFile } from '../command/runCommand.ts';
import { naiveElimination } from '../support/elimination.ts';
import { schemaFaults } from '../support/jsonSchema.ts';
import { readReference, referencePath } from '../support/reference.ts';

const python = ['/usr/bin/python3', 'python3'].find(
  (name) => spawnSync(name, ['-c', 'import scipy.sparse.linalg, scipy.io']).status === 0,
);
const schema = JSON.parse(
  readFileSync(new URL('../../public/configuration-sheet.schema.json', import.meta.url), 'utf8'),
);

interface Case {
  readonly matrix: string;
  readonly words: readonly string[];
}

const cases: readonly Case[] = [
  { matrix: 'lund_a', words: ['--ordering', 'nested-dissection', '--prove'] },
  { matrix: 'bcsstk01', words: ['--ordering', 'sloan'] },
  {
    matrix: 'bcsstk01',
    words: ['--factorization', 'ldlt', '--ordering', 'minimum-degree', '--scaling', 'equilibrate'],
  },
  { matrix: 'utm300', words: ['--ordering', 'minimum-degree', '--factorization', 'lu'] },
  {
    matrix: 'utm300',
    words: ['--ordering', 'minimum-fill', '--factorization', 'lu', '--scaling', 'matching', '--prove'],
  },
  { matrix: 'utm300', words: ['--ordering', 'column-minimum-degree', '--factorization', 'column-lu'] },
  {
    matrix: 'arc130',
    words: ['--ordering', 'column-minimum-degree', '--factorization', 'column-lu', '--scaling', 'equilibrate'],
  },
  { matrix: 'cg20', words: ['--ordering', 'minimum-degree'] },
];

/** What a call wrote. */
async function handedOver({ matrix, words }: Case) {
  const folder = join(mkdtempSync(join(tmpdir(), 'handover-')), 'made');
  const path = referencePath(`${matrix}.mtx`);
  const { status, out, error } = await runCommand('handover', path, ...words, '--out', folder, '--json');
  expect(error).toBe('');
  expect(status).toBe(0);
  const text = (name: string) => readFileSync(join(folder, name), 'utf8');
  const read = async (name: string) =>
    (await readMatrix(bytesSource(name, readFileSync(join(folder, name))), defaultReadOptions, () => {})).matrix;
  const order = async (name: string) => {
    const file = await readPermutation(
      bytesSource(name, readFileSync(join(folder, name))),
      readReference(matrix).columns,
    );
    return orderFrom(file, file.direction ?? 'new-to-old');
  };
  return { folder, path, json: JSON.parse(out), a: readReference(matrix), text, read, order };
}

type Complex = readonly [number, number];

/** Entries by "row column", complex throughout. */
function entriesOf(a: SparseMatrix): Map<string, Complex> {
  const out = new Map<string, Complex>();
  const width = a.field === 'complex' ? 2 : 1;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      const re = a.values?.[p * width] ?? 1;
      out.set(`${a.rowIndex[p]} ${j}`, [re, width === 2 ? (a.values?.[p * 2 + 1] ?? 0) : 0]);
    }
  }
  return out;
}

/** Product of two matrices by entries; the second transposed (and conjugated) where asked. */
function product(a: SparseMatrix, b: SparseMatrix, mirrored = false, conjugated = false): SparseMatrix {
  const n = a.rows;
  const cell = (x: Map<string, Complex>) => x;
  const byColumn: [number, Complex][][] = Array.from({ length: n }, () => []);
  for (const [key, v] of cell(entriesOf(a))) {
    const [i, j] = key.split(' ').map(Number);
    byColumn[j].push([i, v]);
  }
  const sum = new Float64Array(2 * n * n);
  for (const [key, [re, im]] of entriesOf(b)) {
    const [i, j] = key.split(' ').map(Number);
    const [inner, column] = mirrored ? [j, i] : [i, j];
    const y = conjugated ? -im : im;
    for (const [row, [x, z]] of byColumn[inner]) {
      sum[2 * (column * n + row)] += x * re - z * y;
      sum[2 * (column * n + row) + 1] += x * y + z * re;
    }
  }
  return {
    rows: n,
    columns: n,
    field: 'complex',
    columnPointer: Int32Array.from({ length: n + 1 }, (_, j) => j * n),
    rowIndex: Int32Array.from({ length: n * n }, (_, k) => k % n),
    values: sum,
  };
}

function plainVector(text: string): number[] {
  const lines = text.split('\n').filter((line) => line !== '' && !line.startsWith('%'));
  return lines.slice(1).map(Number);
}

describe.each(cases)('$matrix $words', (given) => {
  it('orders are inverse, the permuted matrix is A(p, q), the factors multiply to it', async () => {
    const h = await handedOver(given);
    const order = await h.order('order.mtx');
    const fromPosition = await h.order('position.mtx');
    expect([...fromPosition]).toEqual([...order]);
    expect([...(await h.order('order-0-based.txt'))]).toEqual([...order]);
    expect(order.some((i, k) => order[i] !== k)).toBe(true);

    const lu = given.words.includes('lu') || given.words.includes('column-lu');
    const rows = lu ? plainVector(h.text('row-order.mtx')).map((i) => i - 1) : [...order];
    const original = entriesOf(h.a);
    const permuted = entriesOf(await h.read('permuted.mtx'));
    expect(permuted.size).toBe(original.size);
    for (const [key, value] of permuted) {
      const [k, l] = key.split(' ').map(Number);
      expect(original.get(`${rows[k]} ${order[l]}`)).toEqual(value);
    }
    expect(entriesOf(await h.read('permuted.rb'))).toEqual(permuted);

    // P·R·A·C·Q against the product of the factors
    const p = plainVector(h.text('pivot-rows.mtx')).map((i) => i - 1);
    const q = plainVector(h.text('pivot-columns.mtx')).map((i) => i - 1);
    const scale = (side: string) =>
      existsSync(join(h.folder, `${side}-scaling.mtx`)) ? plainVector(h.text(`${side}-scaling.mtx`)) : null;
    const [r, c] = [scale('row'), scale('column')];
    const lower = await h.read('L.mtx');
    const diagonal = existsSync(join(h.folder, 'D.mtx')) ? await h.read('D.mtx') : null;
    const hermitian = given.matrix === 'cg20' ? h.json.choice.factorization === 'cholesky' : false;
    let made: Map<string, Complex>;
    if (lu) made = entriesOf(product(lower, await h.read('U.mtx')));
    else if (diagonal === null) made = entriesOf(product(lower, lower, true, hermitian));
    else made = entriesOf(product(product(lower, diagonal), lower, true, false));
    if (existsSync(join(h.folder, 'F.mtx'))) {
      for (const [key, [re, im]] of entriesOf(await h.read('F.mtx'))) {
        const [x, y] = made.get(key) ?? [0, 0];
        made.set(key, [x + re, y + im]);
      }
    }
    let largest = 0;
    let worst = 0;
    for (let k = 0; k < p.length; k++) {
      for (let l = 0; l < q.length; l++) {
        const [re, im] = original.get(`${p[k]} ${q[l]}`) ?? [0, 0];
        const factor = (r?.[p[k]] ?? 1) * (c?.[q[l]] ?? (lu ? 1 : (r?.[q[l]] ?? 1)));
        const [x, y] = made.get(`${k} ${l}`) ?? [0, 0];
        largest = Math.max(largest, Math.hypot(re, im) * factor);
        worst = Math.max(worst, Math.hypot(x - re * factor, y - im * factor));
      }
    }
    expect(worst).toBeLessThan(1e-11 * largest);
  });

  it('papers: sheet by its schema, table, recipe replayed, report by itself, script run', async () => {
    const h = await handedOver(given);
    const sheet = JSON.parse(h.text('configuration-sheet.json'));
    expect(schemaFaults(sheet, schema)).toEqual([]);
    const { factorEntries } = sheet.fill;
    expect(h.text('configuration-sheet.txt')).toContain(factorEntries.toLocaleString('en-US'));
    expect(sheet.memory.reserveBytes).toBe(
      Math.ceil((sheet.memory.peakBytes + sheet.memory.matrixBytes) * (1 + sheet.memory.marginShare)),
    );
    expect(sheet.proof === null).toBe(!given.words.includes('--prove'));
    expect(sheet.cautions.join(' ')).toContain('local codes');
    if (sheet.pivoting.strategy === 'threshold') expect(sheet.cautions.join(' ')).toContain('no guarantee');

    const [head, ...lines] = h
      .text('comparison.csv')
      .trimEnd()
      .split('\r\n')
      .map((line) => line.split(','));
    const chosen = lines.find((l) => l[0] === h.json.trial) ?? [];
    expect(Number(chosen[head.indexOf('factorEntries')])).toBe(factorEntries);
    expect(lines.length).toBe(2);

    const replayed = await runCommand('replay', h.path, '--recipe', join(h.folder, 'recipe.json'), '--json');
    expect(replayed.status).toBe(0);
    const trials = JSON.parse(replayed.out).trials as { name: string; factorEntries: number }[];
    expect(trials.find((t) => t.name === h.json.trial)?.factorEntries).toBe(factorEntries);

    const report = h.text('report.html');
    expect(report).toContain(factorEntries.toLocaleString('en-US'));
    expect(report).toContain("default-src 'none'");
    // nothing in it asks for anything outside it
    expect(report.replaceAll('http://www.w3.org/2000/svg', '')).not.toMatch(/https?:|<script|<link|@import|url\(/);
    for (const caution of sheet.cautions.slice(-2)) expect(report).toContain(caution);

    if (python !== undefined) {
      const said = execFileSync(python, ['check.py'], { cwd: h.folder, encoding: 'utf8', stdio: 'pipe' });
      expect(said).toContain('found');
    }
  });
});

it('columns and fronts as text equal elimination on sets', async () => {
  const h = await handedOver(cases[0]);
  const naive = naiveElimination(h.a, await h.order('order.mtx'));
  const numbers = (name: string) =>
    h
      .text(name)
      .split('\n')
      .filter((l) => l !== '' && !l.startsWith('%'))
      .map((l) => l.split(' ').map(Number));
  const columns = numbers('columns.txt');
  expect(columns.map((c) => c[2] - 1)).toEqual(naive.parent);
  expect(columns.map((c) => c[3])).toEqual(naive.columns.map((c) => c.length));
  const fronts = numbers('fronts.txt');
  const pivots = fronts.flatMap((f) => f.slice(4));
  expect(pivots.toSorted((x, y) => x - y)).toEqual(Array.from({ length: h.a.columns }, (_, i) => i + 1));
  for (const [k, [front, parent, order, own]] of fronts.entries()) {
    expect(front).toBe(k + 1);
    expect(parent === 0 || parent > front).toBe(true);
    expect(order).toBeGreaterThanOrEqual(own);
  }
});

it('factors that are too large are refused with the figure, and everything else is written', async () => {
  const { json, folder } = await handedOver({
    matrix: 'lund_a',
    words: ['--ordering', 'natural', '--factor-limit', '64KiB'],
  });
  const lower = json.files.find((f: { id: string }) => f.id === 'factor-lower');
  expect(lower.file).toBeNull();
  expect(lower.refused).toMatch(/entries.*the limit is 64\.0 KiB/);
  expect(existsSync(join(folder, 'L.mtx'))).toBe(false);
  expect(existsSync(join(folder, 'permuted.mtx'))).toBe(true);
});

it('a numeric run that fails takes no other file with it: not definite, and fronts in blocks', async () => {
  const indefinite = tempFile(
    'indefinite.mtx',
    '%%MatrixMarket matrix coordinate real symmetric\n2 2 3\n1 1 1\n2 1 2\n2 2 1\n',
  );
  const folder = mkdtempSync(join(tmpdir(), 'handover-'));
  const calls = [
    [indefinite, '--factorization', 'cholesky'],
    [referencePath('utm300.mtx'), '--factorization', 'lu', '--blocks'],
  ];
  for (const words of calls) {
    const { status, out } = await runCommand(
      'handover',
      ...words,
      '--ordering',
      'minimum-degree',
      '--out',
      folder,
      '--json',
    );
    expect(status).toBe(0);
    const files = JSON.parse(out).files as { id: string; file: string | null; refused: string | null }[];
    expect(files.find((f) => f.id === 'factor-lower')?.refused).toMatch(/\w{5}/);
    expect(files.find((f) => f.id === 'report')?.file).toBe('report.html');
    if (python !== undefined) execFileSync(python, ['check.py'], { cwd: folder, stdio: 'pipe' });
  }
});

it('a rectangular matrix and a bare pattern hand over what is defined for them', async () => {
  const lsq = await handedOver({ matrix: 'lsq', words: ['--ordering', 'column-minimum-degree'] });
  expect(schemaFaults(JSON.parse(lsq.text('configuration-sheet.json')), schema)).toEqual([]);
  expect((await lsq.read('permuted.mtx')).rows).toBe(lsq.a.rows);
  const pattern = tempFile('p.mtx', '%%MatrixMarket matrix coordinate pattern symmetric\n3 3 4\n1 1\n2 1\n3 1\n3 3\n');
  const folder = mkdtempSync(join(tmpdir(), 'handover-'));
  const { status, out } = await runCommand('handover', pattern, '--out', folder);
  expect(status).toBe(0);
  expect(out).toContain('A pattern has no values');
  expect(schemaFaults(JSON.parse(readFileSync(join(folder, 'configuration-sheet.json'), 'utf8')), schema)).toEqual([]);
});

it('names that are markup stay text in the report', async () => {
  const path = tempFile('a<img src=x onerror=y>&.mtx', readFileSync(referencePath('bcsstk01.mtx')));
  const folder = mkdtempSync(join(tmpdir(), 'handover-'));
  expect((await runCommand('handover', path, '--ordering', 'natural', '--out', folder)).status).toBe(0);
  const report = readFileSync(join(folder, 'report.html'), 'utf8');
  expect(report).not.toContain('<img src=x');
  expect(report).toContain('a&lt;img src=x onerror=y&gt;&amp;.mtx');
});

it('the schema check refuses what it should (the check is itself tested)', () => {
  const shape = {
    type: 'object',
    properties: { n: { type: 'integer', minimum: 1 } },
    required: ['n'],
    additionalProperties: false,
  };
  expect(schemaFaults({ n: 1 }, shape)).toEqual([]);
  for (const bad of [{}, { n: 0 }, { n: 1.5 }, { n: 1, m: 2 }, null, []])
    expect(schemaFaults(bad, shape)).not.toEqual([]);
  expect(() => schemaFaults({}, { pattern: 'x' })).toThrow('pattern');
});
