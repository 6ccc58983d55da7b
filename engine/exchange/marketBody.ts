import { Fault, type Repair } from '../matrix/fault.ts';
import type { Field, Symmetry } from '../matrix/pattern.ts';
import { ArrayCursor } from './arrayCursor.ts';
import type { ColumnCount } from './coordinateCount.ts';
import { type CoordinateTarget, readCoordinateLines } from './coordinateLines.ts';
import { overflows, underflows } from './decimal.ts';
import type { DirectPlace } from './directPlace.ts';
import { lineText } from './eachLine.ts';
import { type FinishRequest, finishMatrix, finishPlaced } from './finish.ts';
import type { ImportNote, Loaded } from './loaded.ts';
import { type MarketHeader, quoted } from './marketHeader.ts';
import { numberHint, wordNumber } from './marketWords.ts';
import { noteDuplicates, noteUpper } from './place.ts';
import type { ReadOptions } from './readOptions.ts';
import type { ByteSource } from './source.ts';
import { TripletStore } from './triplets.ts';

/** Fewest bytes an entry takes: "1 1\n", or "1\n" in an array. */
const leastBytes = { coordinate: 4, array: 2 } as const;
/** entries made room for at once where the file's size does not vouch for their number */
const trusted = 2 ** 28;

export function baseOf(options: ReadOptions): 0 | 1 {
  return options.base === 0 ? 0 : 1;
}

/** The symmetry a file is read with. */
export function symmetryRead(header: MarketHeader, options: ReadOptions): Symmetry {
  const field = options.field === 'declared' ? header.field : options.field;
  if (options.mirror === 'general') return 'general';
  const choose = options.mirror !== 'declared' && field === 'complex' && header.symmetry !== 'general';
  return choose
    ? options.mirror
    : header.symmetry === 'hermitian' && field !== 'complex'
      ? 'symmetric'
      : header.symmetry;
}

/** Collects the entries behind the size line. */
export class MarketBody implements CoordinateTarget {
  readonly store: TripletStore;
  readonly rows: number;
  readonly columns: number;
  readonly base: 0 | 1;
  readonly strictDiagonal: boolean;
  limit: number;
  line: number;
  private readonly file: string;
  private readonly header: MarketHeader;
  private readonly options: ReadOptions;
  private readonly field: Field;
  private readonly symmetry: Symmetry;
  private readonly direct: DirectPlace | null;
  private readonly array: ArrayCursor | null;
  private readonly noted = new Map<string, ImportNote>();
  private readonly underflowsBefore = underflows;
  private readonly overflowsBefore = overflows;
  private zeroLines = 0;
  private firstZeroLine = 0;
  private reachesTop = false;
  /** the first line with another number of fields, and whether all entry lines so far agree with it */
  private other: { readonly line: number; readonly words: readonly string[]; agreed: boolean } | null = null;
  private lastLineWhole = true;

  constructor(
    source: ByteSource,
    header: MarketHeader,
    options: ReadOptions,
    line: number,
    direct: DirectPlace | null,
  ) {
    this.file = source.name;
    this.header = header;
    this.options = options;
    this.line = line;
    this.rows = header.rows;
    this.columns = header.columns;
    this.base = baseOf(options);
    this.field = options.field === 'declared' ? header.field : options.field;
    this.symmetry = symmetryRead(header, options);
    this.strictDiagonal = this.symmetry === 'hermitian' || this.symmetry === 'skew-symmetric';
    this.direct = direct;
    this.array = header.layout === 'array' ? new ArrayCursor(header, this.symmetry, options.arrayBy) : null;
    const width = this.field === 'pattern' ? 0 : this.field === 'complex' ? 2 : 1;
    this.limit = options.surplus === 'use' && this.array === null ? Number.POSITIVE_INFINITY : header.entries;
    this.refuseBySize(source, width);
    const known = source.size !== null && header.entries * leastBytes[header.layout] <= source.size;
    const room = known || header.entries <= trusted ? header.entries : 2 ** 20;
    this.store = new TripletStore(
      width,
      direct !== null || options.incomplete === 'use' ? Math.min(room, 2 ** 16) : room,
    );
  }

