import type { SparseMatrix } from '../../matrix/pattern.ts';
import type { Progress } from '../../matrix/progress.ts';
import type { AssemblyTree, FrontRows } from '../../symbolic/types.ts';
import type { DenseKernels } from '../dense/kernels.ts';
import type { PivotRule, PivotTally } from '../dense/pivoting.ts';
import { type DenseWorkspace, packedLength, panelWidth } from '../dense/workspace.ts';
import type { SettledOptions } from './options.ts';
import { type FrontPlan, planFronts } from './plan.ts';
import { Allocator, type FactorArray, FactorStore, Stack } from './storage.ts';

/** Operations between two calls of progress inside one front: a few milliseconds. */
const tickOperations = 2e7;

/**
 * The state of one factorization while the tree is walked. Unknowns are internal columns (positions of the tree's order); for
 * LU a row is numbered like the column it is paired with.
 */
export class FrontRun {
  readonly size: number;
  readonly symmetric: boolean;
  readonly plan: FrontPlan;
  readonly allocator = new Allocator();
  readonly store: FactorStore;
  readonly stack: Stack;
  /** single precision: the panel that is being worked on; empty otherwise */
  scratch: Float64Array;
  work: DenseWorkspace;
  /** original row -> internal row */
  readonly rowPosition: Int32Array;
  /** original column -> internal column */
  readonly columnPosition: Int32Array;
  /** internal row -> place in the current front; meaningful only for its rows */
  readonly localRow: Int32Array;
  /** internal column -> place in the current front; the same array when symmetric */
  readonly localColumn: Int32Array;
  /** place in a child's contribution block -> place in the current front, rows and columns */
  rowMap: Int32Array;
  columnMap: Int32Array;

  /** front -> first subscript in the lists; length count + 1 */
  readonly listStart: Int32Array;
  /** subscripts of all fronts walked: internal rows, pivots first */
  rowList: Int32Array;
  /** the same for columns; the same array when symmetric */
  columnList: Int32Array;
  /** front -> pivots eliminated in it */
  readonly eliminated: Int32Array;
  /** front -> fully summed columns that it could not eliminate */
  readonly delayed: Int32Array;
  /** front -> array of the factor store */
  readonly chunkOf: Int32Array;
  /** front -> first scalar of its panel in that array */
  readonly panelAt: Int32Array;
  /** front -> number of its first pivot in the order of elimination; length count + 1 */
  readonly pivotStart: Int32Array;
  /** LDLᵀ: pivot -> diagonal of D; empty otherwise */
  readonly diagonal: Float64Array;
  /** LDLᵀ: first pivot of a pair -> subdiagonal of D, 0 elsewhere; empty otherwise */
  readonly subdiagonal: Float64Array;
  /** largest modulus of an entry of the scaled matrix */
  readonly largestEntry: number;
  readonly rule: PivotRule;
  readonly tally: PivotTally = { twoByTwo: 0, offDiagonal: 0, perturbed: 0, largest: 0 };
  /** fronts whose contribution blocks are on the stack, and where these begin */
  readonly pendingFront: Int32Array;
  readonly pendingAt: Int32Array;
  pendingCount = 0;

  /** operations between two calls of progress, done so far, forecast in all */
  private sinceTick = 0;
  operations = 0;
  readonly tick: (operations: number) => void;

