import type { SparseMatrix } from '../matrix/pattern.ts';
import { TripletBuilder } from './builder.ts';

/**
 * 24×24 stiffness of the unit trilinear brick, 2×2×2 Gauss points, corners ordered x fastest
 * (isoparametric brick: Zienkiewicz & Taylor, The Finite Element Method; from memory).
 */
export function brickStiffness(young = 1, poisson = 0.3): Float64Array {
  const lambda = (young * poisson) / ((1 + poisson) * (1 - 2 * poisson));
  const mu = young / (2 * (1 + poisson));
  const d = new Float64Array(36);
  for (let i = 0; i < 3; i++) for (let j = 0; j < 3; j++) d[i * 6 + j] = lambda + (i === j ? 2 * mu : 0);
  for (let i = 3; i < 6; i++) d[i * 6 + i] = mu;
  const corner: number[][] = [];
  for (const z of [-1, 1]) for (const y of [-1, 1]) for (const x of [-1, 1]) corner.push([x, y, z]);
  const g = 1 / Math.sqrt(3);
  const stiffness = new Float64Array(24 * 24);
  for (const point of corner) {
    const [px, py, pz] = point.map((c) => c * g);
    const b = new Float64Array(6 * 24);
    corner.forEach(([cx, cy, cz], i) => {
      const gx = (cx * (1 + cy * py) * (1 + cz * pz)) / 4;
      const gy = (cy * (1 + cx * px) * (1 + cz * pz)) / 4;
      const gz = (cz * (1 + cx * px) * (1 + cy * py)) / 4;
      const put = (r: number, c: number, v: number): void => {
        b[r * 24 + 3 * i + c] = v;
      };
      put(0, 0, gx);
      put(1, 1, gy);
      put(2, 2, gz);
      put(3, 0, gy);
      put(3, 1, gx);
      put(4, 1, gz);
      put(4, 2, gy);
      put(5, 0, gz);
      put(5, 2, gx);
    });
    for (let r = 0; r < 24; r++) {
      for (let c = 0; c < 24; c++) {
        let sum = 0;
        for (let p = 0; p < 6; p++) {
          if (b[p * 24 + r] === 0) continue;
          for (let q = 0; q < 6; q++) sum += b[p * 24 + r] * d[p * 6 + q] * b[q * 24 + c];
        }
        stiffness[r * 24 + c] += sum / 8;
      }
    }
  }
  return stiffness;
}

/** Block of k³ nodes, three unknowns each, in trilinear bricks; the face x = 0 is held (identity rows and columns). */
export function elasticity3d(k: number): SparseMatrix {
  const ke = brickStiffness();
  const n = 3 * k ** 3;
  const b = new TripletBuilder(n, n);
  const held = (dof: number): boolean => Math.floor(dof / 3) % k === 0;
  const dofs = new Int32Array(24);
  for (let z = 0; z < k - 1; z++) {
    for (let y = 0; y < k - 1; y++) {
      for (let x = 0; x < k - 1; x++) {
        let at = 0;
        for (const c of [0, 1]) {
          for (const r of [0, 1]) {
            for (const s of [0, 1]) {
              const node = ((z + c) * k + y + r) * k + x + s;
              for (let u = 0; u < 3; u++) dofs[at++] = 3 * node + u;
            }
          }
        }
        for (let i = 0; i < 24; i++) {
          if (held(dofs[i])) continue;
          for (let j = 0; j < 24; j++) {
            if (!held(dofs[j])) b.add(dofs[i], dofs[j], (ke[i * 24 + j] + ke[j * 24 + i]) / 2);
          }
        }
      }
    }
  }
  for (let i = 0; i < n; i++) if (held(i)) b.add(i, i, 1);
  return dropTiny(b.build(), 1e-14);
}

/** Leaves out entries of size below `limit`: couplings that cancel in exact arithmetic. */
function dropTiny(a: SparseMatrix, limit: number): SparseMatrix {
  const values = a.values as Float64Array;
  const columnPointer = new Int32Array(a.columns + 1);
  const rowIndex = new Int32Array(a.rowIndex.length);
  const kept = new Float64Array(values.length);
  let q = 0;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      if (Math.abs(values[p]) < limit) continue;
      rowIndex[q] = a.rowIndex[p];
      kept[q++] = values[p];
    }
    columnPointer[j + 1] = q;
  }
  return { ...a, columnPointer, rowIndex: rowIndex.slice(0, q), values: kept.slice(0, q) };
}
