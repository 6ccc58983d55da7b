import type { Loaded } from '../../engine/exchange/loaded.ts';
import type { SparseMatrix } from '../../engine/matrix/pattern.ts';

/** Whether typed arrays can be shared between workers here (the page is cross-origin isolated). */
export const canShare: boolean = typeof SharedArrayBuffer !== 'undefined' && globalThis.crossOriginIsolated === true;

function sharedInts(a: Int32Array): Int32Array {
  if (a.buffer instanceof SharedArrayBuffer) return a;
  const out = new Int32Array(new SharedArrayBuffer(a.byteLength));
  out.set(a);
  return out;
}

function sharedFloats(a: Float64Array): Float64Array {
  if (a.buffer instanceof SharedArrayBuffer) return a;
  const out = new Float64Array(new SharedArrayBuffer(a.byteLength));
  out.set(a);
  return out;
}

/** The same matrix on shared memory, or the matrix itself where memory cannot be shared. Array by array, so the peak stays low. */
export function shareMatrix(a: SparseMatrix): SparseMatrix {
  if (!canShare) return a;
  return {
    ...a,
    columnPointer: sharedInts(a.columnPointer),
    rowIndex: sharedInts(a.rowIndex),
    values: a.values === null ? null : sharedFloats(a.values),
  };
}

/** `shareMatrix` for all of a loaded file. */
export function shareLoaded(loaded: Loaded): Loaded {
  if (!canShare) return loaded;
  const rhs = loaded.rightHandSides;
  return {
    ...loaded,
    matrix: shareMatrix(loaded.matrix),
    rightHandSides: rhs === null ? null : { ...rhs, values: sharedFloats(rhs.values) },
  };
}
