import type { Loaded } from './loaded.ts';
import { type ReadProgress, readMatrixMarket } from './matrixMarket.ts';
import type { ReadOptions } from './readOptions.ts';
import type { ByteSource } from './source.ts';

/** Reads a matrix in any known format, recognised by its content. @throws Fault with place, reason and repairs. */
export async function readMatrix(source: ByteSource, options: ReadOptions, progress: ReadProgress): Promise<Loaded> {
  return readMatrixMarket(source, options, progress);
}