  /** Arithmetic from the size line, before anything is allocated. */
  private refuseBySize(source: ByteSource, width: number): void {
    const { entries, layout, sizeLine } = this.header;
    const least = entries * leastBytes[layout];
    const place = { file: this.file, line: sizeLine };
    if (source.size !== null && least > source.size && this.options.incomplete === 'refuse') {
      throw new Fault(
        'input',
        'declared-too-many',
        `${this.file}, line ${sizeLine}: ${entries} entries are declared, which takes at least ${least} bytes; the file has ${source.size}. It may be cut off. What is there can be read, marked incomplete.`,
        place,
        [useIncomplete],
      );
    }
    const expanded = this.symmetry === 'general' ? entries : 2 * entries;
    if (expanded > 2 ** 31 - 1) {
      throw new Fault(
        'memory',
        'too-many-entries',
        `${this.file}, line ${sizeLine}: ${entries} entries (${expanded} after expansion) are more than 2147483647, the most this program can index; they would need about ${expanded * (8 * width + 4)} bytes.`,
        place,
      );
    }
  }

  take(bytes: Uint8Array, start: number, end: number): void {
    if (this.array !== null) this.takeArray(bytes, start, end);
    else readCoordinateLines(bytes, start, end, this);
    this.lastLineWhole = bytes[end - 1] === 10 || bytes[end - 1] === 13;
    if (this.direct !== null) {
      this.limit -= this.store.count;
      this.direct.take(this.store);
    }
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
    const text = this.content(bytes, from, to);
    if (text === null) return;
    const words = text.split(/\s+/);
    const cursor = this.array as ArrayCursor;
    const per = this.store.width === 2 ? 2 : 1;
    const byRows = words.length === this.columns * per && this.columns > 1 && this.symmetry === 'general';
    if (words.length !== per && !(this.options.arrayBy === 'rows' && words.length % per === 0)) {
      throw this.fault(
        byRows ? 'array-by-rows' : 'field-count',
        `expected ${per} number${per === 1 ? '' : 's'} a line in an array file, found ${words.length}.${byRows ? ' Each line seems to hold a row; the format goes column by column. It can be read row by row.' : ''}`,
        undefined,
        byRows ? [{ id: 'read-by-rows', text: 'Read row by row, several values a line' }] : [],
      );
    }
    for (let w = 0; w < words.length; w += per) {
      const value = this.number(words[w], w + 1);
      const imaginary = per === 2 ? this.number(words[w + 1], w + 2) : 0;
      if (this.store.count >= this.limit) throw this.surplus([]);
      if (cursor.row === cursor.column) this.checkDiagonal(value, imaginary, cursor.row);
      this.push(cursor.row, cursor.column, value, imaginary);
      cursor.advance();
    }
  }

  private push(i: number, j: number, re: number, im: number): void {
    const { store } = this;
    store.reserve(1);
    const k = store.count++;
    store.row[k] = i;
    store.column[k] = j;
    if (store.width > 0) store.values[k * store.width] = re;
    if (store.width === 2) store.values[2 * k + 1] = im;
  }

  strange(bytes: Uint8Array, from: number, to: number): void {
    const text = this.content(bytes, from, to);
    if (text === null) return;
    const { store } = this;
    let list = text.split(/\s+/);
    const pair = store.width === 2 ? /^(\S+)\s+(\S+)\s+\(\s*([^\s,()]+)\s*,\s*([^\s,()]+)\s*\)$/.exec(text) : null;
    if (pair !== null) {
      this.note('complex-parentheses', `Line ${this.line}: complex values written as (re,im) were accepted.`);
      list = pair.slice(1);
    }
    if (list.length !== 2 + store.width) {
      this.otherFields(list);
      return;
    }
    if (this.other !== null) this.other.agreed = false;
    if (store.count >= this.limit) throw this.surplus([{ id: 'use-surplus', text: 'Use all entries' }]);
    const i = this.index(list[0], 1, this.rows, 'row');
    const j = this.index(list[1], 2, this.columns, 'column');
    const re = store.width > 0 ? this.number(list[2], 3) : 0;
    const im = store.width === 2 ? this.number(list[3], 4) : 0;
    if (i < 0 || j < 0) {
      if (this.zeroLines++ === 0) this.firstZeroLine = this.line;
      if (i === this.rows - 1 || j === this.columns - 1) this.reachesTop = true;
      return;
    }
    if (i === j) this.checkDiagonal(re, im, i);
    this.push(i, j, re, im);
  }

