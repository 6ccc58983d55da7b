import type { SparseMatrix } from '../../matrix/pattern.ts';
import { TripletBuilder } from '../builder.ts';
import type { NodeCoordinates, WorkedExample } from './example.ts';

/**
 * Steady conduction in an aluminium base plate with fins, cells of equal size, seven-point finite volumes; every free face gives heat
 * to the air. `width` cells along each side of the base.
 */
function make(width: number): { matrix: SparseMatrix; coordinates: NodeCoordinates } {
  const plate = Math.max(2, Math.round(width / 8));
  const height = plate + width;
  const filled = (x: number, y: number, z: number): boolean => {
    if (x < 0 || y < 0 || z < 0 || x >= width || y >= width || z >= height) return false;
    return z < plate || x % 5 < 2;
  };
  const at = (x: number, y: number, z: number): number => (z * width + y) * width + x;
  const number = new Int32Array(width * width * height).fill(-1);
  const place: number[] = [];
  let count = 0;
  for (let z = 0; z < height; z++) {
    for (let y = 0; y < width; y++) {
      for (let x = 0; x < width; x++) {
        if (!filled(x, y, z)) continue;
        number[at(x, y, z)] = count++;
        place.push(x * cell, y * cell, z * cell);
      }
    }
  }
  const conduction = 200 * cell;
  const convection = 25 * cell * cell;
  const b = new TripletBuilder(count, count);
  for (let z = 0; z < height; z++) {
    for (let y = 0; y < width; y++) {
      for (let x = 0; x < width; x++) {
        const i = number[at(x, y, z)];
        if (i < 0) continue;
        let diagonal = 0;
        for (const [dx, dy, dz] of faces) {
          if (filled(x + dx, y + dy, z + dz)) {
            b.add(i, number[at(x + dx, y + dy, z + dz)], -conduction);
            diagonal += conduction;
          } else if (z + dz >= 0) diagonal += convection;
        }
        b.add(i, i, diagonal);
      }
    }
  }
  return {
    matrix: b.build(),
    coordinates: { dimensions: 3, unknownsPerNode: 1, values: Float64Array.from(place) },
  };
}

/** edge of a cell in metres */
const cell = 0.002;

const faces: readonly (readonly [number, number, number])[] = [
  [-1, 0, 0],
  [1, 0, 0],
  [0, -1, 0],
  [0, 1, 0],
  [0, 0, -1],
  [0, 0, 1],
];

export const heatSink: WorkedExample = {
  id: 'heat-sink',
  title: 'Heat sink',
  sentence: 'Heat conduction in a finned plate, in space: where the choice of ordering decides by whole factors.',
  sizes: [22, 32, 48],
  sizeMeans: 'cells along the base',
  make,
};
