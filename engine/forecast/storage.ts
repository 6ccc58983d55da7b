import { stackPeak } from '../symbolic/stack.ts';
import type { AssemblyTree } from '../symbolic/types.ts';
import { type Figure, figure, noFigure } from './figure.ts';

/** Bytes of the scalars, indices and pointers of the program that will run. */
export interface Layout {
  /** 4 or 8 for real, 8 or 16 for complex */
  readonly valueBytes: number;
  /** 4 or 8 */
  readonly indexBytes: number;
  /** 4 or 8 */
  readonly pointerBytes: number;
}

/** What storage depends on. */
export interface StorageQuestion {
  readonly size: number;
  readonly lowerEntries: number;
  /** null: the factor is symmetric, only L is stored */
  readonly upperEntries: number | null;
  readonly envelope: number | null;
  /** entries of the matrix */
  readonly matrixEntries: number;
  /** null for column LU */
  readonly tree: AssemblyTree | null;
  readonly layout: Layout;
  /** how far the counts themselves are certain */
  readonly kind: 'exact' | 'bound' | 'modelled';
}

/** Bytes in several layouts. */
export interface Storage {
  /** skyline: every position from the first entry of a row to the diagonal */
  readonly envelope: Figure;
  readonly compressedColumns: Figure;
  /** dense trapezoids with one index list a supernode, padding included */
  readonly panels: Figure;
  /** panels and the stack of contribution blocks at its highest */
  readonly multifrontal: Figure;
  readonly stack: Figure;
  /** the least memory that still works when factors are written out as they are made: the stack and the largest front */
  readonly outOfCore: Figure;
  /** bytes written once and read back for every solve, when factors are written out */
  readonly traffic: Figure;
  /** the whole matrix as a dense array */
  readonly dense: Figure;
  /** what factorizing in the matrix's own storage would save: its bytes; null where fill does not fit */
  readonly overwriting: Figure;
}

/** Bytes of the factors in each layout; exact from the counts for the stated layout. */
export function storageOf(q: StorageQuestion): Storage {
  const { size: n, layout: l, kind } = q;
  const lu = q.upperEntries !== null;
  const upper = q.upperEntries ?? 0;
  const sides = lu ? 2 : 1;
  const entry = l.valueBytes + l.indexBytes;
  const stored = lu ? q.lowerEntries - n + upper : q.lowerEntries;
  const compressed = entry * stored + sides * l.pointerBytes * (n + 1);
  const noTree = 'column LU has no fronts';
  const fill = q.lowerEntries + (lu ? upper - n : 0);
  const matrixHalf = lu ? q.matrixEntries : (q.matrixEntries + n) / 2;
  const own = l.valueBytes * q.matrixEntries + l.indexBytes * q.matrixEntries + l.pointerBytes * (n + 1);
  const overwriting =
    fill <= matrixHalf
      ? figure(own, 'bytes', kind)
      : noFigure(
          'bytes',
          kind,
          'fill-in does not fit into the matrix’s own entries; only a dense matrix, or one without fill, can be overwritten',
        );
  const envelope =
    q.envelope === null
      ? noFigure('bytes', 'exact', 'no envelope is defined for this trial')
      : figure(l.valueBytes * (sides * q.envelope + n) + sides * l.pointerBytes * (n + 1), 'bytes', 'exact');
  const base = {
    envelope,
    compressedColumns: figure(compressed, 'bytes', kind),
    dense: figure(l.valueBytes * n * n, 'bytes', 'exact'),
    overwriting,
  };
  if (q.tree === null) {
    const none = noFigure('bytes', kind, noTree);
    return {
      ...base,
      panels: none,
      multifrontal: none,
      stack: none,
      outOfCore: none,
      traffic: figure(3 * compressed, 'bytes', kind),
    };
  }
  const panel = panelBytes(q.tree, lu, l);
  const stack = l.valueBytes * stackPeak(q.tree, { blocks: lu ? 'square' : 'packed', parent: 'before' });
  let front = 0;
  for (let s = 0; s < q.tree.count; s++) front = Math.max(front, q.tree.frontOrder[s]);
  const frontBytes = l.valueBytes * (lu ? front * front : (front * (front + 1)) / 2);
  return {
    ...base,
    panels: figure(panel, 'bytes', kind),
    stack: figure(stack, 'bytes', kind),
    multifrontal: figure(panel + stack, 'bytes', kind),
    outOfCore: figure(stack + frontBytes, 'bytes', 'bound'),
    traffic: figure(panel + 2 * panel, 'bytes', 'modelled'),
  };
}

function panelBytes(tree: AssemblyTree, lu: boolean, l: Layout): number {
  let subscripts = 0;
  for (let s = 0; s < tree.count; s++) subscripts += tree.frontOrder[s];
  const values = lu ? 2 * tree.storedFactorEntries - tree.size : tree.storedFactorEntries;
  return l.valueBytes * values + l.indexBytes * subscripts + l.pointerBytes * 3 * (tree.count + 1);
}