  /** Skew-symmetric: the diagonal must be zero. Hermitian: it must be real. */
  private checkDiagonal(re: number, im: number, i: number): void {
    if (this.symmetry === 'skew-symmetric' && (re !== 0 || im !== 0)) {
      throw this.fault(
        'skew-diagonal',
        `the banner says skew-symmetric, but the diagonal entry ${i + this.base} is ${re}${im === 0 ? '' : ` + ${im}i`}; expected zero. Declare the file general, or leave the diagonal out.`,
      );
    }
    if (this.symmetry === 'hermitian' && im !== 0) {
      throw this.fault(
        'hermitian-diagonal',
        `the banner says hermitian, but the diagonal entry (${i + 1}, ${i + 1}) has the imaginary part ${im}; expected 0. If the matrix is complex symmetric, read it so.`,
        undefined,
        [{ id: 'read-as-symmetric', text: 'Read as complex symmetric' }],
      );
    }
  }

  /** The text of a line, or null for a comment or a blank line. */
  private content(bytes: Uint8Array, from: number, to: number): string | null {
    if (this.array === null && to - from > 4096) {
      throw this.fault('line-too-long', `the line has ${to - from} bytes; expected a row, a column and a value.`);
    }
    let text = '';
    for (let at = from; at < to; at += 4096) text += lineText(bytes, at, to);
    text = text.trim();
    if (text === '') return null;
    if (text.startsWith('%')) {
      this.note('comments-among-entries', `Line ${this.line}: comments among the entries were skipped.`);
      return null;
    }
    return text;
  }

  /** 0-based index, or −1 for an index 0 in a file that should count from 1. */
  private index(word: string, field: number, size: number, what: string): number {
    let text = word;
    if (/^\+?\d+\.0*$/.test(word)) {
      text = word.replace(/\..*$/, '');
      this.note(
        'index-as-decimal',
        `Line ${this.line}: indices written like "${quoted(word)}" were accepted as integers.`,
      );
    }
    const range = `${this.base} to ${size - 1 + this.base}`;
    if (!/^\+?\d+$/.test(text)) {
      throw this.fault(
        'bad-index',
        `field ${field}, the ${what}, is "${quoted(word)}"; expected an integer from ${range}.`,
        field,
      );
    }
    const value = Number(text) - this.base;
    if (value === -1 && this.base === 1) return -1;
    if (value >= size) {
      throw this.fault(
        'index-out-of-range',
        `field ${field}, the ${what}, is ${quoted(text)}; expected ${range}, as the size line declares.`,
        field,
      );
    }
    return value;
  }

  private number(word: string, field: number): number {
    const value = wordNumber(word);
    if (value !== undefined) return value;
    const expected = 'expected a number like -1.5 or 2.5e-3.';
    throw this.fault('bad-number', `field ${field} is "${quoted(word)}"; ${expected}${numberHint(word)}`, field);
  }

  /** A line with another number of fields than the banner asks for: refused, at once or once it is known whether all lines agree. */
  private otherFields(words: readonly string[]): void {
    const kind = ['pattern', 'real', 'complex'][words.length - 2];
    const numeric = words.every((w) => wordNumber(w) !== undefined);
    if (this.other === null) {
      this.other = {
        line: this.line,
        words,
        agreed: kind !== undefined && numeric && this.store.count === 0 && this.direct === null,
      };
    } else if (words.length !== this.other.words.length || !numeric) this.other.agreed = false;
    if (!this.other.agreed) throw this.fieldCount();
  }

  private fieldCount(): Fault {
    const { line, words, agreed } = this.other as NonNullable<typeof this.other>;
    const wanted = 2 + this.store.width;
    const names = ['row, column', 'row, column, value', 'row, column, real and imaginary part'][this.store.width];
    const kind = ['pattern', 'real', 'complex'][words.length - 2];
    const all = agreed && this.store.count === 0;
    const hint = words.length > 2 ? numberHint(words[words.length - 1]) : '';
    return new Fault(
      'input',
      'field-count',
      `${this.file}, line ${line}: expected ${wanted} fields (${names}), found ${words.length}: "${quoted(words.join(' '))}".${all ? ` These look like ${kind} values under a ${this.field} banner, in every line.` : hint}`,
      { file: this.file, line },
      all ? [{ id: `read-as-${kind}`, text: `Read the file as ${kind}` }] : [],
    );
  }

  private surplus(repairs: readonly Repair[]): Fault {
    return this.fault(
      'surplus-entries',
      `${this.header.entries} entries are declared, and this is one more. Correct the size line${repairs.length > 0 ? ', or use all entries' : ''}.`,
      undefined,
      repairs,
    );
  }

