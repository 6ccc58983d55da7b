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
}

const head = (r: ScriptRequest): string[] => [
  '#!/usr/bin/env python3',
  '"""Reproduces the forecast of an ordering with NumPy and SciPy.',
  '',
  `Matrix       ${r.matrixFile}`,
  `Ordering     ${r.ordering}, from ${r.orderFile} (0-based, new-to-old: order[k] is the original unknown at position k)`,
  `Factorization ${r.factorization}`,
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
];

/** Values are replaced, so that no entry cancels and no pivot moves: what is compared is the structure alone. */
const symmetricBody = (r: ScriptRequest): string[] => [
  '',
  '# the pattern of A + A^T + I with seeded random, symmetric, diagonally dominant values',
  'pattern = sp.csc_matrix((np.ones(matrix.nnz), matrix.indices, matrix.indptr), shape=matrix.shape)',
  'pattern = sp.tril(pattern + pattern.T, -1, format="coo")',
  'random = np.random.default_rng(1)',
  'value = -random.uniform(0.5, 1.0, pattern.nnz)',
  'half = sp.coo_matrix((value, (pattern.row, pattern.col)), shape=(n, n)).tocsc()',
  'off = half + half.T',
  'dominant = off + sp.diags(np.asarray(abs(off).sum(axis=1)).ravel() + 1.0)',
  '',
  '# (P A P^T)(k,l) = A(order[k], order[l])',
  'permuted = sp.csc_matrix(dominant)[order, :][:, order].tocsc()',
  'lu = splu(permuted, permc_spec="NATURAL", diag_pivot_thresh=0.0, relax=1, options={"SymmetricMode": True})',
  'assert (lu.perm_r == np.arange(n)).all() and (lu.perm_c == np.arange(n)).all(), "the library moved rows or columns"',
  `forecast = ${r.factorEntries}`,
  'print("entries of L, diagonal included: found %d, forecast %d" % (lu.L.nnz, forecast))',
  'assert lu.L.nnz == forecast, "the forecast is not reproduced"',
];

const columnBody = (r: ScriptRequest): string[] => [
  '',
  '# columns in the planned order; rows are chosen by partial pivoting, so the count depends on the values',
  'lu = splu(matrix[:, order].tocsc(), permc_spec="NATURAL")',
  'found = lu.L.nnz + lu.U.nnz - n',
  `low, high = ${r.range === null ? '0, float("inf")' : r.range.join(', ')}`,
  'print("entries of L + U, one diagonal: found %d, forecast range %s ... %s" % (found, low, high))',
  'assert low <= found <= high, "outside the forecast range"',
];

/** A ready script: loads the matrix and the order, factorizes, and compares the entries with the forecast; fails if they differ. */
export function pythonScript(r: ScriptRequest): string {
  const body = r.factorization === 'column-lu' ? columnBody(r) : symmetricBody(r);
  return `${[...head(r), ...body].join('\n')}\n`;
}
