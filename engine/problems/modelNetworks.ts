import type { SparseMatrix } from '../matrix/pattern.ts';
import { Random } from '../matrix/random.ts';
import { TripletBuilder } from './builder.ts';
import { grid2d5 } from './modelGrids.ts';

/** Seed of all model problems. */
const seed = 20261;

/** `count` numbers in (0, 1) from the one generator. */
function numbers(count: number): Float64Array {
  const random = new Random(seed);
  const out = new Float64Array(count);
  for (let i = 0; i < count; i++) out[i] = random.next();
  return out;
}

/**
 * Nodal analysis: cells of 40 nodes wired inside, nets between a cell and its parent cell, one supply rail that touches 5 % of
 * the nodes, controlled sources (unsymmetric pattern), voltage sources (rows with a zero diagonal).
 */
export function circuit(n: number): SparseMatrix {
  const r = numbers(12 * n);
  let q = 0;
  const b = new TripletBuilder(n, n);
  const nodes = Math.trunc(n * 0.97);
  const sources = n - nodes;
  const cell = 40;
  const conductor = (a: number, c: number, g: number): void => {
    b.add(a, a, g);
    b.add(c, c, g);
    b.add(a, c, -g);
    b.add(c, a, -g);
  };
  for (let a = 1; a < nodes; a++) {
    const c = Math.floor(a / cell);
    const low = c * cell;
    const high = Math.min(low + cell, nodes);
    b.add(a, a, 1e-3);
    for (let t = 0; t < 2; t++) {
      const other = low + Math.trunc(r[q] * (high - low));
      const g = 10 ** (4 * r[q + 1] - 2);
      q += 2;
      if (other !== a && other !== 0) conductor(a, other, g);
    }
    if (r[q] < 0.08 && c > 0) {
      const other = Math.floor((c - 1) / 2) * cell + Math.trunc(r[q + 1] * cell);
      if (other !== a && other !== 0) conductor(a, other, 1);
    }
    q += 2;
    if (r[q] < 0.05) conductor(a, 0, 0.1);
    if (r[q + 1] < 0.3) b.add(a, low + Math.trunc(r[q + 2] * (high - low)), 0.5 * r[q + 3]);
    q += 4;
  }
  b.add(0, 0, 1);
  for (let s = 0; s < sources; s++) {
    const a = 1 + s * Math.floor((nodes - 1) / sources);
    b.add(a, nodes + s, 1);
    b.add(nodes + s, a, 1);
  }
  return b.build();
}

/** Rings of feeders, laterals hanging from them and some ties: nearly planar, two to three neighbours. */
export function powernet(n: number): SparseMatrix {
  const r = numbers(3 * n);
  const b = new TripletBuilder(n, n);
  const line = (a: number, c: number, y: number): void => {
    b.add(a, c, -y);
    b.add(c, a, -y);
    b.add(a, a, y);
    b.add(c, c, y);
  };
  const trunk = Math.floor(n / 4);
  for (let a = 0; a < trunk; a++) line(a, (a + 1) % trunk, 5 + r[a]);
  for (let a = trunk; a < n; a++) {
    const other = r[n + a] < 0.02 ? Math.trunc(r[a] * a) : Math.max(0, a - 1 - Math.trunc(r[2 * n + a] * 6));
    line(a, other, 1 + r[n + a]);
  }
  for (let s = 0; s < Math.floor(n / 20); s++) {
    const a = Math.trunc(r[s] * n);
    const c = Math.min(n - 1, a + 1 + Math.trunc(r[n + s] * 60));
    if (a !== c) line(a, c, 0.5);
  }
  for (let i = 0; i < n; i++) b.add(i, i, 1e-4);
  return b.build();
}

/** [H Aᵀ; A 0]: H a shifted grid Laplacian, A sparse with three entries a row: symmetric indefinite with a zero block. */
export function kkt(n: number): SparseMatrix {
  const k = Math.trunc(Math.sqrt((n * 2) / 3));
  const size = k * k;
  const m = Math.floor(n / 3);
  const r = numbers(3 * m);
  const b = new TripletBuilder(size + m, size + m);
  const h = grid2d5(k);
  for (let j = 0; j < size; j++) {
    for (let p = h.columnPointer[j]; p < h.columnPointer[j + 1]; p++) {
      const i = h.rowIndex[p];
      b.add(i, j, (h.values as Float64Array)[p] + (i === j ? 0.1 : 0));
    }
  }
  for (let row = 0; row < m; row++) {
    const base = Math.floor((row * size) / m);
    for (let t = 0; t < 3; t++) {
      const x = r[3 * row + t];
      const column = (base + (t === 2 ? Math.trunc(2 + x * 25) : t)) % size;
      b.add(size + row, column, 1 + x);
      b.add(column, size + row, 1 + x);
    }
  }
  return b.build();
}

/** Unknown 0 touches all others. */
export function arrow(n: number): SparseMatrix {
  const b = new TripletBuilder(n, n);
  b.add(0, 0, n);
  for (let i = 1; i < n; i++) {
    b.add(i, i, 2);
    b.add(0, i, 1);
    b.add(i, 0, 1);
  }
  return b.build();
}

/** A random recursive tree. */
export function tree(n: number): SparseMatrix {
  const r = numbers(n);
  const b = new TripletBuilder(n, n);
  for (let i = 0; i < n; i++) b.add(i, i, 1);
  for (let i = 1; i < n; i++) {
    const p = Math.trunc(r[i] * i);
    b.add(i, i, 1);
    b.add(p, p, 1);
    b.add(i, p, -1);
    b.add(p, i, -1);
  }
  return b.build();
}

/** Strong components of growing size, coupled one way, then shuffled: a block triangular form hidden by two permutations. */
export function blocktri(n: number): SparseMatrix {
  const r = numbers(4 * n);
  const byKey = (from: number): Int32Array =>
    Int32Array.from({ length: n }, (_, i) => i).sort((x, y) => r[from + x] - r[from + y] || x - y);
  const inverse = (order: Int32Array): Int32Array => {
    const position = new Int32Array(n);
    order.forEach((i, k) => {
      position[i] = k;
    });
    return position;
  };
  const rowPosition = inverse(byKey(n));
  const columnPosition = inverse(byKey(2 * n));
  const b = new TripletBuilder(n, n);
  const add = (i: number, j: number, v: number): void => b.add(rowPosition[i], columnPosition[j], v);
  let size = 1;
  for (let start = 0; start < n; start += size) {
    size = Math.min(size < 12 ? size + 1 : 1, n - start);
    for (let a = 0; a < size; a++) {
      add(start + a, start + a, 4);
      add(start + a, start + ((a + 1) % size), 1);
      if (start > 0) add(start + a, Math.trunc(r[start + a] * start), 0.5);
    }
  }
  return b.build();
}
