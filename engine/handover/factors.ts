import { inUnit } from '../forecast/limits.ts';
import { Fault } from '../matrix/fault.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import type { Progress } from '../matrix/progress.ts';
import { exportFactors } from '../numeric/column/export.ts';
import { extractFactors } from '../numeric/fronts/extract.ts';
import { FrontFactor } from '../numeric/fronts/frontFactor.ts';
import type { TrialContext } from '../trial/context.ts';
import { factorizeTrial } from '../trial/proof.ts';
import type { TrialResult } from '../trial/result.ts';
import { whyNoProof } from '../trial/rules.ts';

/** Numeric factors as matrices over positions: P·R·A·C·Q = L·U + F, P·S·A·S·Pᵀ = L·Lᴴ or L·D·Lᵀ. */
export interface HandedFactors {
  /** new-to-old: the pivots in the order of elimination, after interchanges and delays */
  readonly rowOrder: NewToOld;
  readonly columnOrder: NewToOld;
  readonly lower: SparseMatrix;
  readonly diagonal: SparseMatrix | null;
  readonly upper: SparseMatrix | null;
  /** entries above the diagonal blocks of a block triangular form; null for one block */
  readonly offDiagonal: SparseMatrix | null;
}

/** memory an entry takes while it is taken out of the fronts and written: lists, triplets and the sorted matrix */
const bytesAnEntry = 96;
/** characters of an entry as text, about */
const textAnEntry = 40;

/** Memory that handing over the factors takes beside the run, bytes; the text itself comes in chunks. */
export function factorsNeed(trial: TrialResult): number {
  return (trial.counts.factorEntries ?? 0) * bytesAnEntry;
}

/** Why factors cannot be handed over here, in a sentence with the figures; null where they can. */
export function whyNoFactors(context: TrialContext, trial: TrialResult, limit: number): string | null {
  const why = whyNoProof(context.facts, trial.choice);
  if (why !== null) return why;
  const need = factorsNeed(trial);
  if (need <= limit) return null;
  const entries = trial.counts.factorEntries ?? 0;
  return `The factors have ${entries.toLocaleString('en-US')} entries: about ${inUnit(entries * textAnEntry)} of text, and ${inUnit(need)} of memory to write them; the limit is ${inUnit(limit)}. The solver makes them again from the matrix, the order and the sheet.`;
}

/**
 * Runs the factorization and takes its factors out.
 * @param limit bytes that taking them out may use
 * @throws Fault "factors-too-large" with the figures, before anything is allocated; the faults of the run
 */
export function handedFactors(
  context: TrialContext,
  trial: TrialResult,
  limit: number,
  memoryLimit: number,
  progress: Progress,
): HandedFactors {
  const why = whyNoFactors(context, trial, limit);
  if (why !== null) throw new Fault('memory', 'factors-too-large', why);
  const { solver } = factorizeTrial(context, trial, { memoryLimit }, progress);
  if (solver instanceof FrontFactor) {
    return { ...extractFactors(solver.factors), offDiagonal: null };
  }
  const { factors } = solver;
  const { lower, upper, offDiagonal } = exportFactors(factors);
  return {
    rowOrder: factors.rowOrder,
    columnOrder: factors.columnOrder,
    lower,
    diagonal: null,
    upper,
    offDiagonal: factors.blockStart.length > 2 ? offDiagonal : null,
  };
}
