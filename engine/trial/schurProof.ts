import { Fault } from '../matrix/fault.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { FrontFactor } from '../numeric/fronts/frontFactor.ts';
import type { SchurComplement } from '../numeric/fronts/schur.ts';
import type { PivotReport } from '../numeric/solver.ts';
import type { TrialContext } from './context.ts';
import { factorizeTrial, type ProofOptions } from './proof.ts';
import type { TrialResult } from './result.ts';

/** The Schur complement onto the held-last unknowns, and what its run showed. */
export interface SchurRun {
  readonly complement: SchurComplement;
  readonly report: PivotReport;
  readonly seconds: number;
  readonly notes: readonly string[];
}

/**
 * Eliminates everything but the held-last unknowns.
 * @param failures pivots that fail at the boundary are appended to the complement, or replaced and counted (static pivoting)
 * @throws Fault "no-held-unknowns"; what `factorizeTrial` throws
 */
export function schurOfTrial(
  context: TrialContext,
  trial: TrialResult,
  failures: 'append' | 'perturb' = 'append',
  options: Pick<ProofOptions, 'memoryLimit'> = {},
  progress: Progress = noProgress,
): SchurRun {
  const held = context.input.heldLast?.length ?? 0;
  if (held === 0) {
    throw new Fault(
      'input',
      'no-held-unknowns',
      'A Schur complement is onto unknowns that are held last, and none are: name them.',
    );
  }
  const pivoting = failures === 'perturb' ? ('static' as const) : trial.choice.pivoting;
  const started = performance.now();
  const { solver } = factorizeTrial(
    context,
    { ...trial, choice: { ...trial.choice, pivoting } },
    options,
    progress,
    held,
  );
  if (!(solver instanceof FrontFactor) || solver.schur === null) throw new Error('held unknowns were eliminated');
  const { schur: complement, report } = solver;
  const notes = [
    complement.appended === 0
      ? 'Every other unknown found an acceptable pivot.'
      : `${complement.appended} further unknowns found no acceptable pivot among the eliminated ones and were appended to the complement.`,
  ];
  if (report.counts.perturbed > 0) {
    notes.push(`${report.counts.perturbed} pivots were replaced: the complement is that of a matrix nearby.`);
  }
  return { complement, report, seconds: (performance.now() - started) / 1000, notes };
}
