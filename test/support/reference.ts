/**
 * The outside figures and the open matrices that came with them, for tests.
 * Sources of every matrix: test/reference/README.md. Figures: general-purpose libraries, same place.
 */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { assemble } from '../../engine/matrix/assemble.ts';
import type { Field, SparseMatrix } from '../../engine/matrix/pattern.ts';

const folder = join(import.meta.dirname ?? new URL('.', import.meta.url).pathname, '..', 'reference');

/** One ordering's outside figures; `order` is 0-based, new-to-old, only for n ≤ 2000. */
export interface OrderingFigures {
  readonly factorEntries: number;
  readonly operations: number;
  readonly treeHeight: number;
  readonly bandwidth?: number;
  readonly envelope?: number;
  readonly order?: readonly number[];
}

/** The outside figures of one matrix; definitions in test/reference/README.md. */
export interface Figures {
  readonly file?: string;
  readonly field: string;
  readonly symmetry: string;
  readonly rows: number;
  readonly columns: number;
  readonly storedEntries: number;
  readonly entries: number;
  readonly structuralRank: number;
  readonly patternSymmetry?: number;
  readonly valueSymmetric?: boolean;
  readonly hermitian?: boolean;
  readonly lowerBandwidth: number;
  readonly upperBandwidth: number;
  readonly diagonalStored: number;
  readonly diagonalNonzero: number;
  readonly symmetrisedEntries?: number;
  readonly envelope?: number;
  readonly components?: number;
  readonly strongComponents?: number;
  readonly orderings?: Readonly<Record<string, OrderingFigures>>;
  readonly lu?: Readonly<Record<string, { lowerEntries: number; upperEntries: number; backwardError: number }>>;
  readonly luWithoutInterchanges?: { lowerEntries: number; upperEntries: number };
  readonly normalEquations?: { entries: number; factorEntries: number; operations: number; treeHeight: number };
  readonly blockTriangular?: { blocks: number; largest: number; singletons: number };
  readonly coarseBlocks?: Readonly<Record<string, unknown>>;
  readonly condition1?: number | null;
  readonly logAbsDeterminant?: number | null;
  readonly determinantSign?: number | readonly number[];
  readonly inertia?: readonly number[];
  readonly eigenvalues?: readonly number[];
}

/** The writer of the files put NaN and infinities as bare words, which JSON does not know: they become null. */
function readFigures(file: string): Record<string, Figures> {
  const text = readFileSync(join(folder, file), 'utf8');
  return JSON.parse(text.replace(/-?\b(?:NaN|Infinity)\b/g, 'null'));
}

/** Figures of the open matrices, by name. */
export const figures: Readonly<Record<string, Figures>> = readFigures('figures.json');

/** Figures of generated problems, by "kind-size" (see engine/problems). */
export const generatedFigures: Readonly<Record<string, Figures>> = readFigures('figures-generated.json');

/** The folder of further open matrices, or null where the environment names none. */
export const fetchedFolder: string | null = (() => {
  const named = process.env.FILLCAST_MATRICES;
  return named !== undefined && existsSync(named) ? named : null;
})();

/** Path of a committed reference file. */
export function referencePath(file: string): string {
  return join(folder, 'matrices', file);
}

/** Names of figures.json whose matrix can be read here: the committed ones, and the further ones where they are. */
export function readableNames(): string[] {
  return Object.keys(figures).filter((name) => pathOf(name) !== null);
}

/** Where the matrix of that name lies, committed or further; null where it does not. */
export function pathOf(name: string): string | null {
  const own = referencePath(`${name}.mtx`);
  if (existsSync(own)) return own;
  if (fetchedFolder === null) return null;
  const further = join(fetchedFolder, `${name}.mtx`);
  return existsSync(further) ? further : null;
}

/** The matrix of that name, both triangles present. Throws where `readableNames` does not list it. */
export function readReference(name: string): SparseMatrix {
  const path = pathOf(name);
  if (path === null) throw new Error(`no matrix ${name} here`);
  return parseMatrixMarket(readFileSync(path, 'latin1'));
}

/** A small, independent reader of well-formed Matrix Market coordinate text: a second opinion beside the exchange room. */
export function parseMatrixMarket(text: string): SparseMatrix {
  const lines = text.split(/\r?\n/);
  const banner = lines[0].trim().toLowerCase().split(/\s+/);
  const field = banner[3] as Field;
  const symmetry = banner[4];
  let at = 1;
  while (lines[at].startsWith('%') || lines[at].trim() === '') at++;
  const [rows, columns, stored] = lines[at++].trim().split(/\s+/).map(Number);
  const row: number[] = [];
  const column: number[] = [];
  const values: number[] = [];
  const push = (i: number, j: number, re: number, im: number): void => {
    row.push(i);
    column.push(j);
    if (field === 'complex') values.push(re, im);
    else if (field !== 'pattern') values.push(re);
  };
  for (let seen = 0; seen < stored; at++) {
    if (lines[at].trim() === '' || lines[at].startsWith('%')) continue;
    seen++;
    const word = lines[at].trim().split(/\s+/);
    const i = Number(word[0]) - 1;
    const j = Number(word[1]) - 1;
    const re = Number(word[2] ?? 0);
    const im = Number(word[3] ?? 0);
    push(i, j, re, im);
    if (symmetry === 'general' || i === j) continue;
    const sign = symmetry === 'skew-symmetric' ? -1 : 1;
    push(j, i, sign * re, symmetry === 'hermitian' ? -im : sign * im);
  }
  return assemble({
    rows,
    columns,
    field,
    row: Int32Array.from(row),
    column: Int32Array.from(column),
    values: field === 'pattern' ? null : Float64Array.from(values),
  }).matrix;
}
