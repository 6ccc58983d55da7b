import { describe, expect, it } from 'vitest';
import { Random } from '../../../engine/matrix/random.ts';
import { complexKernels } from '../../../engine/numeric/dense/complex.ts';
import type { DenseKernels } from '../../../engine/numeric/dense/kernels.ts';
import { realKernels } from '../../../engine/numeric/dense/real.ts';
import { countingKernels } from './countingKernels.ts';

/**
 * Every blocked primitive against its definition, on random data of all small sizes around the tile edges, on trapezoids and
 * rectangles. What lies outside the stated ranges must stay as it was, bit for bit.
 */
const kinds: [string, DenseKernels][] = [
  ['real', realKernels],
  ['complex', complexKernels],
];

function filled(random: Random, length: number): Float64Array {
  return Float64Array.from({ length }, () => 2 * random.next() - 1);
}

/** Largest difference; the definition sums in another order, so equal up to rounding only. */
function difference(a: Float64Array, b: Float64Array): number {
  let worst = 0;
  for (let q = 0; q < a.length; q++) {
    if (!Object.is(a[q], b[q])) worst = Math.max(worst, Number.isNaN(a[q] - b[q]) ? 1e9 : Math.abs(a[q] - b[q]));
  }
  return worst;
}

describe.each(kinds)('%s kernels', (_, kernels) => {
  const w = kernels.width;
  const plain = countingKernels(w, { multiplyAdds: 0, divisions: 0, roots: 0 });
  const sizes = [0, 1, 2, 3, 4, 5, 7, 8, 9, 13];

  it('pack and packTransposed', () => {
    const random = new Random(1);
    for (const shrink of [0, 1]) {
      for (const rows of sizes) {
        for (const depth of [1, 2, 5]) {
          const m = 6 + depth + rows;
          const x = filled(random, w * (3 + m * (2 + depth)));
          const length = w * (kernels.group * Math.ceil(rows / kernels.group) * depth + 3);
          for (const conjugate of [false, true]) {
            const to = filled(random, length);
            const other = to.slice();
            kernels.pack(to, 1, x, 3, m, shrink, 2, 2 + depth, 5, 5 + rows, w === 2 && conjugate);
            plain.pack(other, 1, x, 3, m, shrink, 2, 2 + depth, 5, 5 + rows, w === 2 && conjugate);
            expect(difference(to, other)).toBe(0);
          }
          if (shrink === 1 || rows === 0) continue;
          const y = filled(random, w * (2 + m * (1 + rows)));
          const to = new Float64Array(w * kernels.group * Math.ceil(rows / kernels.group) * depth);
          const other = to.slice();
          kernels.packTransposed(to, 0, y, 2, m, 1, 1 + rows, 4, 4 + depth);
          plain.packTransposed(other, 0, y, 2, m, 1, 1 + rows, 4, 4 + depth);
          // rows that fill up the last group may hold anything
          for (let k = 0; k < to.length / w; k++) {
            const row = Math.floor(k / (kernels.group * depth)) * kernels.group + (k % kernels.group);
            if (row < rows) for (let p = 0; p < w; p++) expect(to[w * k + p]).toBe(other[w * k + p]);
          }
        }
      }
    }
  });

  it('update, whole and lower triangle', () => {
    const random = new Random(2);
    const g = kernels.group;
    for (const rows of sizes) {
      for (const columns of sizes) {
        for (const depth of [0, 1, 3, 8]) {
          for (const lower of [false, true]) {
            for (const offset of lower ? [0, g] : [0, 3]) {
              const shrink = lower ? 1 : 0;
              const i0 = 2 + offset;
              const m = i0 + rows + columns + 3;
              const c = filled(random, w * (m * (columns + 4)));
              const other = c.slice();
              const a = filled(random, w * (g * Math.ceil(rows / g) * depth + 2));
              const b = filled(random, w * (g * Math.ceil(columns / g) * depth + 1));
              const call = (k: DenseKernels, x: Float64Array) =>
                k.update(x, 1, m, shrink, i0, i0 + rows, 2, 2 + columns, lower, a, 2, b, 1, depth);
              call(kernels, c);
              call(plain, other);
              expect(difference(c, other)).toBeLessThan(1e-14);
            }
          }
        }
      }
    }
  });

  it('cholesky of a block of columns, and the first pivot that is not positive', () => {
    const random = new Random(3);
    for (const shrink of [0, 1]) {
      for (const columns of [1, 2, 3, 4, 5, 8, 11]) {
        for (const below of [0, 1, 2, 3, 4, 6]) {
          const k0 = 2;
          const k1 = k0 + columns;
          const m = k1 + below;
          const x = filled(random, w * (m * k1 + 1));
          const at = (j: number) => 1 + j * m - (shrink * j * (j + 1)) / 2 + j;
          for (let j = 0; j < k1; j++) {
            x[w * at(j)] = 3 * m;
            if (w === 2) x[2 * at(j) + 1] = 0;
          }
          for (const bad of [-1, k0, k1 - 1]) {
            const y = x.slice();
            if (bad >= 0) y[w * at(bad)] = -1;
            const other = y.slice();
            expect(kernels.cholesky(y, 1, m, shrink, k0, k1, m)).toBe(bad);
            expect(plain.cholesky(other, 1, m, shrink, k0, k1, m)).toBe(bad);
            if (bad < 0) expect(difference(y, other)).toBeLessThan(1e-13);
            else expect(y[w * at(bad)]).toBeCloseTo(other[w * at(bad)], 12);
          }
        }
      }
    }
  });

  it('column primitives', () => {
    const random = new Random(4);
    for (const shrink of [0, 1]) {
      for (const columns of [0, 1, 2, 3, 4, 5, 9]) {
        for (const rows of sizes) {
          const m = columns + rows + 5;
          const x = filled(random, w * (m * (columns + 3)));
          const f = filled(random, w * (columns + 2));
          const v = filled(random, w * (m + 2));
          for (const conjugate of [false, true]) {
            const [y, z] = [v.slice(), v.slice()];
            kernels.apply(y, 1, x, 2, m, shrink, 1, 1 + columns, columns + 2, columns + 2 + rows, f, 1);
            plain.apply(z, 1, x, 2, m, shrink, 1, 1 + columns, columns + 2, columns + 2 + rows, f, 1);
            expect(difference(y, z)).toBeLessThan(1e-14);
            const c = conjugate && w === 2;
            const [p, q] = [f.slice(), f.slice()];
            kernels.applyTransposed(p, 1, x, 2, m, shrink, 1, 1 + columns, columns + 2, columns + 2 + rows, v, 1, c);
            plain.applyTransposed(q, 1, x, 2, m, shrink, 1, 1 + columns, columns + 2, columns + 2 + rows, v, 1, c);
            expect(difference(p, q)).toBeLessThan(1e-14);
          }
          expect(kernels.largest(v, 1, 0, rows)).toBe(plain.largest(v, 1, 0, rows));
          const [y, z] = [v.slice(), v.slice()];
          kernels.divide(y, 1, v, 0, 1, rows, x, 1);
          plain.divide(z, 1, v, 0, 1, rows, x, 1);
          expect(difference(y, z)).toBeLessThan(1e-12);
        }
      }
    }
  });

  it('pivots of order two: inverse, columns of L, products with D', () => {
    const random = new Random(5);
    for (const hermitian of [false, true]) {
      for (const depth of [1, 2, 3, 4, 7]) {
        const m = depth + 9;
        const x = filled(random, w * m * depth);
        const d = filled(random, w * (depth + 1));
        const e = new Float64Array(w * (depth + 1));
        if (w === 2 && hermitian) for (let k = 0; k <= depth; k++) d[2 * k + 1] = 0;
        // column l has its pivot block at place l + 1; pairs begin at columns 0, 3, 6
        for (let l = 0; l + 1 < depth; l += 3) e.set(filled(random, w), w * (l + 1));
        const [f, g] = [new Float64Array(w * depth), new Float64Array(w * depth)];
        kernels.pairedCoefficients(f, 0, x, 0, m, 1, 0, depth, depth + 2, d, e, 1, hermitian);
        plain.pairedCoefficients(g, 0, x, 0, m, 1, 0, depth, depth + 2, d, e, 1, hermitian);
        expect(difference(f, g)).toBeLessThan(1e-14);
        const from = filled(random, w * kernels.group * 3 * depth);
        const [p, q] = [new Float64Array(from.length), new Float64Array(from.length)];
        kernels.scaleGroups(p, from, 3, depth, d, e, 1, hermitian);
        plain.scaleGroups(q, from, 3, depth, d, e, 1, hermitian);
        expect(difference(p, q)).toBeLessThan(1e-14);
      }
      const [a, b, c] = [filled(random, w), filled(random, w), filled(random, w)];
      const [f, g] = [new Float64Array(4 * w), new Float64Array(4 * w)];
      expect(kernels.invertPair(f, 0, a, 0, b, 0, c, 0, hermitian)).toBe(true);
      plain.invertPair(g, 0, a, 0, b, 0, c, 0, hermitian);
      expect(difference(f, g)).toBeLessThan(1e-12);
      expect(kernels.invertPair(f, 0, new Float64Array(w), 0, new Float64Array(w), 0, c, 0, hermitian)).toBe(false);
      const columns = filled(random, w * 20);
      const other = columns.slice();
      kernels.combine(columns, 1, 10, 2, 8, f.fill(0.5), 0);
      plain.combine(other, 1, 10, 2, 8, f, 0);
      expect(difference(columns, other)).toBeLessThan(1e-14);
    }
  });

  it('largest sees NaN, infinities, zeros, and moduli whose squares vanish or overflow', () => {
    const v = new Float64Array(w * 6);
    expect(kernels.largest(v, 0, 0, 6)).toBe(0);
    expect(kernels.largest(v, 0, 3, 3)).toBe(-1);
    v[w * 4] = 1e-200;
    expect(kernels.largest(v, 0, 0, 6)).toBe(4);
    v[w * 2] = 1e200;
    v[w * 1] = 2e200;
    expect(kernels.largest(v, 0, 0, 6)).toBe(1);
    v[w * 5] = Number.POSITIVE_INFINITY;
    expect(kernels.largest(v, 0, 0, 6)).toBe(5);
    v[w * 3] = Number.NaN;
    expect(kernels.largest(v, 0, 0, 6)).toBe(3);
  });
});
