/** `compare`, `order`, `growth` and `reconcile` with everything that shapes an ordering or a forecast. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { orderFrom, readPermutation } from '../../engine/exchange/readPermutation.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { naiveElimination } from '../support/elimination.ts';
import { figures, readReference, referencePath } from '../support/reference.ts';
import { matrixFile, runCommand, tempFile } from './runCommand.ts';

const lund = referencePath('lund_a.mtx');
const pores = referencePath('pores_1.mtx');

async function json(...words: string[]) {
  const { status, out, error } = await runCommand(...words, '--json');
  expect([status, error]).toEqual([0, '']);
  return JSON.parse(out);
}

describe('compare: the forecast of a trial', () => {
  it('storage, limits, time and parallel tables, workload and advice are there, each figure with unit and kind', async () => {
    const { trials, workload, advice, target } = await json(
      'compare',
      lund,
      '--memory',
      '1MiB',
      '--workers',
      '16',
      '--factorizations',
      '14',
      '--right-hand-sides',
      '3',
      '--refinement-steps',
      '2',
    );
    expect(target).toMatchObject({ memoryBytes: 2 ** 20, cores: 16, indexBytes: 4, scalarBytes: 8 });
    expect(workload).toMatchObject({ factorizations: 14, rightHandSides: 3, refinementSteps: 2 });
    expect(workload.lines.filter((l: { best: boolean }) => l.best)).toHaveLength(1);
    for (const t of trials) {
      for (const figure of [...Object.values(t.storage), t.work.factorization, t.work.solve, t.time.factorization]) {
        const { value, unit, kind, reason } = figure as Record<string, unknown>;
        expect(typeof value === 'number' || typeof reason === 'string').toBe(true);
        expect(unit).toMatch(/bytes|operations|seconds/);
        expect(['exact', 'bound', 'modelled', 'measured']).toContain(kind);
      }
      expect(t.storage.compressedColumns.value).toBe(t.factorBytes);
      expect(t.work.factorization.value).toBe(t.operations);
      expect(t.parallel.rows.map((r: { workers: number }) => r.workers)).toContain(1024);
      expect(t.limits).toMatchObject({ countsExceed32Bit: false, fitsTarget: true, runsHere: true });
      expect(t.limits.sentences).toHaveLength(3);
      expect(t.delayed).toBeNull();
      expect(t.reasons.delayed).toBeTypeOf('string');
    }
    expect(trials.map((t: { ordering: string }) => t.ordering)).toContain(advice.best);
    expect(advice.sentence).toContain('14 factorizations with 3 right-hand sides each');
    expect(advice.reasons.length).toBeGreaterThan(1);
  });

  it('nothing fits: it is said, with the nearest change', async () => {
    const { trials, advice } = await json('compare', lund, '--memory', '10KiB');
    expect(trials.every((t: { limits: { fitsTarget: boolean } }) => !t.limits.fitsTarget)).toBe(true);
    expect(advice).toMatchObject({ best: null, sentence: expect.stringContaining('Nothing fits 10.0 KiB') });
    expect(advice.change).toBeTypeOf('string');
  });

  it('widths of the target reach the bytes, not the counts', async () => {
    const narrow = await json('compare', lund, '--orderings', 'natural');
    const wide = await json('compare', lund, '--orderings', 'natural', '--index-bits', '64', '--precision', 'single');
    const l = figures.lund_a.orderings?.natural.factorEntries ?? 0;
    expect(narrow.trials[0].storage.compressedColumns.value).toBe(12 * l + 8 * 148);
    expect(wide.trials[0].storage.compressedColumns.value).toBe(12 * l + 8 * 148);
    expect(wide.trials[0].storage.envelope.value).toBeLessThan(narrow.trials[0].storage.envelope.value);
    expect(wide.trials[0].factorEntries).toBe(l);
    expect(wide.trials[0].factorBytes).toBe(12 * l + 8 * 148);
  });

  it('LU: expected and range of entries, operations and bytes; lower and upper with their diagonals', async () => {
    for (const factorization of ['lu', 'column-lu']) {
      const { trials } = await json('compare', pores, '--factorization', factorization);
      for (const t of trials) {
        expect(t.factorEntries).toBe(t.lowerEntries + t.upperEntries - 30);
        expect(t.expected).toEqual({ factorEntries: t.factorEntries, operations: t.operations, bytes: t.factorBytes });
        for (const key of ['factorEntries', 'operations', 'bytes']) {
          expect(t.range[key][0]).toBeLessThanOrEqual(t.expected[key]);
          expect(t.range[key][1]).toBeGreaterThanOrEqual(t.expected[key]);
        }
        expect(t.staticStructure.factorEntries).toBeGreaterThanOrEqual(t.factorEntries);
      }
    }
  });

  it('a rectangular matrix: what is not defined is null with a reason', async () => {
    const { trials } = await json('compare', referencePath('lsq.mtx'), '--best-of', 'entries');
    expect(trials.map((t: { ordering: string }) => t.ordering)).toEqual([
      'natural',
      'column-minimum-degree',
      'best-of',
    ]);
    for (const t of trials) {
      for (const key of ['factorEntries', 'operations', 'factorBytes', 'storage', 'limits', 'time', 'parallel']) {
        expect(t[key]).toBeNull();
        expect(t.reasons[key]).toBeTypeOf('string');
      }
    }
  });

  it('as text: tables, break-evens, advice, cautions', async () => {
    const { status, out } = await runCommand('compare', pores, '--factorizations', '5');
    expect(status).toBe(0);
    for (const part of ['proven range', 'memory by layout', 'pivots delayed', 'speed-up with workers', 'Use LU with']) {
      expect(out).toContain(part);
    }
    expect(out).toContain('only a run shows it');
  });
});

describe('compare: what shapes an ordering', () => {
  it('--spread: least, median and most; what overlaps with the best is no difference', async () => {
    const { trials } = await json(
      'compare',
      lund,
      '--spread',
      '4',
      '--orderings',
      'natural,minimum-degree,minimum-fill,nested-dissection',
    );
    const [natural, ...rest] = trials;
    expect(natural.spread).toMatchObject({
      runs: 1,
      operations: { least: natural.operations, most: natural.operations },
    });
    const medians = trials.map((t: { spread: { operations: { median: number } } }) => t.spread.operations.median);
    const best = trials[medians.indexOf(Math.min(...medians))];
    for (const t of rest) {
      const { runs, operations, noDifference } = t.spread;
      expect(runs).toBe(4);
      expect(operations.least).toBeLessThanOrEqual(operations.median);
      expect(operations.median).toBeLessThanOrEqual(operations.most);
      expect(noDifference.operations).toBe(t !== best && operations.least <= best.spread.operations.most);
    }
    expect(natural.spread.noDifference.operations).toBe(false);
  });

  it('--best-of: one more line, no worse than any other by its measure', async () => {
    for (const measure of ['entries', 'operations', 'peak-memory', 'critical-path']) {
      const { trials } = await json('compare', lund, '--best-of', measure, '--rounds', '2', '--time-limit', '60');
      const best = trials[trials.length - 1];
      expect([best.ordering, best.portfolio.measure]).toEqual(['best-of', measure]);
      const value = (t: typeof best): number =>
        measure === 'entries'
          ? t.factorEntries
          : measure === 'operations'
            ? t.operations
            : measure === 'peak-memory'
              ? t.storage.multifrontal.value
              : t.parallel.sequentialFrontsPath;
      for (const t of trials) expect(value(best)).toBeLessThanOrEqual(value(t));
      expect(best.ran.ordering).not.toBe('best-of');
    }
  });

  it('--held-last as a list and as a file; the Schur block is reported', async () => {
    const file = tempFile('held.txt', '% unknowns\n147 3\n20-22\n');
    const [a] = (await json('compare', lund, '--orderings', 'minimum-degree', '--held-last', '147,3,20-22')).trials;
    const [b] = (await json('compare', lund, '--orderings', 'minimum-degree', '--held-last', file)).trials;
    expect(a.heldBlock).toEqual(b.heldBlock);
    expect(a.heldBlock).toMatchObject({ unknowns: 5, denseEntries: 15 });
    const out = tempFile('held-order.txt');
    await runCommand('order', lund, '--ordering', 'minimum-degree', '--held-last', '147,3,20-22', '--out', out);
    const read = await readPermutation(bytesSource('p', new Uint8Array(readFileSync(out))), 147);
    const order = orderFrom(read, 'new-to-old');
    expect([...order.slice(-5)]).toEqual([146, 2, 19, 20, 21]);
    expect(naiveElimination(readReference('lund_a'), order).factorEntries).toBe(a.factorEntries);
  });

  it('--pairing, --blocks, --no-blocks, --relabelling and the options of the methods reach the trial', async () => {
    const kkt = matrixFile('kkt.mtx', modelProblems.kkt(120));
    const paired = await json('compare', kkt, '--factorization', 'ldlt', '--pairing', 'structure');
    expect(paired.trials.every((t: { choice: { matching: string } }) => t.choice.matching === 'structural')).toBe(true);
    expect(paired.trials.find((t: { ordering: string }) => t.ordering === 'minimum-degree').notes.join()).toContain(
      'pairs of unknowns kept together',
    );
    const magnitude = await json('compare', kkt, '--factorization', 'ldlt', '--pairing', 'magnitude');
    expect(magnitude.trials[0].valueDependent).toBe(true);
    const blocked = await json('compare', kkt, '--factorization', 'lu', '--blocks', '--orderings', 'minimum-degree');
    expect(blocked.trials[0].notes.join()).toContain('diagonal blocks');
    const tuned = await json(
      'compare',
      lund,
      '--orderings',
      'nested-dissection',
      '--leaf-size',
      '10',
      '--balance',
      '0.6',
      '--tries',
      '3',
      '--dense-threshold',
      'off',
      '--relabelling',
      '9',
      '--seed',
      '4',
    );
    expect(tuned.trials[0].choice).toMatchObject({
      seed: 4,
      relabelling: 9,
      tuning: { leafSize: 10, balance: 0.6, tries: 3, denseThreshold: 2 ** 31 },
    });
  });

  it('refuses with 2 and a sentence', async () => {
    const cases: [string[], string][] = [
      [['--held-last', '148'], '"148" is no unknown'],
      [['--held-last', '5,5'], 'stands twice'],
      [['--held-last', '1-147'], 'nothing would be eliminated'],
      [['--dense-threshold', 'many'], 'threshold of dense rows'],
      [['--pairing', 'structure'], 'LDLᵀ'],
      [['--memory', 'plenty'], 'number of bytes'],
      [['--orderings', 'geometric-dissection'], 'coordinates'],
      [['--orderings', 'imported'], 'No permutation'],
      [['--factorization', 'column-lu', '--best-of', 'critical-path'], 'no critical path'],
      [['--index-bits', '48'], 'expected one of 32, 64'],
    ];
    for (const [words, message] of cases) {
      const { status, out, error } = await runCommand('compare', lund, ...words);
      expect({ status, out }).toEqual({ status: 2, out: '' });
      expect(error).toContain(message);
    }
  });

  it('coordinates that do not fit the unknowns stated for each node are refused', async () => {
    const nodes = tempFile(
      'nodes.txt',
      Array.from({ length: 49 }, (_, k) => `${k % 7} ${Math.floor(k / 7)}`).join('\n'),
    );
    const words = ['compare', lund, '--coordinates', nodes, '--orderings', 'geometric-dissection'];
    expect((await json(...words, '--unknowns-per-node', '3')).trials[0].ordering).toBe('geometric-dissection');
    const wrong = await runCommand(...words, '--unknowns-per-node', '2');
    expect([wrong.status, wrong.error]).toEqual([2, expect.stringContaining('49 nodes with 2 unknowns each')]);
  });
});

describe('order', () => {
  it('--best-of writes what it kept, and says what that was', async () => {
    const out = tempFile('best.txt');
    const { status, out: said } = await runCommand('order', lund, '--best-of', 'entries', '--out', out);
    expect(status).toBe(0);
    expect(said).toContain('best of several by entries');
    const read = await readPermutation(bytesSource('p', new Uint8Array(readFileSync(out))), 147);
    const [best] = (await json('compare', lund, '--orderings', 'best-of', '--best-of', 'entries')).trials;
    const { factorEntries } = naiveElimination(readReference('lund_a'), orderFrom(read, 'new-to-old'));
    expect(factorEntries).toBe(best.factorEntries);
  });
});

describe('growth', () => {
  const files = [8, 16, 32, 64].map((k) => matrixFile(`grid-${k}.mtx`, modelProblems.grid2d5(k)));
  it('fits, local exponents, and how large n can be', async () => {
    const study = await json('growth', ...files, '--dimension', '2', '--memory', '64GiB', '--seconds', '3600');
    expect(study.ordering).toBe('nested-dissection');
    expect(study.members.map((m: { n: number }) => m.n)).toEqual([64, 256, 1024, 4096]);
    const entries = study.growth.find((g: { figure: string }) => g.figure === 'factorEntries');
    expect(entries.leftOut).toBeLessThan(0.1);
    expect(entries.fit.exponents).toHaveLength(3);
    expect(study.reach.map((r: { what: string }) => r.what)).toEqual(['memory', 'time']);
    const text = await runCommand('growth', ...files);
    expect(text.out).toContain('In 16.0 GiB, n can be up to about');
  });
  it('one size, or one file, is refused', async () => {
    expect((await runCommand('growth', files[0], files[0])).status).toBe(2);
    expect((await runCommand('growth', files[0])).status).toBe(2);
  });
});

describe('reconcile', () => {
  const natural = figures.lund_a.orderings?.natural;
  const l = natural?.factorEntries ?? 0;
  it('finds ordering and convention of figures counted outside', async () => {
    const { answers } = await json(
      'reconcile',
      lund,
      '--entries',
      String(l - 147),
      '--operations',
      String(((natural?.operations ?? 0) - l) / 2),
      '--memory',
      String(16 * l),
    );
    const first = answers.map(
      (a: { explanations: { name: string; convention: string; distance: number }[] }) => a.explanations[0],
    );
    expect(first[0]).toMatchObject({ name: 'natural', convention: 'entries of L without its diagonal', distance: 0 });
    expect(first[1]).toMatchObject({ name: 'natural', convention: 'multiply–adds, each as one', distance: 0 });
    expect(first[2].distance).toBe(0);
    expect(first[2].convention).toContain('8-byte values and 8-byte indices');
  });
  it('says so when none does, and asks for a figure', async () => {
    const none = await runCommand('reconcile', lund, '--entries', '7');
    expect([none.status, none.out]).toEqual([0, expect.stringContaining('No convention of counting')]);
    expect((await runCommand('reconcile', lund)).status).toBe(2);
  });
});
