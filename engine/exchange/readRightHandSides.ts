import { Fault } from '../matrix/fault.ts';
import type { ReadProgress } from './loaded.ts';
import { readDense } from './readDense.ts';
import type { ByteSource } from './source.ts';

/** Right-hand sides that fit their matrix. */
export interface RightHandSides {
  readonly columns: number;
  /** column by column, one number for each row of the matrix; complex interleaved, real part first */
  readonly values: Float64Array;
  readonly complex: boolean;
  /** what was read, in a sentence, with what is odd about it */
  readonly says: string;
}

/**
 * Reads right-hand sides for a matrix of `rows` rows: any matrix file, or plain text with one row a line. A single line (or a matrix of one
 * row) with a number for each row of the matrix is taken as one column.
 * @throws Fault stating both lengths, or naming the line
 */
export async function readRightHandSides(
  source: ByteSource,
  rows: number,
  progress: ReadProgress,
): Promise<RightHandSides> {
  const b = await readDense(source, undefined, progress);
  const lying = b.rows === 1 && b.columns === rows && rows !== 1;
  const columns = lying ? 1 : b.columns;
  const length = lying ? rows : b.rows;
  if (length !== rows) {
    throw new Fault(
      'input',
      'rhs-length',
      `${source.name}, line 1: the right-hand side has ${length} rows and ${columns} columns, the matrix has ${rows} rows; expected as many rows.`,
      { file: source.name, line: 1 },
    );
  }
  const width = b.field === 'complex' ? 2 : 1;
  let zero = 0;
  let notFinite = 0;
  for (let c = 0; c < columns; c++) {
    let any = false;
    for (let k = c * rows * width; k < (c + 1) * rows * width; k++) {
      const v = b.values[k];
      if (v !== 0) any = true;
      if (v - v !== 0) notFinite++;
    }
    if (!any) zero++;
  }
  const parts = [
    `${source.name}: ${columns === 1 ? 'a right-hand side' : `${columns} right-hand sides`} of ${rows} ${width === 2 ? 'complex ' : ''}numbers`,
    lying && 'given as one row',
    zero > 0 && (columns === 1 ? 'all zero, so the solution is zero' : `${zero} of them all zero`),
    notFinite > 0 && `${notFinite} numbers are NaN or infinite: no solution can be judged`,
  ];
  return { columns, values: b.values, complex: width === 2, says: `${parts.filter((p) => p !== false).join('; ')}.` };
}
