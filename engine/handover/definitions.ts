/** What the words of the papers mean, and the conventions that must never be left unsaid. */
export const definitions: readonly (readonly [string, string])[] = [
  ['entries', 'stored nonzeros after symmetric expansion and summing of duplicates; a stored zero is an entry'],
  [
    'permutation',
    'order is new-to-old: order[k] = i means that position k holds the original unknown i, so (P A Pᵀ)(k,l) = A(order[k], order[l]); position is its inverse, old-to-new',
  ],
  ['fill-in', 'entries of the factors that are not entries of the permuted matrix'],
  [
    'factor entries',
    'nnz(L) for Cholesky and LDLᵀ, diagonal counted once; nnz(L) + nnz(U) − n for LU; an absent diagonal counts as fill; padding of supernodes is never inside',
  ],
  [
    'operations',
    'floating-point additions, multiplications, divisions and square roots of the factorization, each counted one; complex ones as the real ones they take',
  ],
  ['factor bytes', '(value width + index width) · entries + pointer width · (n + 1) for each factor'],
  [
    'peak memory',
    'high-water mark of factors so far, the stack of contribution blocks and the front in work, at the widths of the target',
  ],
  ['largest front', 'most entries in one column of L, before padding'],
  ['tree height', 'unknowns on the longest path of the elimination tree'],
  [
    'LU',
    'P·R·A·C·Q = L·U, L with unit diagonal; scalings R and C are diagonal, in the original numbering; P the row order, Q the column order',
  ],
  [
    'backward error',
    'normwise ‖b − A·x‖∞ / (‖A‖∞‖x‖∞ + ‖b‖∞); componentwise by Oettli and Prager, with the denominators of Arioli, Demmel and Duff where they vanish',
  ],
  ['GiB', '2³⁰ bytes'],
];
