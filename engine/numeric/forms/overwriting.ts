/** Widths in bytes of a stored layout. */
export interface StoredWidths {
  /** 8 real, 16 complex, half of it in single precision */
  readonly value: number;
  readonly index: number;
  readonly pointer: number;
}

/** What keeping the factors in the storage of A saves, and what it costs. Bytes are exact for compressed columns. */
export interface OverwritingReport {
  /** A beside its factors */
  readonly separateBytes: number;
  /** one array of places for both: those of A hold the factors, those of fill-in are added */
  readonly overwrittenBytes: number;
  /** separateBytes − overwrittenBytes */
  readonly savedBytes: number;
  /** savedBytes / separateBytes, 0 for an empty matrix */
  readonly savedShare: number;
  /** places of the factors that are no entries of A */
  readonly fillEntries: number;
  /** what is lost with A, in a sentence */
  readonly price: string;
}

/**
 * Overwriting A by its factors. The unit diagonal is not stored, so L and U together have one place for every entry of their
 * joint pattern (nnz(L) + nnz(U) − n); each entry of the permuted A is one of them. For a dense A they are its own n² places, and
 * overwriting saves one matrix out of two; for a sparse one fill-in needs places that A does not have, and only A's own share is
 * saved. The places of A must already be where the factors want them: a static structure without interchanges, or fronts.
 *
 * @param n order
 * @param entries entries of A (after expansion)
 * @param factorEntries nnz(L) + nnz(U) − n for LU; nnz(L) for a symmetric factorization
 * @param symmetric Cholesky or LDLᵀ: one triangle of A and one factor are stored
 * @param diagonalEntries entries of A on its diagonal; an absent one is fill
 */
export function overwritingReport(
  n: number,
  entries: number,
  factorEntries: number,
  symmetric: boolean,
  diagonalEntries: number,
  widths: StoredWidths,
): OverwritingReport {
  const own = symmetric ? (entries - diagonalEntries) / 2 + diagonalEntries : entries;
  const place = widths.value + widths.index;
  const pointers = widths.pointer * (n + 1);
  // L and U are two sets of compressed columns, a symmetric factor is one
  const factorBytes = place * factorEntries + (symmetric ? 1 : 2) * pointers;
  const matrixBytes = place * own + pointers;
  const separateBytes = factorBytes + matrixBytes;
  return {
    separateBytes,
    overwrittenBytes: factorBytes,
    savedBytes: matrixBytes,
    savedShare: separateBytes === 0 ? 0 : matrixBytes / separateBytes,
    fillEntries: factorEntries - own,
    price:
      'A is gone: no residual, no refinement and no verdict without reading it again, and no refactorization from the same values.',
  };
}
