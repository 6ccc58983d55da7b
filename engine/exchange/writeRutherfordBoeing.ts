import type { SparseMatrix, Symmetry } from '../matrix/pattern.ts';
import { checkMirrors } from './mirrors.ts';
import { chunked } from './textChunks.ts';

export interface RutherfordBoeingFormat {
  /** 'general' writes all entries; the others one triangle, and the matrix must be exactly so */
  readonly symmetry: Symmetry;
  /** at most 72 characters */
  readonly title?: string;
  /** at most 8 characters */
  readonly key?: string;
}

const ascii = (text: string, size: number) =>
  text
    .replace(/[^\x20-\x7e]/g, '?')
    .slice(0, size)
    .padEnd(size);

/**
 * The Rutherford–Boeing format (Duff, Grimes & Lewis 1997), assembled, 1-based. Real values take 17 significant digits and read back
 * bit for bit.
 * @throws Fault if the matrix is not exactly of the symmetry asked for
 */
export function writeRutherfordBoeing(a: SparseMatrix, f: RutherfordBoeingFormat): Generator<Uint8Array> {
  checkMirrors(a, f.symmetry);
  return chunked(cards(a, f));
}

function* cards(a: SparseMatrix, f: RutherfordBoeingFormat): Generator<string> {
  const half = f.symmetry !== 'general';
  const kept: number[] = [];
  const pointers = [1];
  for (let j = 0; j < a.columns; j++) {
    for (let p = a.columnPointer[j]; p < a.columnPointer[j + 1]; p++) if (!half || a.rowIndex[p] >= j) kept.push(p);
    pointers.push(kept.length + 1);
  }
  const pointerWidth = String(kept.length + 1).length + 1;
  const indexWidth = String(Math.max(1, a.rows)).length + 1;
  const value = valueCards(a);
  const per = { pointer: Math.floor(80 / pointerWidth), index: Math.floor(80 / indexWidth), value: value.per };
  const numbers = kept.length * (a.values === null ? 0 : a.field === 'complex' ? 2 : 1);
  const count = {
    pointer: Math.ceil(pointers.length / per.pointer),
    index: Math.ceil(kept.length / per.index),
    value: a.values === null ? 0 : Math.ceil(numbers / per.value),
  };
  const integers = (...list: number[]) => list.map((x) => String(x).padStart(14)).join('');
  yield ascii(f.title ?? '', 72) + ascii(f.key ?? '', 8);
  yield integers(count.pointer + count.index + count.value, count.pointer, count.index, count.value);
  yield `${typeOf(a, f.symmetry, value.letter)}${' '.repeat(11)}${integers(a.rows, a.columns, kept.length, 0)}`;
  const formats = `(${per.pointer}I${pointerWidth})`.padEnd(16) + `(${per.index}I${indexWidth})`.padEnd(16);
  yield formats + (a.values === null ? '' : value.format.padEnd(20));
  yield* records(pointers.length, per.pointer, (k) => String(pointers[k]).padStart(pointerWidth));
  yield* records(kept.length, per.index, (k) => String(a.rowIndex[kept[k]] + 1).padStart(indexWidth));
  const { values } = a;
  if (values === null) return;
  const width = a.field === 'complex' ? 2 : 1;
  yield* records(numbers, per.value, (k) => value.word(values[kept[Math.floor(k / width)] * width + (k % width)]));
}

function* records(count: number, per: number, word: (k: number) => string): Generator<string> {
  for (let from = 0; from < count; from += per) {
    let line = '';
    for (let k = from; k < Math.min(count, from + per); k++) line += word(k);
    yield line;
  }
}

function typeOf(a: SparseMatrix, symmetry: Symmetry, letter: string): string {
  const kinds = { symmetric: 'S', hermitian: 'H', 'skew-symmetric': 'Z', general: a.rows === a.columns ? 'U' : 'R' };
  return `${letter}${kinds[symmetry]}A`.toLowerCase();
}

/** How values are written: integers where all are and the field says so, else reals with 17 digits. */
function valueCards(a: SparseMatrix): { letter: string; format: string; per: number; word: (v: number) => string } {
  if (a.values === null) return { letter: 'P', format: '', per: 1, word: String };
  if (a.field === 'integer' && a.values.every((v) => Number.isSafeInteger(v))) {
    const word = (v: number) => (Object.is(v, -0) ? '-0' : String(v));
    let width = 2;
    for (const v of a.values) width = Math.max(width, word(v).length + 1);
    const per = Math.max(1, Math.floor(80 / width));
    return { letter: 'I', format: `(${per}I${width})`, per, word: (v) => word(v).padStart(width) };
  }
  const word = (v: number) => {
    if (v - v !== 0) return (Number.isNaN(v) ? 'NaN' : v > 0 ? 'Infinity' : '-Infinity').padStart(26);
    return (Object.is(v, -0) ? `-${(0).toExponential(16)}` : v.toExponential(16)).toUpperCase().padStart(26);
  };
  return { letter: a.field === 'complex' ? 'C' : 'R', format: '(3E26.16E3)', per: 3, word };
}
