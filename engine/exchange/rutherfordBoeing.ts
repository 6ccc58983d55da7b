import { Fault, type Repair } from '../matrix/fault.ts';
import type { Field, Symmetry } from '../matrix/pattern.ts';
import { eachLine, lineText } from './eachLine.ts';
import { finishMatrix } from './finish.ts';
import { type FortranField, parseFortranFormat, readFortranField } from './fortranFormat.ts';
import type { ImportNote, Loaded, ReadProgress } from './loaded.ts';
import { largestOrder, quoted } from './marketHeader.ts';
import type { ReadOptions } from './readOptions.ts';
import type { ByteSource } from './source.ts';
import { TripletStore } from './triplets.ts';

/**
 * Reads assembled matrices in the Harwell–Boeing format (Duff, Grimes & Lewis 1989) and its successor, the Rutherford–Boeing format
 * (1997): cards of fixed Fortran fields, pointers, row indices, values, right-hand sides. Indices in the file are 1-based.
 * @throws Fault naming the line.
 */
export async function readRutherfordBoeing(
  source: ByteSource,
  options: ReadOptions,
  progress: ReadProgress,
): Promise<Loaded> {
  const cards = new CardReader(source);
  const lines = await eachLine(source, progress, (bytes, from, to, line) => cards.take(bytes, from, to, line));
  return cards.finish(lines, options, progress);
}

/** A run of numbers under one format. */
interface Section {
  readonly what: string;
  readonly fields: readonly FortranField[];
  readonly count: number;
  readonly put: (k: number, value: number) => void;
}

const fieldOf: Readonly<Record<string, Field>> = { R: 'real', C: 'complex', P: 'pattern', I: 'integer' };
const symmetryOf: Readonly<Record<string, Symmetry>> = {
  S: 'symmetric',
  U: 'general',
  H: 'hermitian',
  Z: 'skew-symmetric',
  R: 'general',
};

class CardReader {
  private readonly source: ByteSource;
  private readonly file: string;
  private readonly notes: ImportNote[] = [];
  private readonly sections: Section[] = [];
  private section = 0;
  private done = 0;
  private line = 0;
  private format = 'Harwell–Boeing';
  private title = '';
  private rhsCards = 0;
  private field: Field = 'real';
  private symmetry: Symmetry = 'general';
  private rows = 0;
  private columns = 0;
  private entries = 0;
  private formats: (readonly FortranField[])[] = [];
  private pointers = new Float64Array(0);
  private store = new TripletStore(0, 0);
  private column = 0;
  private rhs: { columns: number; values: Float64Array } | null = null;

  constructor(source: ByteSource) {
    this.source = source;
    this.file = source.name;
  }

  take(bytes: Uint8Array, from: number, to: number, line: number): boolean {
    this.line = line;
    if (line === 1) this.title = lineText(bytes, from, to).slice(0, 72).trim();
    else if (line === 2) this.counts(lineText(bytes, from, to));
    else if (line === 3) this.kind(lineText(bytes, from, to));
    else if (line === 4) this.formatLine(lineText(bytes, from, to));
    else if (line === 5 && this.rhsCards > 0) this.rightHandSideLine(lineText(bytes, from, to));
    else this.card(bytes, from, to);
    return line < 4 || (line === 4 && this.rhsCards > 0) || this.section < this.sections.length;
  }

  private refuse(code: string, text: string, field?: number, repairs: readonly Repair[] = []): Fault {
    return new Fault(
      'input',
      code,
      `${this.file}, line ${this.line}: ${text}`,
      field === undefined ? { file: this.file, line: this.line } : { file: this.file, line: this.line, field },
      repairs,
    );
  }

  private counts(text: string): void {
    const words = text.trim().split(/\s+/);
    if (words.length < 3 || words.length > 5 || words.some((w) => !/^\d+$/.test(w))) {
      throw this.refuse('bad-card-counts', `expected the counts of lines (4 or 5 integers), found "${quoted(text)}".`);
    }
    if (words.length < 5) this.format = 'Rutherford–Boeing';
    this.rhsCards = words.length === 5 ? Number(words[4]) : 0;
  }

