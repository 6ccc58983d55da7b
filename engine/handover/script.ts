import type { FactorizationName } from '../trial/choice.ts';

export interface ScriptRequest {
  /** name of the Matrix Market file the script is to load */
  readonly matrixFile: string;
  /** name of the permutation file: plain text, 0-based, new-to-old, comment lines starting with % */
  readonly orderFile: string;
  readonly factorization: FactorizationName;
  readonly ordering: string;
  /** forecast nnz(L), diagonal counted once (static structure on A + Aᵀ); for column-lu the entries of L + U − n */
  readonly factorEntries: number;
  /** proven range of the factor entries, for column-lu */
  readonly range: readonly [number, number] | null;
  /** row at each position, plain text, 0-based, where rows are moved before ordering; absent: rows as columns */
  readonly rowOrderFile?: string | null;
  /** first position of each diagonal block, increasing from 0; absent or null: one block */
  readonly blockStart?: Int32Array | null;
}

const head = (r: ScriptRequest): string[] => [
  '#!/usr/bin/env python3',
  '"""Reproduces the forecast of an ordering with NumPy and SciPy.',
  '',
  `Matrix       ${r.matrixFile}`,
  `Ordering     ${r.ordering}, from ${r.orderFile} (0-based, new-to-old: order[k] is the original unknown at position k)`,
  `Factorization ${r.factorization}`,
  ...(r.rowOrderFile ? [`Rows         ${r.rowOrderFile} (0-based: the original row at each position)`] : []),
  '"""',
  'import sys',
  'import numpy as np',
  'import scipy.io',
  'import scipy.sparse as sp',
  'from scipy.sparse.linalg import splu',
  '',
  `matrix = sp.csc_matrix(scipy.io.mmread(sys.argv[1] if len(sys.argv) > 1 else ${JSON.stringify(r.matrixFile)}))`,
  `order = np.loadtxt(sys.argv[2] if len(sys.argv) > 2 else ${JSON.stringify(r.orderFile)}, comments="%", dtype=int, ndmin=1)`,
  'n = matrix.shape[1]',
  'assert sorted(order) == list(range(n)), "the order file does not hold each of 0 ... n-1 once"',
  ...(r.rowOrderFile
    ? [
        `rows = np.loadtxt(sys.argv[3] if len(sys.argv) > 3 else ${JSON.stringify(r.rowOrderFile)}, comments="%", dtype=int, ndmin=1)`,
        'assert sorted(rows) == list(range(n)), "the row order file does not hold each of 0 ... n-1 once"',
      ]
    : ['rows = order']),
  ...blockLines(r),
];

/** Position -> diagonal block. */
function blockLines({ blockStart }: ScriptRequest): string[] {
  if (blockStart === undefined || blockStart === null || blockStart.length <= 2)
    return ['block = np.zeros(n, dtype=int)'];
  const lines: string[] = [];
  for (let from = 0; from < blockStart.length - 1; from += 12) {
    lines.push(`    ${[...blockStart.subarray(from, Math.min(blockStart.length - 1, from + 12))].join(', ')},`);
  }
  return [
    '# first position of each diagonal block of the block triangular form; what lies outside them is not factorized',
    'starts = np.array([',
    ...lines,
    '])',
    'block = np.searchsorted(starts, np.arange(n), side="right")',
  ];
}

/** Values are replaced, so that no entry cancels and no pivot moves: what is compared is the structure alone. */
const symmetricBody = (r: ScriptRequest): string[] => [
  '',
  '# (P A Q)(k,l) = A(rows[k], order[l]), inside the diagonal blocks',
  'matrix = sp.csc_matrix((np.ones(matrix.nnz), matrix.indices, matrix.indptr), shape=matrix.shape)',
  'placed = sp.coo_matrix(matrix[rows, :][:, order])',
  'inside = block[placed.row] == block[placed.col]',
  'pattern = sp.csc_matrix((placed.data[inside], (placed.row[inside], placed.col[inside])), shape=(n, n))',
  '',
  '# the pattern of A + A^T + I with seeded random, symmetric, diagonally dominant values',
  'pattern = sp.tril(pattern + pattern.T, -1, format="coo")',
  'random = np.random.default_rng(1)',
  'value = -random.uniform(0.5, 1.0, pattern.nnz)',
  'half = sp.coo_matrix((value, (pattern.row, pattern.col)), shape=(n, n)).tocsc()',
  'off = half + half.T',
  'dominant = sp.csc_matrix(off + sp.diags(np.asarray(abs(off).sum(axis=1)).ravel() + 1.0))',
  '',
  'lu = splu(dominant, permc_spec="NATURAL", diag_pivot_thresh=0.0, relax=1, options={"SymmetricMode": True})',
  'assert (lu.perm_r == np.arange(n)).all() and (lu.perm_c == np.arange(n)).all(), "the library moved rows or columns"',
  `forecast = ${r.factorEntries}`,
  'print("entries of L, diagonal included: found %d, forecast %d" % (lu.L.nnz, forecast))',
  'assert lu.L.nnz == forecast, "the forecast is not reproduced"',
];

const columnBody = (r: ScriptRequest): string[] => [
  '',
  '# columns in the planned order; rows are chosen by partial pivoting, so the count depends on the values',
  'lu = splu(sp.csc_matrix(matrix[rows, :][:, order]), permc_spec="NATURAL", relax=1)',
  '# the library may postorder the columns: block by the column that stands at each position',
  'at = np.empty(n, dtype=int)',
  'at[lu.perm_c] = block',
  'found = -n',
  'for factor in (sp.coo_matrix(lu.L), sp.coo_matrix(lu.U)):',
  '    found += np.count_nonzero((factor.data != 0) & (at[factor.row] == at[factor.col]))',
  `low, high = ${r.range === null ? '0, float("inf")' : r.range.join(', ')}`,
  'print("entries of L + U, one diagonal: found %d, forecast range %s ... %s" % (found, low, high))',
  'assert found <= high, "above the forecast range"',
  'if found < low:',
  '    print("below the range: entries cancelled to exact zeros")',
];

/** A ready script: loads the matrix and the order, factorizes, and compares the entries with the forecast; fails if they differ. */
export function pythonScript(r: ScriptRequest): string {
  const body = r.factorization === 'column-lu' ? columnBody(r) : symmetricBody(r);
  return `${[...head(r), ...body].join('\n')}\n`;
}
