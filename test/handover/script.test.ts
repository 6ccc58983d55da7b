/**
 * The generated script, run for real where Python with SciPy is installed (a general-purpose library; common in engineering
 * offices). Counts by hand on an arrowhead and by elimination on sets elsewhere.
 */
import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { pythonScript, type ScriptRequest } from '../../engine/handover/script.ts';
import { positionOf } from '../../engine/matrix/permutation.ts';
import { naiveElimination } from '../support/elimination.ts';
import { randomOrder } from '../support/random.ts';
import { readReference, referencePath } from '../support/reference.ts';

const python = ['/usr/bin/python3', 'python3'].find(
  (name) => spawnSync(name, ['-c', 'import scipy.sparse.linalg, scipy.io']).status === 0,
);

function run(request: ScriptRequest, matrixPath: string, order: ArrayLike<number>): string {
  const folder = mkdtempSync(join(tmpdir(), 'script-'));
  const script = join(folder, 'check.py');
  const orderFile = join(folder, 'order.txt');
  writeFileSync(script, pythonScript(request));
  writeFileSync(orderFile, `% 0-based, new-to-old\n${Array.from(order).join('\n')}\n`);
  return execFileSync(python as string, [script, matrixPath, orderFile], { encoding: 'utf8', stdio: 'pipe' });
}

const base = {
  matrixFile: 'm.mtx',
  orderFile: 'order.txt',
  ordering: 'natural',
  factorization: 'cholesky',
  range: null,
} as const;

describe.skipIf(python === undefined)(
  'the script for a general-purpose scripting library (skipped without SciPy)',
  () => {
    it('arrowhead of 5, fill counted by hand: hub first 15, hub last 9', () => {
      const folder = mkdtempSync(join(tmpdir(), 'arrow-'));
      const file = join(folder, 'arrow.mtx');
      const entries = ['1 1 9', '2 1 1', '3 1 1', '4 1 1', '5 1 1', '2 2 3', '3 3 3', '4 4 3', '5 5 3'];
      writeFileSync(file, `%%MatrixMarket matrix coordinate real symmetric\n5 5 9\n${entries.join('\n')}\n`);
      expect(run({ ...base, factorEntries: 15 }, file, [0, 1, 2, 3, 4])).toContain('found 15');
      expect(run({ ...base, factorEntries: 9 }, file, [1, 2, 3, 4, 0])).toContain('found 9');
      expect(() => run({ ...base, factorEntries: 10 }, file, [1, 2, 3, 4, 0])).toThrow();
    });

    it('bcsstk01 in a random order: the entries that elimination on sets finds, and the inverse order gives others', () => {
      const a = readReference('bcsstk01');
      const order = randomOrder(a.columns, 5);
      const { factorEntries } = naiveElimination(a, order);
      expect(naiveElimination(a, positionOf(order)).factorEntries).not.toBe(factorEntries);
      expect(run({ ...base, factorEntries }, referencePath('bcsstk01.mtx'), order)).toContain(`found ${factorEntries}`);
    });

    it('column LU: partial pivoting stays in a wide range and outside a wrong one', () => {
      const a = readReference('pores_1');
      const order = Array.from({ length: a.columns }, (_, i) => i);
      const request = { ...base, factorization: 'column-lu', factorEntries: 0 } as const;
      expect(run({ ...request, range: [a.columns, a.columns ** 2] }, referencePath('pores_1.mtx'), order)).toContain(
        'found',
      );
      expect(() => run({ ...request, range: [1, 2] }, referencePath('pores_1.mtx'), order)).toThrow();
    });
  },
);
