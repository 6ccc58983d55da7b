import { Fault } from '../matrix/fault.ts';
import { readCoordinateText } from './coordinateText.ts';
import { refuseForeign, refuseWithoutBanner } from './foreign.ts';
import type { Loaded, ReadProgress } from './loaded.ts';
import { located } from './locate.ts';
import { readMatrixMarket } from './matrixMarket.ts';
import type { ReadOptions } from './readOptions.ts';
import { recognise } from './recognise.ts';
import { readRutherfordBoeing } from './rutherfordBoeing.ts';
import { type ByteSource, firstBytes } from './source.ts';

export type { ReadProgress } from './loaded.ts';

/** Reads a matrix in any known format, recognised by its content. @throws Fault with place, reason and repairs. */
export async function readMatrix(source: ByteSource, options: ReadOptions, progress: ReadProgress): Promise<Loaded> {
  try {
    return await readKind(source, options, progress);
  } catch (thrown) {
    if (thrown instanceof Fault) throw await located(thrown, source);
    if (thrown instanceof RangeError && /array|buffer|length|allocation/i.test(thrown.message))
      throw noRoom(source.name);
    throw thrown;
  }
}

function noRoom(file: string): Fault {
  return new Fault(
    'memory',
    'no-memory',
    `${file}, byte 0: the matrix does not fit in the memory that is left; close other matrices, or use the command line on a larger machine.`,
    { file, byteOffset: 0 },
  );
}

async function readKind(source: ByteSource, options: ReadOptions, progress: ReadProgress): Promise<Loaded> {
  const { head, whole } = await firstBytes(source, 1 << 16);
  const { kind, what } = recognise(head, source.name);
  switch (kind) {
    case 'empty':
      throw new Fault(
        'input',
        'empty-file',
        `${source.name}, byte 0: the file is empty; expected a matrix in text form.`,
        {
          file: source.name,
          byteOffset: 0,
        },
      );
    case 'matrix-market':
      return options.banner === 'none'
        ? readCoordinateText(whole, options, progress)
        : readMatrixMarket(whole, options, progress);
    case 'harwell-boeing':
    case 'rutherford-boeing':
      return readRutherfordBoeing(whole, options, progress);
    case 'foreign':
      throw refuseForeign(source.name, what);
    default:
      if (options.banner === 'none' || options.table !== 'refuse') return readCoordinateText(whole, options, progress);
      throw refuseWithoutBanner(source.name, head, kind);
  }
}
