import type { SparseMatrix } from '../matrix/pattern.ts';
import { TripletBuilder } from './builder.ts';

/** Grid stencils in 2 and 3 dimensions. Unknown (x,y,z) has the number (z·k + y)·k + x. */

/** Kronecker sum of `dims` copies of a tridiagonal k×k matrix, plus a multiple of the identity; complex where a part is. */
function kroneckerSum(
  k: number,
  dims: number,
  complex: boolean,
  part: (d: number) => { diagonal: number; above: [number, number]; below: [number, number] },
  shift: [number, number] = [0, 0],
): SparseMatrix {
  const n = k ** dims;
  const b = new TripletBuilder(n, n, complex);
  const parts = Array.from({ length: dims }, (_, d) => part(d));
  let diagonal = 0;
  for (const p of parts) diagonal += p.diagonal;
  for (let i = 0; i < n; i++) {
    b.add(i, i, diagonal + shift[0], shift[1]);
    let stride = 1;
    for (let d = 0; d < dims; d++) {
      const at = Math.floor(i / stride) % k;
      if (at + 1 < k) b.add(i, i + stride, parts[d].above[0], parts[d].above[1]);
      if (at > 0) b.add(i, i - stride, parts[d].below[0], parts[d].below[1]);
      stride *= k;
    }
  }
  return b.build();
}

const laplace = { diagonal: 2, above: [-1, 0], below: [-1, 0] } as {
  diagonal: number;
  above: [number, number];
  below: [number, number];
};

/** Five-point Laplacian of a k×k grid. */
export const grid2d5 = (k: number): SparseMatrix => kroneckerSum(k, 2, false, () => laplace);

/** Seven-point Laplacian of a k×k×k grid. */
export const grid3d7 = (k: number): SparseMatrix => kroneckerSum(k, 3, false, () => laplace);

function convectionDiffusion(k: number, dims: number): SparseMatrix {
  const peclet = 0.7;
  return kroneckerSum(k, dims, false, () => ({ diagonal: 2 + peclet, above: [-1, 0], below: [-(1 + peclet), 0] }));
}

/** Upwind convection–diffusion in the plane: symmetric pattern, unsymmetric values. */
export const convdiff2d = (k: number): SparseMatrix => convectionDiffusion(k, 2);

/** Upwind convection–diffusion in space. */
export const convdiff3d = (k: number): SparseMatrix => convectionDiffusion(k, 3);

/** Damped Helmholtz operator in space: complex symmetric, indefinite. */
export const helmholtz3d = (k: number): SparseMatrix => kroneckerSum(k, 3, true, () => laplace, [-0.6, 0.08]);

/** Grid with a magnetic phase along one direction: hermitian, positive definite. */
export const hermitian2d = (k: number): SparseMatrix =>
  kroneckerSum(k, 2, true, (d) =>
    d === 1
      ? {
          diagonal: 2.1,
          above: [-Math.cos(0.3), -Math.sin(0.3)],
          below: [-Math.cos(0.3), Math.sin(0.3)],
        }
      : laplace,
  );

function box(k: number, dims: number): SparseMatrix {
  const n = k ** dims;
  const depth = dims === 3 ? k : 1;
  const b = new TripletBuilder(n, n);
  for (let i = 0; i < n; i++) {
    const x = i % k;
    const y = Math.floor(i / k) % k;
    const z = Math.floor(i / (k * k));
    for (let Z = Math.max(0, z - 1); Z <= Math.min(depth - 1, z + 1); Z++) {
      for (let Y = Math.max(0, y - 1); Y <= Math.min(k - 1, y + 1); Y++) {
        for (let X = Math.max(0, x - 1); X <= Math.min(k - 1, x + 1); X++) {
          const j = (Z * k + Y) * k + X;
          b.add(i, j, i === j ? 3 ** dims : -1);
        }
      }
    }
  }
  return b.build();
}

/** Nine-point box stencil of a k×k grid. */
export const grid2d9 = (k: number): SparseMatrix => box(k, 2);

/** Twenty-seven-point box stencil of a k×k×k grid. */
export const grid3d27 = (k: number): SparseMatrix => box(k, 3);

/** Five-point grid with three dense rows and columns. */
export function denserow(k: number): SparseMatrix {
  const n = k * k;
  const b = new TripletBuilder(n, n);
  const special = new Map<string, number>();
  for (let d = 0; d < 3; d++) {
    const row = Math.floor(((d + 1) * n) / 4);
    for (let i = d; i < n; i += 2 + d) {
      special.set(`${row},${i}`, 0.01);
      special.set(`${i},${row}`, 0.01);
    }
    special.set(`${row},${row}`, n);
  }
  const grid = grid2d5(k);
  for (let j = 0; j < n; j++) {
    for (let p = grid.columnPointer[j]; p < grid.columnPointer[j + 1]; p++) {
      const i = grid.rowIndex[p];
      if (!special.has(`${i},${j}`)) b.add(i, j, (grid.values as Float64Array)[p]);
    }
  }
  for (const [key, value] of special) {
    const [i, j] = key.split(',').map(Number);
    b.add(i, j, value);
  }
  return b.build();
}
