import { Fault } from '../matrix/fault.ts';
import type { Field, Symmetry } from '../matrix/pattern.ts';
import { type CoordinateTarget, readCoordinateLines } from './coordinateLines.ts';
import { decimalEnd, parseDecimal } from './decimal.ts';
import { type LineBlock, lineBlocks } from './lineBlocks.ts';
import type { ImportNote, Loaded } from './loaded.ts';
import { HeaderReader, type MarketHeader, quoted } from './marketHeader.ts';
import { placeTriplets } from './place.ts';
import type { ReadOptions } from './readOptions.ts';
import type { ByteSource } from './source.ts';
import { TripletStore } from './triplets.ts';

/** Told bytes pulled, bytes to pull in all (null if unknown), and what is being done; may throw `Cancelled`. */
export type ReadProgress = (bytes: number, total: number | null, phase: string) => void;

/** Fewest bytes an entry takes: "1 1\n", or "1\n" in an array. */
const leastBytes = { coordinate: 4, array: 2 } as const;

/** Reads Matrix Market text (Boisvert, Pozo & Remington, NISTIR 5935, 1996). @throws Fault of kind "input" or "memory". */
export async function readMatrixMarket(
  source: ByteSource,
  options: ReadOptions,
  progress: ReadProgress,
): Promise<Loaded> {
  const head = new HeaderReader(source.name);
  let reader: BodyReader | null = null;
  let line = 0;
  for await (const block of lineBlocks(source, (bytes) => progress(bytes, source.packedSize, 'reading'))) {
    let at = block.start;
    while (reader === null && at < block.end) {
      const end = lineEnd(block, at);
      const header = head.take(latin1(block.bytes, at, end), ++line);
      at = afterLineEnd(block, end);
      if (header !== null) reader = new BodyReader(source, header, options, line);
    }
    if (reader !== null && at < block.end) reader.take(block.bytes, at, block.end);
  }
  if (reader === null) {
    throw new Fault(
      'input',
      line === 0 ? 'empty-file' : 'no-size-line',
      line === 0
        ? `${source.name} is empty; expected a Matrix Market file.`
        : `${source.name}, line ${line}: the file ends before its size line; expected "rows columns entries".`,
      { file: source.name, line },
    );
  }
  progress(source.packedSize ?? 0, source.packedSize, 'placing entries');
  return reader.finish();
}

function lineEnd(block: LineBlock, from: number): number {
  let p = from;
  while (p < block.end && block.bytes[p] !== 10 && block.bytes[p] !== 13) p++;
  return p;
}

function afterLineEnd(block: LineBlock, end: number): number {
  const crLf = block.bytes[end] === 13 && end + 1 < block.end && block.bytes[end + 1] === 10;
  return Math.min(block.end, end + (crLf ? 2 : 1));
}

function latin1(bytes: Uint8Array, from: number, to: number): string {
  let text = '';
  for (let p = from; p < Math.min(to, from + 4096); p++) text += String.fromCharCode(bytes[p]);
  return text;
}

/** Collects the entries behind the size line. */
class BodyReader implements CoordinateTarget {
  readonly store: TripletStore;
  readonly rows: number;
  readonly columns: number;
  readonly base: 0 | 1;
  readonly limit: number;
  line: number;
  private readonly file: string;
  private readonly header: MarketHeader;
  private readonly options: ReadOptions;
  private readonly field: Field;
  private readonly symmetry: Symmetry;
  private readonly noted = new Map<string, ImportNote>();
  private readonly array: boolean;
  /** place of the next value of an array, column by column */
  private arrayRow = 0;
  private arrayColumn = 0;
  private zeroBased = 0;
  private firstZeroBased = 0;
  private lastLineWhole = true;

