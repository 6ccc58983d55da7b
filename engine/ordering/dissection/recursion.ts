import type { Progress } from '../../matrix/progress.ts';
import { Random } from '../../matrix/random.ts';
import { minimumDegreeOfGraph } from '../minimumDegreeOfGraph.ts';
import { IntegerArena } from './arena.ts';
import { induce, type Piece } from './induce.ts';
import { LeafOrdering } from './leaf.ts';
import type { SeparatorSettings, SeparatorTools } from './multilevelSeparator.ts';
import { SEPARATOR, SeparationWorkspace, SIDE_0 } from './separation.ts';
import { pieceOf, type WholeGraph } from './wholeGraph.ts';

/** Resolved options of a dissection. */
export interface DissectionSettings extends SeparatorSettings {
  readonly leafSize: number;
  readonly seed: number;
}

/** A separator as a range of positions, in vertices of the whole graph. */
export interface SeparatorRange {
  readonly start: number;
  readonly end: number;
  readonly level: number;
}

/** Fills `part` with a separation of the piece; no side may be in it to say that it is better left undivided. */
export type FindSeparator = (piece: Piece, part: Int32Array, tools: SeparatorTools) => void;

/** What the recursion shares. */
interface Dissection {
  readonly leafSize: number;
  readonly find: FindSeparator;
  readonly tools: SeparatorTools;
  readonly leaf: LeafOrdering;
  readonly ones: Int32Array;
  readonly order: Int32Array;
  readonly separators: SeparatorRange[];
  readonly progress: Progress;
  /** vertices times levels done, and expected in all */
  done: number;
  readonly expected: number;
}

/** Nested dissection (George 1973) of the free vertices: their order (position -> vertex) and the separators in it. */
export function dissect(
  whole: WholeGraph,
  { leafSize, seed }: { readonly leafSize: number; readonly seed: number },
  find: FindSeparator,
  progress: Progress,
): { order: Int32Array; separators: SeparatorRange[] } {
  const n = whole.freeOrder;
  const arena = new IntegerArena(whole.neighbour.length + 8 * n);
  const workspace = new SeparationWorkspace(n);
  const levels = Math.max(1, Math.log2(n / leafSize) + 1);
  const d: Dissection = {
    leafSize,
    find,
    tools: {
      arena,
      workspace,
      random: new Random(seed),
      pulse: () => progress(Math.min(1, d.done / d.expected), 'dissection'),
    },
    leaf: new LeafOrdering(whole.order, whole.pointer, whole.neighbour, whole.weight),
    ones: new Int32Array(whole.neighbour.length).fill(1),
    order: new Int32Array(n),
    separators: [],
    progress,
    done: 0,
    expected: n * levels,
  };
  const { component } = whole;
  let c = 0;
  while (c + 1 < component.length) {
    const from = component[c];
    // small components share leaves
    let to = component[++c];
    while (c + 1 < component.length && component[c + 1] - from <= leafSize) to = component[++c];
    const mark = arena.mark();
    dissectPiece(d, pieceOf(whole, from, to, d.ones, arena), from, 0);
    arena.release(mark);
  }
  return { order: d.order, separators: d.separators };
}

function dissectPiece(d: Dissection, piece: Piece, at: number, level: number): void {
  const n = piece.graph.order;
  d.tools.pulse();
  d.done += n;
  if (n <= d.leafSize) {
    orderUndivided(d, piece, at);
    return;
  }
  const { arena, workspace } = d.tools;
  const part = arena.take(n);
  d.find(piece, part, d.tools);
  let count0 = 0;
  let inSeparator = 0;
  for (let v = 0; v < n; v++) {
    if (part[v] === SEPARATOR) inSeparator++;
    else if (part[v] === SIDE_0) count0++;
  }
  const count1 = n - count0 - inSeparator;
  if (count0 === 0 || count1 === 0) {
    orderUndivided(d, piece, at);
    return;
  }
  const start = at + count0 + count1;
  d.separators.push({ start, end: at + n, level });
  let position = start;
  for (let v = 0; v < n; v++) if (part[v] === SEPARATOR) d.order[position++] = piece.name[v];
  for (let side = 0; side < 2; side++) {
    const mark = arena.mark();
    dissectPiece(
      d,
      induce(piece, part, side, workspace.scratch, d.ones, arena),
      side === 0 ? at : at + count0,
      level + 1,
    );
    arena.release(mark);
  }
}

/** A piece without a separator, as a dense one: large ones need the quotient graph, without their halo. */
function orderUndivided(d: Dissection, piece: Piece, at: number): void {
  const { order: n, pointer, neighbour, weight } = piece.graph;
  if (n <= LARGEST_LEAF) {
    d.leaf.orderInto(piece.name, d.order, at);
    return;
  }
  const graph = { order: n, pointer, neighbour };
  const order = minimumDegreeOfGraph(graph, { weight }, d.tools.pulse).order;
  for (let k = 0; k < n; k++) d.order[at + k] = piece.name[order[k]];
}

/** Rows of bits serve up to so many vertices. */
const LARGEST_LEAF = 1000;