  private kind(text: string): void {
    const type = text.slice(0, 3).toUpperCase();
    const numbers = text.slice(3).trim().split(/\s+/);
    if (!/^[RCPIQ][SUHZR][AE]$/.test(type) || numbers.length < 3 || numbers.some((w) => !/^\d+$/.test(w))) {
      throw this.refuse(
        'bad-matrix-type',
        `expected a matrix type like RSA and rows, columns, entries; found "${quoted(text)}".`,
      );
    }
    if (type[2] === 'E' || type[0] === 'Q') {
      throw this.refuse(
        'not-assembled',
        `the type ${type} is ${type[2] === 'E' ? 'an unassembled (elemental) matrix' : 'kept in auxiliary files'}; expected an assembled one, like RSA or RUA. Assemble it and write it again.`,
      );
    }
    [this.rows, this.columns, this.entries] = numbers.map(Number);
    if (Math.max(this.rows, this.columns) > largestOrder || this.entries > 2 ** 30) {
      throw this.refuse(
        'size-too-large',
        `${numbers.slice(0, 3).join(', ')} rows, columns, entries are more than this program can index.`,
      );
    }
    this.field = fieldOf[type[0]];
    this.symmetry = symmetryOf[type[1]];
    if (this.symmetry !== 'general' && this.rows !== this.columns) {
      throw this.refuse(
        'symmetric-not-square',
        `the type ${type} is ${this.symmetry}, but the size is ${this.rows} × ${this.columns}; expected a square one.`,
      );
    }
    if (this.symmetry === 'hermitian' && this.field !== 'complex') {
      this.symmetry = 'symmetric';
      this.notes.push({
        code: 'hermitian-real',
        text: `Type ${type}: hermitian without complex values was read as symmetric.`,
      });
    }
  }

  private formatLine(text: string): void {
    const words = text.match(/\((?:[^()]|\([^()]*\))*\)/g) ?? [];
    const wanted = 2 + (this.field === 'pattern' ? 0 : 1) + (this.rhsCards > 0 ? 1 : 0);
    if (words.length < Math.min(wanted, 2 + (this.field === 'pattern' ? 0 : 1))) {
      throw this.refuse(
        'bad-formats',
        `expected ${wanted} Fortran formats like (16I5) (4E20.12), found "${quoted(text)}".`,
      );
    }
    this.formats = words.map((word, k) => {
      const parsed = parseFortranFormat(word);
      if (parsed === null || (k < 2 && parsed.some((f) => !f.integer))) {
        throw this.refuse(
          'bad-formats',
          `the Fortran format "${quoted(word)}" was not understood; expected one like ${k < 2 ? '(16I5)' : '(4E20.12)'}.`,
          k + 1,
        );
      }
      return parsed;
    });
    this.checkBytes();
    const width = this.field === 'pattern' ? 0 : this.field === 'complex' ? 2 : 1;
    const { entries } = this;
    this.pointers = new Float64Array(this.columns + 1);
    this.store = new TripletStore(width, entries);
    const { store } = this;
    this.add('pointer', this.formats[0], this.columns + 1, (k, value) => this.pointer(k, value));
    this.add('row index', this.formats[1], entries, (k, value) => this.rowIndex(k, value));
    if (width > 0) {
      this.add('value', this.formats[2], entries * width, (k, value) => {
        store.values[k] = value;
      });
    }
  }

  /** Arithmetic before allocation: every number takes its field, and blanks at the end of a line may be missing but for one. */
  private checkBytes(): void {
    const { size } = this.source;
    if (size === null) return;
    const least = this.entries + this.columns;
    if (least > size) {
      throw this.refuse(
        'declared-too-many',
        `${this.columns} columns and ${this.entries} entries are declared, which takes more than ${least} bytes; the file has ${size}. It may be cut off.`,
      );
    }
  }

  private add(what: string, fields: readonly FortranField[], count: number, put: Section['put']): void {
    if (count > 0) this.sections.push({ what, fields, count, put });
  }

  private rightHandSideLine(text: string): void {
    const type = text.slice(0, 3).toUpperCase().padEnd(3);
    const [count = 0, indices = 0] = text.slice(3).trim().split(/\s+/).map(Number);
    const fields = this.formats[this.field === 'pattern' ? 2 : 3] ?? this.formats[2];
    const usable =
      /^[FM]/.test(type) && Number.isInteger(count) && count >= 1 && Number.isInteger(indices) && indices >= 0;
    const per = this.field === 'complex' ? 2 : 1;
    const { rows, source } = this;
    const tooMany = source.size !== null && (type[0] === 'F' ? rows * count : count + indices) > source.size;
    if (!usable || fields === undefined || fields[0].integer || tooMany) {
      throw this.refuse(
        'bad-right-hand-side',
        `expected a right-hand side line like "F 1 0" that the file has room for, found "${quoted(text)}".`,
      );
    }
    if (rows * count * per > 2 ** 28) {
      throw this.refuse(
        'size-too-large',
        `${count} right-hand sides of ${rows} rows are more than this program holds in memory.`,
      );
    }
    const values = new Float64Array(rows * count * per);
    this.rhs = { columns: count, values };
    if (type[0] === 'F') {
      this.add('right-hand side value', fields, values.length, (k, value) => {
        values[k] = value;
      });
    } else this.sparseRightHandSides(values, fields, count, indices, per);
    if (/[GX]/.test(type.slice(1))) {
      this.notes.push({
        code: 'guesses-skipped',
        text: 'Starting guesses or solutions behind the right-hand sides were not read.',
      });
    }
  }