  constructor(source: ByteSource, header: MarketHeader, options: ReadOptions, line: number) {
    this.file = source.name;
    this.header = header;
    this.options = options;
    this.line = line;
    this.rows = header.rows;
    this.columns = header.columns;
    this.base = options.base === 0 ? 0 : 1;
    this.array = header.layout === 'array';
    this.field = options.field === 'declared' ? header.field : options.field;
    this.symmetry =
      options.mirror !== 'declared' && this.field === 'complex' && header.symmetry !== 'general'
        ? options.mirror
        : header.symmetry;
    const width = this.field === 'pattern' ? 0 : this.field === 'complex' ? 2 : 1;
    this.limit = options.surplus === 'use' ? Number.POSITIVE_INFINITY : header.entries;
    this.refuseBySize(source, width);
    this.store = new TripletStore(width, header.entries);
    if (this.array && this.symmetry === 'skew-symmetric') this.arrayRow = 1;
  }

  /** Arithmetic from the size line, before anything is allocated. */
  private refuseBySize(source: ByteSource, width: number): void {
    const { entries, layout, sizeLine } = this.header;
    const least = entries * leastBytes[layout];
    if (source.size !== null && least > source.size && this.options.incomplete === 'refuse') {
      throw new Fault(
        'input',
        'declared-too-many',
        `${this.file}, line ${sizeLine}: ${entries} entries are declared, which takes at least ${least} bytes; the file has ${source.size}. It may be cut off. What is there can be read, marked incomplete.`,
        { file: this.file, line: sizeLine },
        [{ id: 'use-incomplete', text: 'Use the entries that are there, marked incomplete' }],
      );
    }
    const expanded = this.symmetry === 'general' ? entries : 2 * entries;
    if (expanded > 2 ** 31 - 1) {
      throw new Fault(
        'memory',
        'too-many-entries',
        `${this.file}, line ${sizeLine}: ${entries} entries (${expanded} after expansion) are more than 2147483647, the most this program can index; they would need about ${expanded * (8 * width + 4)} bytes.`,
        { file: this.file, line: sizeLine },
      );
    }
  }

  take(bytes: Uint8Array, start: number, end: number): void {
    if (this.array) this.takeArray(bytes, start, end);
    else readCoordinateLines(bytes, start, end, this);
    this.lastLineWhole = bytes[end - 1] === 10 || bytes[end - 1] === 13;
  }

  private takeArray(bytes: Uint8Array, start: number, end: number): void {
    let p = start;
    while (p < end) {
      this.line++;
      let q = p;
      while (q < end && bytes[q] !== 10 && bytes[q] !== 13) q++;
      this.arrayLine(bytes, p, q);
      p = q;
      if (p < end && bytes[p] === 13 && p + 1 < end && bytes[p + 1] === 10) p++;
      p++;
    }
  }

  private arrayLine(bytes: Uint8Array, from: number, to: number): void {
    const words = this.words(bytes, from, to);
    if (words === null) return;
    const per = this.store.width === 2 ? 2 : 1;
    if (words.length !== per) {
      const byRows = words.length === this.columns * per;
      throw this.fault(
        byRows ? 'array-by-rows' : 'field-count',
        `expected ${per} number${per === 1 ? '' : 's'} a line in an array file, found ${words.length}.${byRows ? ' Each line seems to hold a row; the format goes column by column.' : ''}`,
      );
    }
    const value = this.number(words[0], 1);
    const imaginary = per === 2 ? this.number(words[1], 2) : 0;
    if (this.store.count >= this.limit) throw this.surplus();
    this.store.reserve(1);
    this.push(this.arrayRow, this.arrayColumn, value, imaginary);
    if (++this.arrayRow === this.rows) {
      this.arrayColumn++;
      this.arrayRow =
        this.symmetry === 'general' ? 0 : this.symmetry === 'skew-symmetric' ? this.arrayColumn + 1 : this.arrayColumn;
    }
  }

  private push(i: number, j: number, re: number, im: number): void {
    const { store } = this;
    const k = store.count++;
    store.row[k] = i;
    store.column[k] = j;
    if (store.width > 0) store.values[k * store.width] = re;
    if (store.width === 2) store.values[2 * k + 1] = im;
  }

