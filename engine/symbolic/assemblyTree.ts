import { asNewToOld, composeOrders } from '../matrix/permutation.ts';
import { type Amalgamation, amalgamate, type NodeForest, usualAmalgamation } from './amalgamate.ts';
import { postorder } from './postorder.ts';
import { fundamentalSupernodes } from './supernodes.ts';
import type { AssemblyTree, SymbolicFactor } from './types.ts';

export interface AssemblyOptions {
  /** padding allowed; default `usualAmalgamation` */
  readonly amalgamation?: Amalgamation;
  /** the last so many columns form one final supernode of their own; default 0 */
  readonly held?: number;
  /** children in the order of least stack (Liu 1986); default true, else in postorder */
  readonly bestChildren?: boolean;
  /** how the contribution blocks of that stack are kept: packed lower triangles (default), or square, as LU keeps them */
  readonly blocks?: 'packed' | 'square';
}

/**
 * Supernodes and their tree in an internal postorder of the factor's columns. Near-linear in columns; the factor's entries are
 * not listed.
 */
export function assemblyTree(factor: SymbolicFactor, options: AssemblyOptions = {}): AssemblyTree {
  const n = factor.size;
  const held = options.held ?? 0;
  const post = postorder(factor.parent, held);
  const to = new Int32Array(n);
  for (let t = 0; t < n; t++) to[post[t]] = t;
  const parent = new Int32Array(n);
  const columnCount = new Int32Array(n);
  for (let t = 0; t < n; t++) {
    const up = factor.parent[post[t]];
    parent[t] = up < 0 ? -1 : to[up];
    columnCount[t] = factor.columnCount[post[t]];
  }
  const first = fundamentalSupernodes(parent, columnCount, held);
  const forest = forestOf(first, parent, columnCount, held);
  const fixed = held > 0 ? forest.parent.length - 1 : -1;
  const { into, sizes } = amalgamate(forest, options.amalgamation ?? usualAmalgamation, fixed);
  const walk = walkOrder(into, sizes, forest.parent, options, fixed);
  const tree = lay(walk, into, sizes, forest, first);
  const order = composeOrders(factor.order, composeOrders(asNewToOld(post), asNewToOld(tree.columnOrder)));
  let storedFactorEntries = 0;
  for (let s = 0; s < tree.frontOrder.length; s++) {
    const p = tree.firstColumn[s + 1] - tree.firstColumn[s];
    storedFactorEntries += p * tree.frontOrder[s] - (p * (p - 1)) / 2;
  }
  return {
    size: n,
    count: tree.frontOrder.length,
    order,
    firstColumn: tree.firstColumn,
    parent: tree.parent,
    frontOrder: tree.frontOrder,
    storedFactorEntries,
    factorEntries: factor.factorEntries,
  };
}

/** Sizes and parents of the fundamental supernodes; the held-last one is a root whose front is its own columns. */
function forestOf(first: Int32Array, parent: Int32Array, columnCount: Int32Array, held: number): NodeForest {
  const count = first.length - 1;
  const nodeOf = new Int32Array(parent.length);
  for (let s = 0; s < count; s++) nodeOf.fill(s, first[s], first[s + 1]);
  const columns = new Int32Array(count);
  const frontOrder = new Int32Array(count);
  const up = new Int32Array(count);
  for (let s = 0; s < count; s++) {
    columns[s] = first[s + 1] - first[s];
    frontOrder[s] = held > 0 && s === count - 1 ? held : columnCount[first[s]];
    const above = parent[first[s + 1] - 1];
    up[s] = above < 0 || (held > 0 && s === count - 1) ? -1 : nodeOf[above];
  }
  return { columns, frontOrder, parent: up };
}

/**
 * The nodes that stand, children before parents. Liu 1986: children by decreasing (stack needed − block left behind) need the
 * least stack when the parent's front is made after its children.
 */
function walkOrder(
  into: Int32Array,
  sizes: NodeForest,
  oldParent: Int32Array,
  options: AssemblyOptions,
  fixed: number,
): Int32Array {
  const best = options.bestChildren ?? true;
  const square = options.blocks === 'square';
  const count = into.length;
  const parentOf = (s: number): number => (oldParent[s] < 0 ? -1 : into[oldParent[s]]);
  const firstChild = new Int32Array(count).fill(-1);
  const nextChild = new Int32Array(count).fill(-1);
  const roots: number[] = [];
  for (let s = count - 1; s >= 0; s--) {
    if (into[s] !== s) continue;
    const p = parentOf(s);
    if (p < 0) {
      if (s !== fixed) roots.push(s);
      continue;
    }
    nextChild[s] = firstChild[p];
    firstChild[p] = s;
  }
  roots.reverse();
  if (fixed >= 0) roots.push(fixed);
  const need = new Float64Array(count);
  const block = new Float64Array(count);
  const sorted: number[] = [];
  for (let s = 0; s < count; s++) {
    if (into[s] !== s) continue;
    const rest = sizes.frontOrder[s] - sizes.columns[s];
    block[s] = square ? rest * rest : (rest * (rest + 1)) / 2;
    sorted.length = 0;
    for (let c = firstChild[s]; c >= 0; c = nextChild[c]) sorted.push(c);
    if (best && sorted.length > 1) sorted.sort((a, b) => need[b] - block[b] - (need[a] - block[a]) || a - b);
    let held = 0;
    let peak = 0;
    for (const c of sorted) {
      peak = Math.max(peak, held + need[c]);
      held += block[c];
    }
    need[s] = Math.max(peak, held + block[s]);
    firstChild[s] = -1;
    for (let k = sorted.length - 1; k >= 0; k--) {
      nextChild[sorted[k]] = firstChild[s];
      firstChild[s] = sorted[k];
    }
  }
  const out = new Int32Array(count);
  const stack = new Int32Array(count);
  let standing = 0;
  for (const root of roots) {
    let depth = 0;
    stack[depth++] = root;
    while (depth > 0) {
      const s = stack[depth - 1];
      const child = firstChild[s];
      if (child >= 0) {
        firstChild[s] = nextChild[child];
        stack[depth++] = child;
      } else {
        out[standing++] = s;
        depth--;
      }
    }
  }
  return out.slice(0, standing);
}

/** Numbers the nodes and their columns along the walk; a joined node's columns come in their old order. */
function lay(
  walk: Int32Array,
  into: Int32Array,
  sizes: NodeForest,
  forest: NodeForest,
  first: Int32Array,
): { firstColumn: Int32Array; parent: Int32Array; frontOrder: Int32Array; columnOrder: Int32Array } {
  const count = walk.length;
  const number = new Int32Array(into.length).fill(-1);
  for (let k = 0; k < count; k++) number[walk[k]] = k;
  const firstColumn = new Int32Array(count + 1);
  const parent = new Int32Array(count);
  const frontOrder = new Int32Array(count);
  for (let k = 0; k < count; k++) {
    const s = walk[k];
    firstColumn[k + 1] = firstColumn[k] + sizes.columns[s];
    frontOrder[k] = sizes.frontOrder[s];
    const up = forest.parent[s];
    parent[k] = up < 0 ? -1 : number[into[up]];
  }
  const next = firstColumn.slice(0, count);
  const columnOrder = new Int32Array(first[into.length]);
  for (let s = 0; s < into.length; s++) {
    const k = number[into[s]];
    for (let j = first[s]; j < first[s + 1]; j++) columnOrder[next[k]++] = j;
  }
  return { firstColumn, parent, frontOrder, columnOrder };
}