  private sparseRightHandSides(
    values: Float64Array,
    fields: readonly FortranField[],
    count: number,
    indices: number,
    per: number,
  ): void {
    const start = new Float64Array(count + 1);
    const row = new Float64Array(indices);
    this.add('right-hand side pointer', this.formats[0], count + 1, (k, value) => {
      const least = k === 0 ? 1 : start[k - 1];
      if (value < least || value > indices + 1 || (k === 0 && value !== 1))
        throw this.range('right-hand side pointer', value, least, indices + 1);
      start[k] = value;
    });
    this.add('right-hand side row', this.formats[1], indices, (k, value) => {
      if (value < 1 || value > this.rows) throw this.range('right-hand side row', value, 1, this.rows);
      row[k] = value - 1;
    });
    let at = 0;
    this.add('right-hand side value', fields, indices * per, (k, value) => {
      const e = Math.floor(k / per);
      while (at < count - 1 && start[at + 1] - 1 <= e) at++;
      values[(at * this.rows + row[e]) * per + (k % per)] = value;
    });
  }

  private range(what: string, value: number, low: number, high: number): Fault {
    return this.refuse('index-out-of-range', `a ${what} is ${value}; expected ${low} to ${high}.`);
  }

  private pointer(k: number, value: number): void {
    const least = k === 0 ? 1 : this.pointers[k - 1];
    const wanted = k === 0 ? 1 : k === this.columns ? this.entries + 1 : null;
    if (value < least || value > this.entries + 1 || (wanted !== null && value !== wanted)) {
      throw this.refuse(
        'bad-pointer',
        `the pointer of column ${k + 1} is ${value}; expected ${wanted ?? `${least} to ${this.entries + 1}`}.`,
      );
    }
    this.pointers[k] = value;
  }

  private rowIndex(k: number, value: number): void {
    if (value < 1 || value > this.rows) throw this.range('row index', value, 1, this.rows);
    while (this.pointers[this.column + 1] - 1 <= k) this.column++;
    this.store.row[k] = value - 1;
    this.store.column[k] = this.column;
  }

  private card(bytes: Uint8Array, from: number, to: number): void {
    const { what, fields, count, put } = this.sections[this.section];
    for (let f = 0; f < fields.length && this.done < count; f++) {
      const value = readFortranField(bytes, from, to, fields[f]);
      if (value === undefined) throw this.badField(what, fields[f], f, lineText(bytes, from, to));
      put(this.done++, value);
    }
    if (this.done < count) return;
    this.done = 0;
    this.section++;
  }

  private badField(what: string, f: FortranField, k: number, line: string): Fault {
    const text = line.slice(f.at, f.at + f.width);
    return this.refuse(
      'bad-field',
      `field ${k + 1} (characters ${f.at + 1} to ${f.at + f.width}), a ${what}, is "${quoted(text)}"; expected ${f.integer ? 'an integer' : 'a number'} in a field of ${f.width} characters.`,
      k + 1,
    );
  }

  finish(lines: number, options: ReadOptions, progress: ReadProgress): Loaded {
    this.line = lines;
    if (lines < 4 || this.section < this.sections.length) {
      const what = this.sections[this.section];
      throw this.refuse(
        'too-few-entries',
        what === undefined
          ? 'the file ends in its first lines; expected title, counts, type and formats.'
          : `the file ends after ${this.done} of ${what.count} numbers (${what.what}). It may be cut off; fetch it again.`,
      );
    }
    progress(this.source.packedSize ?? 0, this.source.packedSize, 'placing entries');
    if (this.title !== '') this.notes.push({ code: 'title', text: `Title in the file: ${quoted(this.title)}` });
    this.store.count = this.entries;
    return finishMatrix(this.store, {
      file: this.file,
      format: this.format,
      rows: this.rows,
      columns: this.columns,
      field: this.field,
      symmetry: this.symmetry,
      options,
      notes: this.notes,
      labels: null,
      rightHandSides: this.rhs,
    });
  }
}
