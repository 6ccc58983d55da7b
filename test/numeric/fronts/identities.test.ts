import { describe, expect, it } from 'vitest';
import type { SparseMatrix } from '../../../engine/matrix/pattern.ts';
import { extractFactors } from '../../../engine/numeric/fronts/extract.ts';
import type { FrontFactor } from '../../../engine/numeric/fronts/frontFactor.ts';
import type { FrontOptions } from '../../../engine/numeric/fronts/options.ts';
import { randomOrder } from '../../support/random.ts';
import {
  type Dense,
  dense,
  factorized,
  multiply,
  randomVector,
  type Shape,
  shaped,
  transposed,
  zeros,
} from './support.ts';

/**
 * The identities the factors stand for, entry by entry: |P·R·A·C·Q − L·U| ≤ c·n·ε·(|L|·|U|) (Higham 2002, ch. 9; for LDLᵀ with
 * threshold pivots ch. 11, where |L|·|D|·|Lᵀ| takes its place).
 */
function permutedScaled(a: SparseMatrix, rows: Int32Array, columns: Int32Array, o: FrontOptions): Dense {
  const d = dense(a);
  const n = d.n;
  const out = zeros(n);
  for (let l = 0; l < n; l++) {
    for (let k = 0; k < n; k++) {
      const right = o.kind === 'lu' ? o.columnScale : o.rowScale;
      const f = (o.rowScale?.[rows[k]] ?? 1) * (right?.[columns[l]] ?? 1);
      out.re[l * n + k] = f * d.re[columns[l] * n + rows[k]];
      out.im[l * n + k] = f * d.im[columns[l] * n + rows[k]];
    }
  }
  return out;
}

function moduli(a: Dense): Dense {
  const out = zeros(a.n);
  for (let q = 0; q < out.re.length; q++) out.re[q] = Math.hypot(a.re[q], a.im[q]);
  return out;
}

/** Largest |difference| / (|L|·|U| + |A|) over all entries. */
function defect(a: SparseMatrix, factor: FrontFactor, o: FrontOptions): number {
  const e = extractFactors(factor.factors);
  const conjugate = a.field === 'complex' && (o.kind === 'cholesky' || o.hermitian === true);
  const lower = dense(e.lower);
  const middle = e.diagonal === null ? lower : multiply(lower, dense(e.diagonal)).product;
  const right = e.upper === null ? transposed(lower, conjugate) : dense(e.upper);
  const { product } = multiply(middle, right);
  const sizes = e.diagonal === null ? moduli(lower) : multiply(moduli(lower), moduli(dense(e.diagonal))).product;
  const bound = multiply(sizes, moduli(right)).product.re;
  const target = permutedScaled(a, e.rowOrder, e.columnOrder, o);
  let worst = 0;
  for (let q = 0; q < product.re.length; q++) {
    const difference = Math.hypot(product.re[q] - target.re[q], product.im[q] - target.im[q]);
    const size = bound[q] + Math.hypot(target.re[q], target.im[q]);
    if (difference > 0) worst = Math.max(worst, difference / size);
  }
  return worst;
}

function largestOffDiagonal(a: SparseMatrix): number {
  const d = dense(a);
  let most = 0;
  for (let j = 0; j < d.n; j++) {
    for (let i = 0; i < d.n; i++) if (i !== j) most = Math.max(most, Math.hypot(d.re[j * d.n + i], d.im[j * d.n + i]));
  }
  return most;
}

const cases: { shape: Shape; kind: 'cholesky' | 'ldlt' | 'lu'; hermitian: boolean }[] = [
  { shape: 'definite', kind: 'cholesky', hermitian: true },
  { shape: 'definite', kind: 'ldlt', hermitian: true },
  { shape: 'definite', kind: 'lu', hermitian: false },
  { shape: 'symmetric', kind: 'ldlt', hermitian: false },
  { shape: 'hermitian', kind: 'ldlt', hermitian: true },
  { shape: 'saddle', kind: 'ldlt', hermitian: false },
  { shape: 'saddle', kind: 'lu', hermitian: false },
  { shape: 'general', kind: 'lu', hermitian: false },
  { shape: 'shifted', kind: 'lu', hermitian: false },
];

describe.each([false, true])('complex: %s', (complex) => {
  describe.each(cases)('$shape by $kind', ({ shape, kind, hermitian }) => {
    it.each([11, 12, 13, 14, 15, 16])(
      'factors multiply to the permuted, scaled matrix, multipliers bounded, seed %i',
      (seed) => {
        const n = 20 + 9 * (seed - 10);
        const a = shaped(shape, n, complex, seed);
        const threshold = [0.5, 0.1, 0.01][seed % 3];
        const scaled = seed % 2 === 0;
        const options: FrontOptions = {
          kind,
          pivoting: 'threshold',
          threshold,
          hermitian,
          ...(scaled
            ? {
                rowScale: randomVector(n, seed + 1).map((v) => 1.5 + v),
                columnScale: randomVector(n, seed + 2).map((v) => 1.5 + v),
              }
            : {}),
        };
        const order = randomOrder(n, seed + 3);
        const factor = factorized(a, order, options, seed % 2 === 0 ? 0.3 : 0);
        expect(defect(a, factor, options)).toBeLessThan(4 * n * 2 ** -53);
        if (kind === 'cholesky') return;
        expect(largestOffDiagonal(extractFactors(factor.factors).lower)).toBeLessThanOrEqual(
          (1 / threshold) * (1 + 1e-12),
        );
      },
    );
  });
});

describe('the defect itself', () => {
  it('sees one changed entry of L', () => {
    const a = shaped('definite', 30, false, 5);
    const options: FrontOptions = { kind: 'cholesky', pivoting: 'none' };
    const factor = factorized(a, randomOrder(30, 6), options);
    expect(defect(a, factor, options)).toBeLessThan(1e-14);
    factor.factors.chunks[0][factor.factors.panelAt[3]] *= 1 + 1e-9;
    expect(defect(a, factor, options)).toBeGreaterThan(1e-11);
  });
});
