import { describe, expect, it } from 'vitest';
import { rasterOf } from '../../app/maps/raster.ts';
import { centreOn, clampViewport, everything, panBy, positionsOf, zoomAt } from '../../app/maps/viewport.ts';
import { sayPath, sayScale, sayValue, span } from '../../app/maps/words.ts';

describe('where the maps look', () => {
  it('a zoom keeps the point under the pointer', () => {
    let v = everything;
    for (let k = 0; k < 20; k++) {
      const before = { x: v.left + 0.3 * v.width, y: v.top + 0.7 * v.height };
      v = zoomAt(v, 1.3, 0.3, 0.7, 1e-6);
      expect(v.left + 0.3 * v.width).toBeCloseTo(before.x, 12);
      expect(v.top + 0.7 * v.height).toBeCloseTo(before.y, 12);
    }
  });
  it('never leaves the ground and never gets closer than allowed', () => {
    const v = panBy(zoomAt(everything, 1e9, 1, 1, 0.01), 5, 5, 0.01);
    expect(v).toEqual({ top: 0.99, left: 0.99, height: 0.01, width: 0.01 });
    expect(clampViewport({ top: -1, left: 2, height: 3, width: 0.5 }, 0.1)).toEqual({
      top: 0,
      left: 0.5,
      height: 1,
      width: 0.5,
    });
  });
  it('brings a place to the middle', () => {
    const v = centreOn({ top: 0, left: 0, height: 0.1, width: 0.1 }, 0.5, 0.25, 0.01);
    expect(v.top + v.height / 2).toBeCloseTo(0.5, 12);
    expect(v.left + v.width / 2).toBeCloseTo(0.25, 12);
  });
  it('covers whole positions, at least one', () => {
    expect(positionsOf(0, 1, 7)).toEqual([0, 7]);
    expect(positionsOf(0.5, 0.1, 10)).toEqual([5, 6]);
    expect(positionsOf(0.999999, 1e-9, 3)).toEqual([2, 3]);
  });
});

describe('dots', () => {
  const inks = { ink: [10, 20, 30], fill: [200, 100, 0] } as const;
  const raster = (original: number[], fill: number[], columns: number, shade: 'density' | 'any') =>
    rasterOf(
      {
        rows: original.length / columns,
        columns,
        original: Float64Array.from(original),
        fill: Float64Array.from(fill),
        cellArea: 1e6,
        shade,
      },
      inks,
    );
  it('a lone entry among a million places is plainly visible, an empty dot is not there', () => {
    const pixels = raster([1, 0], [0, 0], 2, 'density');
    expect(pixels[3]).toBeGreaterThan(0.4 * 255);
    expect(pixels[7]).toBe(0);
    expect([...pixels.subarray(0, 3)]).toEqual([10, 20, 30]);
  });
  it('more entries are darker, or all alike when asked so', () => {
    const dense = raster([1, 1000, 1e6], [0, 0, 0], 3, 'density');
    expect(dense[7]).toBeGreaterThan(dense[3]);
    expect(dense[11]).toBe(255);
    const any = raster([1, 1000, 1e6], [0, 0, 0], 3, 'any');
    expect([any[3], any[7], any[11]]).toEqual([255, 255, 255]);
  });
  it('the hatch grows with the share of fill-in, and pure fill-in has no ink', () => {
    const wide = 60;
    const coloured = (share: number): number => {
      const pixels = raster(
        new Array(wide * wide).fill(1000 * (1 - share)),
        new Array(wide * wide).fill(1000 * share),
        wide,
        'any',
      );
      let count = 0;
      for (let k = 0; k < wide * wide; k++) if (pixels[4 * k] === 200) count++;
      return count / (wide * wide);
    };
    expect(coloured(0)).toBe(0);
    expect(coloured(0.2)).toBeGreaterThan(0.1);
    expect(coloured(0.8)).toBeGreaterThan(coloured(0.2));
    expect(coloured(1)).toBe(1);
  });
});

describe('words of the maps', () => {
  it('positions are written from 1, ranges with both ends', () => {
    expect(span(0, 1)).toBe('1');
    expect(span(1000, 2000)).toBe('1,001–2,000');
  });
  it('a path names its unknowns', () => {
    expect(sayPath([4, 6, 2])).toBe(
      'Unknown 7 is joined to both 5 and 3; eliminating it leaves an entry here. Path: 5 – 7 – 3.',
    );
    expect(sayPath([4, 6, 7, 8, 2])).toContain('A path of 3 unknowns joins 5 and 3');
    expect(sayPath(Array.from({ length: 40 }, (_, k) => k))).toContain('26 more');
  });
  it('complex values keep the sign of their imaginary part', () => {
    expect(sayValue([1.5, -2])).toBe('1.5 − 2i');
    expect(sayValue([0, 0.25])).toBe('0 + 0.25i');
    expect(sayValue([-3])).toBe('-3');
  });
  it('the scale says when every entry is drawn singly', () => {
    expect(sayScale(1, 1)).toBe('every entry drawn singly');
    expect(sayScale(2000, 2000)).toBe('one dot = 2,000 × 2,000 places');
  });
});
