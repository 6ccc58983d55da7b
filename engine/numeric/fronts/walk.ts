import { Fault } from '../../matrix/fault.ts';
import { eliminateCholesky, updateCholeskyBlock } from './choleskyFront.ts';
import { extendIntoBlock, extendIntoPanel } from './extend.ts';
import { type Front, gatherFront } from './front.ts';
import { eliminateLdlt, updateLdltBlock } from './ldltFront.ts';
import { closeLuPanel, eliminateLu, updateLuBlock } from './luFront.ts';
import { addHeldOriginals, addOriginals, type EntryList, listEntries } from './originals.ts';
import { blockSize, panelSize } from './plan.ts';
import type { FrontRun } from './run.ts';

/** What differs between the kinds of fronts. */
interface FrontKind {
  /** eliminates pivots of the assembled panel; returns how many */
  readonly eliminate: (run: FrontRun, front: Front) => number;
  /** finishes the contribution block at `at` of the stack, children's parts being inside already */
  readonly update: (run: FrontRun, front: Front, done: number, at: number) => void;
  /** brings the panel into its final form */
  readonly close: (run: FrontRun, front: Front, done: number) => void;
}

const kinds: Record<'cholesky' | 'ldlt' | 'lu', FrontKind> = {
  cholesky: { eliminate: eliminateCholesky, update: updateCholeskyBlock, close: () => {} },
  ldlt: { eliminate: eliminateLdlt, update: updateLdltBlock, close: () => {} },
  lu: { eliminate: eliminateLu, update: updateLuBlock, close: closeLuPanel },
};

/**
 * The multifrontal walk (Duff & Reid 1983, 1984; Liu 1992): every supernode in the tree's order assembles a front from the matrix and
 * its children's contribution blocks, eliminates what it can, and leaves a contribution block on the stack for its parent.
 */
export function walkFronts(run: FrontRun): void {
  const entries = listEntries(run);
  const kind = kinds[run.options.kind];
  const front: Front = {
    s: 0,
    m: 0,
    summed: 0,
    own: 0,
    first: 0,
    list: 0,
    children: 0,
    panel: new Float64Array(0),
    base: 0,
  };
  for (let s = 0; s < run.tree.count; s++) {
    gatherFront(run, s, front);
    run.fitBuffers(front.m, front.summed);
    placePanel(run, front);
    addOriginals(run, entries, front);
    extendIntoPanel(run, front);
    const done = kind.eliminate(run, front);
    run.eliminated[s] = done;
    run.delayed[s] = front.summed - done;
    run.pivotStart[s + 1] = run.pivotStart[s] + done;
    if (done < front.summed) refuseZeroPivot(run, front, done);
    leaveBlock(run, kind, entries, front, done);
    kind.close(run, front, done);
    keepPanel(run, front, panelSize(run.symmetric, front.m, done));
    run.tick(1000);
  }
}

/** Finds room for the panel: in the factors themselves or, when these are of single precision, in the scratch of the run. */
function placePanel(run: FrontRun, front: Front): void {
  const { store } = run;
  const size = panelSize(run.symmetric, front.m, front.summed);
  if (run.options.single) {
    front.panel = run.scratchFor(size);
    front.base = 0;
    return;
  }
  front.base = store.reserve(size);
  front.panel = store.chunks[store.chunks.length - 1] as Float64Array;
  run.chunkOf[front.s] = store.chunks.length - 1;
  run.panelAt[front.s] = front.base;
}

/** Keeps the finished panel: gives back what it did not use, or rounds it to single precision. */
function keepPanel(run: FrontRun, front: Front, size: number): void {
  const { store } = run;
  if (!run.options.single) {
    store.keep(front.base, size);
    return;
  }
  const width = run.kernels.width;
  const at = store.reserve(size);
  const to = store.chunks[store.chunks.length - 1];
  run.chunkOf[front.s] = store.chunks.length - 1;
  run.panelAt[front.s] = at;
  for (let q = 0; q < width * size; q++) {
    to[width * at + q] = front.panel[q];
    if (!Number.isFinite(to[width * at + q])) throw outOfRange(run, front, 0, front.panel[q]);
  }
  if (run.options.kind === 'ldlt') return;
  // a pivot must not vanish by rounding (those of LDLᵀ stay double)
  for (let k = 0; k < run.eliminated[front.s]; k++) {
    const q = k * front.m - (run.symmetric ? (k * (k + 1)) / 2 : 0) + k;
    const zero = to[width * (at + q)] === 0 && (width === 1 || to[width * (at + q) + 1] === 0);
    if (zero) throw outOfRange(run, front, k, front.panel[width * q]);
  }
}

function outOfRange(run: FrontRun, front: Front, k: number, value: number): Fault {
  const row = run.originalRow(run.rowList[front.list + k]);
  return new Fault(
    'not-completed',
    'outside-single-range',
    `The factors hold ${value}, outside the range of single precision (in the front of original row ${row}, 0-based). Scale the matrix, or store the factors in double precision.`,
    { row },
  );
}

/** Makes the front's contribution block on top of its children's and puts it in their place. */
function leaveBlock(run: FrontRun, kind: FrontKind, entries: EntryList | null, front: Front, done: number): void {
  const { stack } = run;
  const bottom = front.children > 0 ? run.pendingAt[run.pendingCount - front.children] : stack.top;
  const size = front.m - done;
  if (size === 0) {
    stack.top = bottom;
    run.pendingCount -= front.children;
    return;
  }
  const scalars = blockSize(run.symmetric, size);
  const at = stack.push(scalars);
  stack.array.fill(0, at * run.kernels.width, (at + scalars) * run.kernels.width);
  extendIntoBlock(run, front, at, done);
  if (run.options.schur > 0) addHeldOriginals(run, entries, front, at, done);
  kind.update(run, front, done, at);
  stack.settle(at, bottom, scalars);
  run.pendingCount -= front.children;
  run.pendingFront[run.pendingCount] = front.s;
  run.pendingAt[run.pendingCount++] = bottom;
}

/** Without threshold pivoting a front must take all its pivots; one that is exactly zero ends the run. */
function refuseZeroPivot(run: FrontRun, front: Front, done: number): void {
  if (run.options.pivoting === 'threshold') return;
  const column = run.tree.order[run.columnList[front.list + done]];
  throw new Fault(
    'not-completed',
    'zero-pivot',
    `The pivot of original column ${column} (0-based) is zero, and the chosen pivoting allows no other. Use threshold or static pivoting.`,
    { row: run.originalRow(run.rowList[front.list + done]), column },
    [{ id: 'use-threshold', text: 'Use threshold pivoting.' }],
  );
}