  private fault(code: string, text: string, field?: number, repairs: readonly Repair[] = []): Fault {
    const { file, line } = this;
    return new Fault(
      'input',
      code,
      `${file}, line ${line}: ${text}`,
      field === undefined ? { file, line } : { file, line, field },
      repairs,
    );
  }

  private note(code: string, text: string): void {
    if (!this.noted.has(code)) this.noted.set(code, { code, text });
  }

  finish(count: ColumnCount | null): Loaded {
    if (this.other !== null) throw this.fieldCount();
    if (this.zeroLines > 0) throw this.looksZeroBased();
    const stored = this.direct?.stored ?? this.store.count;
    this.settleCount(stored);
    this.noteNumbers();
    this.noteReading();
    const r: FinishRequest = {
      file: this.file,
      format: `Matrix Market ${this.header.layout}`,
      rows: this.rows,
      columns: this.columns,
      field: this.field,
      symmetry: this.symmetry,
      options: this.options,
      notes: [...this.header.notes, ...this.noted.values()],
      labels: null,
      rightHandSides: null,
    };
    if (this.direct === null || count === null) return finishMatrix(this.store, r);
    const notes = [...r.notes];
    if (count.above > 0) noteUpper(this.symmetry, notes);
    const { duplicates, ...c } = this.direct.finish(this.options.duplicates);
    noteDuplicates({ ...c, duplicates }, this.options.duplicates, notes);
    const { columnPointer, rowIndex } = c;
    const values = this.field === 'pattern' ? null : c.values;
    const { rows, columns, field } = this;
    return finishPlaced({ rows, columns, columnPointer, rowIndex, field, values }, stored, duplicates, { ...r, notes });
  }

  /** Where the file was read in another way than it declares. */
  private noteReading(): void {
    const { header, options } = this;
    const said: string[] = [];
    if (options.base === 0) said.push('indices counted from 0');
    if (this.symmetry !== header.symmetry) said.push(`${this.symmetry} instead of ${header.symmetry}`);
    if (this.field !== header.field) said.push(`${this.field} instead of ${header.field}`);
    if (this.array !== null && options.arrayBy === 'rows') said.push('row by row instead of column by column');
    if (said.length > 0) this.note('read-otherwise', `Read on request as: ${said.join('; ')}.`);
  }

  /** Numbers that a double cannot hold. */
  private noteNumbers(): void {
    const under = underflows - this.underflowsBefore;
    const over = overflows - this.overflowsBefore;
    if (under > 0)
      this.note('underflow', `${under} values are too small for a double and became 0; they stay in the pattern.`);
    if (over > 0) this.note('overflow', `${over} values are too large for a double and became infinite.`);
  }

  private looksZeroBased(): Fault {
    const { store } = this;
    let top = this.reachesTop;
    for (let e = 0; e < store.count && !top; e++)
      top = store.row[e] === this.rows - 1 || store.column[e] === this.columns - 1;
    // with base 0 the largest index is one below the size, so an index equal to the size speaks against it
    const line = this.firstZeroLine;
    const lines = `first of ${this.zeroLines} such line${this.zeroLines === 1 ? '' : 's'}`;
    return new Fault(
      'input',
      top ? 'index-out-of-range' : 'looks-0-based',
      `${this.file}, line ${line}: an index is 0, below 1 (${lines}); Matrix Market counts from 1. ${top ? 'Other indices equal the declared size, so the file is not 0-based either; expected 1 or more.' : 'The file looks 0-based and can be read so.'}`,
      { file: this.file, line },
      top ? [] : [{ id: 'read-as-0-based', text: 'Read the indices as 0-based' }],
    );
  }

  private settleCount(stored: number): void {
    const { entries } = this.header;
    if (stored > entries) this.note('surplus-used', `${entries} entries declared, ${stored} found; all were used.`);
    if (stored >= entries) return;
    const last = this.lastLineWhole ? 'complete' : 'cut';
    const text = `${entries} entries declared, ${stored} found; the file ends in line ${this.line} (last line ${last}).`;
    if (this.options.incomplete === 'refuse') {
      throw this.fault(
        'too-few-entries',
        `${text} It may be cut off. What is there can be read, marked incomplete.`,
        undefined,
        [useIncomplete],
      );
    }
    this.note('incomplete', `Incomplete: ${text}`);
  }
}

const useIncomplete: Repair = { id: 'use-incomplete', text: 'Use the entries that are there, marked incomplete' };
