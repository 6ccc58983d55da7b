import type { Classes } from '../graph/components.ts';
import type { Base } from './base.ts';
import { type Fact, fact, type Mark, markWhere } from './fact.ts';
import type { BlockForm } from './structure.ts';
import { counted, percent, plural } from './wording.ts';

export type ShapeName =
  | 'empty'
  | 'diagonal'
  | 'upper-triangular'
  | 'lower-triangular'
  | 'permuted-triangular'
  | 'tridiagonal'
  | 'banded'
  | 'block-diagonal'
  | 'permuted-block-diagonal'
  | 'arrow'
  | 'bordered-band'
  | 'dense';

/** Shapes recognised in the stored positions, most telling first; none is common. */
export interface Shapes {
  readonly names: readonly ShapeName[];
}

/** What the other facts found; null where they are not defined. */
export interface ShapeEvidence {
  readonly components: Classes | null;
  readonly blocks: BlockForm | null;
  /** unknown -> neighbours in A + Aᵀ */
  readonly neighbours: Int32Array | null;
}

/** More than this share of all positions: told as dense (common practice, no source). */
const denseShare = 0.2;
/** A band is told as such when at least this share of its positions are entries, and it spans at most a quarter of the diagonals. */
const bandShare = 0.25;

export function shapesFact(base: Base, evidence: ShapeEvidence): Fact<Shapes> {
  const { rows, columns } = base.matrix;
  const names: ShapeName[] = [];
  const told: string[] = [];
  const marks: Mark[] = [];
  const say = (name: ShapeName, sentence: string): void => {
    names.push(name);
    told.push(sentence);
  };
  if (base.entries === 0)
    say('empty', rows === 0 && columns === 0 ? 'The matrix is empty.' : 'The matrix has no entries.');
  else if (base.square) squareShapes(base, evidence, say, marks);
  const density = base.entries / (rows * columns);
  if (base.entries > 0 && density > denseShare) {
    const bytes = rows * columns * (base.matrix.field === 'complex' ? 16 : 8);
    say(
      'dense',
      `Dense: ${percent(density)} of all positions are entries; as a full array it takes ${counted(bytes)} bytes.`,
    );
  }
  return fact({ names }, told.length === 0 ? 'No special shape.' : told.join(' '), 'shapes', 'exact', marks);
}

function squareShapes(
  base: Base,
  evidence: ShapeEvidence,
  say: (name: ShapeName, sentence: string) => void,
  marks: Mark[],
): void {
  const direct = bySubstitution(base, evidence.blocks);
  if (direct !== null) {
    say(direct[0], direct[1]);
    return;
  }
  const { lowerBandwidth: lower, upperBandwidth: upper } = base.positions;
  const n = base.matrix.columns;
  const components = evidence.components;
  if (components !== null && components.count > 1) {
    if (increasing(components.of))
      say('block-diagonal', `Block diagonal: ${counted(components.count)} independent blocks.`);
    else {
      say(
        'permuted-block-diagonal',
        `Block diagonal after reordering: ${counted(components.count)} independent parts, interleaved in this numbering.`,
      );
    }
  }
  if (lower <= 1 && upper <= 1)
    say('tridiagonal', 'Tridiagonal: in this order, without row interchanges, the factors have no fill-in.');
  else if (isBand(n, lower, upper, base.entries)) {
    say('banded', `Banded: ${counted(lower)} diagonals below and ${counted(upper)} above the main one, well filled.`);
  } else if (evidence.neighbours !== null) bordered(base, evidence.neighbours, say, marks);
}

/** Shapes that need no factorization. */
function bySubstitution(base: Base, blocks: BlockForm | null): readonly [ShapeName, string] | null {
  const { lowerBandwidth: lower, upperBandwidth: upper } = base.positions;
  const none = 'no factorization needed';
  if (lower === 0 && upper === 0) return ['diagonal', `Diagonal: ${none}, one division for each unknown.`];
  if (lower === 0) return ['upper-triangular', `Upper triangular: ${none}, back substitution solves it.`];
  if (upper === 0) return ['lower-triangular', `Lower triangular: ${none}, forward substitution solves it.`];
  if (blocks === null || blocks.blocks < base.matrix.columns) return null;
  return ['permuted-triangular', `Permuted triangular: rows and columns can be reordered to a triangle, so ${none}.`];
}

function increasing(of: Int32Array): boolean {
  for (let v = 1; v < of.length; v++) if (of[v] < of[v - 1]) return false;
  return true;
}

function isBand(n: number, lower: number, upper: number, entries: number): boolean {
  if (4 * (lower + upper + 1) > n) return false;
  const cells = (lower + upper + 1) * n - (lower * (lower + 1)) / 2 - (upper * (upper + 1)) / 2;
  return entries >= bandShare * cells;
}

/** Arrow: without a few unknowns of many neighbours, nothing but the diagonal is left; bordered band: a narrow band is left. */
function bordered(
  base: Base,
  neighbours: Int32Array,
  say: (name: ShapeName, sentence: string) => void,
  marks: Mark[],
): void {
  const { columnPointer, rowIndex } = base.matrix;
  const n = neighbours.length;
  const hub = new Uint8Array(n);
  // a few: at most √n; many neighbours: more than √n
  const root = Math.sqrt(n);
  const rank = new Int32Array(n);
  let hubs = 0;
  for (let i = 0; i < n; i++) {
    rank[i] = i - hubs;
    if (neighbours[i] > Math.max(2, root)) {
      hub[i] = 1;
      hubs++;
    }
  }
  if (hubs === 0 || hubs > root) return;
  let lower = 0;
  let upper = 0;
  let entries = 0;
  for (let j = 0; j < n; j++) {
    if (hub[j]) continue;
    for (let p = columnPointer[j]; p < columnPointer[j + 1]; p++) {
      const i = rowIndex[p];
      if (hub[i]) continue;
      entries++;
      const d = rank[i] - rank[j];
      if (d > lower) lower = d;
      if (-d > upper) upper = -d;
    }
  }
  const mark = markWhere('unknowns of the border', 'unknowns', hub);
  const border = `${plural(hubs, 'unknown')} in the border`;
  const last = mark.indices[0] === n - hubs;
  const advice = last
    ? 'it stands last, where it causes no fill-in outside itself'
    : 'keep it last, first it would fill the factor';
  if (lower === 0 && upper === 0) say('arrow', `Arrow: ${border}, a diagonal besides; ${advice}.`);
  else if (isBand(n - hubs, lower, upper, entries)) {
    say(
      'bordered-band',
      `Bordered band: ${border}, besides it a band of ${counted(lower)} below and ${counted(upper)} above; keep the border last.`,
    );
  } else return;
  marks.push(mark);
}
