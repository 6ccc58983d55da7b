import type { Field } from '../matrix/pattern.ts';

/** A dense block of columns: right-hand sides, solutions. */
export interface Dense {
  readonly rows: number;
  readonly columns: number;
  readonly field: Exclude<Field, 'pattern'>;
  /** column by column; complex interleaved, real part first */
  readonly values: Float64Array;
}
