import type { SparseMatrix } from '../../matrix/pattern.ts';
import { TripletBuilder } from '../builder.ts';
import type { NodeCoordinates, WorkedExample } from './example.ts';

/**
 * Stiffness of a bilinear plane-stress rectangle of sides a × b, 2×2 Gauss points, unit thickness
 * (Zienkiewicz & Taylor, The Finite Element Method; from memory). Corners counter-clockwise from the lower left. 8×8 by rows.
 */
function planeStressStiffness(a: number, b: number, young: number, poisson: number): Float64Array {
  const c = young / (1 - poisson * poisson);
  const d = [c, c * poisson, 0, c * poisson, c, 0, 0, 0, (c * (1 - poisson)) / 2];
  const xi = [-1, 1, 1, -1];
  const eta = [-1, -1, 1, 1];
  const out = new Float64Array(64);
  const g = 1 / Math.sqrt(3);
  for (const s of [-g, g]) {
    for (const t of [-g, g]) {
      const strain = new Float64Array(24);
      for (let i = 0; i < 4; i++) {
        const dx = (xi[i] * (1 + eta[i] * t)) / (2 * a);
        const dy = (eta[i] * (1 + xi[i] * s)) / (2 * b);
        strain[2 * i] = dx;
        strain[8 + 2 * i + 1] = dy;
        strain[16 + 2 * i] = dy;
        strain[16 + 2 * i + 1] = dx;
      }
      for (let i = 0; i < 8; i++) {
        for (let j = 0; j < 8; j++) {
          let sum = 0;
          for (let p = 0; p < 3; p++) {
            for (let q = 0; q < 3; q++) sum += strain[8 * p + i] * d[3 * p + q] * strain[8 * q + j];
          }
          out[8 * i + j] += (sum * a * b) / 4;
        }
      }
    }
  }
  return out;
}

/** Deck of 36 m × 3 m seen from above, `across` elements over its width, lightening holes along the middle, held at three piers. */
function make(across: number): { matrix: SparseMatrix; coordinates: NodeCoordinates } {
  const side = 3 / across;
  const along = 12 * across;
  const solid = (ex: number, ey: number): boolean => {
    const x = ((ex + 0.5) * side) % 3;
    const y = (ey + 0.5) * side;
    return ((x - 1.5) / 0.9) ** 2 + ((y - 1.5) / 0.55) ** 2 > 1;
  };
  const number = new Int32Array((along + 1) * (across + 1)).fill(-1);
  const node = (ix: number, iy: number): number => ix * (across + 1) + iy;
  const pier = (ix: number): boolean => ix === 0 || ix === along / 2 || ix === along;
  for (let ex = 0; ex < along; ex++) {
    for (let ey = 0; ey < across; ey++) {
      if (!solid(ex, ey)) continue;
      for (const [dx, dy] of corners) number[node(ex + dx, ey + dy)] = -2;
    }
  }
  const place: number[] = [];
  let count = 0;
  for (let ix = 0; ix <= along; ix++) {
    for (let iy = 0; iy <= across; iy++) {
      if (number[node(ix, iy)] !== -2) continue;
      if (pier(ix) && (iy === 0 || iy === across)) {
        number[node(ix, iy)] = -1;
        continue;
      }
      number[node(ix, iy)] = count++;
      place.push(ix * side, iy * side);
    }
  }
  // concrete: 33 GN/m², in MN and m so that the figures stay readable
  const stiffness = planeStressStiffness(side, side, 33_000, 0.2);
  const b = new TripletBuilder(2 * count, 2 * count);
  const unknown = new Int32Array(8);
  for (let ex = 0; ex < along; ex++) {
    for (let ey = 0; ey < across; ey++) {
      if (!solid(ex, ey)) continue;
      corners.forEach(([dx, dy], c) => {
        const at = number[node(ex + dx, ey + dy)];
        unknown[2 * c] = at < 0 ? -1 : 2 * at;
        unknown[2 * c + 1] = at < 0 ? -1 : 2 * at + 1;
      });
      for (let i = 0; i < 8; i++) {
        for (let j = 0; j < 8; j++) {
          if (unknown[i] >= 0 && unknown[j] >= 0) {
            b.add(unknown[i], unknown[j], (stiffness[8 * i + j] + stiffness[8 * j + i]) / 2);
          }
        }
      }
    }
  }
  return {
    matrix: b.build(),
    coordinates: { dimensions: 2, unknownsPerNode: 2, values: Float64Array.from(place) },
  };
}

const corners: readonly (readonly [number, number])[] = [
  [0, 0],
  [1, 0],
  [1, 1],
  [0, 1],
];

export const footbridge: WorkedExample = {
  id: 'footbridge-deck',
  title: 'Footbridge deck',
  sentence:
    'Plane stress in a perforated concrete deck over three piers: long and narrow, symmetric positive definite.',
  sizes: [16, 32, 64],
  sizeMeans: 'elements across the deck',
  make,
};
