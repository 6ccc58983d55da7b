import type { Proof } from '../../engine/trial/proof.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { Reuse } from '../../engine/trial/reuse.ts';
import type { SweepRow } from '../../engine/trial/sweep.ts';
import type { MatrixKey } from './protocol.ts';

/** How a proof is to be made. */
export interface ProofWish {
  /** most refinement steps */
  readonly refine: number;
  /** factors kept in this precision */
  readonly precision: 'double' | 'single';
  /** solves with the transpose of A */
  readonly transposed: boolean;
  /** of the random right-hand sides */
  readonly seed: number;
  /** right-hand sides that came with the matrix are solved too */
  readonly given: boolean;
}

/** The numeric run that is asked for: refused if its forecast passes the memory limit (bytes). */
export interface ProofAsk {
  readonly key: MatrixKey;
  readonly result: TrialResult;
  readonly heldLast: Int32Array;
  readonly wish: ProofWish;
  readonly memoryLimit: number;
}

/** A Schur complement for the page: its facts, and the whole of it as a file. */
export interface SchurAnswer {
  readonly size: number;
  readonly appended: number;
  /** original rows, 0-based */
  readonly rows: Int32Array;
  readonly complex: boolean;
  /** the first rows and columns, column by column; complex interleaved */
  readonly corner: { readonly size: number; readonly values: Float64Array };
  readonly file: Blob;
  readonly seconds: number;
  readonly notes: readonly string[];
}

/** What the proof panel asks of a worker. */
export interface ProofOperations {
  /** the numeric run of a finished trial */
  prove: { ask: ProofAsk; answer: Proof; early: never };
  /** the same with every pivot threshold and with static pivoting */
  sweep: { ask: ProofAsk; answer: readonly SweepRow[]; early: never };
  /** the matrix `second` on the analysis made for `key` */
  reuse: { ask: ProofAsk & { second: MatrixKey }; answer: Reuse; early: never };
  /** the Schur complement onto the unknowns held last */
  schur: { ask: ProofAsk & { failures: 'append' | 'perturb' }; answer: SchurAnswer; early: never };
}
