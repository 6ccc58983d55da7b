import type { Target, Workload } from '../forecast/target.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import type { NewToOld } from '../matrix/permutation.ts';
import type { NodeCoordinates } from '../problems/examples/example.ts';
import type { Choice } from '../trial/choice.ts';
import type { TrialResult } from '../trial/result.ts';
import { hashArrays } from './sha256.ts';
import { programVersion } from './version.ts';

/** A file as it lies on a disk, packed or not. */
export interface FileMark {
  readonly name: string;
  readonly bytes: number;
  /** of the bytes of the file */
  readonly sha256: string;
}

/** The matrix a recipe was made for: by its file, and by its content, which a conversion or packing leaves alone. */
export interface MatrixMark {
  readonly name: string;
  /** null where it came from no file: a worked example, a combination */
  readonly file: FileMark | null;
  /** ways of reading that were chosen, in order: words of `--read` */
  readonly read: readonly string[];
  readonly rows: number;
  readonly columns: number;
  readonly entries: number;
  readonly field: string;
  /** of sizes, pointers, indices and values as held: `matrixHash` */
  readonly contentSha256: string;
}

/** What came beside the matrix and shapes the trials; by content, so that any file that says the same will do. */
export interface BesideMark {
  /** the permutation read, as new-to-old */
  readonly permutation: string | null;
  readonly coordinates: string | null;
}

/** The numbers by which a replay is held. */
export interface RecipeFigures {
  readonly factorEntries: number | null;
  readonly operations: number | null;
  readonly factorBytes: number | null;
  readonly largestFront: number | null;
  readonly treeHeight: number | null;
  /** on the recipe's target; null without a forecast */
  readonly peakBytes: number | null;
  /** of the effective order, new-to-old, 0-based 32-bit integers */
  readonly orderSha256: string;
}

export interface RecipeTrial {
  /** unique in the recipe */
  readonly name: string;
  /** what was asked for */
  readonly choice: Choice;
  /** what makes the same order again: `choice`, or what a portfolio kept, so that a time limit does not matter */
  readonly ran: Choice;
  /** original unknowns, 0-based */
  readonly heldLast: readonly number[];
  readonly figures: RecipeFigures;
}

/** Everything that makes the same numbers again, on the page and on the command line. Plain data; stored as JSON. */
export interface Recipe {
  readonly format: 'fillcast-recipe';
  readonly formatVersion: 1;
  /** version of the program that wrote it */
  readonly version: string;
  readonly indexBase: 0;
  readonly matrix: MatrixMark;
  readonly beside: BesideMark;
  readonly target: Target;
  readonly workload: Workload;
  /** name of the trial that is handed over, and that a gate watches */
  readonly chosen: string;
  readonly trials: readonly RecipeTrial[];
}

export const recipeFormat = 'fillcast-recipe';

/** Hash of what a matrix says, whatever file it came in. Linear in entries. */
export function matrixHash(a: SparseMatrix): string {
  const values = a.values ?? new Float64Array(0);
  return hashArrays(
    `matrix ${a.rows} ${a.columns} ${a.values === null ? 0 : a.field === 'complex' ? 2 : 1}\n`,
    a.columnPointer,
    a.rowIndex.subarray(0, a.columnPointer[a.columns]),
    values,
  );
}

export function orderHash(order: NewToOld): string {
  return hashArrays(`order ${order.length}\n`, order);
}

export function coordinatesHash(c: NodeCoordinates): string {
  return hashArrays(`coordinates ${c.dimensions} ${c.unknownsPerNode}\n`, c.values);
}

/** What belongs beside the trials of one matrix in a recipe. */
export function besideMark(imported: NewToOld | null, coordinates: NodeCoordinates | null): BesideMark {
  return {
    permutation: imported === null ? null : orderHash(imported),
    coordinates: coordinates === null ? null : coordinatesHash(coordinates),
  };
}

