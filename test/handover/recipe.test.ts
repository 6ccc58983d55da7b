/**
 * Recipes: hashes against the published examples of the standard and the platform's own library, replay to the same numbers, and
 * every wrong field refused by its name.
 */
import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { parseRecipe } from '../../engine/handover/parseRecipe.ts';
import { matrixHash } from '../../engine/handover/recipe.ts';
import { Sha256 } from '../../engine/handover/sha256.ts';
import { programVersion } from '../../engine/handover/version.ts';
import { Random } from '../../engine/matrix/random.ts';
import { runCommand, tempFile } from '../command/runCommand.ts';
import { readReference, referencePath } from '../support/reference.ts';

const utf8 = new TextEncoder();

describe('SHA-256', () => {
  // FIPS 180-2, appendix B.1 and B.2, and the empty message (NIST example values), from memory and held by the platform library below
  const published: readonly (readonly [string, string])[] = [
    ['', 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'],
    ['abc', 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad'],
    [
      'abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq',
      '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
    ],
  ];
  for (const [message, hex] of published) {
    it(`of "${message}" is the published one`, () => expect(new Sha256().update(utf8.encode(message)).hex()).toBe(hex));
  }

  it('of 1 to 300 random bytes in random pieces equals the platform library', () => {
    const random = new Random(7);
    for (let length = 1; length <= 300; length++) {
      const bytes = Uint8Array.from({ length }, () => random.below(256));
      const hash = new Sha256();
      for (let at = 0; at < length; ) {
        const step = 1 + random.below(90);
        hash.update(bytes.subarray(at, at + step));
        at += step;
      }
      expect(hash.hex()).toBe(createHash('sha256').update(bytes).digest('hex'));
    }
  });
});

it('the version in recipes and sheets is that of the package', () => {
  const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
  expect(programVersion).toBe(version);
});

/** Runs compare with a recipe; the text of the recipe and the JSON of the comparison. */
async function recipeFor(name: string, ...words: string[]) {
  const path = tempFile(`recipe-${name}-${words.length}.json`);
  const { status, out, error } = await runCommand(
    'compare',
    referencePath(`${name}.mtx`),
    '--json',
    '--recipe-out',
    path,
    ...words,
  );
  expect(error).toBe('');
  expect(status).toBe(0);
  return { path, text: readFileSync(path, 'utf8'), compared: JSON.parse(out) };
}

interface TrialNumbers {
  ordering: string;
  factorEntries: number;
  operations: number;
  factorBytes: number;
  peak: { bytes: number };
}
const numbers = ({ factorEntries, operations, factorBytes, peak }: TrialNumbers) => ({
  factorEntries,
  operations,
  factorBytes,
  peak: peak.bytes,
});

describe('replay', () => {
  it('gives the same numbers as the comparison that wrote the recipe: relabelled, held last, other seeds', async () => {
    const words = ['--seed', '5', '--relabelling', '9', '--held-last', '3,40-44', '--memory', '2GiB'];
    const { path, compared } = await recipeFor('lund_a', ...words);
    const { status, out } = await runCommand('replay', referencePath('lund_a.mtx'), '--recipe', path, '--json');
    expect(status).toBe(0);
    const replayed = JSON.parse(out);
    expect(replayed).toMatchObject({ same: true, matches: 'same-file' });
    expect(replayed.target.memoryBytes).toBe(2 * 2 ** 30);
    expect(replayed.trials.map(numbers)).toEqual(compared.trials.map(numbers));
    expect(replayed.trials[0].choice).toMatchObject({ seed: 5, relabelling: 9 });
  });

  it('the hash in the recipe is that of the file', async () => {
    const { text } = await recipeFor('bcsstk01', '--orderings', 'natural');
    const bytes = readFileSync(referencePath('bcsstk01.mtx'));
    expect(JSON.parse(text).matrix.file).toEqual({
      name: 'bcsstk01.mtx',
      bytes: bytes.length,
      sha256: createHash('sha256').update(bytes).digest('hex'),
    });
  });

  it('a portfolio with a time limit is replayed by what it kept', async () => {
    const { path, text } = await recipeFor(
      'utm300',
      '--orderings',
      'best-of',
      '--best-of',
      'entries',
      '--rounds',
      '2',
      '--time-limit',
      '60',
    );
    expect(JSON.parse(text).trials[0].ran.ordering).not.toBe('best-of');
    const { status } = await runCommand('replay', referencePath('utm300.mtx'), '--recipe', path);
    expect(status).toBe(0);
  });

  it('the same matrix in another format is taken; another matrix is refused; a changed number is found', async () => {
    const { path, text } = await recipeFor('bcsstk01', '--orderings', 'minimum-degree,sloan');
    const other = tempFile('same.rb');
    await runCommand('convert', referencePath('bcsstk01.mtx'), '--out', other, '--format', 'rutherford-boeing');
    const replayed = await runCommand('replay', other, '--recipe', path);
    expect(replayed.status).toBe(0);
    expect(replayed.out).toContain('the same matrix, entry for entry');
    const refused = await runCommand('replay', referencePath('lund_a.mtx'), '--recipe', path);
    expect(refused.status).toBe(2);
    expect(refused.error).toContain('bcsstk01.mtx');
    const wrong = JSON.parse(text);
    wrong.trials[1].figures.factorEntries++;
    const changed = await runCommand('replay', other, '--recipe', tempFile('changed.json', JSON.stringify(wrong)));
    expect(changed.status).toBe(4);
    expect(changed.out).toContain('sloan, factorEntries: recorded');
  });

  it('a permutation is known by what it says, whatever its file', async () => {
    const matrix = referencePath('bcsstk01.mtx');
    const order = tempFile('order.txt');
    const position = tempFile('position.txt');
    const words = ['--ordering', 'nested-dissection', '--relabelling', '3', '--out'];
    await runCommand('order', matrix, ...words, order);
    await runCommand(
      'order',
      matrix,
      ...words,
      position,
      '--direction',
      'old-to-new',
      '--base',
      '0',
      '--format',
      'matrix-market-array',
    );
    const { path } = await recipeFor('bcsstk01', '--orderings', 'imported', '--permutation', order);
    expect((await runCommand('replay', matrix, '--recipe', path)).status).toBe(2);
    expect((await runCommand('replay', matrix, '--recipe', path, '--permutation', position)).status).toBe(0);
    await runCommand('order', matrix, '--ordering', 'sloan', '--out', order);
    const other = await runCommand('replay', matrix, '--recipe', path, '--permutation', order);
    expect(other.status).toBe(2);
    expect(other.error).toContain('not the one of the recipe');
  });

  it('order writes a recipe of its one trial', async () => {
    const recipe = tempFile('one.json');
    const words = ['--ordering', 'minimum-fill', '--out', tempFile('o.txt'), '--recipe-out', recipe];
    expect((await runCommand('order', referencePath('lund_a.mtx'), ...words)).status).toBe(0);
    expect((await runCommand('replay', referencePath('lund_a.mtx'), '--recipe', recipe)).status).toBe(0);
  });
});

it('the content hash changes with every value, place and sign of zero', () => {
  const a = readReference('bcsstk01');
  const values = a.values ?? new Float64Array(0);
  const with0 = (x: number) => matrixHash({ ...a, values: Float64Array.from(values, (v, k) => (k === 7 ? x : v)) });
  expect(new Set([matrixHash(a), with0(0), with0(-0), matrixHash({ ...a, values: null })]).size).toBe(4);
});

describe('gate', () => {
  it('holds at the exact figure and not one below it, for each limit, with the excess said', async () => {
    const { path, compared } = await recipeFor('lund_a', '--orderings', 'minimum-degree');
    const [{ factorBytes, operations, peak }] = compared.trials;
    const call = (...words: string[]) => runCommand('gate', referencePath('lund_a.mtx'), '--recipe', path, ...words);
    for (const [option, figure] of [
      ['--max-factor-bytes', factorBytes],
      ['--max-peak-bytes', peak.bytes],
      ['--max-operations', operations],
    ] as const) {
      expect((await call(option, String(figure))).status, option).toBe(0);
      const over = await call(option, String(figure - 1));
      expect(over.status, option).toBe(5);
      expect(over.out).toContain('passed by');
      expect(over.out).toContain('(1 ');
    }
    const json = JSON.parse((await call('--max-factor-bytes', '1KiB', '--max-operations', '1e12', '--json')).out);
    expect(json.holds).toBe(false);
    expect(json.trials[0].lines).toMatchObject([
      { limit: 'factorBytes', most: 1024, found: factorBytes, over: factorBytes - 1024, holds: false },
      { limit: 'operations', holds: true, over: 0 },
    ]);
  });

  it('takes another matrix, for that is what it is for; needs a limit and a known trial', async () => {
    const { path } = await recipeFor('lund_a', '--orderings', 'minimum-degree');
    const other = referencePath('bcsstk01.mtx');
    expect((await runCommand('gate', other, '--recipe', path, '--max-factor-bytes', '4GiB')).status).toBe(0);
    expect((await runCommand('gate', other, '--recipe', path)).status).toBe(2);
    expect(
      (await runCommand('gate', other, '--recipe', path, '--max-operations', '1', '--trial', 'sloan')).status,
    ).toBe(2);
    expect((await runCommand('gate', other, '--max-operations', '1')).status).toBe(2);
  });
});

it('a recipe with any field removed or of a wrong kind is refused, and the field named', async () => {
  const { text } = await recipeFor('bcsstk01', '--orderings', 'natural');
  const whole = JSON.parse(text);
  expect(parseRecipe(text, 'r.json')).toEqual(whole);
  let tried = 0;
  const visit = (value: Record<string, unknown>, path: readonly string[]) => {
    for (const key of Object.keys(value)) {
      const kept = value[key];
      if (path.length === 0 && key === 'formatVersion') continue;
      value[key] = undefined;
      tried++;
      expect(() => parseRecipe(JSON.stringify(whole), 'r.json'), [...path, key].join('.')).toThrow(key);
      value[key] = kept;
      if (typeof kept === 'object' && kept !== null) {
        visit((Array.isArray(kept) ? (kept[0] ?? {}) : kept) as Record<string, unknown>, [...path, key]);
      }
    }
  };
  visit(whole, []);
  expect(tried).toBeGreaterThan(50);
  for (const bad of ['', 'null', '[]', '{', '{"format":"other"}'])
    expect(() => parseRecipe(bad, 'r.json')).toThrow('r.json');
  expect(() => parseRecipe(text.replace('"formatVersion": 1', '"formatVersion": 2'), 'r.json')).toThrow('version');
  expect(() => parseRecipe(text.replace('"natural"', '"alphabetical"'), 'r.json')).toThrow('expected one of natural');
});