  strange(bytes: Uint8Array, from: number, to: number): void {
    const words = this.words(bytes, from, to);
    if (words === null) return;
    const { store } = this;
    const wanted = 2 + store.width;
    let list = words;
    if (list.length === 3 && store.width === 2 && /^\(.*,.*\)$/.test(list[2])) {
      this.note('complex-parentheses', `Line ${this.line}: complex values written as (re,im) were accepted.`);
      list = [list[0], list[1], ...list[2].slice(1, -1).split(',')];
    }
    if (list.length !== wanted) throw this.fieldCount(list);
    if (store.count >= this.limit) throw this.surplus();
    const i = this.index(list[0], 1, this.rows, 'row');
    const j = this.index(list[1], 2, this.columns, 'column');
    const re = store.width > 0 ? this.number(list[2], 3) : 0;
    const im = store.width === 2 ? this.number(list[3], 4) : 0;
    if (i < 0 || j < 0) return;
    store.reserve(1);
    this.push(i, j, re, im);
  }

  /** Words of a line, or null for a comment or a blank line. */
  private words(bytes: Uint8Array, from: number, to: number): string[] | null {
    const text = latin1(bytes, from, to).trim();
    if (text === '') return null;
    if (text.startsWith('%')) {
      this.note('comments-among-entries', `Line ${this.line}: comments among the entries were skipped.`);
      return null;
    }
    return text.split(/\s+/);
  }

  /** 0-based index, or −1 once the line is counted as looking 0-based. */
  private index(word: string, field: number, size: number, what: string): number {
    let text = word;
    if (/^\+?\d+\.0*$/.test(word)) {
      text = word.replace(/\..*$/, '');
      this.note(
        'index-as-decimal',
        `Line ${this.line}: indices written like "${quoted(word)}" were accepted as integers.`,
      );
    }
    if (!/^\+?\d+$/.test(text)) {
      throw this.fault(
        'bad-index',
        `field ${field}, the ${what}, is "${quoted(word)}"; expected an integer from ${this.base} to ${size - 1 + this.base}.`,
        field,
      );
    }
    const value = Number(text) - this.base;
    if (value === -1 && this.base === 1) {
      if (this.zeroBased++ === 0) this.firstZeroBased = this.line;
      return -1;
    }
    if (value >= size) {
      throw this.fault(
        'index-out-of-range',
        `field ${field}, the ${what}, is ${text}; expected ${this.base} to ${size - 1 + this.base}, as the size line declares.`,
        field,
      );
    }
    return value;
  }

  private number(word: string, field: number): number {
    const bytes = Uint8Array.from(word, (c) => c.charCodeAt(0) & 255);
    const value = parseDecimal(bytes, 0, bytes.length);
    if (decimalEnd === bytes.length) return value;
    if (/^[+-]?(nan|inf|infinity)(\(.*\))?$/i.test(word)) {
      return /nan/i.test(word)
        ? Number.NaN
        : word.startsWith('-')
          ? Number.NEGATIVE_INFINITY
          : Number.POSITIVE_INFINITY;
    }
    const hint = /^[+-]?\d+,\d+$/.test(word)
      ? ' A decimal comma is not read; write a point.'
      : /^[+-]?[\d.]+[+-]\d+$/.test(word)
        ? ' An exponent without its letter has two readings here; write E before it.'
        : /[ijIJ]$/.test(word)
          ? ' Write complex values as two numbers, real and imaginary.'
          : '';
    throw this.fault(
      'bad-number',
      `field ${field} is "${quoted(word)}"; expected a number like -1.5 or 2.5e-3.${hint}`,
      field,
    );
  }

