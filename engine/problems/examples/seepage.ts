import type { SparseMatrix } from '../../matrix/pattern.ts';
import { TripletBuilder } from '../builder.ts';
import type { WorkedExample } from './example.ts';

/**
 * Seepage under a weir, mixed form: one flux per inner face and one head per cell, [M Bᵀ; B 0]. Symmetric indefinite with a
 * zero block: the diagonal of every head is absent.
 */
function make(deep: number): { matrix: SparseMatrix; coordinates: null } {
  const long = 2 * deep;
  const cell = (x: number, y: number): number => x * deep + y;
  const faces: [number, number, number][] = [];
  for (let x = 0; x < long; x++) {
    for (let y = 0; y < deep; y++) {
      // layers of sand and silt, and a tight cut-off wall in the middle
      const resistance = (y % 6 < 4 ? 1 : 8) * (Math.abs(x - deep) < 1 && y < deep / 2 ? 200 : 1);
      if (x + 1 < long) faces.push([cell(x, y), cell(x + 1, y), resistance]);
      if (y + 1 < deep) faces.push([cell(x, y), cell(x, y + 1), 2 * resistance]);
    }
  }
  // the river bed on both sides of the weir: faces with a head outside
  for (let x = 0; x < long; x++) if (Math.abs(x - deep) > deep / 4) faces.push([cell(x, 0), -1, 0.5]);
  const fluxes = faces.length;
  const n = fluxes + long * deep;
  const b = new TripletBuilder(n, n);
  faces.forEach(([from, to, resistance], f) => {
    b.add(f, f, resistance);
    for (const [c, sign] of [
      [from, 1],
      [to, -1],
    ]) {
      if (c < 0) continue;
      b.add(f, fluxes + c, sign);
      b.add(fluxes + c, f, sign);
    }
  });
  return { matrix: b.build(), coordinates: null };
}

export const seepage: WorkedExample = {
  id: 'seepage',
  title: 'Seepage under a weir',
  sentence: 'Fluxes and heads together, a saddle point: a third of the diagonal is missing, so LDLᵀ needs 2×2 pivots.',
  sizes: [40, 80, 140],
  sizeMeans: 'cells of depth',
  make,
};
