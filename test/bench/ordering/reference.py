#!/usr/bin/env python3
"""Reference side of the ordering benchmark: SciPy on one Matrix Market file.
reference.py FILE.mtx [COLUMN-ORDER.txt]   prints one JSON object:
  reverse-cuthill-mckee: seconds, bandwidth (of A + A^T)
  multiple-minimum-degree: seconds (an upper bound, from an incomplete LU), order in FILE.mmd (0-based, new-to-old)
  with a column order: entries of L + U of splu on A Q in natural order, and of its own column ordering (square, n at most 40000)
"""
import json, sys, time, warnings
import numpy as np, scipy.io, scipy.sparse as sp, scipy.sparse.linalg as sl
from scipy.sparse.csgraph import reverse_cuthill_mckee

warnings.simplefilter("ignore")
a = sp.csr_matrix(scipy.io.mmread(sys.argv[1]))
n = a.shape[0]
p = sp.csr_matrix((np.ones(a.nnz), a.indices, a.indptr), shape=a.shape)
out = {}
t = time.perf_counter()
s = ((p + p.T) > 0).astype(float).tocsr()
order = reverse_cuthill_mckee(s, symmetric_mode=True)
seconds = time.perf_counter() - t
place = np.empty(n, dtype=np.int64)
place[order] = np.arange(n)
coo = s.tocoo()
out["reverse-cuthill-mckee"] = {"seconds": seconds, "bandwidth": int(np.max(np.abs(place[coo.row] - place[coo.col]))) if coo.nnz else 0}
s = s.tolil()
s.setdiag(0)
s = s.tocsc()
s.eliminate_zeros()
dominant = (sp.diags(np.asarray(s.sum(0)).ravel() + 1) - s).tocsc()
t = time.perf_counter()
f = sl.spilu(dominant, drop_tol=0.5, fill_factor=1, permc_spec="MMD_AT_PLUS_A", diag_pivot_thresh=0.0, options=dict(SymmetricMode=True))
out["multiple-minimum-degree"] = {"seconds": time.perf_counter() - t}
np.savetxt(sys.argv[1] + ".mmd", np.argsort(f.perm_c), fmt="%d")
if len(sys.argv) > 2 and n <= 40000:
    q = np.loadtxt(sys.argv[2], dtype=np.int64)
    values = np.random.default_rng(1).uniform(0.5, 1.5, a.nnz) * np.random.default_rng(2).choice([-1, 1], a.nnz)
    c = sp.csc_matrix((values, a.indices, a.indptr), shape=a.shape) if sp.issparse(a) and a.format == "csc" else sp.csr_matrix((values, a.indices, a.indptr), shape=a.shape).tocsc()
    try:
        t = time.perf_counter()
        own = sl.splu(c, permc_spec="COLAMD")
        own_seconds = time.perf_counter() - t
        given = sl.splu(c[:, q].tocsc(), permc_spec="NATURAL")
        out["column"] = {"own": int(own.L.nnz + own.U.nnz), "given": int(given.L.nnz + given.U.nnz), "ownSeconds": own_seconds}
    except RuntimeError as error:
        out["column"] = {"reason": str(error)}
print(json.dumps(out))
