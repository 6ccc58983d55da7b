/** Rates of the dense kernels alone. */
import { partialCholesky, updateFromCholesky } from '../../../engine/numeric/dense/cholesky.ts';
import { complexKernels } from '../../../engine/numeric/dense/complex.ts';
import type { DenseKernels } from '../../../engine/numeric/dense/kernels.ts';
import { partialLdlt, updateFromLdlt } from '../../../engine/numeric/dense/ldlt.ts';
import { partialLu, updateFromLu } from '../../../engine/numeric/dense/lu.ts';
import { realKernels } from '../../../engine/numeric/dense/real.ts';
import { type DenseWorkspace, packedLength } from '../../../engine/numeric/dense/workspace.ts';

const quiet = (): void => {};

function workspace(width: number, m: number, p: number): DenseWorkspace {
  const packed = width * packedLength(m, p);
  const [left, right] = [new Float64Array(packed), new Float64Array(packed)];
  const columns = () => new Float64Array(width * m);
  return { left, right, first: columns(), second: columns(), factors: new Float64Array(width * 64) };
}

/** A front of order m with p pivots, dominant diagonal, one factorization after another. */
function frontSeconds(
  kernels: DenseKernels,
  kind: 'cholesky' | 'ldlt' | 'lu',
  m: number,
  p: number,
  runs: number,
): number {
  const w = kernels.width;
  const q = m - p;
  const lu = kind === 'lu';
  const x = new Float64Array(w * (lu ? p * (2 * m - p) : p * m - (p * (p - 1)) / 2));
  const c = new Float64Array(w * (lu ? q * q : (q * (q + 1)) / 2));
  const work = workspace(w, m, p);
  const [list, place] = [new Int32Array(m), new Int32Array(m)];
  const [d, e] = [new Float64Array(w * p), new Float64Array(w * p)];
  const rule = { pivoting: 'threshold', threshold: 0.1, smallest: 0, hermitian: false } as const;
  const tally = { twoByTwo: 0, offDiagonal: 0, perturbed: 0, largest: 0 };
  let best = Infinity;
  for (let run = 0; run < runs; run++) {
    for (let k = 0; k < x.length; k++) x[k] = 1 / (1 + (k % 7));
    for (let j = 0; j < p; j++) x[w * (lu ? j * m + j : j * m - (j * (j + 1)) / 2 + j)] = 2 * m;
    if (w === 2) for (let j = 0; j < p; j++) x[2 * (lu ? j * m + j : j * m - (j * (j + 1)) / 2 + j) + 1] = 0;
    for (let k = 0; k < m; k++) list[k] = place[k] = k;
    const t = performance.now();
    if (kind === 'cholesky') {
      partialCholesky(kernels, work, x, 0, m, 1, m, p, quiet);
      updateFromCholesky(kernels, work, x, 0, m, 1, m, p, p, c, 0, q, 1, quiet);
    } else if (kind === 'ldlt') {
      const panel = { x, base: 0, m, p, d, e, dAt: 0, list, listAt: 0 };
      const done = partialLdlt(kernels, work, panel, rule, tally, quiet);
      updateFromLdlt(kernels, work, panel, false, done, p, c, 0, q, quiet);
    } else {
      const panel = { x, base: 0, m, p, rowList: list, columnList: list.slice(), listAt: 0, localRow: place };
      const done = partialLu(kernels, work, panel, rule, tally, quiet);
      updateFromLu(kernels, work, panel, done, c, 0, q, quiet);
    }
    best = Math.min(best, (performance.now() - t) / 1000);
  }
  return best;
}

function operations(kind: string, width: number, m: number, p: number): number {
  let sum = 0;
  for (let k = 0; k < p; k++) sum += (m - k) * (m - k);
  return sum * (kind === 'lu' ? 2 : 1) * (width === 2 ? 4 : 1);
}

/** Operations a second of a real Cholesky front of a good size, measured now. */
export function denseRate(): number {
  return operations('cholesky', 1, 1200, 400) / frontSeconds(realKernels, 'cholesky', 1200, 400, 8);
}

/** Prints rates in GFLOP/s by kind and size. */
export function denseTable(): void {
  const sizes: [number, number][] = [
    [20, 8],
    [60, 20],
    [150, 50],
    [400, 150],
    [1200, 400],
    [1000, 1000],
  ];
  console.log(`GFLOP/s of one front      ${sizes.map(([m, p]) => `${m}/${p}`.padStart(10)).join('')}`);
  for (const kernels of [realKernels, complexKernels]) {
    for (const kind of ['cholesky', 'ldlt', 'lu'] as const) {
      const rates = sizes.map(([m, p]) => {
        const runs = Math.max(5, Math.min(3000, Math.ceil(4e8 / operations(kind, kernels.width, m, p))));
        return operations(kind, kernels.width, m, p) / frontSeconds(kernels, kind, m, p, runs) / 1e9;
      });
      const label = `${kernels.width === 1 ? 'real' : 'complex'} ${kind}`.padEnd(26);
      console.log(label + rates.map((r) => r.toFixed(2).padStart(10)).join(''));
    }
  }
}
