import { Fault } from '../matrix/fault.ts';
import type { Field, Symmetry } from '../matrix/pattern.ts';
import { decimalEnd, parseDecimal } from './decimal.ts';
import { eachLine, lineText } from './eachLine.ts';
import { finishMatrix } from './finish.ts';
import type { ImportNote, Loaded, ReadProgress } from './loaded.ts';
import { largestOrder, quoted } from './marketHeader.ts';
import { NodeTable } from './nodeTable.ts';
import type { ReadOptions } from './readOptions.ts';
import type { ByteSource } from './source.ts';
import { TripletStore } from './triplets.ts';

/**
 * Reads plain coordinate text: lines of row, column and up to two values, separated by blanks, commas or semicolons; a size line, a
 * Matrix Market banner and a line of column names may stand before. Or a table of node, dof, node, dof, value. Base, columns and
 * size come from the data. Only after the user confirmed (options `banner` or `table`).
 * @throws Fault naming the line.
 */
export async function readCoordinateText(
  source: ByteSource,
  options: ReadOptions,
  progress: ReadProgress,
): Promise<Loaded> {
  const text = new TextReader(source, options);
  const lines = await eachLine(source, progress, (bytes, from, to, line) => {
    text.take(lineText(bytes, from, to), line);
    return true;
  });
  progress(source.packedSize ?? 0, source.packedSize, 'placing entries');
  return text.finish(lines);
}

class TextReader {
  private readonly file: string;
  private readonly options: ReadOptions;
  private readonly notes: ImportNote[] = [];
  private readonly table: NodeTable | null;
  private store: TripletStore | null = null;
  /** fields of a line */
  private width = 0;
  private field: Field = 'real';
  private symmetry: Symmetry;
  private declared: readonly number[] | null = null;
  private declaredLine = 0;
  private line = 0;
  private low = Number.POSITIVE_INFINITY;
  private topRow = 0;
  private topColumn = 0;
  private headed = false;
  /** three integers in the first line: the size if the rest agrees, else an entry */
  private first: readonly string[] | null = null;
  private readonly scratch = new Uint8Array(64);

  constructor(source: ByteSource, options: ReadOptions) {
    this.file = source.name;
    this.options = options;
    this.symmetry = options.storage;
    this.table = options.table === 'node-dof' ? new NodeTable() : null;
  }

  private refuse(code: string, text: string, field?: number): Fault {
    const place = { file: this.file, line: this.line };
    return new Fault(
      'input',
      code,
      `${this.file}, line ${this.line}: ${text}`,
      field === undefined ? place : { ...place, field },
    );
  }

