import type { SparseMatrix } from '../../matrix/pattern.ts';
import { TripletBuilder } from '../builder.ts';
import type { NodeCoordinates, WorkedExample } from './example.ts';

/**
 * Dye carried through a shallow channel with round posts: upwind convection and diffusion on square cells, and a pump that
 * returns part of the outflow to the inlet, cell to cell. Unsymmetric in values, and in pattern because of the pump.
 */
function make(across: number): { matrix: SparseMatrix; coordinates: NodeCoordinates } {
  const along = 3 * across;
  const wet = (x: number, y: number): boolean => {
    if (x < 0 || y < 0 || x >= along || y >= across) return false;
    const u = (x / across) % 1;
    const v = y / across;
    const shift = Math.floor(x / across) % 2 === 0 ? 0.35 : 0.65;
    return (u - 0.5) ** 2 + (v - shift) ** 2 > 0.02;
  };
  const number = new Int32Array(along * across).fill(-1);
  const place: number[] = [];
  let count = 0;
  for (let x = 0; x < along; x++) {
    for (let y = 0; y < across; y++) {
      if (!wet(x, y)) continue;
      number[x * across + y] = count++;
      place.push(x / across, y / across);
    }
  }
  const b = new TripletBuilder(count, count);
  const diffusion = 1;
  for (let x = 0; x < along; x++) {
    for (let y = 0; y < across; y++) {
      const i = number[x * across + y];
      if (i < 0) continue;
      const speed = 1.5 * (1 - (2 * (y / across) - 1) ** 2);
      const swirl = 0.6 * Math.sin((2 * Math.PI * x) / across);
      let diagonal = 0;
      const neighbour = (dx: number, dy: number, inflow: number): void => {
        if (!wet(x + dx, y + dy)) return;
        b.add(i, number[(x + dx) * across + y + dy], -(diffusion + inflow));
        diagonal += diffusion + inflow;
      };
      neighbour(-1, 0, speed);
      neighbour(1, 0, 0);
      neighbour(0, -1, Math.max(0, swirl));
      neighbour(0, 1, Math.max(0, -swirl));
      if (x === 0) {
        diagonal += 2 + speed;
        const outlet = number[(along - 1) * across + y];
        if (outlet >= 0 && outlet !== i) b.add(i, outlet, -0.4);
      }
      b.add(i, i, diagonal);
    }
  }
  return {
    matrix: b.build(),
    coordinates: { dimensions: 2, unknownsPerNode: 1, values: Float64Array.from(place) },
  };
}

export const channel: WorkedExample = {
  id: 'dye-channel',
  title: 'Dye in a channel',
  sentence: 'Convection past posts with a return pump: unsymmetric in values and in pattern, a case for LU.',
  sizes: [60, 120, 240],
  sizeMeans: 'cells across the channel',
  make,
};