/** The mark of a matrix; `file` and the words by which it was read come from outside the engine. */
export function matrixMark(
  name: string,
  matrix: SparseMatrix,
  file: FileMark | null,
  read: readonly string[],
): MatrixMark {
  return {
    name,
    file,
    read,
    rows: matrix.rows,
    columns: matrix.columns,
    entries: matrix.columnPointer[matrix.columns],
    field: matrix.field,
    contentSha256: matrixHash(matrix),
  };
}

/** A finished trial as a recipe holds it. */
export function recipeTrial(
  name: string,
  result: Pick<TrialResult, 'choice' | 'ran' | 'counts' | 'effective'>,
  heldLast: readonly number[],
  peakBytes: number | null,
): RecipeTrial {
  const { choice, ran, counts, effective } = result;
  return { name, choice, ran, heldLast, figures: figuresOf(counts, effective, peakBytes) };
}

/** The numbers of a trial by which a replay is held. */
export function figuresOf(counts: TrialResult['counts'], effective: NewToOld, peakBytes: number | null): RecipeFigures {
  const { factorEntries, operations, factorBytes, largestFront, treeHeight } = counts;
  return {
    factorEntries,
    operations,
    factorBytes,
    largestFront,
    treeHeight,
    peakBytes,
    orderSha256: orderHash(effective),
  };
}

export function makeRecipe(parts: Omit<Recipe, 'format' | 'formatVersion' | 'version' | 'indexBase'>): Recipe {
  return { format: recipeFormat, formatVersion: 1, version: programVersion, indexBase: 0, ...parts };
}

/** The recipe as a file. */
export function recipeText(recipe: Recipe): string {
  return `${JSON.stringify(recipe, null, 2)}\n`;
}

/** One number that a replay found otherwise. */
export interface RecipeDifference {
  readonly figure: keyof RecipeFigures;
  readonly recorded: number | string | null;
  readonly found: number | string | null;
}

/** What differs between the recorded numbers and those found; empty when a replay holds. */
export function differencesOf(recorded: RecipeFigures, found: RecipeFigures): readonly RecipeDifference[] {
  return (Object.keys(recorded) as (keyof RecipeFigures)[])
    .filter((figure) => recorded[figure] !== found[figure])
    .map((figure) => ({ figure, recorded: recorded[figure], found: found[figure] }));
}

/** How a matrix at hand stands to the one of a recipe. */
export type Sameness = 'same-file' | 'same-matrix' | 'other';

export function samenessOf(recipe: Recipe, matrix: SparseMatrix, file: FileMark | null): Sameness {
  if (matrixHash(matrix) !== recipe.matrix.contentSha256) return 'other';
  return file !== null && file.sha256 === recipe.matrix.file?.sha256 ? 'same-file' : 'same-matrix';
}

/** The same in a sentence. */
export function samenessWords(recipe: Recipe, name: string, sameness: Sameness): string {
  const made = `The recipe was made for ${recipe.matrix.name}`;
  if (sameness === 'same-file') return `${name} is the file of the recipe, byte for byte.`;
  if (sameness === 'same-matrix') {
    return recipe.matrix.file === null
      ? `${name} holds the matrix of the recipe, entry for entry.`
      : `${made}; ${name} is another file that holds the same matrix, entry for entry.`;
  }
  const { rows, columns, entries } = recipe.matrix;
  return `${made} (${rows} × ${columns}, ${entries} entries); ${name} holds another matrix.`;
}

/** What a recipe needs beside the matrix and is not the same here, as sentences; empty when all is there. */
export function missingBeside(recipe: Recipe, beside: BesideMark): readonly string[] {
  const uses = (word: string): boolean => recipe.trials.some(({ ran }) => ran.ordering === word);
  const out: string[] = [];
  if (uses('imported') && recipe.beside.permutation !== beside.permutation) {
    out.push(
      beside.permutation === null
        ? 'The recipe uses a permutation that was read from a file; give that file too.'
        : 'The permutation given is not the one of the recipe.',
    );
  }
  if (uses('geometric-dissection') && recipe.beside.coordinates !== beside.coordinates) {
    out.push(
      beside.coordinates === null
        ? 'The recipe uses coordinates of the mesh nodes; give their file too.'
        : 'The coordinates given are not those of the recipe.',
    );
  }
  return out;
}
