import type { SparseMatrix } from '../../matrix/pattern.ts';
import { TripletBuilder } from '../builder.ts';
import type { NodeCoordinates, WorkedExample } from './example.ts';

/**
 * Scalar wave equation −∇²u − k²ε u in a box with a lossy ceramic post and one open face (first-order absorbing condition),
 * seven-point differences: complex symmetric, neither hermitian nor definite. `points` inner points along the longest edge.
 */
function make(points: number): { matrix: SparseMatrix; coordinates: NodeCoordinates } {
  const nx = points;
  const ny = Math.round(points * 0.8);
  const nz = Math.round(points * 0.7);
  const step = 1 / points;
  const wave = 2 * Math.PI * 2.3;
  const n = nx * ny * nz;
  const b = new TripletBuilder(n, n, true);
  const place = new Float64Array(3 * n);
  const size = [nx, ny, nz];
  const stride = [1, nx, nx * ny];
  for (let i = 0; i < n; i++) {
    const at = [i % nx, Math.floor(i / nx) % ny, Math.floor(i / (nx * ny))];
    for (let d = 0; d < 3; d++) place[3 * i + d] = at[d] * step;
    const dx = at[0] / nx - 0.55;
    const dy = at[1] / ny - 0.5;
    const post = dx * dx + dy * dy < 0.015;
    const permittivity = post ? [6, -0.3] : [1, -0.002];
    let real = 6 - wave * wave * step * step * permittivity[0];
    let imaginary = -(wave * wave) * step * step * permittivity[1];
    for (let d = 0; d < 3; d++) {
      if (at[d] > 0) b.add(i, i - stride[d], -1, 0);
      if (at[d] < size[d] - 1) b.add(i, i + stride[d], -1, 0);
    }
    if (at[2] === nz - 1) {
      real -= 1;
      imaginary += wave * step;
    }
    b.add(i, i, real, imaginary);
  }
  return { matrix: b.build(), coordinates: { dimensions: 3, unknownsPerNode: 1, values: place } };
}

export const cavity: WorkedExample = {
  id: 'resonant-cavity',
  title: 'Resonant cavity',
  sentence:
    'A wave in a box with a ceramic post and an open face: complex symmetric and indefinite, so pivoting matters.',
  sizes: [22, 32, 44],
  sizeMeans: 'points along the longest edge',
  make,
};