  take(text: string, line: number): void {
    this.line = line;
    const trimmed = text.trim();
    const banner =
      /^%{1,2}matrixmarket\s+matrix\s+coordinate\s+(real|integer|complex|pattern)\s+(general|symmetric|skew-symmetric|hermitian)/i.exec(
        trimmed,
      );
    if (banner !== null && this.store === null && this.first === null) {
      this.field = banner[1].toLowerCase() as Field;
      this.symmetry = banner[2].toLowerCase() as Symmetry;
      return;
    }
    if (trimmed === '' || /^(%|#|\/\/)/.test(trimmed)) return;
    const words = trimmed.split(/\s*[,;]\s*|\s+/);
    if (this.store === null && !this.headed && words.every((w) => !/^[+-]?\.?\d/.test(w))) {
      this.headed = true;
      this.notes.push({ code: 'column-names', text: `Line ${line}: column names were skipped: "${quoted(trimmed)}".` });
      return;
    }
    if (
      this.table === null &&
      this.store === null &&
      this.first === null &&
      words.length === 3 &&
      words.every((w) => /^\d+$/.test(w))
    ) {
      this.first = words;
      this.declaredLine = line;
      return;
    }
    this.entry(words);
  }

  private begin(width: number): TripletStore {
    const wanted = this.table !== null ? [5] : [2, 3, 4];
    if (!wanted.includes(width)) {
      throw this.refuse('field-count', `expected ${wanted.join(', ')} fields, found ${width}.`);
    }
    this.width = width;
    const values = this.table !== null ? 1 : ((width - 2) as 0 | 1 | 2);
    if (values === 0) this.field = 'pattern';
    else if (values === 2) this.field = 'complex';
    else if (this.field === 'pattern' || this.field === 'complex') this.field = 'real';
    this.store = new TripletStore(values, 1024);
    return this.store;
  }

  private entry(words: readonly string[]): void {
    const store = this.store ?? this.begin(words.length);
    if (words.length !== this.width) {
      throw this.refuse('field-count', `expected ${this.width} fields as in the lines before, found ${words.length}.`);
    }
    store.reserve(1);
    const k = store.count++;
    if (this.table !== null) {
      const key = words.slice(0, 4).map((w, f) => this.integer(w, f + 1));
      store.row[k] = this.table.keyOf(key[0], key[1]);
      store.column[k] = this.table.keyOf(key[2], key[3]);
      store.values[k] = this.number(words[4], 5);
      return;
    }
    const i = this.integer(words[0], 1);
    const j = this.integer(words[1], 2);
    if (i > this.topRow) this.topRow = i;
    if (j > this.topColumn) this.topColumn = j;
    if (i < this.low) this.low = i;
    if (j < this.low) this.low = j;
    store.row[k] = i;
    store.column[k] = j;
    for (let w = 0; w < store.width; w++) store.values[k * store.width + w] = this.number(words[2 + w], 3 + w);
  }

  private integer(word: string, field: number): number {
    if (!/^\+?\d+(\.0*)?$/.test(word) || Number(word) > largestOrder) {
      throw this.refuse(
        'bad-index',
        `field ${field} is "${quoted(word)}"; expected an integer from 0 to ${largestOrder}.`,
        field,
      );
    }
    return Number(word);
  }

  private number(word: string, field: number): number {
    const { scratch } = this;
    const size = Math.min(word.length, scratch.length);
    for (let p = 0; p < size; p++) scratch[p] = word.charCodeAt(p) & 255;
    const value = parseDecimal(scratch, 0, size);
    if (decimalEnd === word.length) return value;
    if (/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(word)) return Number(word);
    if (/^[+-]?nan$/i.test(word)) return Number.NaN;
    if (/^[+-]?inf(inity)?$/i.test(word))
      return word.startsWith('-') ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
    throw this.refuse(
      'bad-number',
      `field ${field} is "${quoted(word)}"; expected a number like -1.5 or 2.5e-3.`,
      field,
    );
  }

  finish(lines: number): Loaded {
    this.settleFirst();
    this.line = Math.max(1, lines);
    const { store } = this;
    if (store === null && this.declared === null)
      throw this.refuse('no-entries', 'no entries were found; expected lines of row, column, value.');
    const filled = store ?? this.begin(3);
    const base = this.options.base === 'declared' ? (this.low === 0 ? 0 : 1) : this.options.base;
    const { rows, columns, labels } = this.table === null ? this.numbered(filled, base) : this.table.number(filled);
    if (this.declared !== null && this.declared[2] !== filled.count) this.miscounted(filled.count, this.declared[2]);
    this.notes.push({
      code: 'coordinate-text',
      text:
        this.table === null
          ? `Read as coordinate text with ${this.width} fields a line, counted from ${base}, ${rows} × ${columns}${this.declared === null ? ' by the largest indices' : ' by the size line'}.`
          : `Read as a table of node, dof, node, dof, value: ${rows} pairs of node and dof became rows, in ascending order.`,
    });
    return finishMatrix(filled, {
      file: this.file,
      format: this.table === null ? 'coordinate text' : 'node and dof table',
      rows,
      columns,
      field: this.field,
      symmetry: this.symmetry,
      options: this.options,
      notes: this.notes,
      labels,
      rightHandSides: null,
    });
  }

  /** Decides whether three integers in the first line were the size. */
  private settleFirst(): void {
    if (this.first === null) return;
    const [m, n, count] = this.first.map(Number);
    const others = this.store?.count ?? 0;
    const fits = this.topRow <= m && this.topColumn <= n;
    if (fits && (count === others || this.width !== 3 || (count > others && m === n))) {
      this.declared = [m, n, count];
      return;
    }
    this.line = this.declaredLine;
    this.entry(this.first);
  }

  private miscounted(found: number, declared: number): void {
    const text = `${declared} entries declared in line ${this.declaredLine}, ${found} found.`;
    const option = found < declared ? this.options.incomplete : this.options.surplus;
    if (option === 'refuse') {
      const repair = found < declared ? 'use-incomplete' : 'use-surplus';
      throw new Fault(
        'input',
        found < declared ? 'too-few-entries' : 'surplus-entries',
        `${this.file}, line ${this.line}: ${text} What is there can be used.`,
        { file: this.file, line: this.line },
        [{ id: repair, text: 'Use the entries that are there' }],
      );
    }
    this.notes.push({
      code: found < declared ? 'incomplete' : 'surplus-used',
      text: `${found < declared ? 'Incomplete: ' : ''}${text}`,
    });
  }

  private numbered(store: TripletStore, base: 0 | 1): { rows: number; columns: number; labels: null } {
    if (this.low < base) throw this.refuse('index-out-of-range', `an index is ${this.low}; expected ${base} or more.`);
    for (let e = 0; e < store.count; e++) {
      store.row[e] -= base;
      store.column[e] -= base;
    }
    let rows = this.topRow + 1 - base;
    let columns = this.topColumn + 1 - base;
    if (store.count === 0) rows = columns = 0;
    if (this.declared !== null) {
      const [m, n] = this.declared;
      if (rows > m || columns > n)
        throw this.refuse('index-out-of-range', `indices reach ${rows} × ${columns}, the size line says ${m} × ${n}.`);
      if (m > largestOrder || n > largestOrder)
        throw this.refuse('size-too-large', `${m} × ${n} is more than this program can index.`);
      rows = m;
      columns = n;
    }
    // a table of the stored entries tells the size only by its largest indices: an order far beyond the entries is no matrix of ours
    if (this.declared === null && Math.max(rows, columns) > 1_000_000 + 1000 * store.count) {
      throw this.refuse(
        'size-too-large',
        `the largest index is ${Math.max(rows, columns)}, with only ${store.count} entries; expected row and column numbers.`,
      );
    }
    if (this.symmetry !== 'general' && rows !== columns) rows = columns = Math.max(rows, columns);
    return { rows, columns, labels: null };
  }
}
