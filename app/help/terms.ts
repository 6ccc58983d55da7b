/**
 * Each term of the page explained where it stands, with the convention that goes with it. Definitions as everywhere in the program.
 */
export const terms = {
  entries: 'Stored nonzeros after symmetric expansion and summing of duplicates. A stored zero is an entry.',
  ordering:
    'The method that renumbers the unknowns before elimination. order[k] = i means that position k holds the original unknown i: (P A Pᵀ)(k,l) = A(order[k], order[l]).',
  factorization:
    'Cholesky A = L·Lᵀ for symmetric (hermitian) positive definite; LDLᵀ for symmetric indefinite; LU on fronts of the pattern of A + Aᵀ; column LU column by column with row interchanges.',
  'factor entries':
    'nnz(L) for Cholesky and LDLᵀ, diagonal counted once; nnz(L) + nnz(U) − n for LU. Padding of supernodes is never inside.',
  'fill-in': 'Entries of the factors that are not entries of the permuted matrix.',
  'fill ratio':
    'Factor entries divided by the entries of the matrix that the factors replace (for Cholesky and LDLᵀ its lower triangle).',
  operations:
    'Additions, multiplications, divisions and square roots of the numeric factorization, each counted one; complex ones as the real ones they take.',
  'factor bytes': 'Compressed columns of the factors at the widths of your target: values, indices, column pointers.',
  'peak bytes':
    'High-water mark of a multifrontal run: factors so far, stack of contribution blocks, and the front in work.',
  'largest front': 'Most entries in one column of L: the order of the largest dense matrix in the work.',
  'tree height': 'Unknowns on the longest path of the elimination tree: what must be done one after the other.',
  bandwidth: 'Largest |i − j| over the entries after the requested reordering.',
  envelope:
    'Sum over rows of the distance from the first entry of A + Aᵀ to the diagonal, after the requested reordering.',
  'forecast time':
    'Modelled: operations and bytes at the rates of your target, on all its cores as far as the tree allows. A figure to compare trials by, no promise.',
  'total time':
    'Ordering and analysis once, then the factorizations and solves of your workload, at the rates of your target.',
  'ordering time':
    'Wall-clock seconds of this ordering in this browser. Seconds in a browser are not seconds of your solver; ratios travel.',
  'critical path':
    'Operations on the longest way from a leaf of the assembly tree to its root, each front whole: what cannot be done side by side. Exact until a pivot is delayed.',
  'at most faster':
    'Operations divided by those on the critical path of the assembly tree: no number of cores can gain more.',
  'backward error': '‖b − A·x‖∞ / (‖A‖∞‖x‖∞ + ‖b‖∞) of the solution that was returned.',
  proof:
    'A real factorization and solve in this page. Green: normwise backward error ≤ 1e-12, componentwise ≤ 1e-10 and at least one trusted digit. Red: normwise > 1e-8 or anything not finite.',
  pivoting:
    'None: pivots are taken in order. Threshold: a pivot must be at least u times the largest candidate. Static: small pivots are replaced and the solution refined.',
  threshold: 'u between 0 and 1. Larger is safer and fills more; LDLᵀ allows at most 0.5.',
  scaling:
    'None, equilibration of rows and columns (Ruiz), or the scaling that comes with large-entry matching. R and C of P·R·A·C·Q = L·U, in the original numbering.',
  matching:
    'Brings one entry of each row to the diagonal before ordering: any entries that do (structural), or large ones.',
  blocks: 'Block triangular form first: only the diagonal blocks are factorized.',
  'held last': 'Unknowns kept at the end in one block, in the given order, for a Schur complement.',
  seed: 'Start of the random choices. Same input, same options, same seed: same result in any browser.',
  workload: 'How many factorizations with this pattern, and how many right-hand sides for each.',
  target: 'The machine you will really run on.',
} as const;

export type TermName = keyof typeof terms;