  private fieldCount(list: readonly string[]): Fault {
    const kinds = ['pattern', 'real', 'complex'] as const;
    const wanted = 2 + this.store.width;
    const other = kinds[list.length - 2];
    const fits = other !== undefined && this.store.count === 0;
    return this.fault(
      'field-count',
      `expected ${wanted} fields (row, column${this.store.width === 0 ? '' : this.store.width === 1 ? ', value' : ', real and imaginary part'}), found ${list.length}: "${quoted(list.join(' '))}".${fits ? ` These look like ${other} values under a ${this.field} banner.` : ''}`,
      undefined,
      fits ? [{ id: `read-as-${other}`, text: `Read the values as ${other}` }] : [],
    );
  }

  private surplus(): Fault {
    return this.fault(
      'surplus-entries',
      `${this.header.entries} entries are declared, and this is one more. Correct the size line, or use all entries.`,
      undefined,
      [{ id: 'use-surplus', text: 'Use all entries' }],
    );
  }

  private fault(code: string, text: string, field?: number, repairs: Fault['repairs'] = []): Fault {
    const place = field === undefined ? {} : { field };
    return new Fault(
      'input',
      code,
      `${this.file}, line ${this.line}: ${text}`,
      { file: this.file, line: this.line, ...place },
      repairs,
    );
  }

  private note(code: string, text: string): void {
    if (!this.noted.has(code)) this.noted.set(code, { code, text });
  }

  finish(): Loaded {
    const { header, store } = this;
    if (this.zeroBased > 0) throw this.looksZeroBased();
    if (store.count < header.entries) this.incomplete();
    const placed = placeTriplets(store, {
      file: this.file,
      rows: header.rows,
      columns: header.columns,
      field: this.field,
      symmetry: this.symmetry,
      duplicates: this.options.duplicates,
    });
    const values = valueFacts(placed.matrix.values, store.width);
    return {
      name: this.file,
      format: `Matrix Market ${header.layout}`,
      matrix: placed.matrix,
      storedEntries: store.count,
      symmetry: this.symmetry,
      duplicates: placed.duplicates,
      explicitZeros: values?.zeros ?? null,
      notFinite: values?.notFinite ?? 0,
      notes: [...header.notes, ...this.noted.values(), ...placed.notes],
      labels: null,
      rightHandSides: null,
    };
  }

  private looksZeroBased(): Fault {
    const line = this.firstZeroBased;
    return new Fault(
      'input',
      'looks-0-based',
      `${this.file}, line ${line}: an index is 0, below 1 (first of ${this.zeroBased} such line${this.zeroBased === 1 ? '' : 's'}); Matrix Market counts from 1. The file looks 0-based and can be read so.`,
      { file: this.file, line },
      [{ id: 'read-as-0-based', text: 'Read the indices as 0-based' }],
    );
  }

  private incomplete(): void {
    const { header, store } = this;
    const last = this.lastLineWhole ? 'complete' : 'cut';
    const text = `${header.entries} entries declared, ${store.count} found; the file ends in line ${this.line} (last line ${last}).`;
    if (this.options.incomplete === 'refuse') {
      throw new Fault(
        'input',
        'too-few-entries',
        `${this.file}, line ${this.line}: ${text} It may be cut off. What is there can be read, marked incomplete.`,
        { file: this.file, line: this.line },
        [{ id: 'use-incomplete', text: 'Use the entries that are there, marked incomplete' }],
      );
    }
    this.note('incomplete', `Incomplete: ${text}`);
  }
}

/** Exact zeros and values that are NaN or infinite, by entries. */
function valueFacts(values: Float64Array | null, width: number): { zeros: number; notFinite: number } | null {
  if (values === null) return null;
  let zeros = 0;
  let notFinite = 0;
  for (let e = 0; e < values.length; e += width) {
    const re = values[e];
    const im = values[e + width - 1];
    if (re === 0 && im === 0) zeros++;
    if (!Number.isFinite(re) || !Number.isFinite(im)) notFinite++;
  }
  return { zeros, notFinite };
}
