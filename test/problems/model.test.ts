/**
 * Model problems against outside figures: made by another language's program from the same definition and generator of random
 * numbers, counted with SciPy and NumPy (test/reference/README.md).
 */
import { describe, expect, it } from 'vitest';
import { checkMatrix } from '../../engine/matrix/check.ts';
import { entryCount } from '../../engine/matrix/pattern.ts';
import { transposePattern } from '../../engine/matrix/transpose.ts';
import { brickStiffness } from '../../engine/problems/brick.ts';
import { workedExamples } from '../../engine/problems/examples.ts';
import { modelProblems } from '../../engine/problems/model.ts';
import { generatedFigures } from '../support/reference.ts';

describe('model problems', () => {
  for (const [name, figure] of Object.entries(generatedFigures)) {
    const [kind, size] = name.split('-');
    if (!(kind in modelProblems)) continue;
    it(`${name} has the entries, bandwidths and diagonal counted outside`, () => {
      const a = modelProblems[kind](Number(size));
      checkMatrix(a);
      let lower = 0;
      let upper = 0;
      let diagonal = 0;
      for (let j = 0; j < a.columns; j++) {
        for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
          lower = Math.max(lower, a.rowIndex[p] - j);
          upper = Math.max(upper, j - a.rowIndex[p]);
          if (a.rowIndex[p] === j) diagonal++;
        }
      }
      expect({ rows: a.rows, entries: entryCount(a), lower, upper, diagonal }).toEqual({
        rows: figure.rows,
        entries: figure.entries,
        lower: figure.lowerBandwidth,
        upper: figure.upperBandwidth,
        diagonal: figure.diagonalStored,
      });
    });
  }

  it('the brick has six rigid motions: constant fields and rotations carry no energy (elementary mechanics)', () => {
    const k = brickStiffness();
    const corner: number[][] = [];
    for (const z of [0, 1]) for (const y of [0, 1]) for (const x of [0, 1]) corner.push([x, y, z]);
    const motions: ((p: number[]) => number[])[] = [
      () => [1, 0, 0],
      () => [0, 1, 0],
      () => [0, 0, 1],
      ([x, y]) => [-y, x, 0],
      ([, y, z]) => [0, -z, y],
      ([x, , z]) => [z, 0, -x],
    ];
    for (const motion of motions) {
      const u = corner.flatMap((p) => motion(p));
      for (let i = 0; i < 24; i++) {
        let force = 0;
        for (let j = 0; j < 24; j++) force += k[24 * i + j] * u[j];
        expect(Math.abs(force)).toBeLessThan(1e-14);
      }
    }
  });
});

describe('worked examples', () => {
  for (const example of workedExamples) {
    it(`${example.id} is well formed, whole, and what its sentence says`, () => {
      const { matrix, coordinates } = example.make(example.sizes[0]);
      checkMatrix(matrix);
      expect(matrix.rows).toBe(matrix.columns);
      expect(matrix.rows).toBeGreaterThan(3000);
      expect(matrix.rows).toBeLessThan(40_000);
      for (const v of matrix.values as Float64Array) expect(Number.isFinite(v)).toBe(true);
      const samePattern =
        entryCount(transposePattern(matrix)) === entryCount(matrix) &&
        transposePattern(matrix).rowIndex.every((i, p) => i === matrix.rowIndex[p]);
      expect(samePattern).toBe(example.id !== 'dye-channel');
      expect(matrix.field).toBe(example.id === 'resonant-cavity' ? 'complex' : 'real');
      if (coordinates !== null) {
        expect((coordinates.values.length / coordinates.dimensions) * coordinates.unknownsPerNode).toBe(matrix.rows);
      }
    });
  }
});
