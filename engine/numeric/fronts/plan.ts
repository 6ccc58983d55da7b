import type { AssemblyTree } from '../../symbolic/types.ts';
import { packedLength, panelWidth } from '../dense/workspace.ts';

/** Sizes of a run in which no pivot is delayed, from the tree alone. In scalars unless said otherwise. */
export interface FrontPlan {
  /** supernode -> scalars of its panel */
  readonly panels: Float64Array;
  /** largest panel */
  readonly largestPanel: number;
  /** Σ panels: the stored factor entries */
  readonly factor: number;
  /** high-water mark of the stack of contribution blocks */
  readonly stack: number;
  /** scalars of each packing buffer */
  readonly packed: number;
  /** order of the largest front */
  readonly largestFront: number;
  /** Σ order of fronts */
  readonly subscripts: number;
}

/** Scalars of a panel with p pivots in a front of order m: lower trapezoid, or both trapezoids with the diagonal once. */
export function panelSize(symmetric: boolean, m: number, p: number): number {
  return symmetric ? p * m - (p * (p - 1)) / 2 : p * (2 * m - p);
}

/** Scalars of a contribution block of order s: packed lower triangle, or square. */
export function blockSize(symmetric: boolean, s: number): number {
  return symmetric ? (s * (s + 1)) / 2 : s * s;
}

/**
 * Sizes for the layout used here: panels in the factor store, contribution blocks on a stack (packed lower triangle when
 * symmetric, square for LU), the parent's block made on top of its children's before these are dropped. Linear in supernodes.
 * @param held number of last columns that are never eliminated: they stay in contribution blocks up to the roots.
 */
export function planFronts(tree: AssemblyTree, symmetric: boolean, held: number): FrontPlan {
  const panels = new Float64Array(tree.count);
  const left = tree.size - held;
  const pending = new Float64Array(tree.count);
  const extra = new Int32Array(tree.count);
  let factor = 0;
  let largestPanel = 0;
  let top = 0;
  let stack = 0;
  let largestFront = 0;
  let mostPivots = 0;
  let subscripts = 0;
  for (let s = 0; s < tree.count; s++) {
    const first = tree.firstColumn[s];
    const own = tree.firstColumn[s + 1] - first;
    const p = Math.max(0, Math.min(own, left - first));
    const m = tree.frontOrder[s] + extra[s];
    panels[s] = panelSize(symmetric, m, p);
    factor += panels[s];
    if (panels[s] > largestPanel) largestPanel = panels[s];
    subscripts += m;
    if (m > largestFront) largestFront = m;
    if (p > mostPivots) mostPivots = p;
    const block = blockSize(symmetric, m - p);
    if (top + block > stack) stack = top + block;
    top += block - pending[s];
    const parent = tree.parent[s];
    if (parent < 0) continue;
    pending[parent] += block;
    extra[parent] += own - p + extra[s];
  }
  return {
    panels,
    largestPanel,
    factor,
    stack,
    packed: packedLength(largestFront, mostPivots),
    largestFront,
    subscripts,
  };
}

/** What the peak of a run depends on beside the tree. */
export interface PeakQuestion {
  readonly kind: 'cholesky' | 'ldlt' | 'lu';
  readonly complex: boolean;
  /** entries of the matrix, both triangles */
  readonly entries: number;
  /** held unknowns; default 0 */
  readonly schur?: number;
  /** whether rows are paired with columns by a matching; default false */
  readonly paired?: boolean;
  /** whether factors are stored in single precision; default false */
  readonly single?: boolean;
}

/** Bytes of a run's arrays, by purpose. */
export interface PeakBytes {
  /** panels of the factors, with amalgamation padding, and the pivot blocks of LDLᵀ */
  readonly factors: number;
  /** stack of contribution blocks at its highest */
  readonly stack: number;
  /** packed operands and columns of the dense kernels */
  readonly workspace: number;
  /** subscripts, maps and lists */
  readonly indices: number;
  readonly total: number;
}

/** The peak of `PivotReport.peakBytes`, exact when no pivot is delayed: every array of a run is made from these sizes. */
export function predictPeakBytes(tree: AssemblyTree, question: PeakQuestion): PeakBytes {
  const { kind, complex, entries } = question;
  const symmetric = kind !== 'lu';
  const plan = planFronts(tree, symmetric, question.schur ?? 0);
  const scalar = complex ? 16 : 8;
  const n = tree.size;
  const pivots = kind === 'ldlt' ? 2 * n : 0;
  const packed = kind === 'cholesky' && !complex ? plan.packed : 2 * plan.packed;
  const columns = kind === 'cholesky' ? 0 : kind === 'ldlt' ? 2 : 1;
  const sides = symmetric ? 1 : 2;
  const perColumn = 1 + (question.paired === true ? 1 : 0) + sides;
  const lists = symmetric ? 0 : n + 1 + 2 * entries;
  const perFront = 8;
  const single = question.single === true;
  const factors = (single ? scalar / 2 : scalar) * plan.factor + scalar * pivots;
  const stack = scalar * plan.stack;
  const workspace = scalar * ((single ? plan.largestPanel : 0) + packed + columns * plan.largestFront + panelWidth + 4);
  const indices =
    4 * (perColumn * n + sides * (plan.largestFront + plan.subscripts) + perFront * tree.count + 4 + lists);
  return { factors, stack, workspace, indices, total: factors + stack + workspace + indices };
}
