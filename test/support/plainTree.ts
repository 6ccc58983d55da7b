import type { Pattern } from '../../engine/matrix/pattern.ts';
import { asNewToOld, composeOrders, type NewToOld, positionOf } from '../../engine/matrix/permutation.ts';
import { symmetrize } from '../../engine/matrix/symmetrize.ts';
import type { AssemblyTree, FrontRows } from '../../engine/symbolic/types.ts';

/**
 * An assembly tree by the plainest means (explicit row merge, column after column), independent of the symbolic room, for tests of
 * the numeric room. Supernodes: chains whose merge adds at most `padding` of zeros to the merged trapezoid; 0: fundamental ones.
 */
export function plainTree(a: Pattern, order: NewToOld, padding = 0): { tree: AssemblyTree; rows: FrontRows } {
  const n = a.columns;
  const first = structureOf(a, order);
  const post = postorder(first.parent);
  const effective = composeOrders(order, asNewToOld(post));
  const { columns, parent } = structureOf(a, effective);
  // supernodes: column j joins the one of j − 1 when j is its parent and the padding allows it
  const starts: number[] = [];
  const sets: Int32Array[] = [];
  let padded = 0;
  for (let j = 0; j < n; j++) {
    const s = sets.length - 1;
    if (s >= 0 && parent[j - 1] === j) {
      const own = j - starts[s];
      const add = own * (columns[j].length - (sets[s].length - own));
      const merged = (own + 1) * columns[j].length;
      if (padded + add <= padding * merged) {
        const rest = columns[j];
        const head = sets[s].subarray(0, own);
        padded += add;
        const set = new Int32Array(own + rest.length);
        set.set(head);
        set.set(rest, own);
        sets[s] = set;
        continue;
      }
    }
    starts.push(j);
    sets.push(columns[j]);
    padded = 0;
  }
  const count = sets.length;
  const firstColumn = new Int32Array(count + 1);
  const superOf = new Int32Array(n);
  for (let s = 0; s < count; s++) {
    firstColumn[s] = starts[s];
    const end = s + 1 < count ? starts[s + 1] : n;
    superOf.fill(s, starts[s], end);
  }
  firstColumn[count] = n;
  const superParent = new Int32Array(count);
  const frontOrder = new Int32Array(count);
  const pointer = new Float64Array(count + 1);
  let stored = 0;
  for (let s = 0; s < count; s++) {
    const m = sets[s].length;
    const p = firstColumn[s + 1] - firstColumn[s];
    frontOrder[s] = m;
    pointer[s + 1] = pointer[s] + m;
    superParent[s] = m > p ? superOf[sets[s][p]] : -1;
    stored += p * m - (p * (p - 1)) / 2;
  }
  const row = new Int32Array(pointer[count]);
  for (let s = 0; s < count; s++) row.set(sets[s], pointer[s]);
  let factorEntries = 0;
  for (const c of columns) factorEntries += c.length;
  const tree = {
    size: n,
    count,
    order: effective,
    firstColumn,
    parent: superParent,
    frontOrder,
    storedFactorEntries: stored,
    factorEntries,
  };
  return { tree, rows: { pointer, row } };
}

/** Subscripts of every column of L (diagonal first, increasing) and the elimination tree, by merging children. */
function structureOf(a: Pattern, order: NewToOld): { columns: Int32Array[]; parent: Int32Array } {
  const n = a.columns;
  const full = symmetrize(a, 'full');
  const position = positionOf(order);
  const mark = new Int32Array(n).fill(-1);
  const parent = new Int32Array(n).fill(-1);
  const children: number[][] = Array.from({ length: n }, () => []);
  const columns: Int32Array[] = [];
  for (let j = 0; j < n; j++) {
    const set: number[] = [j];
    mark[j] = j;
    const add = (i: number): void => {
      if (i <= j || mark[i] === j) return;
      mark[i] = j;
      set.push(i);
    };
    const c = order[j];
    for (let p = full.columnPointer[c]; p < full.columnPointer[c + 1]; p++) add(position[full.rowIndex[p]]);
    for (const child of children[j]) for (const i of columns[child]) add(i);
    const sorted = Int32Array.from(set).sort();
    columns.push(sorted);
    if (sorted.length > 1) {
      parent[j] = sorted[1];
      children[sorted[1]].push(j);
    }
  }
  return { columns, parent };
}

/** Children before parents, subtrees together. */
function postorder(parent: Int32Array): Int32Array {
  const n = parent.length;
  const children: number[][] = Array.from({ length: n }, () => []);
  const stack: number[] = [];
  for (let j = 0; j < n; j++) if (parent[j] >= 0) children[parent[j]].push(j);
  for (let j = n - 1; j >= 0; j--) if (parent[j] < 0) stack.push(j);
  const out: number[] = [];
  const opened = new Uint8Array(n);
  while (stack.length > 0) {
    const j = stack[stack.length - 1];
    if (opened[j]) {
      out.push(j);
      stack.pop();
      continue;
    }
    opened[j] = 1;
    for (let k = children[j].length - 1; k >= 0; k--) stack.push(children[j][k]);
  }
  return Int32Array.from(out);
}
