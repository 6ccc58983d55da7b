import { Fault, type Repair } from '../matrix/fault.ts';
import type { Field, Symmetry } from '../matrix/pattern.ts';
import type { ImportNote } from './loaded.ts';
import { absurdOrder } from './sizeLimits.ts';

/** The banner and size line of a Matrix Market file (Boisvert, Pozo & Remington, NISTIR 5935, 1996). */
export interface MarketHeader {
  readonly layout: 'coordinate' | 'array';
  readonly field: Field;
  readonly symmetry: Symmetry;
  readonly rows: number;
  readonly columns: number;
  /** entries declared; for an array, those the layout and symmetry imply */
  readonly entries: number;
  /** line of the size line, 1-based */
  readonly sizeLine: number;
  readonly notes: readonly ImportNote[];
}

const layouts = ['coordinate', 'array'] as const;
const fields = ['real', 'integer', 'complex', 'pattern', 'double'] as const;
const symmetries = ['general', 'symmetric', 'skew-symmetric', 'hermitian'] as const;
/** largest order an index array can hold */
export const largestOrder = 2 ** 31 - 2;

/** Takes the lines of the head one by one until the size line is read. */
export class HeaderReader {
  private readonly file: string;
  private readonly notes: ImportNote[] = [];
  private banner: { layout: 'coordinate' | 'array'; field: Field; symmetry: Symmetry } | null = null;

  constructor(file: string) {
    this.file = file;
  }

  /** @returns the header once it is complete, else null */
  take(text: string, line: number): MarketHeader | null {
    const trimmed = text.trim();
    if (this.banner === null) {
      if (trimmed === '') return null;
      if (trimmed !== text.trimEnd())
        this.note('leading-blanks', `Line ${line}: blanks before the banner were skipped.`);
      this.banner = this.parseBanner(trimmed, line);
      return null;
    }
    if (trimmed === '' || trimmed.startsWith('%')) return null;
    return this.parseSize(trimmed, line);
  }

  private note(code: string, text: string): void {
    this.notes.push({ code, text });
  }

  private refuse(code: string, line: number, text: string, repairs: readonly Repair[] = []): Fault {
    return new Fault('input', code, `${this.file}, line ${line}: ${text}`, { file: this.file, line }, repairs);
  }

  private parseBanner(
    text: string,
    line: number,
  ): { layout: 'coordinate' | 'array'; field: Field; symmetry: Symmetry } {
    const words = text.toLowerCase().split(/\s+/);
    if (!/^%{1,2}matrixmarket$/.test(words[0])) {
      throw this.refuse(
        'no-banner',
        line,
        `expected the banner "%%MatrixMarket matrix coordinate real general", found "${quoted(text)}". If these are plain coordinate lines, read the file as coordinate text.`,
        [{ id: 'read-as-coordinate-text', text: 'Read as coordinate text: row, column, value, 1-based' }],
      );
    }
    if (words[0] === '%matrixmarket') this.note('banner-repaired', `Line ${line}: banner repaired, one % was missing.`);
    if (words[1] !== 'matrix') {
      throw this.refuse('banner-object', line, `the banner names "${words[1] ?? 'nothing'}", expected "matrix".`);
    }
    const layout = this.word(layouts, words[2], 'layout', line);
    const field = this.word(fields, words[3], 'field', line);
    const symmetry = this.word(symmetries, words[4], 'symmetry', line);
    if (words.length > 5) {
      const rest = words.slice(5).join(' ');
      this.note('banner-extra', `Line ${line}: text after the banner was ignored: "${quoted(rest)}".`);
    }
    if (layout === 'array' && field === 'pattern') {
      throw this.refuse('array-pattern', line, 'an array has values; the field cannot be "pattern".');
    }
    return { layout, field: field === 'double' ? 'real' : field, symmetry };
  }

  private word<T extends string>(known: readonly T[], word: string | undefined, what: string, line: number): T {
    const bare = word?.replace(/[([].*$/, '');
    const found = known.find((k) => k === bare);
    if (found === undefined) {
      throw this.refuse(
        `banner-${what}`,
        line,
        `the banner's ${what} is "${quoted(word ?? 'missing')}", expected ${known.filter((k) => k !== 'double').join(', ')}.`,
      );
    }
    if (bare !== word) {
      const rest = (word ?? '').slice(found.length);
      this.note('banner-extra', `Line ${line}: text behind "${found}" was ignored: "${quoted(rest)}".`);
    }
    return found;
  }

  private parseSize(text: string, line: number): MarketHeader {
    const banner = this.banner as NonNullable<typeof this.banner>;
    const words = text.split(/\s+/);
    const wanted = banner.layout === 'coordinate' ? 3 : 2;
    const what = banner.layout === 'coordinate' ? 'rows, columns and entries' : 'rows and columns';
    const numbers = words.map((w) => (/^\d+$/.test(w) ? Number(w) : Number.NaN));
    if (words.length !== wanted || numbers.some(Number.isNaN)) {
      const dataLike =
        banner.layout === 'coordinate' &&
        !Number.isNaN(numbers[0]) &&
        !Number.isNaN(numbers[1]) &&
        ((words.length === 3 && /^[+-]?\.?\d/.test(words[2])) ||
          (words.length === 2 && banner.field === 'pattern') ||
          (words.length === 4 && banner.field === 'complex'));
      throw this.refuse(
        dataLike ? 'no-size-line' : 'bad-size-line',
        line,
        `expected the size line with ${what}, found "${quoted(text)}".${dataLike ? ' The data seem to start at once; the size can be inferred from them.' : ''}`,
        dataLike ? [{ id: 'infer-size', text: 'Infer the size from the data' }] : [],
      );
    }
    const [rows, columns] = numbers;
    if (rows > largestOrder || columns > largestOrder) {
      throw this.refuse(
        'size-too-large',
        line,
        `${words[0]} × ${words[1]} is more than ${largestOrder} rows or columns, the most this program can index.`,
      );
    }
    const absurd = absurdOrder(rows, columns, banner.layout === 'coordinate' ? numbers[2] : rows * columns);
    if (absurd !== null) throw this.refuse('size-absurd', line, `${absurd}.`);
    if (banner.symmetry !== 'general' && rows !== columns) {
      throw this.refuse(
        'symmetric-not-square',
        line,
        `the banner says ${banner.symmetry}, but the size is ${rows} × ${columns}; expected as many rows as columns.`,
      );
    }
    let symmetry = banner.symmetry;
    if (symmetry === 'hermitian' && banner.field !== 'complex') {
      symmetry = 'symmetric';
      this.note(
        'hermitian-real',
        `"hermitian" with ${banner.field} values was read as symmetric: the two are the same.`,
      );
    }
    const entries = banner.layout === 'coordinate' ? numbers[2] : arrayEntries(rows, symmetry, columns);
    return { ...banner, symmetry, rows, columns, entries, sizeLine: line, notes: this.notes };
  }
}

/** Values an array file holds: all, the lower triangle, or the triangle below the diagonal. */
function arrayEntries(rows: number, symmetry: Symmetry, columns: number): number {
  if (symmetry === 'general') return rows * columns;
  return symmetry === 'skew-symmetric' ? (rows * (rows - 1)) / 2 : (rows * (rows + 1)) / 2;
}

/** A piece of the user's text fit for a message. */
export function quoted(text: string): string {
  const clean = text.replace(/[^\x20-\x7e\u00a0-\uffff]/g, '·');
  return clean.length > 60 ? `${clean.slice(0, 57)}…` : clean;
}
