/**
 * What every factorization of the numeric room offers, whichever way it was made: fronts or columns, real or complex.
 */

/** A factorized square matrix that can solve. All vectors are in the original numbering, scalings and permutations inside. */
export interface Solver {
  /** number of unknowns */
  readonly size: number;
  /** whether the factors are complex; then every vector is interleaved, real part first (2 · size doubles a column) */
  readonly complex: boolean;
  /** what the run showed about its pivots and its cost */
  readonly report: PivotReport;
  /**
   * Overwrites b with x of A·x = b, without refinement.
   * @param x right-hand sides, column after column: size · columns doubles, twice that when `complex`.
   */
  solveInPlace(x: Float64Array, columns: number): void;
  /** Overwrites b with x of Aᵀ·x = b (transposed, not conjugated). Layout as in `solveInPlace`. */
  solveTransposedInPlace(x: Float64Array, columns: number): void;
}

/** How often something other than the planned pivot was taken. */
export interface PivotCounts {
  /** pivots whose row is not the row of their column (after a matching: not the matched row) */
  readonly offDiagonal: number;
  /** pivots handed to a parent front because they failed the threshold, each counted once a front it left */
  readonly delayed: number;
  /** pivots of order two, each counted once (they take two columns) */
  readonly twoByTwo: number;
  /** pivots that were too small and were replaced; > 0 makes the determinant and the inertia unknown */
  readonly perturbed: number;
}

/** A pivot with its address. Of a 2×2 pivot: its two eigenvalues or, complex symmetric, the root of its determinant. */
export interface PivotPlace {
  /** modulus */
  readonly modulus: number;
  /** original row, 0-based */
  readonly row: number;
  /** original column, 0-based */
  readonly column: number;
}

/** Facts of one numeric run. Counts that can pass 2³¹ are exact doubles. */
export interface PivotReport {
  readonly counts: PivotCounts;
  /** pivot of smallest modulus, in the scaled matrix; null for an empty matrix */
  readonly smallestPivot: PivotPlace | null;
  /** pivot of largest modulus, in the scaled matrix; null for an empty matrix */
  readonly largestPivot: PivotPlace | null;
  /** [positive, negative, zero] by Sylvester's law; null for LU, complex symmetric LDLᵀ and perturbed pivots */
  readonly inertia: readonly [number, number, number] | null;
  /** log|det A|, scalings taken out again; null with perturbed pivots or a held-last block */
  readonly logAbsDeterminant: number | null;
  /** sign of the determinant as [re, im] of modulus one ([±1, 0] when real); null where the logarithm is */
  readonly determinantSign: readonly [number, number] | null;
  /** LU: max|U| / max|P·R·A·C·Q|; LDLᵀ and Cholesky: largest entry of any reduced matrix / largest of S·A·S; null if not measured */
  readonly pivotGrowth: number | null;
  /** nnz of the factors by the house convention (diagonal counted once), without padding */
  readonly factorEntries: number;
  /** entries held with amalgamation padding, same convention; equals `factorEntries` where nothing is padded */
  readonly storedFactorEntries: number;
  /** operations the run executed, padding included, assembly not, 2×2 extra work not; in real operations when complex */
  readonly executedOperations: number;
  /** extra operations of 2×2 pivots */
  readonly twoByTwoOperations: number;
  /** high-water mark of the bytes in arrays the engine allocated for the run: factors, stack, front workspace, index lists */
  readonly peakBytes: number;
  /** what else is worth showing: "stack grown from 1.2e6 to 2.4e6 entries by 14 delayed pivots" */
  readonly notes: readonly string[];
}

/**
 * Solves with complex right-hand sides whatever the factors are: with real factors, real and imaginary parts are solved side by side.
 * @param x interleaved, 2 · size · columns doubles, overwritten.
 */
export function solveComplexInPlace(solver: Solver, x: Float64Array, columns: number, transposed = false): void {
  const solve = (v: Float64Array, k: number) =>
    transposed ? solver.solveTransposedInPlace(v, k) : solver.solveInPlace(v, k);
  if (solver.complex) {
    solve(x, columns);
    return;
  }
  const n = solver.size;
  const parts = new Float64Array(2 * n);
  for (let c = 0; c < columns; c++) {
    const base = 2 * n * c;
    for (let i = 0; i < n; i++) {
      parts[i] = x[base + 2 * i];
      parts[n + i] = x[base + 2 * i + 1];
    }
    solve(parts, 2);
    for (let i = 0; i < n; i++) {
      x[base + 2 * i] = parts[i];
      x[base + 2 * i + 1] = parts[n + i];
    }
  }
}