  constructor(
    readonly matrix: SparseMatrix,
    readonly tree: AssemblyTree,
    readonly rows: FrontRows,
    readonly options: SettledOptions,
    readonly kernels: DenseKernels,
    progress: Progress,
    recycled: FactorArray[] = [],
  ) {
    const n = tree.size;
    const count = tree.count;
    const width = kernels.width;
    const a = this.allocator;
    this.size = n;
    this.symmetric = options.kind !== 'lu';
    this.plan = planFronts(tree, this.symmetric, options.schur);
    this.columnPosition = a.int32(n);
    for (let k = 0; k < n; k++) this.columnPosition[tree.order[k]] = k;
    this.rowPosition = options.rowPermutation === null ? this.columnPosition : a.int32(n);
    if (options.rowPermutation !== null) {
      for (let j = 0; j < n; j++) this.rowPosition[options.rowPermutation[j]] = this.columnPosition[j];
    }
    this.localRow = a.int32(n);
    this.localColumn = this.symmetric ? this.localRow : a.int32(n);
    this.rowMap = a.int32(this.plan.largestFront);
    this.columnMap = this.symmetric ? this.rowMap : a.int32(this.plan.largestFront);
    this.listStart = a.int32(count + 1);
    this.rowList = a.int32(this.plan.subscripts);
    this.columnList = this.symmetric ? this.rowList : a.int32(this.plan.subscripts);
    this.eliminated = a.int32(count);
    this.delayed = a.int32(count);
    this.chunkOf = a.int32(count);
    this.panelAt = a.int32(count);
    this.pendingFront = a.int32(count + 1);
    this.pendingAt = a.int32(count + 1);
    this.store = new FactorStore(a, this.plan.panels, width, recycled, options.single);
    this.scratch = a.float64(options.single ? width * this.plan.largestPanel : 0);
    this.stack = new Stack(a, this.plan.stack, width);
    this.work = this.buffers(this.plan.largestFront, this.plan.packed);
    this.pivotStart = a.int32(count + 1);
    this.diagonal = a.float64(options.kind === 'ldlt' ? width * n : 0);
    this.subdiagonal = a.float64(options.kind === 'ldlt' ? width * n : 0);
    this.largestEntry = largestScaled(matrix, options);
    this.rule = {
      pivoting: options.pivoting,
      threshold: options.threshold,
      smallest: options.perturbation * this.largestEntry,
      hermitian: options.hermitian,
    };
    let total = 0;
    for (let s = 0; s < count; s++) {
      const m = tree.frontOrder[s];
      const q = m - (tree.firstColumn[s + 1] - tree.firstColumn[s]);
      total += (m * m * m - q * q * q) / 3;
    }
    const scale = this.symmetric ? 1 : 2;
    this.tick = (operations) => {
      this.operations += operations;
      this.sinceTick += operations;
      if (this.sinceTick < tickOperations) return;
      this.sinceTick = 0;
      progress(Math.min(1, this.operations / (scale * total)), 'factorizing');
    };
  }

  /** original row of an internal row */
  originalRow(internal: number): number {
    const column = this.tree.order[internal];
    return this.options.rowPermutation === null ? column : this.options.rowPermutation[column];
  }

  /** The scratch panel of single precision, zeroed; larger where delayed pivots need it. */
  scratchFor(scalars: number): Float64Array {
    const length = this.kernels.width * scalars;
    if (length > this.scratch.length) {
      this.allocator.release(this.scratch);
      this.scratch = this.allocator.float64(length + (length >> 2));
    } else this.scratch.fill(0, 0, length);
    return this.scratch;
  }

  /** Makes the dense buffers larger where delayed pivots made a front larger than planned. */
  fitBuffers(m: number, p: number): void {
    const { work, kernels, allocator } = this;
    const packed = packedLength(m, p);
    const columns = this.options.kind === 'cholesky' ? 0 : m;
    if (packed * kernels.width <= work.left.length && columns * kernels.width <= work.first.length) return;
    for (const buffer of [work.left, work.right, work.first, work.second, work.factors]) allocator.release(buffer);
    this.work = this.buffers(m + (m >> 2), Math.max(packed + (packed >> 2), work.left.length / kernels.width));
  }

  private buffers(m: number, packed: number): DenseWorkspace {
    const { allocator: a, options } = this;
    const width = this.kernels.width;
    const shared = options.kind === 'cholesky' && width === 1;
    const columns = options.kind === 'cholesky' ? 0 : width * m;
    return {
      left: a.float64(width * packed),
      right: a.float64(shared ? 0 : width * packed),
      first: a.float64(columns),
      second: a.float64(options.kind === 'ldlt' ? columns : 0),
      factors: a.float64(width * (panelWidth + 4)),
    };
  }
}

/** Largest modulus of an entry of R·A·C. */
function largestScaled(matrix: SparseMatrix, options: SettledOptions): number {
  const values = matrix.values as Float64Array;
  const width = matrix.field === 'complex' ? 2 : 1;
  const { rowScale, columnScale } = options;
  let most = 0;
  for (let j = 0; j < matrix.columns; j++) {
    const c = columnScale === null ? 1 : Math.abs(columnScale[j]);
    for (let p = matrix.columnPointer[j]; p < matrix.columnPointer[j + 1]; p++) {
      const r = rowScale === null ? 1 : Math.abs(rowScale[matrix.rowIndex[p]]);
      const v = r * c * (width === 1 ? Math.abs(values[p]) : Math.hypot(values[2 * p], values[2 * p + 1]));
      if (v > most) most = v;
    }
  }
  return most;
}
