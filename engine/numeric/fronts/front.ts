import type { FrontRun } from './run.ts';

/**
 * The front that is being worked on. Places 0 … summed − 1 are fully summed unknowns (own columns, then those that children
 * delayed), the rest belong to the contribution block.
 */
export interface Front {
  /** supernode */
  s: number;
  /** order of the front */
  m: number;
  /** fully summed unknowns */
  summed: number;
  /** of these, the own columns: internal columns first … first + own − 1 */
  own: number;
  /** first internal column of the supernode */
  first: number;
  /** first subscript in the lists */
  list: number;
  /** children pending on the stack: the last `children` of them */
  children: number;
  /** array and first scalar of the panel */
  panel: Float64Array;
  base: number;
}

/** Lists the unknowns of front s: own columns, delayed ones, then held and later ones in increasing order; sets their places. */
export function gatherFront(run: FrontRun, s: number, front: Front): void {
  const { tree, rows, localRow, localColumn } = run;
  const left = tree.size - run.options.schur;
  const first = tree.firstColumn[s];
  const own = Math.max(0, Math.min(tree.firstColumn[s + 1], left) - first);
  let children = 0;
  let extra = 0;
  while (children < run.pendingCount && tree.parent[run.pendingFront[run.pendingCount - 1 - children]] === s) {
    const child = run.pendingFront[run.pendingCount - 1 - children];
    extra += run.delayed[child];
    children++;
  }
  const begin = rows.pointer[s];
  const end = rows.pointer[s + 1];
  const at = run.listStart[s];
  let extraHeld = 0;
  if (run.options.schur > 0) extraHeld = heldBelow(run, children, first);
  const m = end - begin + extra + extraHeld;
  growLists(run, at + m, m);
  const rowList = run.rowList;
  const columnList = run.columnList;
  let place = 0;
  for (let q = begin; q < begin + own; q++, place++) {
    rowList[at + place] = rows.row[q];
    columnList[at + place] = rows.row[q];
  }
  for (let c = run.pendingCount - children; c < run.pendingCount; c++) {
    const child = run.pendingFront[c];
    const from = run.listStart[child] + run.eliminated[child];
    for (let k = 0; k < run.delayed[child]; k++, place++) {
      rowList[at + place] = rowList[from + k];
      columnList[at + place] = columnList[from + k];
    }
  }
  const summed = place;
  if (extraHeld > 0) place = appendHeldBelow(run, children, first, at, place);
  for (let q = begin + own; q < end; q++, place++) {
    rowList[at + place] = rows.row[q];
    columnList[at + place] = rows.row[q];
  }
  for (let k = 0; k < m; k++) localRow[rowList[at + k]] = k;
  if (localColumn !== localRow) for (let k = 0; k < m; k++) localColumn[columnList[at + k]] = k;
  run.listStart[s + 1] = at + m;
  front.s = s;
  front.m = m;
  front.summed = summed;
  front.own = own;
  front.first = first;
  front.list = at;
  front.children = children;
}

/** Held unknowns of the children that belong to supernodes below this one. */
function heldBelow(run: FrontRun, children: number, first: number): number {
  let sum = 0;
  for (let c = run.pendingCount - children; c < run.pendingCount; c++) {
    const child = run.pendingFront[c];
    let q = run.listStart[child] + run.eliminated[child] + run.delayed[child];
    while (q < run.listStart[child + 1] && run.rowList[q] < first) {
      sum++;
      q++;
    }
  }
  return sum;
}

function appendHeldBelow(run: FrontRun, children: number, first: number, at: number, from: number): number {
  let place = from;
  for (let c = run.pendingCount - children; c < run.pendingCount; c++) {
    const child = run.pendingFront[c];
    const end = run.listStart[child + 1];
    for (let q = run.listStart[child] + run.eliminated[child] + run.delayed[child]; q < end; q++, place++) {
      if (run.rowList[q] >= first) break;
      run.rowList[at + place] = run.rowList[q];
      run.columnList[at + place] = run.rowList[q];
    }
  }
  return place;
}

/** Delayed pivots make lists longer than planned. */
function growLists(run: FrontRun, need: number, m: number): void {
  if (need > run.rowList.length) {
    const length = Math.ceil(need * 1.25);
    run.rowList = grown(run, run.rowList, length);
    run.columnList = run.symmetric ? run.rowList : grown(run, run.columnList, length);
  }
  if (m > run.rowMap.length) {
    run.rowMap = grown(run, run.rowMap, m + (m >> 2));
    run.columnMap = run.symmetric ? run.rowMap : grown(run, run.columnMap, m + (m >> 2));
  }
}

function grown(run: FrontRun, list: Int32Array, length: number): Int32Array {
  const out = run.allocator.int32(length);
  out.set(list);
  run.allocator.release(list);
  return out;
}
