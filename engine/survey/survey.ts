import type { SparseMatrix } from '../matrix/pattern.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import { type Base, makeBase, notSquare } from './base.ts';
import { type Constrained, constrainedFact } from './constrained.ts';
import {
  columnDegreesFact,
  type Degrees,
  type DenseLines,
  denseLinesFact,
  type EmptyLines,
  emptyLinesFact,
  neighbourCounts,
  neighboursFact,
  rowDegreesFact,
} from './degrees.ts';
import { type Diagonal, diagonalFact } from './diagonal.ts';
import { type Dominance, dominanceFact, type Gershgorin, gershgorinFact } from './dominance.ts';
import { type DuplicateRows, duplicateRowsFact } from './duplicates.ts';
import {
  type Bandwidth,
  bandwidthFact,
  type Envelope,
  envelopeFact,
  type Sizes,
  sizesFact,
  type Wavefront,
  wavefrontFact,
} from './extent.ts';
import { type Fact, undefinedFact } from './fact.ts';
import { type Magnitudes, magnitudesFact } from './magnitudes.ts';
import { scanMirrors } from './mirror.ts';
import { type Norms, normsFact } from './norms.ts';
import { type SaddlePoint, saddlePointFact } from './saddle.ts';
import { type Shapes, shapesFact } from './shapes.ts';
import {
  type BlockForm,
  blockFormFact,
  type Components,
  componentsFact,
  componentsOf,
  matchingOf,
  type StructuralRank,
  strongComponentsFact,
  strongOf,
  structuralRankFact,
  transposeOf,
} from './structure.ts';
import { type Symmetries, symmetryFact } from './symmetry.ts';
import { Ticker } from './ticker.ts';

/** All facts of a matrix, in the order in which they are told: recognised shapes first. */
export interface Survey {
  readonly shapes: Fact<Shapes>;
  readonly sizes: Fact<Sizes>;
  readonly symmetry: Fact<Symmetries>;
  readonly diagonal: Fact<Diagonal>;
  readonly emptyLines: Fact<EmptyLines>;
  readonly structuralRank: Fact<StructuralRank>;
  readonly components: Fact<Components>;
  readonly strongComponents: Fact<Components>;
  readonly blocks: Fact<BlockForm>;
  readonly constrained: Fact<Constrained>;
  readonly saddlePoint: Fact<SaddlePoint>;
  readonly duplicateRows: Fact<DuplicateRows>;
  readonly bandwidth: Fact<Bandwidth>;
  readonly envelope: Fact<Envelope>;
  readonly wavefront: Fact<Wavefront>;
  readonly rowDegrees: Fact<Degrees>;
  readonly columnDegrees: Fact<Degrees>;
  readonly neighbours: Fact<Degrees>;
  readonly denseLines: Fact<DenseLines>;
  readonly magnitudes: Fact<Magnitudes>;
  readonly norms: Fact<Norms>;
  readonly dominance: Fact<Dominance>;
  readonly gershgorin: Fact<Gershgorin>;
}

export type FactName = keyof Survey;

/** Receives each fact as soon as it is known; the order is that of the work, not of the telling. */
export type FactListener = <Name extends FactName>(name: Name, fact: Survey[Name]) => void;

/**
 * Surveys a matrix of any shape (both triangles present; never changed). Nearly linear in entries + rows + columns; besides
 * the matrix it holds some arrays of length rows or columns, and one transposed pattern where the diagonal is not fully stored and the
 * pattern is not symmetric.
 */
export function survey(matrix: SparseMatrix, progress: Progress = noProgress, onFact: FactListener = () => {}): Survey {
  const ticker = new Ticker(progress, expectedWork(matrix));
  const told: { -readonly [Name in FactName]?: Survey[Name] } = {};
  const tell = <Name extends FactName>(name: Name, value: Survey[Name]): Survey[Name] => {
    told[name] = value;
    onFact(name, value);
    return value;
  };
  const base = makeBase(matrix, ticker);
  tell('sizes', sizesFact(base));
  tell('bandwidth', bandwidthFact(base));
  tell('envelope', envelopeFact(base));
  tell('wavefront', wavefrontFact(base));
  tell('rowDegrees', rowDegreesFact(base));
  tell('columnDegrees', columnDegreesFact(base));
  tell('denseLines', denseLinesFact(base));
  tell('emptyLines', emptyLinesFact(base));
  tell('diagonal', diagonalFact(base));
  tell('dominance', dominanceFact(base));
  ticker.begin('magnitudes');
  tell('magnitudes', magnitudesFact(base, ticker));
  tell('norms', normsFact(base, ticker));
  relations(base, ticker, tell);
  tell('duplicateRows', duplicateRowsFact(base, ticker));
  progress(1, 'surveyed');
  return inOrder(told as Survey);
}

type Tell = <Name extends FactName>(name: Name, value: Survey[Name]) => Survey[Name];

/** The facts about how rows and columns hang together. */
function relations(base: Base, ticker: Ticker, tell: Tell): void {
  ticker.begin('symmetry');
  const scan = base.square ? scanMirrors(base.matrix, null, ticker) : null;
  const symmetry = tell('symmetry', symmetryFact(base, scan)).value;
  const neighbours = scan === null ? null : neighbourCounts(base, scan);
  tell('neighbours', neighboursFact(base, neighbours));
  const realSpectrum = symmetry?.hermitian ?? false;
  tell('gershgorin', gershgorinFact(base, realSpectrum));
  const components = base.square ? componentsOf(base, ticker) : null;
  const apart = (): Fact<Components> => undefinedFact(notSquare(base.matrix), 'components');
  tell('components', components === null ? apart() : componentsFact(components));
  const patternSymmetric = symmetry !== null && symmetry.unmatched === 0;
  const strong = components === null ? null : strongOf(base, components, patternSymmetric, ticker);
  tell('strongComponents', strong === null ? apart() : strongComponentsFact(strong));
  const transposed = transposeOf(base, patternSymmetric, ticker);
  const matching = matchingOf(base, transposed, ticker);
  tell('structuralRank', structuralRankFact(base, matching, transposed));
  const blocks = tell('blocks', blockFormFact(base, base.square ? matching : null, strong, ticker));
  tell('shapes', shapesFact(base, { components, blocks: blocks.value, neighbours }));
  ticker.begin('constrained unknowns');
  tell('constrained', constrainedFact(base, scan, ticker));
  tell('saddlePoint', saddlePointFact(base, scan, ticker));
}

/** Units of `Ticker`: passes over the entries that count their work. */
function expectedWork(matrix: SparseMatrix): number {
  const entries = matrix.rowIndex.length;
  return 8 * entries + 6 * matrix.columns;
}

const order: readonly FactName[] = [
  'shapes',
  'sizes',
  'symmetry',
  'diagonal',
  'emptyLines',
  'structuralRank',
  'components',
  'strongComponents',
  'blocks',
  'constrained',
  'saddlePoint',
  'duplicateRows',
  'bandwidth',
  'envelope',
  'wavefront',
  'rowDegrees',
  'columnDegrees',
  'neighbours',
  'denseLines',
  'magnitudes',
  'norms',
  'dominance',
  'gershgorin',
];

/** The names of all facts in the order in which they are told. */
export const factNames: readonly FactName[] = order;

function inOrder(told: Survey): Survey {
  return Object.fromEntries(order.map((name) => [name, told[name]])) as unknown as Survey;
}
