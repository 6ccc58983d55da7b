import type { AssemblyTree } from './types.ts';

/**
 * How contribution blocks are kept: the lower triangle packed, or square. The parent's block is made on top of its children's, which
 * are freed afterwards; or the children are freed while it is assembled in place of the last one's space.
 */
export interface StackLayout {
  readonly blocks: 'packed' | 'square';
  readonly parent: 'before' | 'after';
}

/** Entries of a contribution block of order s. */
export function blockEntries(s: number, layout: StackLayout): number {
  return layout.blocks === 'packed' ? (s * (s + 1)) / 2 : s * s;
}

/** High-water mark of the stack of contribution blocks over the walk of the tree, in entries. Factor panels are not in it. Linear in supernodes. */
export function stackPeak(tree: AssemblyTree, layout: StackLayout): number {
  let peak = 0;
  walkStack(tree, layout, (_s, _used, high) => {
    if (high > peak) peak = high;
  });
  return peak;
}

/**
 * Entries on the stack after each supernode, and the highest while it was made.
 * @returns supernode -> entries; for a picture of memory over time
 */
export function stackCourse(tree: AssemblyTree, layout: StackLayout): { after: Float64Array; high: Float64Array } {
  const after = new Float64Array(tree.count);
  const high = new Float64Array(tree.count);
  walkStack(tree, layout, (s, used, most) => {
    after[s] = used;
    high[s] = most;
  });
  return { after, high };
}

function walkStack(
  tree: AssemblyTree,
  layout: StackLayout,
  see: (s: number, used: number, high: number) => void,
): void {
  // entries of the children's blocks that wait for a supernode
  const waiting = new Float64Array(tree.count);
  let used = 0;
  for (let s = 0; s < tree.count; s++) {
    const block = blockEntries(tree.frontOrder[s] - (tree.firstColumn[s + 1] - tree.firstColumn[s]), layout);
    const high = layout.parent === 'before' ? used + block : Math.max(used, used - waiting[s] + block);
    used += block - waiting[s];
    if (tree.parent[s] >= 0) waiting[tree.parent[s]] += block;
    else used -= block;
    see(s, used, high);
  }
}
