/** Short ways to read a text and to look at what came out. */
import type { Loaded } from '../../engine/exchange/loaded.ts';
import { readMatrix } from '../../engine/exchange/read.ts';
import { applyRepair, defaultReadOptions } from '../../engine/exchange/readOptions.ts';
import { bytesSource } from '../../engine/exchange/source.ts';
import { checkMatrix } from '../../engine/matrix/check.ts';
import { Fault } from '../../engine/matrix/fault.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';

/** Reads with the repairs named; the result passed the invariant checker. */
export async function load(
  text: string | Uint8Array,
  repairs: readonly string[] = [],
  chunk = 1 << 20,
): Promise<Loaded> {
  const bytes = typeof text === 'string' ? new TextEncoder().encode(text) : text;
  const options = repairs.reduce(applyRepair, defaultReadOptions);
  const loaded = await readMatrix(bytesSource('m.mtx', bytes, chunk), options, () => {});
  checkMatrix(loaded.matrix);
  return loaded;
}

/** The refusal; it names a line, a byte or a member. */
export async function faultOf(text: string | Uint8Array, repairs: readonly string[] = []): Promise<Fault> {
  try {
    await load(text, repairs);
  } catch (thrown) {
    if (!(thrown instanceof Fault)) throw thrown;
    if (!/\bline \d+|\bbyte \d+|\bmember /.test(thrown.message)) throw new Error(`no place in "${thrown.message}"`);
    return thrown;
  }
  throw new Error('nothing was refused');
}

export const codes = (loaded: Loaded): string[] =>
  loaded.notes.map((n) => n.code).filter((c) => c !== 'explicit-zeros');
export const note = (loaded: Loaded, code: string): string => loaded.notes.find((n) => n.code === code)?.text ?? '';

/** Rows of real parts; what is not stored is 0. */
export function dense(a: SparseMatrix): number[][] {
  const out = Array.from({ length: a.rows }, () => new Array<number>(a.columns).fill(0));
  const width = a.field === 'complex' ? 2 : 1;
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) {
      out[a.rowIndex[p]][j] = a.values === null ? 1 : a.values[p * width];
    }
  }
  return out;
}
