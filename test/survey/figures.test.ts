import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { surveyJson } from '../../engine/survey/json.ts';
import { survey } from '../../engine/survey/survey.ts';
import {
  type Figures,
  fetchedFolder,
  figures,
  generatedFigures,
  readableNames,
  readReference,
} from '../support/reference.ts';

/** The names of the figures files that the survey computes under the same definition (SciPy 1.10.1, test/reference/README.md). */
const compared = [
  'rows',
  'columns',
  'entries',
  'patternSymmetry',
  'valueSymmetric',
  'hermitian',
  'lowerBandwidth',
  'upperBandwidth',
  'envelope',
  'structuralRank',
  'components',
  'strongComponents',
  'diagonalStored',
  'diagonalNonzero',
  'symmetrisedEntries',
] as const;

function compare(name: string, matrix: SparseMatrix, expected: Figures): number {
  const found = surveyJson(survey(matrix));
  let seen = 0;
  for (const key of compared) {
    if (expected[key] === undefined) continue;
    expect(found[key], `${name}: ${key}`).toBe(expected[key]);
    seen++;
  }
  if (expected.blockTriangular !== undefined) {
    expect(found.blocks, name).toBe(expected.blockTriangular.blocks);
    expect(found.largestBlock, name).toBe(expected.blockTriangular.largest);
    seen += 2;
  }
  return seen;
}

describe('survey against the outside figures, exactly', () => {
  for (const name of readableNames()) {
    test(name, () => {
      expect(compare(name, readReference(name), figures[name])).toBeGreaterThanOrEqual(4);
    });
  }

  test.skipIf(fetchedFolder !== null)('further open matrices: skipped, FILLCAST_MATRICES names no folder', () => {
    // what stands here is the committed set alone, and it must be complete
    expect(readableNames().length).toBe(10);
  });

  test.skipIf(fetchedFolder === null)('every matrix of the figures file was read', () => {
    expect(readableNames().sort()).toEqual(Object.keys(figures).sort());
  });

  for (const name of Object.keys(generatedFigures)) {
    const [kind, size] = name.split('-');
    const make = modelProblems[kind];
    test.skipIf(make === undefined)(`model problem ${name}`, () => {
      expect(compare(name, make(Number(size)), generatedFigures[name])).toBeGreaterThan(10);
    });
  }
});

test('the figures files hold nothing that this test leaves out by mistake', () => {
  const text = readFileSync(new URL('../reference/figures.json', import.meta.url), 'utf8');
  for (const key of compared) expect(text).toContain(`"${key}"`);
});
